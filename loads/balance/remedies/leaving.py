"""The last resort: somebody stays on the ground. Who that is, a program does not say.

A group is described so that whoever of it stays, the load is within: how many, from which rows, and how heavy
at least. Of each group either a point of the flight is known that lies outside without it, too, or that a
weight stays too great, or it was assessed. So fewer than are told would not do: that is proved.
"""

from collections.abc import Sequence
from fractions import Fraction
from itertools import combinations
from typing import NamedTuple

from fleet.basis import Seat
from loads.balance.aboard import Person
from loads.balance.checks_places import held_by
from loads.balance.rails import rail_ends
from loads.balance.remedies.points import spots_of
from loads.balance.remedies.question import Question
from loads.balance.remedies.steps import Leave, taken
from loads.balance.remedies.suiting import fixed_lines
from loads.balance.result import Result

MOST_GROUPS = 12_000
ZERO = Fraction(0)
MOST_ASSESSED = 400
MOST_WINDOWS = 3
Group = tuple[tuple[Person, ...], Fraction, bool]  # its weight, and whether it is plain that it does not hold
Tried = tuple[tuple[Person, ...], Fraction, Result | None]  # None: it was known that it does not hold


class Left(NamedTuple):
    """So many passengers of these rows, together at least so heavy; `result` is that of the lightest such
    group. `proven`: fewer do not suffice. Without rows there are such groups, but none that can be told.
    """

    people: int
    rows: tuple[str, ...]
    weight: Fraction
    result: Result
    proven: bool = False


def fewest_left(question: Question) -> Left | None:
    """Return the fewest passengers who have to stay on the ground; None when that mends nothing.

    Whoever has an infant on the lap stays out of the count: nobody is asked to part from a child.
    """
    rows = rows_of(question.ready.basis.seats)
    fixed = fixed_lines(question.declared)
    people = [
        one
        for one in question.declared.passengers
        if one.weight is not None and one.lap_infant is None and one.pointer not in fixed
    ]
    known = _Known(question)
    fewer_do_not = True
    for count in range(1, len(people) + 1):
        if not _affordable(len(people), count):
            return None
        groups = _groups(question, known, people, count)
        few = sum(not outside for _, _, outside in groups) <= MOST_ASSESSED
        kept: dict[tuple[int, ...], Result] = {}
        for some in ([groups] if few else []) + _windows(groups, rows)[: None if few else MOST_WINDOWS]:
            tried = _each_tried(question, some, kept)
            if not question.left():
                return None
            described = _described(tried, rows, count)
            if described is not None:
                return described._replace(proven=fewer_do_not)
        holding = [result for result in kept.values() if _holds(result)]
        if few and holding:  # so many will do, but no rows and weight tell of which any will
            return Left(count, (), ZERO, holding[0], fewer_do_not)
        fewer_do_not = fewer_do_not and few
    return None


def _groups(question: Question, known: "_Known", people: Sequence[Person], count: int) -> list[Group]:
    found: list[Group] = []
    for group in combinations(people, count):
        if not question.left():
            return []
        found.append((group, known.weight(group), known.outside(group)))
    return found


def _each_tried(
    question: Question, groups: Sequence[Group], kept: dict[tuple[int, ...], Result]
) -> list[Tried]:
    """Return groups with the result without each; what was assessed before is `kept`."""
    tried: list[Tried] = []
    for group, weight, outside in groups:
        if not question.left():
            return []
        result = None
        if not outside:
            key = tuple(map(id, group))
            if key not in kept:
                kept[key] = question.assessed(taken(question.declared, [Leave(one) for one in group]))
            result = kept[key]
        tried.append((group, weight, result))
    return tried


