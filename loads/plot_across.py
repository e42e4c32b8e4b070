r"""The plot of a load against lateral limits that vary with the longitudinal CG, as one SVG text.

    lateral  R |   .-------.
               |  /  R T    \     the limit: a closed line, named at the right
             0 | |   Z L     |    phases: the shapes and letters they have on the other plots
               |  \_________/
             L +---------------> centre of gravity, arm

Right of the centreline is up. It draws and decides nothing: binary floats are used here and nowhere near a
verdict.
"""

from collections.abc import Mapping, Sequence
from fractions import Fraction
from itertools import pairwise
from typing import Any

from fleet.lateral import LateralByCg
from loads.plot import DASHES, ROW, STANDARD, Frame, broken, grid, titles
from loads.plot_marks import MARKS, WORST, Mark, drawn_marks
from loads.plot_path import BETWEEN
from loads.plot_scale import Scale
from loads.svg import corners, element, label, picture, short

Knot = tuple[float, float, float]  # weight, moment, lateral moment
AXIS = "lateral by CG"  # of a worst point in the result document
UP = {"arm": "lateral arm", "moment": "lateral moment"}


def plot_across(result: Mapping[str, Any], limits: Sequence[LateralByCg], *, frame: Frame = STANDARD) -> str:
    """This function will return an SVG text of the result document against these limits.

    They are in the units of the result. Returns "" when there is nothing to draw. Aft and right: positive.
    """
    shown = [limit for limit in limits if limit.gives == limits[0].gives]
    if not shown or not result["phases"]:
        return ""
    gives = shown[0].gives
    marks = [Mark(MARKS[row["phase"]], row["phase"], *_place(row, gives)) for row in result["phases"]]
    worst = [each for each in (result.get("path") or {}).get("worst", ()) if each["axis"] == AXIS]
    marks += [Mark(WORST, f"worst point, {each['point']}", *_place(each, gives)) for each in worst]
    points = [(float(along), float(across)) for limit in shown for along, across in limit.points]
    x = Scale.around([along for along, _ in points] + [mark.x for mark in marks], frame.left, frame.right)
    y = Scale.around([across for _, across in points] + [mark.y for mark in marks], frame.bottom, frame.top)
    units = result["units"]
    unit = units["moment" if gives == "moment" else "length"]
    parts = [
        *grid(x, y, frame, sided=False, sided_up=True),
        *titles(frame, f"centre of gravity, arm, {units['length']}", f"{UP[gives]}, {unit}"),
        *(_outline(limit, number, x, y, frame) for number, limit in enumerate(shown)),
        *_burn(result, gives, x, y),
        *drawn_marks(marks, x, y, frame.right),
    ]
    told = "; ".join(
        f"{mark.phase}: {_sided(mark.y)} {unit} at {short(mark.x)} {units['length']}" for mark in marks
    )
    return picture(parts, frame.width, frame.height, told)


def _place(row: Mapping[str, Any], gives: str) -> tuple[float, float]:
    arm, across = Fraction(row["arm"]), Fraction(row["lateral_arm"])
    return float(arm), float(across * Fraction(row["weight"]) if gives == "moment" else across)


def _outline(limit: LateralByCg, number: int, x: Scale, y: Scale, frame: Frame) -> str:
    points = [(x.at(float(along)), y.at(float(across))) for along, across in limit.points]
    dash = DASHES[number % len(DASHES)]
    line = element(
        "polygon", points=corners(points), fill="none", stroke="#000", stroke_width=1.5, stroke_dasharray=dash
    )
    words = broken(f"{limit.id} lateral limit: {', '.join(limit.phases)}")
    top = frame.top + 6 + number * ROW * 5
    names = [
        label(each, (frame.right + 11, top + row * ROW), font_size=8.5) for row, each in enumerate(words)
    ]
    return element("g", line, *names)


def _burn(result: Mapping[str, Any], gives: str, x: Scale, y: Scale) -> list[str]:
    """The burn as a thin line from engine start to the least fuel, straight in moments between its kinks; one
    that jumps at events as a line from jump to jump.
    """
    path = result.get("path")
    if not path:
        return []
    rows = [row for row in result["phases"] if row["phase"] != "zero fuel"] + list(path["points"])
    runs = [[_knot(row) for row in run] for run in path.get("runs") or ()]
    runs = runs or [sorted((_knot(row) for row in rows), reverse=True)]
    drawn = []
    for run in runs:
        points = [
            (x.at(moment / weight), y.at(across if gives == "moment" else across / weight))
            for weight, moment, across in _way(run)
        ]
        drawn.append(
            element("polyline", points=corners(points), fill="none", stroke="#000", stroke_width=0.4)
        )
    return drawn


def _knot(row: Mapping[str, Any]) -> Knot:
    weight = float(row["weight"])
    return weight, float(row["moment"]), float(row["lateral_arm"]) * weight


def _way(run: Sequence[Knot]) -> list[Knot]:
    way = [run[0]]
    for (w1, m1, l1), (w2, m2, l2) in pairwise(run):
        steps = [number / BETWEEN for number in range(1, BETWEEN + 1)]
        way += [(w1 + (w2 - w1) * part, m1 + (m2 - m1) * part, l1 + (l2 - l1) * part) for part in steps]
    return way


def _sided(value: float) -> str:
    figure = short(abs(value))
    return figure if figure == "0" else f"{'L' if value < 0 else 'R'} {figure}"
