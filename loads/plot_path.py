"""The burn on a plot: a thin line through the phases, and the worst point of it, a cross with a W.

It draws and decides nothing. Between two kinks the moment is straight over weight, so in a plane of arms the
line is bent a little; it is drawn through points in between.
"""

from collections.abc import Mapping, Sequence
from itertools import pairwise
from typing import Any

from fleet.basis import Axis
from loads.plot_marks import WORST, Mark
from loads.plot_scale import Scale
from loads.svg import corners, element

BETWEEN = 8  # straight pieces from one kink to the next


def burn_line(result: Mapping[str, Any], axis: Axis, plane: str, x: Scale, y: Scale) -> list[str]:
    """This function will return the burn as one SVG line, or as several with the jumps of its events between
    them; [] for a result that holds no path.

    It runs from engine start to the least fuel at landing; zero fuel is a limit, not a place on the flight.
    """
    path = result.get("path")
    if not path:
        return []
    if path.get("runs"):
        return _runs(path["runs"], axis, plane, x, y)
    known = [phase for phase in result["phases"] if phase["phase"] != "zero fuel"]
    knots = sorted((_knot(row, axis) for row in (*known, *path["points"], *path["worst"])), reverse=True)
    return [_drawn(_way(knots), plane, x, y)]


def _runs(
    runs: Sequence[Sequence[Mapping[str, Any]]], axis: Axis, plane: str, x: Scale, y: Scale
) -> list[str]:
    """Draw a path that jumps at events: a line from jump to jump, and each jump as a line of short dashes."""
    lines = [[_knot(row, axis) for row in run] for run in runs]
    found = [_drawn(_way(knots), plane, x, y) for knots in lines]
    jumps = [[one[-1], other[0]] for one, other in pairwise(lines)]
    return found + [_drawn(_way(jump), plane, x, y, dashes="1.5 1.5") for jump in jumps]


def _way(knots: Sequence[tuple[float, float]]) -> list[tuple[float, float]]:
    way = [knots[0]]
    for (w1, m1), (w2, m2) in pairwise(knots):
        steps = [number / BETWEEN for number in range(1, BETWEEN + 1)]
        way += [(w1 + (w2 - w1) * step, m1 + (m2 - m1) * step) for step in steps]
    return way


def _drawn(
    way: Sequence[tuple[float, float]], plane: str, x: Scale, y: Scale, dashes: str | None = None
) -> str:
    points = [
        (x.at(moment if plane == "moment" else moment / weight), y.at(weight)) for weight, moment in way
    ]
    return element(
        "polyline",
        points=corners(points),
        fill="none",
        stroke="#000",
        stroke_width=0.4,
        **({} if dashes is None else {"stroke_dasharray": dashes}),
    )


def worst_mark(result: Mapping[str, Any], axis: Axis, plane: str) -> list[Mark]:
    """This function will return the mark of the worst point of an axis; [] where there is none."""
    found = [each for each in (result.get("path") or {}).get("worst", ()) if each["axis"] == axis]
    marks = []
    for each in found:
        weight, moment = _knot(each, axis)
        across = moment if plane == "moment" else moment / weight
        marks.append(Mark(WORST, f"worst point, {each['point']}", across, weight))
    return marks


def _knot(row: Mapping[str, Any], axis: Axis) -> tuple[float, float]:
    """The weight and the moment of a row of the result, of one axis."""
    weight = float(row["weight"])
    return weight, float(row["moment"]) if axis == "longitudinal" else float(row["lateral_arm"]) * weight
