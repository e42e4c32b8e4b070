"""How little has to be left behind, or loaded as ballast: the least weight that brings a load within.

A weight that is taken off or added shifts the whole path by one weight and one moment. Where all points of
the path stay between the same corners' weights of an envelope, its sides are quadratics in the weight added,
and nothing else is not linear. So the weight is cut into spans at which no point passes a corner, from the
least on; in each a program with whole tenths is solved in which the quadratic part is replaced by what is
never stricter (the chord, or tangents). Its least amount is therefore a lower bound. It is assessed: within,
it is the smallest there is; not within, the span is cut there and the rest tried more finely.
"""

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from fractions import Fraction
from itertools import pairwise
from math import floor

from fleet.basis import Axis, Place
from loads.balance.aboard import Declared, Item
from loads.balance.checks_places import held_by
from loads.balance.remedies.arranging import Found, can_be_parted, is_movable, tenths_up
from loads.balance.remedies.points import AXES, Spot, rows_inside, spots_of
from loads.balance.remedies.program import Number, Program, Solution
from loads.balance.remedies.question import BY_PEOPLE_ALONE, NOT_BY_LOADING, TENTH, Question
from loads.balance.remedies.steps import Ballast, Step, Take, taken
from loads.balance.remedies.suiting import fixed_lines
from loads.balance.result import Result

MOST_TRIED = 60
FINER = 8
ZERO = Fraction(0)


@dataclass(frozen=True, slots=True)
class Source:
    """What may be taken off one place, or loaded there: up to `most` tenths, and `whole` pieces besides."""

    place: Place
    most: int
    whole: tuple[Item, ...] = ()


def least_removed(question: Question) -> Found | None:
    """Return the least weight of items to leave behind; people are never among them."""
    by_place: dict[str, list[Item]] = {}
    for item in _free(question.declared):
        by_place.setdefault(item.place.id, []).append(item)
    sources = []
    for place in question.ready.basis.places:
        items = by_place.get(place.id, [])
        parted = sum((item.weight or ZERO for item in items if can_be_parted(item)), ZERO)
        whole = tuple(item for item in items if not can_be_parted(item))
        if items:
            sources.append(Source(place, tenths_up(parted), whole))
    return _Least(question, sources, -1).found() if sources else None


def least_ballast(question: Question) -> Found | None:
    """Return the least ballast to load, in places of the configuration whose limit was entered."""
    held = held_by(question.declared)
    _, heavier = question.weight_range()
    sources = []
    for place in question.ready.basis.places:
        present = place.id in set(question.declared.configuration.places) and not place.external
        if not present or place.maximum is None:
            continue
        room = None if place.maximum.value is None else place.maximum.value - (held.get(place.id) or ZERO)
        most = min((each for each in (room, heavier) if each is not None), default=None)
        if most is not None and most >= TENTH:
            sources.append(Source(place, floor(most / TENTH)))
    return _Least(question, sources, 1).found() if sources else None


