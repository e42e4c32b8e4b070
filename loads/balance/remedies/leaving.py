"""The last resort: somebody stays on the ground. Who that is, a program does not say.

A group is described so that whoever of it stays, the load is within: how many, from which rows, and how heavy
at least. Each of them was tried.
"""

from collections.abc import Sequence
from fractions import Fraction
from itertools import combinations
from typing import NamedTuple

from fleet.basis import Seat
from loads.balance.aboard import Declared, Person
from loads.balance.checks_places import held_by
from loads.balance.remedies.question import Question
from loads.balance.remedies.steps import Leave, taken
from loads.balance.remedies.suiting import fixed_lines
from loads.balance.result import Result

MOST_TRIED = 400
MOST_LEFT = 3
ZERO = Fraction(0)


class Left(NamedTuple):
    """So many passengers of these rows, together at least so heavy; `result` is that of the lightest such
    group.
    """

    people: int
    rows: tuple[str, ...]
    weight: Fraction
    result: Result


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
    for count in range(1, MOST_LEFT + 1):
        tried: list[tuple[tuple[Person, ...], Fraction, Result]] = []
        if not _affordable(len(people), count):
            return None
        for group in combinations(people, count):
            if not question.left():
                return None
            result = question.assessed(taken(question.declared, [Leave(one) for one in group]))
            tried.append((group, _weight(group, question.declared), result))
        described = _described(tried, rows, count)
        if described is not None:
            return described
    return None


def rows_of(seats: Sequence[Seat]) -> dict[str, str]:
    """Return the row of each seat: as the basis names it, or counted from the front by the arms of the seats
    passengers may have.
    """
    named = {seat.id: seat.row for seat in seats if seat.row is not None}
    arms = sorted({seat.arm for seat in seats if seat.serves != "crew"})
    counted = {seat.id: str(arms.index(seat.arm) + 1) for seat in seats if seat.arm in arms}
    return {seat.id: named.get(seat.id) or counted.get(seat.id, "") for seat in seats}


def _described(
    tried: Sequence[tuple[tuple[Person, ...], Fraction, Result]], rows: dict[str, str], count: int
) -> Left | None:
    """Return rows and least weight so that every group of them holds; the widest description that is true."""
    good = [each for each in tried if each[2].verdict == "within"]
    if not good:
        return None
    wanted = {rows[one.seat.id] for group, _, _ in good for one in group}
    while wanted:
        here = [each for each in tried if all(rows[one.seat.id] in wanted for one in each[0])]
        bad = [weight for _, weight, result in here if result.verdict != "within"]
        least = max(bad, default=ZERO)
        holding = [each for each in here if each[2].verdict == "within" and each[1] > least]
        if holding:
            lightest = min(holding, key=lambda each: each[1])
            inside = {rows[one.seat.id] for group, _, _ in holding for one in group}
            order = sorted(inside, key=_row_order)
            return Left(count, tuple(order), lightest[1], lightest[2])
        # A heavier group of these rows does not hold: leave out the row of the heaviest that fails.
        heaviest = max(here, key=lambda each: (each[2].verdict != "within", each[1]), default=None)
        if heaviest is None:
            return None
        wanted -= {rows[one.seat.id] for one in heaviest[0]}
    return None


def _weight(group: Sequence[Person], declared: Declared) -> Fraction:
    held = held_by(declared)
    return sum((held.get(one.seat.id) or ZERO for one in group), ZERO)


def _affordable(people: int, count: int) -> bool:
    groups = 1
    for number in range(count):
        groups = groups * (people - number) // (number + 1)
    return 0 < groups <= MOST_TRIED


def _row_order(row: str) -> tuple[int, str]:
    return (int(row), "") if row.isdigit() else (10**6, row)
