"""The shape of an envelope: is a point in it, how far is the nearest edge. All exact.

A closed polygon in (arm or moment, weight); which of the two says in which plane its edges are straight.
Notches stay. A point on an edge is inside. `fleet.polygon` cuts it once into trapezoids; at the weight of a
point at most a few are left, and the point is inside when it is right of the left side and left of the right
side of one of them: a handful of whole multiplications and no division.

Weights in one weight unit, arms in one length unit, moments in that weight unit times that length unit.
Aft and right are positive, so the low edge along the arm is the forward (or left) one.
"""

from bisect import bisect_right
from collections.abc import Iterator, Sequence
from fractions import Fraction
from itertools import pairwise
from math import lcm
from typing import Literal, NamedTuple

from fleet.polygon import NotAnEnvelope, Point, Slabs, Trapezoid, demand_polygon, slabs_of
from fleet.rational import rational

__all__ = [
    "NotAnEnvelope",
    "Point",
    "Section",
    "Shape",
    "Slabs",
    "Stretch",
    "Trapezoid",
    "demand_polygon",
    "merged",
]

Stretch = tuple[Fraction, Fraction]


class Section(NamedTuple):
    """A straight stretch of the envelope: the one a point lies in, or else the nearest to it.

    `margin` is the distance from the point to `edge`, the nearer end of the stretch; negative when the
    point is outside.
    """

    low: Fraction
    high: Fraction
    margin: Fraction
    edge: Literal["low", "high"]


