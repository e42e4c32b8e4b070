"""Checks of a flight on which something comes aboard, or hangs outside: its greatest and its least weight,
the weight with and without a jettisonable external load, and how many people there are at most.

Only while something that can be released hangs outside does the maximum with an external load hold, and then
all but that load must be within the ordinary maximum. A landing, and zero fuel, have their ordinary limits.
"""

from collections.abc import Mapping, Sequence
from fractions import Fraction

from fleet.basis import Phase
from loads.balance.aboard import Declared
from loads.balance.flight_weights import FlightWeights, Moment
from loads.balance.margins import Figure, at_least, at_most
from loads.balance.over_flight import over_flight
from loads.balance.prepared import Prepared
from loads.balance.result import Check, State
from loads.balance.rounding import WEIGHT_PLACES, printed

BADNESS = {"fail": 0, "unresolved": 1, "pass": 2, "advisory": 3}
RAMP = "ramp weight without the external load, which lies on the ground"
WITHOUT = "without the external load that can be released"


def with_flight_weights(
    checks: Sequence[Check],
    declared: Declared,
    weights: FlightWeights,
    states: Mapping[Phase, State],
    ready: Prepared,
) -> list[Check]:
    """Return the checks of a load with those of its weights over the flight in place of the plain ones."""
    judge = _Judge(declared, ready)
    other = {"weight.take-off": judge.take_off(weights.take_off)}
    if weights.ramp.released:
        other["weight.ramp"] = judge.ramp(weights.ramp)
    if weights.payload > 0:
        other["weight.zero-fuel"] = judge.zero_fuel(states["zero fuel"].weight + weights.payload)
    if declared.sequence:
        other["weight.minimum-flying"] = [judge.lightest(weights.flight), *judge.heaviest(weights.flight)]
    found: list[Check] = []
    for check in checks:
        found += other.get(check.code, [check])
    return found


def greatest_persons_check(declared: Declared, ready: Prepared) -> list[Check]:
    """Return whether everybody has a seat when most people are aboard; [] where nobody comes aboard."""
    if not any(event.coming for event in declared.sequence):
        return []
    most = max(len(each.crew) + len(each.passengers) for each in over_flight(declared))
    closed = dict(ready.basis.closed)
    seats = sum(seat not in closed for seat in declared.configuration.seats)
    text = f"{seats - most} seats left" if most <= seats else f"{most - seats} more than there are seats"
    return [
        Check(
            "persons.greatest",
            "greatest number of persons in flight, lap infants aside",
            "pass" if most <= seats else "fail",
            actual=str(most),
            limit=str(seats),
            unit="persons",
            margin=str(seats - most),
            margin_text=text,
            source="seats of the configuration that may be used",
            what_next="" if most <= seats else "Let fewer come aboard, or let somebody leave before.",
        )
    ]


class _Judge:
    """The checks of one load's moments against the limits of its configuration."""

    def __init__(self, declared: Declared, ready: Prepared) -> None:
        self.limits = declared.configuration.limits
        self.unit = ready.weight

    def take_off(self, at: Moment) -> list[Check]:
        """Return the check of the take-off weight, and of what of it stays when the load is released."""
        return self._both("weight.take-off", "take-off weight", at)

    def ramp(self, at: Moment) -> list[Check]:
        """Return the check of the ramp weight: the external load lies on the ground."""
        figure = self._figure("weight.ramp", RAMP, at.weight - at.released, "ramp")
        return [at_most(figure, self.limits.ramp, self._off)]

    def zero_fuel(self, greatest: Fraction) -> list[Check]:
        """Return the check of the zero-fuel weight with the greatest load of the flight."""
        title = "zero-fuel weight, with the greatest load of the flight"
        figure = self._figure("weight.zero-fuel", title, greatest, "zero fuel")
        return [at_most(figure, self.limits.zero_fuel, self._off)]

    def lightest(self, flight: Sequence[Moment]) -> Check:
        """Return the check of the least weight in flight."""
        least = min((one for one in flight if one.ends), key=lambda one: one.weight)
        title = "minimum flying weight"
        if least.phase is None:
            title = f"{title}, {least.where}"
        figure = self._figure("weight.minimum-flying", title, least.weight, least.phase)

        def fix(short: Fraction) -> str:
            return f"Add at least {self._up(short)} as ballast, load or fuel kept until then."

        return at_least(figure, self.limits.minimum_flying, fix)

    def heaviest(self, flight: Sequence[Moment]) -> list[Check]:
        """Return the checks of the greatest weight in flight: the moment with the least room, of the whole
        and of what stays when the load is released.
        """
        found: dict[str, Check] = {}
        for one in flight:
            if one.ends:
                continue
            where = f"weight in flight, {one.where if one.phase is None else f'at {one.where}'}"
            for check in self._both("weight.in-flight", where, one._replace(phase=None)):
                held = found.get(check.code)
                if held is None or _rank(check) < _rank(held):
                    found[check.code] = check
        return list(found.values())

    def _both(self, code: str, title: str, at: Moment) -> list[Check]:
        limits, higher = self.limits, self.limits.with_external_load
        ordinary = at_most(self._figure(code, title, at.weight, at.phase), limits.take_off, self._off)
        if not at.released:
            if at.outside and higher is not None and ordinary.outcome == "fail":
                text = f"{ordinary.margin_text}; somebody hangs outside, so no higher weight holds"
                ordinary = ordinary._replace(margin_text=text)
            return [ordinary]
        named = f"{title}, with the external load"
        if higher is None:
            return [self._not_entered(ordinary, named) if ordinary.outcome == "fail" else ordinary]
        inside = self._figure(f"{code}-internal", f"{title}, {WITHOUT}", at.weight - at.released, at.phase)
        return [
            at_most(self._figure(code, named, at.weight, at.phase), higher, self._off),
            at_most(inside, limits.take_off, self._off),
        ]

    def _not_entered(self, ordinary: Check, title: str) -> Check:
        return ordinary._replace(
            title=title,
            outcome="unresolved",
            limit=None,
            margin=None,
            room=None,
            margin_text=f"{ordinary.margin_text}; the maximum with an external load was not entered",
            what_next="Enter the maximum with an external load in the loading basis, or carry less.",
        )

    def _figure(self, code: str, title: str, weight: Fraction, phase: Phase | None) -> Figure:
        return Figure(code, title, weight, self.unit, WEIGHT_PLACES, phase)

    def _off(self, excess: Fraction) -> str:
        return f"Carry at least {self._up(excess)} less at that moment."

    def _up(self, weight: Fraction) -> str:
        return f"{printed(weight, WEIGHT_PLACES, 'up')} {self.unit}"


def _rank(check: Check) -> tuple[int, bool, Fraction]:
    return BADNESS[check.outcome], check.room is None, check.room or Fraction(0)
