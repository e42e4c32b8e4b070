"""The allowable take-off weight: the least of every limit that bears on it, and which one governs.

Structural take-off; stated limits at take-off; landing limit, structural or stated, plus the fuel burned
until then; zero-fuel limit plus the fuel burnable at take-off; ramp limit less taxi fuel (rule: the maximum
allowable take-off weight of 14 CFR 135.63(c)(3), the limiting mass of CAT.POL.MAB.105(a)).
"""

from collections.abc import Mapping
from fractions import Fraction
from typing import NamedTuple

from fleet.basis import Limits, Phase
from fleet.sourced import Limit
from loads.balance.aboard import Declared
from loads.balance.exact import minus, plus
from loads.balance.flight_weights import FlightWeights
from loads.balance.result import Json, State
from loads.balance.rounding import WEIGHT_PLACES, printed


class Candidate(NamedTuple):
    """One bound on the take-off weight, and where it comes from."""

    name: str
    weight: Fraction


class Allowable(NamedTuple):
    """The candidates with the least one (None: no limit at all), and the limits that were not entered."""

    candidates: tuple[Candidate, ...]
    least: Candidate | None
    not_entered: tuple[str, ...]

    def as_document(self) -> Json:
        """Return the block of the result document; weights are rounded down."""
        return {
            "weight": None if self.least is None else printed(self.least.weight, WEIGHT_PLACES, "down"),
            "governed_by": "no limit" if self.least is None else self.least.name,
            "candidates": [
                {"name": one.name, "weight": printed(one.weight, WEIGHT_PLACES, "down")}
                for one in self.candidates
            ],
            "not_entered": list(self.not_entered),
        }


def allowable_take_off(
    declared: Declared, states: Mapping[Phase, State], weights: FlightWeights | None = None
) -> Allowable:
    """Return the allowable take-off weight of this load with its fuel plan; of equal bounds the first named
    governs. `weights` are those of a load on which something comes aboard in flight or hangs outside.
    """
    limits = declared.configuration.limits
    at = {phase: state.weight for phase, state in states.items()}
    take_off = at["take-off"]
    # What leaves in flight is no more aboard at landing than the fuel that burned.
    trip = "trip fuel and what leaves" if any(e.leaving for e in declared.sequence) else "trip fuel"
    if any(e.coming for e in declared.sequence):
        trip = f"{trip}, less what comes aboard"
    entered: list[tuple[str, Limit | None, Fraction]] = [
        ("structural take-off", limits.take_off, Fraction(0)),
        (f"landing limit + {trip}", limits.landing, minus(take_off, at["landing"])),
        ("zero-fuel limit + take-off fuel", limits.zero_fuel, minus(take_off, at["zero fuel"])),
        ("ramp limit - taxi fuel", limits.ramp, minus(take_off, at["ramp"])),
    ]
    if weights is not None:
        entered = _over_flight(entered, limits, weights, take_off)
    found = [
        Candidate(name, plus(limit.value, added))
        for name, limit, added in entered
        if limit is not None and limit.value is not None
    ]
    for stated in declared.limits:
        if stated.at == "take-off":
            found.append(Candidate(stated.named, stated.weight))
        else:
            found.append(Candidate(f"{stated.named} + {trip}", stated.weight + take_off - at["landing"]))
    missing = tuple(name for name, limit, _ in entered if limit is None)
    return Allowable(tuple(found), min(found, key=lambda one: one.weight, default=None), missing)


Entered = list[tuple[str, Limit | None, Fraction]]


def _over_flight(plain: Entered, limits: Limits, weights: FlightWeights, take_off: Fraction) -> Entered:
    """Return the bounds of a load on which something comes aboard in flight or hangs outside."""
    structural, landing, zero_fuel, ramp = plain
    found: Entered = [structural]
    outside = weights.take_off.released
    if outside and limits.with_external_load is not None:
        found = [
            ("maximum with an external load", limits.with_external_load, Fraction(0)),
            ("structural take-off + external load", limits.take_off, outside),
        ]
    comes = ("zero-fuel limit + take-off fuel, less what comes aboard", limits.zero_fuel)
    found += [landing, (*comes, zero_fuel[2] - weights.payload) if weights.payload > 0 else zero_fuel]
    found.append((ramp[0], ramp[1], ramp[2] + weights.ramp.released))
    for one in weights.flight:
        if one.phase is None and not one.ends and one.weight > take_off:
            higher = limits.with_external_load if one.released else None
            name = f"maximum in flight, {one.where}"
            found.append((name, limits.take_off if higher is None else higher, take_off - one.weight))
            if higher is not None:
                found.append(
                    (f"{name}, + external load", limits.take_off, take_off - one.weight + one.released)
                )
    return found
