"""A load that varies by one figure x, such as what lies in a place: where its verdict may turn.

Weights add evenly, so between two x at which the burn runs through the same tanks in the same order, and
through the same parts of their tables, every kink of the path has a weight and, times D, moments that are
polynomials of x of a degree up to two. Three flights tell them. D is 1, or the density where that varies.

Which tank runs dry first, and where a table is left, is decided by comparing figures that vary evenly with
what is in the tanks. What comes out the same at two x therefore comes out the same between them; where it
does not, the range is parted there.
"""

from collections.abc import Callable, Iterator, Mapping, Sequence
from dataclasses import dataclass, field
from fractions import Fraction
from itertools import pairwise
from typing import Literal, NamedTuple

from fleet.tanks import OutsideTable
from loads.balance.aboard import Declared, FuelPlan, TankFuel
from loads.balance.checks_path import held_at
from loads.balance.flown import at_ends_of_rails
from loads.balance.path import Knot, Stretch
from loads.balance.polynomial import ONE, Poly, Root, roots_between, value
from loads.balance.rails import rail_ends
from loads.balance.remedies.question import Question
from loads.balance.remedies.tables import fuel_turns, trim_turns
from loads.balance.result import Result
from loads.balance.touching import each_once
from loads.balance.varied_flights import Fit, Flights, Sample

QUARTERS = 4
FINEST = Fraction(1, 1 << 24)  # a range as short as this is not parted further
Kinds = tuple[object, ...]
ENDS_OF_RAILS: tuple[Literal["forward", "aft"], ...] = ("forward", "aft")


class Change(NamedTuple):
    """A load as a function of x. `over` is D; `refuels`: what burns where varies, too; `marks` are x at
    which what a tank holds stands on a point of its table.
    """

    at: Callable[[Fraction], Declared]
    over: Poly = (ONE,)
    refuels: bool = False
    marks: tuple[Fraction, ...] = ()


class CannotBe(Exception):
    """A load of this kind there is not: a tank would hold less than nothing, or could not feed the flight."""


