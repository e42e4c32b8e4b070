"""Invented outlines, and a slow second opinion on them.

The second opinion is the textbook one, in rationals: a point on any edge is inside; otherwise a ray to the
right is followed and the edges it crosses are counted. It shares no line with `fleet.envelope`.
"""

import random
from fractions import Fraction
from typing import Literal

from fleet.envelope import Point, Shape

Plane = Literal["arm", "moment"]
PLANES: tuple[Plane, ...] = ("arm", "moment")

# (arm, weight). In the moment plane the same corners stand at arm times weight, joined by straight lines
# there.
_OUTLINES = {
    "convex": "82.0 2000, 82.0 3400, 86.5 5000, 90 5600, 95 5600, 95.5 2000",
    "sloping": "71.13 1903.7, 74.91 2751.3, 79.02 3333.3, 81.97 2866.1, 78.3 2210.9",
    "notched": "-12 1500, -12 2300, -7.5 2300, -9 2600, -7 3100, 4 3100, 4 2700, 1.5 2500, 6 2100, 6 1500, "
    "2 1500, 0.5 1800, -2 1500",
    "ahead of the datum": "-41.5 900, -44 1500, -40.25 1750, -33 1600, -31 900",
}
NAMES = tuple(_OUTLINES)


def outline(name: str, plane: Plane) -> list[Point]:
    pairs = (corner.split() for corner in _OUTLINES[name].split(","))
    corners = [(Fraction(arm), Fraction(weight)) for arm, weight in pairs]
    return corners if plane == "arm" else [(arm * weight, weight) for arm, weight in corners]


def shape(name: str, plane: Plane) -> Shape:
    return Shape(plane, outline(name, plane))


def second_opinion(points: list[Point], x: Fraction, y: Fraction) -> bool:
    inside = False
    for (x1, y1), (x2, y2) in zip(points, [*points[1:], points[0]], strict=True):
        turn = (x2 - x1) * (y - y1) - (x - x1) * (y2 - y1)
        if turn == 0 and min(x1, x2) <= x <= max(x1, x2) and min(y1, y2) <= y <= max(y1, y2):
            return True
        if (y1 > y) != (y2 > y) and x < x1 + (y - y1) * (x2 - x1) / (y2 - y1):
            inside = not inside
    return inside


def near_the_edge(points: list[Point], chance: random.Random) -> tuple[Fraction, Fraction]:
    """This function will return a point on a corner or edge, or beside one by a unit of some last digit."""
    at = chance.randrange(len(points))
    (x1, y1), (x2, y2) = points[at], points[at - 1]
    share = Fraction(chance.choice([0, 1, chance.randint(0, 999)]), chance.choice([1, 7, 64, 1000]))
    share = min(share, Fraction(1))
    x, y = x1 + share * (x2 - x1), y1 + share * (y2 - y1)
    unit = Fraction(1, chance.choice([1, 10, 1000, 10**9]))
    return x + chance.choice([-1, 0, 0, 1]) * unit, y + chance.choice([-1, 0, 0, 1]) * unit


def moment_at(plane: Plane, x: Fraction, weight: Fraction) -> Fraction:
    return x * weight if plane == "arm" else x