class Shape:
    """An envelope prepared for exact decisions. Unchanging once made."""

    __slots__ = (
        "_at_level",
        "_levels",
        "_moment_plane",
        "_points",
        "_scale",
        "_spans",
        "_whole",
        "_whole_scale",
        "slabs",
    )

    def __init__(self, plane: Literal["arm", "moment"], points: Sequence[Point]) -> None:
        """Make the shape of a polygon, vertices in order, the first not repeated. Raises `NotAnEnvelope`."""
        slabs = slabs_of(plane, points)
        # Nothing below, then by turns what is at a level and what is between two levels, then nothing above.
        between = [(), *slabs.trapezoids, ()]
        self._prepare(slabs, [below + above for below, above in pairwise(between)])
        self._moment_plane = plane == "moment"
        self._points = tuple(points)
        scale = lcm(*(each.denominator for point in points for each in point))
        self._whole = tuple((int(x * scale), int(y * scale)) for x, y in points)
        self._whole_scale = scale

    def _prepare(self, slabs: Slabs, at_levels: Sequence[tuple[Trapezoid, ...]]) -> None:
        """Keep the slabs for decisions, with what counts at the very weight of each level."""
        self.slabs = slabs
        self._scale = slabs.scale
        self._levels = list(slabs.levels)
        self._at_level = frozenset(slabs.levels)
        spans: list[tuple[Trapezoid, ...]] = [()]
        for here, above in zip(at_levels, [*slabs.trapezoids, ()], strict=True):
            spans += [here, above]
        self._spans = tuple(spans)

    def holds(self, weight: Fraction, moment: Fraction) -> bool:
        """Return whether the point lies inside or on an edge; exact."""
        over, other = weight.denominator, moment.denominator
        if over == other:
            return self.holds_whole(weight.numerator, moment.numerator, over)
        return self.holds_whole(weight.numerator * other, moment.numerator * over, over * other)

    def holds_whole(self, weight: int, moment: int, over: int) -> bool:
        """Return what `holds` returns, for weight and moment as whole numbers of one `over`-th, over > 0."""
        whole, rest = divmod(weight * self._scale, over)
        index = bisect_right(self._levels, whole) * 2
        if not rest and whole in self._at_level:
            index -= 1
        # Multiplied by the square of the denominator, the sides need no quotient.
        x, one, y, square = moment * over, over * over, weight * over, weight * weight
        for p, a, b, c, p2, a2, b2, c2 in self._spans[index]:
            if p * x + a * one + b * y + c * square >= 0 and p2 * x + a2 * one + b2 * y + c2 * square >= 0:
                return True
        return False

    def arms_at(self, weight: Fraction) -> tuple[Stretch, ...]:
        """Return the stretches of arm (low, high) inside the envelope at a weight, rising.

        Empty when there are none.
        """
        found = self._arms_of_pieces(weight)
        return tuple(merged(found)) if found[1:] else tuple(found)

    def _arms_of_pieces(self, weight: Fraction) -> list[Stretch]:
        whole, rest = divmod(weight.numerator * self._scale, weight.denominator)
        index = bisect_right(self._levels, whole) * 2
        if not rest and whole in self._at_level:
            index -= 1
        y, one = weight.numerator, weight.denominator
        per, even, square = y * one, one * one, y * y
        return [
            (
                rational(-a * even - b * per - c * square, p * per),
                rational(-a2 * even - b2 * per - c2 * square, p2 * per),
            )
            for p, a, b, c, p2, a2, b2, c2 in self._spans[index]
        ]

    def weights_at(self, arm: Fraction) -> tuple[Stretch, ...]:
        """Return the stretches of weight (low, high) inside the envelope along one arm, rising.

        Empty when there are none.
        """
        over, of = arm.denominator, arm.numerator
        whole, scale = self._whole, self._whole_scale
        # Which side of the line of this arm each vertex is on, and how far, all in one whole-number measure.
        if self._moment_plane:
            sides = [x * over - of * y for x, y in whole]
        else:
            line = of * scale
            sides = [x * over - line for x, _ in whole]
        marks = []
        (_, y1), f1 = whole[-1], sides[-1]
        for (_, y2), f2 in zip(whole, sides, strict=True):
            if f2 == 0:
                marks.append(rational(y2, scale))
            elif f1 < 0 < f2 or f2 < 0 < f1:
                marks.append(rational(y1 * (f1 - f2) + (y2 - y1) * f1, scale * (f1 - f2)))
            y1, f1 = y2, f2
        if 0 not in sides:  # every mark is a crossing, so inside and outside take turns
            rising = sorted(marks)
            return tuple(zip(rising[::2], rising[1::2], strict=True))
        rising = sorted(set(marks))
        found = [(mark, mark) for mark in rising]
        for low, high in pairwise(rising):
            middle = (low + high) / 2
            if self.holds(middle, arm * middle):
                found.append((low, high))
        return tuple(merged(found))

    def arm_section(self, weight: Fraction, moment: Fraction) -> Section | None:
        """Return the stretch of arm at the same weight and the margin in arm.

        None where the envelope has none.
        """
        return _nearest(self.arms_at(weight), _arm(weight, moment)) if weight.numerator > 0 else None

    def weight_section(self, weight: Fraction, moment: Fraction) -> Section | None:
        """Return the stretch of weight at the same arm and the margin in weight.

        None where the envelope has none.
        """
        return _nearest(self.weights_at(_arm(weight, moment)), weight) if weight.numerator > 0 else None

    @property
    def lowest(self) -> Fraction:
        """Return the least weight of the envelope."""
        return Fraction(self._levels[0], self._scale)

    @property
    def highest(self) -> Fraction:
        """Return the greatest weight of the envelope."""
        return Fraction(self._levels[-1], self._scale)


def merged(stretches: list[Stretch]) -> Iterator[Stretch]:
    """Yield rising stretches, those that touch or overlap joined."""
    stretches.sort()
    low, high = stretches[0]
    for next_low, next_high in stretches[1:]:
        if next_low > high:
            yield low, high
            low, high = next_low, next_high
        else:
            high = max(high, next_high)
    yield low, high


def _nearest(stretches: tuple[Stretch, ...], at: Fraction) -> Section | None:
    """Return the section with the greatest margin: the stretch that holds the point, or the nearest one."""
    best: Section | None = None
    here, over = at.as_integer_ratio()
    for low, high in stretches:
        least, of = low.as_integer_ratio()
        most, per = high.as_integer_ratio()
        below, above = here * of - least * over, most * over - here * per  # by over * of, over * per
        aft = above * of < below * per
        margin = rational(above, over * per) if aft else rational(below, over * of)
        if best is None or margin > best.margin:
            best = Section(low, high, margin, "high" if aft else "low")
    return best


def _arm(weight: Fraction, moment: Fraction) -> Fraction:
    """Return moment / weight; the same as `/`, without asking what else they could be."""
    above, below = moment.as_integer_ratio()
    over, under = weight.as_integer_ratio()
    return rational(above * under, below * over)
