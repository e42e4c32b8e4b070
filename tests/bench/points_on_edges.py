"""The decision on 100,000 points that lie on an edge or a corner, or beside one by a unit of some last digit.

    python -m tests.bench.points_on_edges [points]

Convex, sloping and notched envelopes, in both planes, and the same outlines as lateral limits against the
longitudinal CG, ahead of the datum, too; judged by a slow second opinion in rationals that shares no line
with the engine. Wanted: none wrong.
"""

import random
import sys
from collections.abc import Callable
from fractions import Fraction
from functools import partial
from itertools import product

from fleet.envelope import Point, Shape
from fleet.lateral import Across
from tests.pure.fleet.outlines import (
    NAMES,
    PLANES,
    Plane,
    moment_at,
    near_the_edge,
    outline,
    second_opinion,
    shape,
)

SEED = 14
AHEAD = 2600  # so far the lateral limits are moved forward: some corners come to lie ahead of the datum
Decision = Callable[[Fraction, Fraction], bool]


def _held(exact: Shape, plane: Plane, x: Fraction, weight: Fraction) -> bool:
    return exact.holds(weight, moment_at(plane, x, weight))


def cases() -> list[tuple[list[Point], Decision]]:
    """Return every outline with the decision of the engine on a point of it."""
    found: list[tuple[list[Point], Decision]] = []
    for name, plane in product(NAMES, PLANES):
        found.append((outline(name, plane), partial(_held, shape(name, plane), plane)))
    for name in NAMES:
        turned = [(weight - AHEAD, arm) for arm, weight in outline(name, "arm")]
        found.append((turned, Across(turned).holds))
    return found


def main(count: int) -> int:
    """Print the table; 1 when a point was judged wrong."""
    chance, wrong, inside = random.Random(SEED), 0, 0
    drawn = cases()
    for number in range(count):
        points, decide = drawn[number % len(drawn)]
        x, y = near_the_edge(points, chance)
        right = second_opinion(points, x, y)
        inside += right
        wrong += decide(x, y) is not right
    print(f"{'points':<30}{count:>10,}")
    print(f"{'inside':<30}{inside:>10,}")
    print(f"{'outside':<30}{count - inside:>10,}")
    print(f"{'judged wrong':<30}{wrong:>10,}    (target 0)")
    return 1 if wrong else 0


if __name__ == "__main__":
    sys.exit(main(int((sys.argv[1:] or ["100000"])[0])))
