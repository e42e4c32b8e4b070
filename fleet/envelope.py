r"""The shape of an envelope: is it a polygon, is a point in it, how far is the nearest edge. All exact.

A closed polygon in (arm or moment, weight); which of the two says in which plane its edges are straight.
Notches stay. A point on an edge is inside. shapely judges whether the polygon is one; it never decides
membership.

    weight                   The polygon is cut once, at the weight of every vertex, into trapezoids.
      ^    ____              At the weight of a point at most a few are left, and the point is inside
      |   /----\             when it is right of the left side and left of the right side of one of
      |  /------\__          them. Each side is a line P*x + Q*y + R >= 0 with whole numbers P, Q, R,
      | /---------_/         so a decision is a handful of whole multiplications and no division.
      +--------------> arm or moment

Weights in one weight unit, arms in one length unit, moments in that weight unit times that length unit.
Aft and right are positive, so the low edge along the arm is the forward (or left) one.
"""

from bisect import bisect_right
from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from fractions import Fraction
from itertools import pairwise
from math import lcm
from operator import itemgetter
from typing import Literal, NamedTuple

from shapely import Polygon
from shapely.validation import explain_validity

Point = tuple[Fraction, Fraction]  # (arm or moment, weight)
Line = tuple[int, int, int]
Trapezoid = tuple[
    int, int, int, int, int, int
]  # left side P, Q, R, then right side P, Q, R; inside: both >= 0
Stretch = tuple[Fraction, Fraction]
FEWEST_POINTS = 3


class Slabs(NamedTuple):
    """The polygon cut at the weights of its vertices: whole `levels`, rising, in units of 1 / `scale`.

    `trapezoids[i]` lie between levels i and i + 1, side by side; sides are lines of arm, or of moment where
    `in_moment`.
    """

    scale: int
    levels: tuple[int, ...]
    trapezoids: tuple[tuple[Trapezoid, ...], ...]
    in_moment: bool


class NotAnEnvelope(ValueError):
    """These points make no envelope. `code` is stable, the message says why and what to do."""

    def __init__(self, code: str, detail: str) -> None:
        super().__init__(detail)
        self.code = code


@dataclass(frozen=True, slots=True)
class Section:
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
        demand_polygon(points)
        self._moment_plane = plane == "moment"
        self._points = tuple(points)
        weights = sorted({weight for _, weight in points})
        self._scale = lcm(*(weight.denominator for weight in weights))
        self._levels = [int(weight * self._scale) for weight in weights]
        self._at_level = frozenset(self._levels)
        slabs = [tuple(_trapezoids(points, low, high)) for low, high in pairwise(weights)]
        self.slabs = Slabs(self._scale, tuple(self._levels), tuple(slabs), self._moment_plane)
        # Nothing below, then by turns what is at a level and what is between two levels, then nothing above.
        between = [(), *slabs, ()]
        spans: list[tuple[Trapezoid, ...]] = [()]
        for below, above in pairwise(between):
            spans += [below + above, above]
        self._spans = tuple(spans)
        scale = lcm(*(each.denominator for point in points for each in point))
        self._whole = tuple((int(x * scale), int(y * scale)) for x, y in points)
        self._whole_scale = scale

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
        # The sides are lines in (arm, weight): multiplied by weight and denominator, they need no quotient.
        if self._moment_plane:
            x, y, one = moment, weight, over
        else:
            x, y, one = moment * over, weight * weight, weight * over
        for p, q, r, p2, q2, r2 in self._spans[index]:
            if p * x + q * y + r * one >= 0 and p2 * x + q2 * y + r2 * one >= 0:
                return True
        return False

    def arms_at(self, weight: Fraction) -> tuple[Stretch, ...]:
        """Return the stretches of arm (low, high) inside the envelope at a weight, rising.

        Empty when there are none.
        """
        whole, rest = divmod(weight.numerator * self._scale, weight.denominator)
        index = bisect_right(self._levels, whole) * 2
        if not rest and whole in self._at_level:
            index -= 1
        y, one = weight.numerator, weight.denominator
        over = y if self._moment_plane else one
        found = [
            (Fraction(-q * y - r * one, p * over), Fraction(-q2 * y - r2 * one, p2 * over))
            for p, q, r, p2, q2, r2 in self._spans[index]
        ]
        return tuple(_merged(found)) if found[1:] else tuple(found)

    def weights_at(self, arm: Fraction) -> tuple[Stretch, ...]:
        """Return the stretches of weight (low, high) inside the envelope along one arm, rising.

        Empty when there are none.
        """
        over, of = arm.denominator, arm.numerator
        # Which side of the line of this arm each vertex is on, and how far, all in one whole-number measure.
        if self._moment_plane:
            sides = [x * over - of * y for x, y in self._whole]
        else:
            line = of * self._whole_scale
            sides = [x * over - line for x, _ in self._whole]
        marks: set[Fraction] = set()
        for (_, y1), f1, (_, y2), f2 in zip(
            self._points, sides, self._points[1:] + self._points[:1], sides[1:] + sides[:1], strict=True
        ):
            if f1 == 0:
                marks.add(y1)
            elif f1 < 0 < f2 or f2 < 0 < f1:
                marks.add(y1 + (y2 - y1) * Fraction(f1, f1 - f2))
        rising = sorted(marks)
        if 0 not in sides:  # every mark is a crossing, so inside and outside take turns
            return tuple(zip(rising[::2], rising[1::2], strict=True))
        found = [(mark, mark) for mark in rising]
        for low, high in pairwise(rising):
            middle = (low + high) / 2
            if self.holds(middle, arm * middle):
                found.append((low, high))
        return tuple(_merged(found))

    def arm_section(self, weight: Fraction, moment: Fraction) -> Section | None:
        """Return the stretch of arm at the same weight and the margin in arm.

        None where the envelope has none.
        """
        return _nearest(self.arms_at(weight), moment / weight) if weight > 0 else None

    def weight_section(self, weight: Fraction, moment: Fraction) -> Section | None:
        """Return the stretch of weight at the same arm and the margin in weight.

        None where the envelope has none.
        """
        return _nearest(self.weights_at(moment / weight), weight) if weight > 0 else None

    @property
    def lowest(self) -> Fraction:
        """Return the least weight of the envelope."""
        return Fraction(self._levels[0], self._scale)

    @property
    def highest(self) -> Fraction:
        """Return the greatest weight of the envelope."""
        return Fraction(self._levels[-1], self._scale)


