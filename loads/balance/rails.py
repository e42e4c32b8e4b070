"""Seats that stand on rails and whose setting nobody stated: both ends of the rail are checked.

All such seats forward, and all of them aft, are the least and the greatest moment there can be; both are
added to every phase and to the whole path, and of each check the worse one counts and says which end it was.

A lateral limit against the longitudinal CG may be kept at both ends and broken between them. Every place
between at which that may turn is known (`loads.balance.touching`), so one look between each two proves it.
"""

from collections.abc import Iterator, Mapping, Sequence
from fractions import Fraction
from itertools import pairwise
from typing import NamedTuple

from fleet.basis import Phase
from loads.balance.aboard import Declared, Person
from loads.balance.exact import added
from loads.balance.moves import Flight
from loads.balance.over_flight import coming_people
from loads.balance.path import Knot
from loads.balance.path_worst import Burn, bounds_on, burn_of, shifted
from loads.balance.polynomial import Root
from loads.balance.prepared import Prepared
from loads.balance.result import Check, State
from loads.balance.touching import each_once
from loads.balance.varied_flights import Fit, Flights, Sample

BY_MOMENT = ("cg.", "path.longitudinal", "path.zero-fuel", "lateral-by-cg", "path.lateral-by-cg")
ORDER = {"fail": 0, "unresolved": 1, "pass": 2, "advisory": 3}


BY_CG = ("lateral-by-cg", "path.lateral-by-cg")
STATE_THEM = "State where the seats on rails stand."


class RailEnd(NamedTuple):
    """All seats without a setting at one end: in words, what that adds to the moment, and the share of the
    way aft.
    """

    words: str
    along: Fraction
    share: Fraction


def rail_ends(declared: Declared) -> tuple[RailEnd, ...]:
    """Return both ends, or () when somebody sits in no seat whose setting is open."""
    ends = [
        (_weight(person), person.seat.arm, person.seat.rail)
        for person in (*declared.crew, *declared.passengers, *coming_people(declared))
        if person.seat.rail is not None
    ]
    if not ends:
        return ()
    fore = added(w * (rail.forward - arm) for w, arm, rail in ends if rail is not None)
    rear = added(w * (rail.aft - arm) for w, arm, rail in ends if rail is not None)
    return RailEnd("forward", fore, Fraction(0)), RailEnd("aft", rear, Fraction(1))


def between_ends(ends: Sequence[RailEnd], flights: Sequence[Flight], ready: Prepared) -> Iterator[RailEnd]:
    """Yield positions between both ends, one between each two at which a lateral limit against the
    longitudinal CG may turn from kept to broken; none where the ends alone decide.
    """
    if not ready.basis.lateral_by_cg:
        return
    fore, rear = ends
    samples = [Sample(tuple(states.values()), burn.path) for states, burn in flights]
    found = Flights(ready, (Fraction(1),), Fit((fore.share, rear.share)), samples)
    whole = fore.share, rear.share
    turns = each_once([*(Root(end, end) for end in whole), *found.touches_across(whole)])
    for turn, following in pairwise(turns):
        share = (turn.high + following.low) / 2
        yield RailEnd("between forward and aft", fore.along + share * (rear.along - fore.along), share)


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
    told: list[Check],
    at_ends: list[tuple[RailEnd, list[Check]]],
    between: Sequence[tuple[RailEnd, list[Check]]] = (),
    *,
    apart: bool = False,
) -> list[Check]:
    """Return the checks with each that depends on the moment replaced by the worse of both ends, or what is
    broken `between` them where both ends keep it.

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
        if worse.outcome == "pass" and check.code.startswith(BY_CG):
            inside = [(each, checks[number]._replace(what_next=STATE_THEM)) for each, checks in between]
            end, worse = min([(end, worse), *inside], key=lambda each: ORDER[each[1].outcome])
        parted = apart if check.code == "path.longitudinal" else check.code.startswith("cg.") and _apart(ends)
        if worse.outcome == "pass" and parted:
            text = "forward and aft lie in different parts of the envelope"
            worse = worse._replace(outcome="unresolved", what_next=STATE_THEM, margin_text=text)
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