@dataclass
class Varying:
    """One change of a load that is asked about; what was assessed is kept."""

    question: Question
    change: Change
    kept: dict[Fraction, Result | None] = field(default_factory=dict)

    def result(self, at: Fraction) -> Result | None:
        """Return what the load comes to at an x; None where a tank would take more than its table knows, or
        there is no such load.
        """
        if at not in self.kept:
            try:
                self.kept[at] = self.question.assessed(self.change.at(at))
            except (OutsideTable, CannotBe):
                self.kept[at] = None
        return self.kept[at]

    def turns(self, low: Fraction, high: Fraction) -> list[Root]:
        """Return every x from `low` to `high` at which a limit that the centre of gravity, trim or the tanks
        decide may turn from kept to broken or back, in order; such as cannot be told apart are one.
        """
        if high <= low:
            return []
        if not self.change.refuels:
            return each_once(self._within(low, high))
        marks = sorted({low, high, *(mark for mark in self.change.marks if low < mark < high)})
        found: list[Root] = [Root(mark, mark) for mark in marks]
        for one, other in pairwise(marks):
            found += self._parted(one, other)
        return each_once(found)

    def _parted(self, low: Fraction, high: Fraction) -> Iterator[Root]:
        """Yield where the verdict may turn in every part of a range through which the burn runs alike."""
        cut = (low + high) / 2
        for share in (
            QUARTERS,
            2 * QUARTERS,
        ):  # all of the range, else the lower half of it to see where that ends
            fit = Fit([low + (high - low) * at / share for at in (1, 2, 3)])
            kinds = [self._kinds(at) for at in fit.at]
            if not kinds[0] == kinds[1] == kinds[2]:
                continue
            known = not kinds[0] or not isinstance(kinds[0][0], str)
            lengths = self._lengths(fit) if known else None
            if share == QUARTERS and all(self._alike(kinds[0], lengths, end) for end in (low, high)):
                if known:
                    yield from self._within(low, high)
                return
            cut = min(_passed(lengths or (), low, high), default=cut)
            break
        if not self.question.left() or high - low <= FINEST:
            yield Root(low, high)
            return
        yield Root(cut, cut)
        yield from self._parted(low, cut)
        yield from self._parted(cut, high)

    def _kinds(self, at: Fraction) -> Kinds:
        """Return through which tanks and parts of their tables the burn runs; in words what of it is not
        known.
        """
        result = self.result(at)
        if result is None:
            return ("no such load",)
        if result.burn is None:
            return ("off", *(one.code for one in result.checks if one.code.startswith("tank-table.")))
        path = result.burn.path
        if path.gaps:
            return ("gap", *dict.fromkeys((gap.leg, gap.tank) for gap in path.gaps))
        plan = self.change.at(at).fuel
        return tuple(
            (each.leg, each.feeding, *_pieces(plan, held_at(each, _middle(each), plan.density), each.feeding))
            for each in path.stretches
        )

    def _lengths(self, fit: Fit) -> list[Poly]:
        """Return the weight each stretch burns, as a polynomial."""
        results = [self.result(at) for at in fit.at]
        paths = [each.burn.path for each in results if each is not None and each.burn is not None]
        return [
            fit.through([each.start.weight - each.end.weight for each in stretches])
            for stretches in zip(*(path.stretches for path in paths), strict=True)
        ]

    def _alike(self, kinds: Kinds, lengths: Sequence[Poly] | None, end: Fraction) -> bool:
        """Return whether the burn runs at an end as it does inside, but for what has no length there."""
        if lengths is None:
            return self._kinds(end) == kinds
        sizes = [value(each, end) for each in lengths]
        if any(size < 0 for size in sizes):
            return False
        return self._kinds(end) == tuple(each for each, size in zip(kinds, sizes, strict=True) if size)

    def _points(self, low: Fraction, high: Fraction) -> list[Fraction]:
        """Return the x whose flights tell the polynomials: two where nothing is of a higher degree."""
        quarter = (high - low) / QUARTERS
        if self.change.refuels:
            return [low + quarter, low + 2 * quarter, low + 3 * quarter]
        result = self.result(low + 2 * quarter)
        path = None if result is None or result.burn is None else result.burn.path
        bent = path is not None and (
            any(each.bend for each in path.stretches) or any(each.swept for each in path.turns)
        )
        return [low + 2 * quarter, *([low + 3 * quarter] if bent else []), high]

    def _within(self, low: Fraction, high: Fraction) -> Iterator[Root]:
        """Yield where the verdict may turn in a range through which the burn runs alike."""
        fit = Fit(self._points(low, high))
        loads = [self.change.at(at) for at in fit.at]
        runs = [[self.result(at) for at in fit.at]]
        if rail_ends(loads[0]):
            runs += [
                [self.question.assessed(at_ends_of_rails(each, end)) for each in loads]
                for end in ENDS_OF_RAILS
            ]
        ready, over, ends = self.question.ready, self.change.over, (low, high)
        for run in runs:
            known = [each for each in run if each is not None and each.states]
            if len(known) == len(run):
                paths = [None if each.burn is None else each.burn.path for each in known]
                samples = [Sample(each.states, path) for each, path in zip(known, paths, strict=True)]
                flights = Flights(ready, over, fit, samples)
                yield from flights.touches(ends)
                take_off = flights.point([each.state("take-off") for each in known])
                yield from trim_turns(take_off, ready, ends)
        if self.change.refuels:
            yield from fuel_turns(loads, over, fit, ready, ends)


def _passed(lengths: Sequence[Poly], low: Fraction, high: Fraction) -> list[Fraction]:
    """Return where a stretch would come to have no length, inside a range."""
    found = [root.low for each in lengths for root in roots_between(each, low, high)]
    return [each for each in found if low < each < high]


def _middle(stretch: Stretch) -> Knot:
    return stretch.at((stretch.start.weight + stretch.end.weight) / 2)


def _pieces(plan: FuelPlan, held: Mapping[str, Fraction], feeding: Sequence[str]) -> Iterator[int]:
    """Yield which part of its table each tank that feeds stands in."""
    for fuel in plan.tanks:
        if fuel.tank.id in feeding:
            volume = held[fuel.tank.id] + fuel.trapped
            yield sum(piece.first <= volume for piece in fuel.tank.table.curve.pieces)


def table_points(held: TankFuel, each: Fraction) -> tuple[Fraction, ...]:
    """Return the whole and broken counts of `each` more in a tank at which it stands on a point of its
    table.
    """
    full = held.usable + held.trapped
    pieces = held.tank.table.curve.pieces
    return tuple((volume - full) / each for volume in (pieces[0].first, *(piece.last for piece in pieces)))
