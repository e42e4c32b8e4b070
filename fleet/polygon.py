r"""An outline of an envelope as a polygon, cut at the weight of every vertex into trapezoids.

    weight                   Between two levels lie trapezoids side by side. Each of their sides is a curve
      ^    ____
      |   /----\                 P*moment + A + B*weight + C*weight*weight = 0
      |  /------\__
      | /---------_/         with whole numbers: a straight edge over arms has A = 0, one over moments C = 0.
      +--------------> arm or moment

shapely judges whether the outline is a polygon; it never decides membership.
"""

from collections.abc import Iterator, Sequence
from fractions import Fraction
from itertools import pairwise
from math import lcm
from operator import itemgetter
from typing import Literal, NamedTuple

from shapely import Polygon
from shapely.validation import explain_validity

Point = tuple[Fraction, Fraction]  # (arm or moment, weight)
Side = tuple[int, int, int, int]  # P, A, B, C; inside where P*moment + A + B*weight + C*weight**2 >= 0
# The left side, whose P is above zero, then the right one, whose P is below.
Trapezoid = tuple[int, int, int, int, int, int, int, int]
FEWEST_POINTS = 3


class NotAnEnvelope(ValueError):
    """These points make no envelope. `code` is stable, the message says why and what to do."""

    def __init__(self, code: str, detail: str) -> None:
        super().__init__(detail)
        self.code = code


class Slabs(NamedTuple):
    """An envelope cut at its levels: whole numbers, rising, weights in units of 1 / `scale`.

    `trapezoids[i]` lie between levels i and i + 1, side by side, in rising order of arm.
    """

    scale: int
    levels: tuple[int, ...]
    trapezoids: tuple[tuple[Trapezoid, ...], ...]

    def parts(self) -> Iterator[tuple[tuple[Fraction, Fraction], tuple[Trapezoid, ...]]]:
        """Yield the two weights of each pair of neighbouring levels, and the trapezoids between them."""
        weights = (Fraction(level, self.scale) for level in self.levels)
        yield from zip(pairwise(weights), self.trapezoids, strict=True)


def slabs_of(plane: Literal["arm", "moment"], points: Sequence[Point]) -> Slabs:
    """Return the polygon with these vertices, in order, the first not repeated. Raises `NotAnEnvelope`."""
    demand_polygon(points)
    weights = sorted({weight for _, weight in points})
    scale = lcm(*(weight.denominator for weight in weights))
    return Slabs(
        scale,
        tuple(int(weight * scale) for weight in weights),
        tuple(tuple(_trapezoids(plane, points, low, high)) for low, high in pairwise(weights)),
    )


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


def overlap(one: Sequence[Point], other: Sequence[Point]) -> bool:
    """Return whether two polygons have an area in common; as near as doubles tell, so for a slip only."""
    return bool(_doubles(one).intersection(_doubles(other)).area > 0)


def _doubles(points: Sequence[Point]) -> Polygon:
    return Polygon([(float(x), float(y)) for x, y in points])


def _crossing(why: str) -> NotAnEnvelope:
    return NotAnEnvelope(
        "envelope-crosses-itself",
        f"the outline crosses or touches itself ({why}); enter the points in order around it",
    )


def _trapezoids(
    plane: Literal["arm", "moment"], points: Sequence[Point], low: Fraction, high: Fraction
) -> Iterator[Trapezoid]:
    """Yield the pieces of the polygon between two neighbouring vertex weights, from low to high arm or
    moment.
    """
    across = []
    for one, other in zip(points, [*points[1:], points[0]], strict=True):
        (x1, y1), (x2, y2) = sorted((one, other), key=itemgetter(1))
        if y1 <= low and y2 >= high:
            slope = (x2 - x1) / (y2 - y1)
            side = _side(plane, x1, y1, x2, y2)
            across.append((x1 + (low - y1) * slope, x1 + (high - y1) * slope, side))
    across.sort(key=lambda side: side[0] + side[1])
    for (low_left, high_left, _), (low_right, high_right, _) in pairwise(across):
        if low_left > low_right or high_left > high_right:  # exact, where doubles may have been too coarse
            raise _crossing("self-intersection")
    for (_, _, left), (_, _, right) in zip(across[::2], across[1::2], strict=True):
        yield (*left, -right[0], -right[1], -right[2], -right[3])


def _side(plane: Literal["arm", "moment"], x1: Fraction, y1: Fraction, x2: Fraction, y2: Fraction) -> Side:
    """Return the side through two points, P above zero, so that it is positive to its right (y2 > y1)."""
    exact = (y2 - y1, x1 - x2, y1 * (x2 - x1) - x1 * (y2 - y1))
    scale = lcm(*(each.denominator for each in exact))
    p, q, r = (int(each * scale) for each in exact)
    return (p, 0, r, q) if plane == "arm" else (p, r, q, 0)
