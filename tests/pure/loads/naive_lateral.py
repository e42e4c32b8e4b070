"""A second judge of lateral limits against the longitudinal CG, slow and plain, in fractions.

It shares nothing with the engine: a point is judged by counting crossings (`oracle.inside`), and the margin
is measured along a line of one longitudinal arm that is cut with every side of the polygon.
"""

from fractions import Fraction

from tests.pure.loads.naive_path import PHASES_OF, points_along
from tests.pure.loads.oracle import inside

F = Fraction


def place_of(point, gives):
    """Where a point of a path lies in the plane of such a limit; None where its moment is not known."""
    if point.moment is None:
        return None
    across = point.lateral_moment if gives == "moment" else point.lateral_moment / point.weight
    return point.moment / point.weight, across


def margin(place, polygon):
    """The way across to the nearer edge, below 0 outside; None at the arm of a corner or off the polygon."""
    x, y = place
    if any(corner[0] == x for corner in polygon):
        return None
    crossed = []
    for (x1, y1), (x2, y2) in zip(polygon, (*polygon[1:], polygon[0]), strict=True):
        if (x1 - x) * (x2 - x) < 0:
            crossed.append(y1 + (y2 - y1) * (x - x1) / (x2 - x1))
    crossed.sort()
    ways = [min(y - low, high - y) for low, high in zip(crossed[::2], crossed[1::2], strict=True)]
    return max(ways, default=None)


def sampled_lateral(declared, basis, dry, samples):
    """All samples: (inside, margin or None), per limit and leg in the order of flight."""
    runs = []
    points = list(points_along(declared, basis, dry, samples))
    for limit in basis.lateral_by_cg:
        for leg, phases in PHASES_OF.items():
            if not set(phases) & set(limit.phases):
                continue
            places = [place_of(point, limit.gives) for point in points if point.leg == leg]
            known = [place for place in places if place is not None]
            runs.append([(inside(place, limit.points), margin(place, limit.points)) for place in known])
    return runs
