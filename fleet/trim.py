"""The take-off trim setting, from the manual's own table.

    setting against CG        straight between two points of the table
    setting against weight    where there is a table for each of several weights, straight between two

Nothing is extrapolated: off the table there is no setting. A flap setting has tables of its own; between two
flap settings nothing is interpolated. The CG is an arm in the length unit of the basis, or percent of its
chord; weights in its weight unit.
"""

from collections.abc import Sequence
from dataclasses import dataclass
from fractions import Fraction
from itertools import pairwise
from typing import Literal

from fleet.sourced import Source

Points = tuple[tuple[Fraction, Fraction], ...]  # (CG, setting), the CG rising strictly


class OffTrimTable(ValueError):
    """A CG or a weight lies beyond the table; `of` says which of the two, `first` and `last` are its ends."""

    def __init__(self, of: Literal["CG", "weight"], at: Fraction, first: Fraction, last: Fraction) -> None:
        super().__init__(f"{of} {float(at):g} lies off the table, {float(first):g} to {float(last):g}")
        self.of = of
        self.at = at
        self.first = first
        self.last = last


@dataclass(frozen=True, slots=True)
class TrimLine:
    """Settings against the CG at one weight; a weight of None: the manual prints one table for all."""

    weight: Fraction | None
    points: Points
    source: Source


@dataclass(frozen=True, slots=True)
class TrimTable:
    """The table of one flap setting (None: it does not depend on flaps); lines by rising weight."""

    flap: str | None
    lines: tuple[TrimLine, ...]

    def setting(self, cg: Fraction, weight: Fraction) -> Fraction:
        """Return the exact setting. Raises `OffTrimTable`."""
        first = self.lines[0]
        if first.weight is None:
            return between(first.points, cg, "CG")
        by_weight = [(line.weight, line) for line in self.lines if line.weight is not None]
        lowest, highest = by_weight[0][0], by_weight[-1][0]
        if not lowest <= weight <= highest:
            raise OffTrimTable("weight", weight, lowest, highest)
        around = next(
            (pair for pair in pairwise(by_weight) if pair[0][0] <= weight <= pair[1][0]),
            (by_weight[0], by_weight[0]),
        )
        (low, lighter), (high, heavier) = around
        if weight == low:
            return between(lighter.points, cg, "CG")
        if weight == high:
            return between(heavier.points, cg, "CG")
        at_low, at_high = between(lighter.points, cg, "CG"), between(heavier.points, cg, "CG")
        return at_low + (at_high - at_low) * (weight - low) / (high - low)


@dataclass(frozen=True, slots=True)
class Trim:
    """The trim tables of a basis: what a setting is counted in, and how finely the manual prints it.

    `lowest` and `highest` are the ends of the settings allowed for take-off, None where no range is stated.
    """

    against: Literal["arm", "chord"]
    unit: str
    step: Fraction
    lowest: Fraction | None
    highest: Fraction | None
    source: Source | None  # of the range
    tables: tuple[TrimTable, ...]

    def stepped(self, setting: Fraction) -> Fraction:
        """Return a setting as the manual prints it: the nearest step, halves away from zero."""
        steps = abs(setting) / self.step
        whole = (2 * steps + 1).numerator // (2 * (2 * steps + 1).denominator)
        return whole * self.step if setting >= 0 else -whole * self.step


def between(
    points: Sequence[tuple[Fraction, Fraction]], at: Fraction, of: Literal["CG", "weight"]
) -> Fraction:
    """Return what a table gives at a figure, straight between its points. Raises `OffTrimTable`."""
    for (x1, y1), (x2, y2) in pairwise(points):
        if x1 <= at <= x2:
            return y1 + (y2 - y1) * (at - x1) / (x2 - x1)
    raise OffTrimTable(of, at, points[0][0], points[-1][0])