def _windows(groups: Sequence[Group], rows: dict[str, str]) -> list[list[Group]]:
    """Return the groups of rows that follow each other, for as many rows as leave no more to be assessed than
    there is time for: the most to be assessed first.
    """
    order = sorted({rows[one.seat.id] for group, _, _ in groups for one in group}, key=_row_order)
    place = {row: number for number, row in enumerate(order)}
    spans = [sorted(place[rows[one.seat.id]] for one in group) for group, _, _ in groups]
    found = []
    for first in range(len(order)):
        for last in range(first, len(order)):
            inside = [
                group
                for group, span in zip(groups, spans, strict=True)
                if first <= span[0] and span[-1] <= last
            ]
            possible = sum(not outside for _, _, outside in inside)
            if 0 < possible <= MOST_ASSESSED:
                found.append((possible, inside))
    found.sort(key=lambda each: -each[0])
    return [inside for _, inside in found]


class _Known:
    """What is known of a load without some of its people before it is assessed."""

    def __init__(self, question: Question) -> None:
        held = held_by(question.declared)
        self._weights = {seat: weight or ZERO for seat, weight in held.items()}
        _, heavier = question.weight_range()
        self._least = ZERO if heavier is None else -heavier  # so much has to come off in any case
        # With seats on open rails what counts is both ends, not the arms the seats are entered at.
        spots = [] if rail_ends(question.declared) else list(spots_of(question))
        self._spots = sorted(spots, key=lambda spot: spot.shape.holds(spot.weight, spot.moment))

    def weight(self, group: Sequence[Person]) -> Fraction:
        """Return what a group weighs, with what lies on their seats."""
        return sum((self._weights[one.seat.id] for one in group), ZERO)

    def outside(self, group: Sequence[Person]) -> bool:
        """Return whether it is plain that the load is not within without a group."""
        weights = [(self._weights[one.seat.id], one.seat) for one in group]
        off = sum((weight for weight, _ in weights), ZERO)
        if off < self._least:
            return True
        moments = {
            "longitudinal": sum((weight * seat.arm for weight, seat in weights), ZERO),
            "lateral": sum((weight * seat.lateral_arm for weight, seat in weights), ZERO),
        }
        return not all(
            spot.shape.holds(spot.weight - off, spot.moment - moments[spot.axis]) for spot in self._spots
        )


def rows_of(seats: Sequence[Seat]) -> dict[str, str]:
    """Return the row of each seat: as the basis names it, or counted from the front by the arms of the seats
    passengers may have.
    """
    named = {seat.id: seat.row for seat in seats if seat.row is not None}
    arms = sorted({seat.arm for seat in seats if seat.serves != "crew"})
    counted = {seat.id: str(arms.index(seat.arm) + 1) for seat in seats if seat.arm in arms}
    return {seat.id: named.get(seat.id) or counted.get(seat.id, "") for seat in seats}


def _described(tried: Sequence[Tried], rows: dict[str, str], count: int) -> Left | None:
    """Return rows and least weight so that every group of them holds; the widest description that is true."""
    good = [each for each in tried if _holds(each[2])]
    if not good:
        return None
    wanted = {rows[one.seat.id] for group, _, _ in good for one in group}
    while wanted:
        here = [each for each in tried if all(rows[one.seat.id] in wanted for one in each[0])]
        bad = [weight for _, weight, result in here if not _holds(result)]
        least = max(bad, default=ZERO)
        holding = [
            (group, weight, result)
            for group, weight, result in here
            if result is not None and result.verdict == "within" and weight > least
        ]
        if holding:
            lightest = min(holding, key=lambda each: each[1])
            inside = {rows[one.seat.id] for group, _, _ in holding for one in group}
            order = sorted(inside, key=_row_order)
            return Left(count, tuple(order), lightest[1], lightest[2])
        # A heavier group of these rows does not hold: leave out the row of the heaviest that fails.
        heaviest = max(here, key=lambda each: (not _holds(each[2]), each[1]), default=None)
        if heaviest is None:
            return None
        wanted -= {rows[one.seat.id] for one in heaviest[0]}
    return None


def _holds(result: Result | None) -> bool:
    return result is not None and result.verdict == "within"


def _affordable(people: int, count: int) -> bool:
    groups = 1
    for number in range(count):
        groups = groups * (people - number) // (number + 1)
    return groups <= MOST_GROUPS


def _row_order(row: str) -> tuple[int, str]:
    return (int(row), "") if row.isdigit() else (10**6, row)