class _Least:
    """The search for one load, one way: sign -1 takes off, +1 adds."""

    def __init__(self, question: Question, sources: Sequence[Source], sign: int) -> None:
        self.question, self.sources, self.sign = question, sources, sign
        self.spots = list(spots_of(question))
        self.proven = True
        whole = sum((item.weight or ZERO for each in sources for item in each.whole), ZERO)
        self.most = sum(each.most for each in sources) * TENTH + whole

    def found(self) -> Found | None:
        """Return the least amount that holds; None when there is none or the time ran out."""
        if self.question.breaks(*NOT_BY_LOADING, *BY_PEOPLE_ALONE):
            return None
        low, high = self.question.weight_range()
        ends = (low, high) if self.sign > 0 else (_minus(high), _minus(low))
        first = max(ends[0] or ZERO, TENTH)
        last = self.most if ends[1] is None else min(self.most, ends[1])
        waiting = self._spans(first, last)
        for _ in range(MOST_TRIED):
            if not waiting:
                return None
            start, end = waiting.pop()
            solved = self._solved(start, end)
            if solved is None:
                continue
            steps, amount = solved
            result = self.question.assessed(taken(self.question.declared, steps))
            if result.verdict == "within":
                return Found(steps, result, self.proven)
            waiting += self._again(result, steps, amount, (start, end))
        return None

    def _again(
        self, result: Result, steps: Sequence[Step], amount: Fraction, span: tuple[Fraction, Fraction]
    ) -> list[tuple[Fraction, Fraction]]:
        """Return what of a span is still to be tried once its least amount did not hold, the least last."""
        end = span[1]
        if self._learnt(result, steps):
            return self._spans(amount, end)
        finer = amount, min(amount + max((end - amount) / FINER, TENTH), end)
        if finer == span or finer[0] == finer[1]:
            self.proven = False  # a limit this program does not know decides here
            return [(amount + TENTH, end)] if amount + TENTH <= end else []
        return [(finer[1], end), finer] if finer[1] < end else [finer]

    def _learnt(self, result: Result, steps: Sequence[Step]) -> bool:
        """Return whether a point of the path became known at which it leaves an envelope."""
        found = False
        for axis, worst in (result.burn.worst if result.burn is not None else {}).items():
            if worst.room is not None and worst.room >= 0:
                continue
            across = axis == "lateral"
            weight, moment = worst.knot.weight, worst.knot.lateral_moment if across else worst.knot.moment
            for step in steps:
                place, each = _where(step)
                weight -= self.sign * each
                moment -= self.sign * each * (place.lateral_arm if across else place.arm)
            spot = Spot(axis, worst.bound[1], weight, moment)
            if spot not in self.spots:
                self.spots.append(spot)
                found = True
        return found

    def _spans(self, first: Fraction, last: Fraction) -> list[tuple[Fraction, Fraction]]:
        """Return the spans of the amount in which no point passes a corner's weight, the least last."""
        if first > last:
            return []
        marks = {first, last}
        for spot in self.spots:
            slabs = spot.shape.slabs
            for level in slabs.levels:
                amount = self.sign * (Fraction(level, slabs.scale) - spot.weight)
                if first < amount < last:
                    marks.add(amount)
        rising = sorted(marks)
        return list(pairwise(rising))[::-1] or [(first, first)]

    def _solved(self, start: Fraction, end: Fraction) -> tuple[tuple[Step, ...], Fraction] | None:
        """Return the steps of the least amount of a span, and that amount; None when it has none."""
        program, parts = Program(), {}
        weight: dict[int, Number] = {}
        moments: dict[Axis, dict[int, Number]] = {axis: {} for axis in AXES}
        for source in self.sources:
            for item in (None, *source.whole):
                each = TENTH if item is None else item.weight or ZERO
                most = source.most if item is None else 1
                column = program.column(each, 0, most, whole=True)
                parts[column] = source, item
                weight[column] = self.sign * each
                moments["longitudinal"][column] = self.sign * each * source.place.arm
                moments["lateral"][column] = self.sign * each * source.place.lateral_arm
        ends = (start, end) if self.sign > 0 else (-end, -start)
        program.row(weight, ends[0], ends[1])
        self._limits(program, parts)
        for spot in self.spots:
            if not self._inside(program, spot, weight, moments[spot.axis], ends):
                return None
        solution = program.solve(self.question.left())
        if not isinstance(solution, Solution):
            self.proven = self.proven and solution == "none"
            return None
        self.proven = self.proven and solution.proven
        steps = tuple(self._steps(solution, parts))
        return steps, sum((_where(step)[1] for step in steps), ZERO)

    def _limits(self, program: Program, parts: dict[int, tuple[Source, Item | None]]) -> None:
        """Add what places and zones may hold."""
        held, basis = held_by(self.question.declared), self.question.ready.basis
        spots = [(place.maximum, (place.id,)) for place in basis.places]
        for maximum, members in [*spots, *((zone.maximum, zone.members) for zone in basis.zones)]:
            if maximum is None or maximum.value is None:
                continue
            now = sum((held.get(member) or ZERO for member in members), ZERO)
            here: dict[int, Number] = {
                column: self.sign * (TENTH if item is None else item.weight or ZERO)
                for column, (source, item) in parts.items()
                if source.place.id in members
            }
            if here:
                program.row(here, high=maximum.value - now)

    def _inside(
        self,
        program: Program,
        spot: Spot,
        weight: dict[int, Number],
        moments: dict[int, Number],
        ends: tuple[Fraction, Fraction],
    ) -> bool:
        """Add that a point lies inside; return False where the envelope has no part at these weights."""
        middle = spot.weight + (ends[0] + ends[1]) / 2
        slabs = spot.shape.slabs
        at = middle * slabs.scale
        inside = [
            sides
            for (low, high), each in zip(pairwise(slabs.levels), slabs.trapezoids, strict=True)
            if low <= at <= high
            for sides in each
        ]
        if len(inside) == 1:
            for row, bound in rows_inside(spot, inside[0], weight, moments, ends):
                program.row(row, low=bound)
        elif inside:
            switches = [program.switch() for _ in inside]
            program.row(dict.fromkeys(switches, 1), low=1)
            for switch, sides in zip(switches, inside, strict=True):
                for row, bound in rows_inside(spot, sides, weight, moments, ends):
                    reach = sum((abs(Fraction(each)) for each in row.values()), ZERO)
                    loose = reach * (self.most / TENTH + 1) + abs(bound)
                    program.row({**row, switch: -loose}, low=bound - loose)
        return bool(inside)

    def _steps(self, solution: Solution, parts: dict[int, tuple[Source, Item | None]]) -> Iterator[Step]:
        for column, (source, item) in parts.items():
            tenths = round(solution.values[column])
            if tenths and item is not None:
                yield Take(item, item.weight or ZERO)
            elif tenths and self.sign > 0:
                yield Ballast(source.place, tenths * TENTH)
            elif tenths:
                yield from _off(_free(self.question.declared), source.place, tenths * TENTH)


def _free(declared: Declared) -> list[Item]:
    """Return the items that may stay behind: movable, of known weight, and named by no event."""
    fixed = fixed_lines(declared)
    return [
        item
        for item in declared.items
        if is_movable(item) and item.weight is not None and item.pointer not in fixed
    ]


def _off(items: Sequence[Item], place: Place, amount: Fraction) -> Iterator[Take]:
    """Yield the fewest lines of a place that make up an amount: the largest first."""
    here = [item for item in items if item.place.id == place.id and can_be_parted(item)]
    for item in sorted(here, key=lambda item: -(item.weight or ZERO)):
        part = min(item.weight or ZERO, amount)
        if part > 0:
            yield Take(item, part)
            amount -= part


def _where(step: Step) -> tuple[Place, Fraction]:
    """Return the place of a step of this search, and its weight."""
    if isinstance(step, Take):
        return step.item.place, step.weight
    if isinstance(step, Ballast):
        return step.place, step.weight
    raise TypeError("only what is taken off or added has an amount here")


def _minus(value: Fraction | None) -> Fraction | None:
    return None if value is None else -value
