"""Seats that stand on rails and whose setting nobody stated: both ends of the rail are checked.

All such seats forward, and all of them aft, are the least and the greatest moment there can be; both are
added to every phase and to the whole path, and of each check the worse one counts and says which end it was.
"""

from collections.abc import Mapping, Sequence
from fractions import Fraction
from typing import NamedTuple

from fleet.basis import Phase
from loads.balance.aboard import Declared, Person
from loads.balance.exact import added
from loads.balance.moves import Flight
from loads.balance.over_flight import coming_people
from loads.balance.path import Knot
from loads.balance.path_worst import Burn, bounds_on, burn_of, shifted
from loads.balance.prepared import Prepared
from loads.balance.result import Check, State

BY_MOMENT = ("cg.", "path.longitudinal", "path.zero-fuel", "lateral-by-cg", "path.lateral-by-cg")
ORDER = {"fail": 0, "unresolved": 1, "pass": 2, "advisory": 3}


class RailEnd(NamedTuple):
    """All seats without a setting at one end: in words, and what that adds to the moment."""

    words: str
    along: Fraction


def rail_ends(declared: Declared) -> tuple[RailEnd, ...]:
    """Return both ends, or () when somebody sits in no seat whose setting is open."""
    ends = [
        (_weight(person), person.seat.arm, person.seat.rail)
        for person in (*declared.crew, *declared.passengers, *coming_people(declared))
        if person.seat.rail is not None
    ]
    if not ends:
        return ()
    return (
        RailEnd("forward", added(w * (rail.forward - arm) for w, arm, rail in ends if rail is not None)),
        RailEnd("aft", added(w * (rail.aft - arm) for w, arm, rail in ends if rail is not None)),
    )


def at_rail_end(states: Mapping[Phase, State], burn: Burn, end: RailEnd, ready: Prepared) -> Flight:
    """Return the phases and the burn with all open seats at one end."""
    moved = {
        phase: state._replace(moment=state.moment + end.along, arm=(state.moment + end.along) / state.weight)
        for phase, state in states.items()
    }
    return moved, burn_of(shifted(burn.path, end.along, Fraction(0)), ready)


def parts_lie_apart(flights: Sequence[Flight], ready: Prepared) -> bool:
    """Return whether both ends lie inside an envelope, but in different parts of it at one weight: then the
    way between leads outside.

    It is asked at the ends of every stretch. As an envelope has no hole, what is inside at both ends of the
    rail, and all the way between them where a stretch begins and ends, is inside all over.
    """
    (_, forward), (_, aft) = flights
    for one, other in zip(forward.path.stretches, aft.path.stretches, strict=True):
        for _, shape in bounds_on(one.leg, ready):
            for fore, rear in ((one.start, other.start), (one.end, other.end)):
                parts = shape.arms_at(fore.weight)
                if len(parts) > 1 and _part(parts, fore) != _part(parts, rear):
                    return True
    return False


def _part(parts: Sequence[tuple[Fraction, Fraction]], knot: Knot) -> int | None:
    arm = knot.moment / knot.weight
    return next((number for number, (low, high) in enumerate(parts) if low <= arm <= high), None)


def worse_of(
    told: list[Check], at_ends: list[tuple[RailEnd, list[Check]]], *, apart: bool = False
) -> list[Check]:
    """Return the checks with each that depends on the moment replaced by the worse of both ends.

    Inside one part of an envelope at one end and inside another at the other, the way between leads outside;
    `apart` says that this is so somewhere along the burn.
    """
    found = []
    for number, check in enumerate(told):
        ends = [(end, checks[number]) for end, checks in at_ends]
        if not check.code.startswith(BY_MOMENT) or check.outcome == "advisory":
            found.append(check)
            continue
        end, worse = min(ends, key=lambda each: _badness(each[1]))
        parted = apart if check.code == "path.longitudinal" else check.code.startswith("cg.") and _apart(ends)
        if worse.outcome == "pass" and parted:
            fix = "State where the seats on rails stand."
            text = "forward and aft lie in different parts of the envelope"
            worse = worse._replace(outcome="unresolved", what_next=fix, margin_text=text)
        words = f"{worse.margin_text}, seats on rails {end.words}"
        found.append(worse._replace(margin_text=words))
    return found


def _weight(person: Person) -> Fraction:
    infant = person.lap_infant
    parts = (person.weight, infant.weight if infant else None, person.restraint)
    return added(part for part in parts if part is not None)


def _badness(check: Check) -> tuple[int, bool, Fraction]:
    return ORDER[check.outcome], check.room is not None, check.room or Fraction(0)


def _apart(ends: list[tuple[RailEnd, Check]]) -> bool:
    return len({(check.low, check.limit) for _, check in ends}) > 1
