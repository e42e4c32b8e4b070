"""The decision on 100,000 points that lie on an edge or a corner, or beside one by a unit of some last digit.

    python -m tests.bench.points_on_edges [points]

Convex, sloping and notched envelopes, in both planes; judged by a slow second opinion in rationals that
shares no line with the engine. Wanted: none wrong.
"""

import random
import sys
from itertools import product

from tests.pure.fleet.outlines import NAMES, PLANES, moment_at, near_the_edge, outline, second_opinion, shape

SEED = 14


def main(count: int) -> int:
    """Print the table; 1 when a point was judged wrong."""
    chance, wrong, inside = random.Random(SEED), 0, 0
    drawn = [(plane, outline(name, plane), shape(name, plane)) for name, plane in product(NAMES, PLANES)]
    for number in range(count):
        plane, points, exact = drawn[number % len(drawn)]
        x, weight = near_the_edge(points, chance)
        right = second_opinion(points, x, weight)
        inside += right
        wrong += exact.holds(weight, moment_at(plane, x, weight)) is not right
    print(f"{'points':<30}{count:>10,}")
    print(f"{'inside':<30}{inside:>10,}")
    print(f"{'outside':<30}{count - inside:>10,}")
    print(f"{'judged wrong':<30}{wrong:>10,}    (target 0)")
    return 1 if wrong else 0


if __name__ == "__main__":
    sys.exit(main(int((sys.argv[1:] or ["100000"])[0])))
