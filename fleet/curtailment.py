r"""An operator's own margins inside a certified envelope, and the envelope that is left. All exact.

    weight ^   ______________      certified: straight edges
           |  / ........... |      operational: each edge moved in, by an arm or by a moment
           | / :          : |
           |/__:__________:_|
           +--------------------> arm

At a weight W an edge moves in by arm + moment / W, the sum over the curtailments that hold there. In the form
of `fleet.polygon`, P*moment + A + B*W + C*W**2, an arm changes B and a moment changes A: nothing is
approximated, in whichever plane the certified edges are straight. Notches stay notches: both of their sides
move. Weights in the weight unit of the basis, arms in its length unit, moments in their product; forward and
left are the low edges, aft and right the high ones. Curtailments hold from their least to their greatest
weight, both included; where two rows of one meet, the greater counts.
"""

from bisect import bisect_right
from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass
from fractions import Fraction
from itertools import pairwise
from math import isqrt, lcm
from typing import Literal, NamedTuple

from fleet.envelope import Shape, Slabs, Stretch, Trapezoid, merged
from fleet.sourced import Source

Purpose = Literal["fuel", "seating variation", "crew and passenger movement", "gear and flap", "other"]
Axis = Literal["longitudinal", "lateral"]
ZERO = Fraction(0)
BITS = 80  # an irrational end of a stretch of weight is moved inward by less than 2**-80


class Inset(NamedTuple):
    """How far an edge moves in: an arm, and a moment that counts as moment / weight; both 0 or more."""

    arm: Fraction = ZERO
    moment: Fraction = ZERO

    def at(self, weight: Fraction) -> Fraction:
        """Return what it is at a weight, in arm."""
        return self.arm + self.moment / weight if self.moment else self.arm

    def plus(self, other: "Inset") -> "Inset":
        """Return both together."""
        return Inset(self.arm + other.arm, self.moment + other.moment)


NONE = Inset()


@dataclass(frozen=True, slots=True)
class Amounts:
    """The insets between two weights, both included; None: as far down, or up, as the envelope goes."""

    least: Fraction | None
    most: Fraction | None
    forward: Inset = NONE
    aft: Inset = NONE
    left: Inset = NONE
    right: Inset = NONE

    def hold(self, weight: Fraction) -> bool:
        """Return whether they hold at a weight."""
        return (self.least is None or self.least <= weight) and (self.most is None or weight <= self.most)

    def sides(self, axis: Axis) -> tuple[Inset, Inset]:
        """Return what the low and the high edge move by."""
        return (self.forward, self.aft) if axis == "longitudinal" else (self.left, self.right)


@dataclass(frozen=True, slots=True)
class Curtailment:
    """One margin of the operator: what for, at which phases, how much, and its page in the operator's
    manual. `configurations` and `categories` (of certification) are those it holds for, () for all.
    """

    id: str
    purpose: Purpose
    phases: tuple[str, ...]
    rows: tuple[Amounts, ...]
    source: Source
    configurations: tuple[str, ...] = ()
    categories: tuple[str, ...] = ()

    def insets(self, axis: Axis, weight: Fraction) -> tuple[Inset, Inset]:
        """Return what the low and the high edge move by at a weight; where two rows meet, the greater."""
        sides = [row.sides(axis) for row in self.rows if row.hold(weight)]
        low = max((side for side, _ in sides), key=lambda each: each.at(weight), default=NONE)
        high = max((side for _, side in sides), key=lambda each: each.at(weight), default=NONE)
        return low, high


def holding(curtailments: Iterable[Curtailment], phase: str, axis: Axis) -> tuple[Curtailment, ...]:
    """Return those that hold at a phase and move an edge of this axis."""
    return tuple(
        each
        for each in curtailments
        if phase in each.phases and any(row.sides(axis) != (NONE, NONE) for row in each.rows)
    )


