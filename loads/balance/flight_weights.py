"""The weight of the aircraft over a flight on which something comes aboard, or hangs outside.

Within a section weight only falls, so its greatest is at a start and its least at an end of one. Of the whole
weight, what hangs outside and can be released (`released`) is told apart:

    weight in all     at most the maximum with an external load, while something releasable hangs outside
    weight - released at most the ordinary maximum, always

after 14 CFR 27.25(c) and 29.25(c) as remembered: what exceeds the ordinary maximum is made up only of the
jettisonable external load, and nobody hangs outside. With somebody outside nothing counts as releasable.
"""

from collections.abc import Mapping, Sequence
from fractions import Fraction
from typing import NamedTuple

from fleet.basis import Phase
from loads.balance.aboard import Declared
from loads.balance.exact import added
from loads.balance.fuel import NOTHING, Contents
from loads.balance.over_flight import over_flight
from loads.balance.prepared import Prepared
from loads.balance.result import State
from loads.balance.sections import Dry, Sections


class Moment(NamedTuple):
    """One moment of the flight: where it is in words, the weight in all, and of it what can be released."""

    where: str
    weight: Fraction
    released: Fraction
    ends: bool  # at the end of a section, when it is lightest
    outside: bool  # somebody hangs outside
    phase: Phase | None = None


class FlightWeights(NamedTuple):
    """The moments from take-off on, at engine start and at take-off; `payload` is by how much the aircraft
    without fuel gets heavier than at engine start.
    """

    ramp: Moment
    take_off: Moment
    flight: tuple[Moment, ...]
    payload: Fraction


def flight_weights(
    declared: Declared,
    states: Mapping[Phase, State],
    flown: tuple[Sections | None, Sequence[Dry] | None],
    ready: Prepared,
) -> FlightWeights | None:
    """Return the weights of a load on which something comes aboard or hangs outside; None of any other."""
    loads = over_flight(declared)
    outside = [_outside(each, ready) for each in loads]
    comes = any(event.coming for event in declared.sequence)
    if not comes and not any(released or person for released, person in outside):
        return None
    sections, dry = flown
    if sections is None or dry is None:
        moments = [
            _moment(phase, states[phase].weight, outside[0], phase)
            for phase in ("take-off", "landing", "minimum at landing")
        ]
        ramp = _moment("ramp", states["ramp"].weight, outside[0], "ramp")
        return FlightWeights(ramp, moments[0], tuple(moments), NOTHING)
    flight = _along(declared, sections, dry, outside)
    taxi = sum(event.leg == "taxi" for event in declared.sequence)
    ramp = _moment("ramp", states["ramp"].weight, outside[0], "ramp")
    take_off = _moment("take-off", states["take-off"].weight, outside[taxi], "take-off")
    heaviest = max(each.sums.weight for each in dry) - dry[0].sums.weight
    return FlightWeights(ramp, take_off, flight, heaviest)


def _along(
    declared: Declared, sections: Sections, dry: Sequence[Dry], outside: Sequence[tuple[Fraction, bool]]
) -> tuple[Moment, ...]:
    """Return both ends of every section in flight."""
    plan = declared.fuel
    trapped = added(held.trapped for held in plan.tanks)
    found = []
    before = None
    for section in sections.sections:
        if section.leg != "taxi":
            held = outside[section.aboard]
            start = section.begins or (f"just after event {before}" if before else "")
            end = section.ends or (f"just before event {section.event.number}" if section.event else "")
            for where, contents, phase, ends in (
                (start, section.start, section.begins, False),
                (end, section.end, section.ends, True),
            ):
                weight = dry[section.aboard].sums.weight + _fuel(contents, trapped, plan.density)
                found.append(Moment(where, weight, held[0], ends, held[1], phase))
        before = None if section.event is None else section.event.number
    return tuple(found)


def _fuel(contents: Contents, trapped: Fraction, density: Fraction) -> Fraction:
    return (added(contents.values()) + trapped) * density


def _moment(where: str, weight: Fraction, outside: tuple[Fraction, bool], phase: Phase) -> Moment:
    return Moment(where, weight, outside[0], True, outside[1], phase)


def _outside(aboard: Declared, ready: Prepared) -> tuple[Fraction, bool]:
    """Return the weight outside that can be released, and whether somebody hangs outside."""
    places = {place.id for place in ready.basis.places if place.external}
    people = (*aboard.crew, *aboard.passengers)
    if any(person.seat.id in places for person in people):
        return NOTHING, True
    released = (
        item.weight for item in aboard.items if item.jettisonable and item.place.external and item.weight
    )
    return added(released), False
