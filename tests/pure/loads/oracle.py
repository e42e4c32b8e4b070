"""A second judge of envelopes, slow and plain: crossings of a ray counted in fractions, edges tested first.

It shares nothing with the engine: it turns a load into its sum by adding weight times arm, and a point into
inside or outside by the rule taught for polygons, in the plane in which the edges are straight.
"""

from fractions import Fraction

F = Fraction


Point = tuple[F, F]


def on_segment(point: Point, a: Point, b: Point) -> bool:
    (x, y), (x1, y1), (x2, y2) = point, a, b
    if (x2 - x1) * (y - y1) != (y2 - y1) * (x - x1):
        return False
    return min(x1, x2) <= x <= max(x1, x2) and min(y1, y2) <= y <= max(y1, y2)


def inside(point: Point, polygon: tuple[Point, ...]) -> bool:
    """Whether a point lies in a simple polygon or on its edge."""
    edges = list(zip(polygon, (*polygon[1:], polygon[0]), strict=True))
    if any(on_segment(point, a, b) for a, b in edges):
        return True
    x, y = point
    crossings = 0
    for (x1, y1), (x2, y2) in edges:
        if (y1 > y) != (y2 > y) and x < x1 + (y - y1) * (x2 - x1) / (y2 - y1):
            crossings += 1
    return crossings % 2 == 1


def load_inside(weight: F, moment: F, polygon: tuple[Point, ...], plane: str) -> bool:
    """Whether a load of a weight and a moment lies in an envelope of a plane."""
    return inside((moment / weight if plane == "arm" else moment, weight), polygon)