class CurtailedShape(Shape):
    """What is left of a certified shape inside an operator's margins; decides as any shape does."""

    __slots__ = ("axis", "certified", "curtailments")

    def __init__(self, certified: Shape, curtailments: Sequence[Curtailment], axis: Axis) -> None:
        self.certified = certified
        self.curtailments = tuple(curtailments)
        self.axis: Axis = axis
        levels = self._weights()
        scale = lcm(*(level.denominator for level in levels))
        own: list[tuple[Trapezoid, ...]] = [()]  # nothing below, and at last nothing above
        between = []
        for low, high in pairwise(levels):
            pieces = self._certified_pieces(low, high)
            own.append(pieces)
            insets = self.insets((low + high) / 2)
            shrunk = [_shrunk(piece, insets) for piece in pieces]
            between.append(tuple(_present(shrunk, low, high)))
        own.append(())
        at_levels = []
        for number, level in enumerate(levels):
            insets = self.insets(level)
            at_levels.append(tuple(_shrunk(piece, insets) for piece in (*own[number], *own[number + 1])))
        whole = tuple(int(level * scale) for level in levels)
        self._prepare(Slabs(scale, whole, tuple(between)), at_levels)

    def insets(self, weight: Fraction) -> tuple[Inset, Inset]:
        """Return what the low and the high edge move by at a weight, all curtailments together."""
        low, high = NONE, NONE
        for each in self.curtailments:
            one, other = each.insets(self.axis, weight)
            low, high = low.plus(one), high.plus(other)
        return low, high

    def arms_at(self, weight: Fraction) -> tuple[Stretch, ...]:
        """Return the stretches of arm (low, high) left at a weight, rising. Empty when there are none."""
        found = [each for each in self._arms_of_pieces(weight) if each[0] <= each[1]]
        return tuple(merged(found)) if found else ()

    def weights_at(self, arm: Fraction) -> tuple[Stretch, ...]:
        """Return the stretches of weight (low, high) left along one arm, rising. Empty when there are none.

        An end that is no rational number is moved inward by less than 2**-80.
        """
        found: list[Stretch] = []
        for ends, pieces in self.slabs.parts():
            for p, a, b, c, p2, a2, b2, c2 in pieces:
                front = _not_below_zero(Fraction(a), b + p * arm, Fraction(c), ends)
                rear = _not_below_zero(Fraction(a2), b2 + p2 * arm, Fraction(c2), ends)
                found += [
                    (max(one[0], other[0]), min(one[1], other[1]))
                    for one in front
                    for other in rear
                    if max(one[0], other[0]) <= min(one[1], other[1])
                ]
        return tuple(merged(found)) if found else ()

    def used_up(self) -> Iterator[Stretch]:
        """Yield the ranges of weight somewhere in which nothing of the envelope is left.

        The very tip of an envelope that runs to a point may be cut off: that is no such range.
        """
        told: set[Fraction] = set()
        for ends, pieces in self.slabs.parts():
            own = self._certified_pieces(*ends)
            if not any(_left(piece, ends) for piece in pieces) and not any(
                _tip_alone(piece, self.insets((ends[0] + ends[1]) / 2), ends) for piece in own
            ):
                told.update(ends)
                yield ends
        for level in self.slabs.levels:
            at = Fraction(level, self.slabs.scale)
            if (
                at not in told
                and not self.arms_at(at)
                and any(low < high for low, high in self.certified.arms_at(at))
            ):
                yield at, at

    def _weights(self) -> list[Fraction]:
        slabs = self.certified.slabs
        levels = {Fraction(level, slabs.scale) for level in slabs.levels}
        lowest, highest = min(levels), max(levels)
        for each in self.curtailments:
            for row in each.rows:
                levels |= {end for end in (row.least, row.most) if end is not None and lowest < end < highest}
        return sorted(levels)

    def _certified_pieces(self, low: Fraction, high: Fraction) -> tuple[Trapezoid, ...]:
        slabs = self.certified.slabs
        middle = (low + high) / 2 * slabs.scale
        return slabs.trapezoids[bisect_right(slabs.levels, middle) - 1]