def demand_polygon(points: Sequence[Point]) -> None:
    """Refuse, with `NotAnEnvelope`, points that are no simple polygon with an area and weights above zero."""
    if len(points) < FEWEST_POINTS:
        raise NotAnEnvelope(
            "envelope-too-few-points", "an envelope needs at least three points; enter the missing ones"
        )
    if len(set(points)) < len(points):
        raise NotAnEnvelope(
            "envelope-repeated-point",
            "a point stands twice; leave the repetition out, the envelope closes by itself",
        )
    if any(weight <= 0 for _, weight in points):
        raise NotAnEnvelope("envelope-weight", "weights of an envelope lie above zero; correct the point")
    ring = zip(points, [*points[1:], points[0]], strict=True)
    if sum((x1 * y2 - x2 * y1 for (x1, y1), (x2, y2) in ring), Fraction(0)) == 0:
        raise NotAnEnvelope("envelope-no-area", "the points enclose no area; correct them or their order")
    # Whole numbers, so that shapely's doubles are exact up to 2**53.
    across = lcm(*(x.denominator for x, _ in points))
    up = lcm(*(y.denominator for _, y in points))
    polygon = Polygon([(float(x * across), float(y * up)) for x, y in points])
    if not polygon.is_valid:
        raise _crossing(explain_validity(polygon).split("[")[0].lower())


def _crossing(why: str) -> NotAnEnvelope:
    return NotAnEnvelope(
        "envelope-crosses-itself",
        f"the outline crosses or touches itself ({why}); enter the points in order around it",
    )


def _trapezoids(points: Sequence[Point], low: Fraction, high: Fraction) -> Iterator[Trapezoid]:
    """Yield the pieces of the polygon between two neighbouring vertex weights, from low to high arm or
    moment.
    """
    across = []
    for one, other in zip(points, [*points[1:], points[0]], strict=True):
        (x1, y1), (x2, y2) = sorted((one, other), key=itemgetter(1))
        if y1 <= low and y2 >= high:
            slope = (x2 - x1) / (y2 - y1)
            across.append((x1 + (low - y1) * slope, x1 + (high - y1) * slope, _line(x1, y1, x2, y2)))
    across.sort(key=lambda side: side[0] + side[1])
    for (low_left, high_left, _), (low_right, high_right, _) in pairwise(across):
        if low_left > low_right or high_left > high_right:  # exact, where doubles may have been too coarse
            raise _crossing("self-intersection")
    for (_, _, left), (_, _, right) in zip(across[::2], across[1::2], strict=True):
        yield (*left, -right[0], -right[1], -right[2])


def _line(x1: Fraction, y1: Fraction, x2: Fraction, y2: Fraction) -> Line:
    """Return whole P > 0, Q, R so that P*x + Q*y + R is zero on the line and positive to its right (y2 >
    y1).
    """
    exact = (y2 - y1, x1 - x2, y1 * (x2 - x1) - x1 * (y2 - y1))
    scale = lcm(*(each.denominator for each in exact))
    p, q, r = (int(each * scale) for each in exact)
    return p, q, r


def _merged(stretches: list[Stretch]) -> Iterator[Stretch]:
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
    for low, high in stretches:
        below, above = at - low, high - at
        margin, edge = (below, "low") if below <= above else (above, "high")
        if best is None or margin > best.margin:
            best = Section(low, high, margin, "low" if edge == "low" else "high")
    return best
