"""The exact decision against plain floats with shapely, on the same points, within one run.

    .venv/bin/python -m tests.bench.decision_against_shapely

Both are given a weight and a moment and answer inside or outside. The float way divides, makes a point and
asks `covers` of the unprepared polygon; a second row leaves the making of the point out of its time. The
exact way is asked with rationals and, as the sums have them, with whole numbers over one denominator. How
often the float way is wrong is counted on the points of an edge.
"""

import random
from collections.abc import Callable
from fractions import Fraction
from itertools import product
from statistics import median
from time import perf_counter

from shapely import Point, Polygon

from fleet.envelope import Shape
from tests.pure.fleet.outlines import NAMES, outline, second_opinion

POINTS, REPEATS = 2_000, 15
Row = tuple[str, float]


def rows() -> list[Row]:
    """This function will return the rows of the table: what was measured, and the figure."""
    chance = random.Random(4)
    points = outline("convex", "arm")
    exact, floats = Shape("arm", points), Polygon([(float(x), float(y)) for x, y in points])
    asked = [_typed(chance) for _ in range(POINTS)]
    whole = [(int(weight * 100), int(moment * 100), 100) for weight, moment in asked]
    plain = [(float(weight), float(moment)) for weight, moment in asked]
    made = [Point(moment / weight, weight) for weight, moment in plain]

    ways: dict[str, Callable[[], list[bool]]] = {
        "exact": lambda: [exact.holds(weight, moment) for weight, moment in asked],
        "whole": lambda: [exact.holds_whole(*each) for each in whole],
        "floats": lambda: [floats.covers(Point(moment / weight, weight)) for weight, moment in plain],
        "covers": lambda: [floats.covers(each) for each in made],
    }
    if ways["exact"]() != ways["whole"]():
        raise AssertionError
    times: dict[str, list[float]] = {name: [] for name in ways}
    for _ in range(REPEATS):
        for name, way in ways.items():
            begun = perf_counter()
            way()
            times[name].append(perf_counter() - begun)
    took = {name: median(each) for name, each in times.items()}
    return [
        *((f"{name}, microseconds a point", 1e6 * each / POINTS) for name, each in took.items()),
        ("exact / floats with shapely", took["exact"] / took["floats"]),
        ("exact, whole numbers / floats with shapely", took["whole"] / took["floats"]),
        ("exact / shapely's covers alone, points made before", took["exact"] / took["covers"]),
        ("exact, whole numbers / shapely's covers alone", took["whole"] / took["covers"]),
        *zip(
            (f"wrong of 1,000 points on edges: {way}" for way in ("exact", "floats")),
            _wrong_on_edges(),
            strict=True,
        ),
    ]


def _typed(chance: random.Random) -> tuple[Fraction, Fraction]:
    weight = Fraction(chance.randint(18_000, 58_000), 10)
    return weight, Fraction(round(weight * chance.randint(8_000, 9_700)), 100)


def _wrong_on_edges() -> tuple[int, int]:
    chance, wrong = random.Random(7), [0, 0]
    shapes = [(outline(name, plane), plane) for name, plane in product(NAMES, ("arm", "moment"))]
    for _ in range(1_000):
        points, plane = chance.choice(shapes)
        at, share = chance.randrange(len(points)), Fraction(chance.randint(1, 999), 1_000)
        (x1, y1), (x2, y2) = points[at], points[at - 1]
        x, weight = x1 + share * (x2 - x1), y1 + share * (y2 - y1)
        moment = x * weight if plane == "arm" else x
        right = second_opinion(points, x, weight)
        wrong[0] += Shape(plane, points).holds(weight, moment) is not right
        across = float(moment) / float(weight) if plane == "arm" else float(moment)
        polygon = Polygon([(float(px), float(py)) for px, py in points])
        wrong[1] += polygon.covers(Point(across, float(weight))) is not right
    return wrong[0], wrong[1]


if __name__ == "__main__":
    for what, figure in rows():
        print(f"{what:<52} {figure:8.2f}")