def _shrunk(piece: Trapezoid, insets: tuple[Inset, Inset]) -> Trapezoid:
    """Return a piece with both sides moved in, in whole numbers again."""
    p, a, b, c, p2, a2, b2, c2 = piece
    low, high = insets
    left = _whole(p, a - p * low.moment, b - p * low.arm, c)
    right = _whole(p2, a2 + p2 * high.moment, b2 + p2 * high.arm, c2)
    return (*left, *right)


def _whole(p: int, a: Fraction, b: Fraction, c: int) -> tuple[int, int, int, int]:
    over = lcm(a.denominator, b.denominator)
    return p * over, int(a * over), int(b * over), c * over


def _width(piece: Trapezoid) -> tuple[Fraction, Fraction, Fraction]:
    """Return A, B, C of the width of a piece times the weight: A + B*W + C*W**2."""
    p, a, b, c, p2, a2, b2, c2 = piece
    return (
        Fraction(a2, -p2) + Fraction(a, p),
        Fraction(b2, -p2) + Fraction(b, p),
        Fraction(c2, -p2) + Fraction(c, p),
    )


def _extremes(piece: Trapezoid, ends: Stretch) -> tuple[Fraction, Fraction]:
    """Return the lesser width times weight at two weights, and the greatest between them.

    Somewhere between it may be less than at both only where nothing is left at the lower: a is 0 or less
    there, so what bends upward has risen since its least.
    """
    a, b, c = _width(piece)
    least, most = sorted((c * weight + b) * weight + a for weight in ends)
    if c < 0 and ends[0] < -b / (2 * c) < ends[1]:
        most = a - b * b / (4 * c)
    return least, most


def _left(piece: Trapezoid, ends: Stretch) -> bool:
    """Return whether something is left of a piece at every weight."""
    return _extremes(piece, ends)[0] >= 0


def _present(pieces: Sequence[Trapezoid], low: Fraction, high: Fraction) -> Sequence[Trapezoid]:
    """Leave out what is used up altogether, as long as something is left beside it."""
    present = [piece for piece in pieces if _extremes(piece, (low, high))[1] >= 0]
    return present or pieces


def _tip_alone(own: Trapezoid, insets: tuple[Inset, Inset], ends: Stretch) -> bool:
    """Return whether a piece runs to a point at one end and something is left of it at the other."""
    a, b, c = _width(own)
    far = [other for end, other in (ends, ends[::-1]) if (c * end + b) * end + a == 0]
    shrunk = _shrunk(own, insets)
    return any(_left(shrunk, (end, end)) for end in far)


def _not_below_zero(a: Fraction, b: Fraction, c: Fraction, ends: Stretch) -> list[Stretch]:
    """Return where a + b*W + c*W**2 is 0 or more between two weights, irrational ends moved inward.

    It is the distance from a moved edge times the weight: where c is not 0 the certified edge is straight in
    arm, and a, the moment it moved by, is 0 or less.
    """
    low, high = ends
    square = b * b - 4 * a * c
    if not c:
        if not b:
            return [ends] if a >= 0 else []
        root = -a / b
        start, end = (root, high) if b > 0 else (low, root)
    elif c > 0:  # a is 0 or less, so of the two roots one is above 0
        start, end = (_root(square, up=True) - b) / (2 * c), high
    elif square < 0:
        return []
    else:
        reach = _root(square, up=False)
        start, end = (-b + reach) / (2 * c), (-b - reach) / (2 * c)
    return [(max(low, start), min(high, end))]  # turned round where it is nowhere


def _root(square: Fraction, *, up: bool) -> Fraction:
    """Return the root of a rational, rounded in one direction where it is none."""
    above, below = isqrt(square.numerator), isqrt(square.denominator)
    if above * above == square.numerator and below * below == square.denominator:
        return Fraction(above, below)
    scale = 1 << BITS
    whole = isqrt(square.numerator * square.denominator * scale * scale)
    return Fraction(whole + up, square.denominator * scale)
