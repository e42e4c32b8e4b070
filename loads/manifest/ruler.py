"""A check drawn as a ruler in its own unit: the limits are its ends, a filled triangle is where the load
stands.

low |----+----+----+--v-| high
"""

from collections.abc import Mapping
from fractions import Fraction
from typing import Any

from loads.plot_scale import Scale, ticks
from loads.svg import corners, element, line

WIDTH, HEIGHT = 150.0, 13.0
BASE = 10.0
MOST_MARKS = 6


def ruler(check: Mapping[str, Any]) -> str:
    """This function will return a check's ruler as SVG, or "" when it has no two ends or no actual.

    An upper limit alone starts its ruler at 0. A load beyond a limit stands beyond the ruler's end.
    """
    if check["actual"] is None or check["limit"] is None:
        return ""
    actual, high = float(Fraction(check["actual"])), float(Fraction(check["limit"]))
    low = float(Fraction(check["low"])) if check["low"] is not None else min(0.0, high)
    if not low < high:
        return ""
    scale = Scale(min(low, actual), max(high, actual), 5.0, WIDTH - 5.0)
    ends = [scale.at(low), scale.at(high)]
    parts = [line((ends[0], BASE), (ends[1], BASE), stroke_width=0.7)]
    parts += [line((end, BASE - 8), (end, BASE + 2.5), stroke_width=1.6) for end in ends]
    inner = [value for value in ticks(Scale(low, high, 0, 1), MOST_MARKS) if low < value < high]
    parts += [
        line((scale.at(value), BASE - 2.5), (scale.at(value), BASE), stroke_width=0.6) for value in inner
    ]
    at = scale.at(actual)
    parts.append(
        element("polygon", points=corners([(at, BASE - 0.5), (at - 3.4, BASE - 7), (at + 3.4, BASE - 7)]))
    )
    return element(
        "svg", *parts, xmlns="http://www.w3.org/2000/svg", viewBox=f"0 0 {WIDTH:g} {HEIGHT:g}", fill="#000"
    )
