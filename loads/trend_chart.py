"""Rejected loads a week, one strip an aircraft over a common scale, so that no line lies on another.

Q9-AAA      2
       1   /o           a circle where something was rejected, its count above it
     __o__/__________
Q9-BBB          1
     ___________o____
     week beginning
"""

from collections.abc import Sequence
from dataclasses import dataclass
from datetime import date

from loads.plot_marks import shape
from loads.plot_scale import Scale
from loads.svg import corners, element, label, line

MOST_STRIPS = 8
WIDTH = 640.0
LEFT, RIGHT = 96.0, 630.0
STRIP, ROOM = 52.0, 20.0  # the height of a strip, and what is kept free above its highest mark
FOOT = 38.0
_INK, _SOFT, _RULE = "#16202e", "#4d5969", "#c6ccd4"
_EVERY = 3  # weeks between dates under the lowest strip


@dataclass(frozen=True, slots=True)
class Series:
    """One strip: its name and a count for each week."""

    name: str
    counts: tuple[int, ...]


def trend_chart(series: Sequence[Series], weeks: Sequence[date]) -> str:
    """This function will return the chart as SVG; `weeks` are the first days of the weeks, as many as counts.

    Strips without any count are left out, and at most `MOST_STRIPS` are drawn, the first ones; "" without
    any.
    """
    drawn = [one for one in series if any(one.counts)][:MOST_STRIPS]
    if not drawn or not weeks:
        return ""
    most = max(max(one.counts) for one in drawn)
    across = Scale(0, max(len(weeks) - 1, 1), LEFT + 10, RIGHT - 10)
    height = STRIP * len(drawn) + FOOT
    parts: list[str] = []
    for number, one in enumerate(drawn):
        base = STRIP * (number + 1)
        parts += _strip(one, across, Scale(0, most, base, base - STRIP + ROOM))
    parts += _foot(weeks, across, STRIP * len(drawn))
    words = "; ".join(f"{one.name}: {', '.join(map(str, one.counts))}" for one in drawn)
    return element(
        "svg",
        element("title", words=f"Rejected loads a week, the oldest week first. {words}"),
        *parts,
        xmlns="http://www.w3.org/2000/svg",
        viewBox=f"0 0 {WIDTH:g} {height:g}",
        role="img",
        font_family="IBM Plex Sans, sans-serif",
        font_size=11,
        fill=_INK,
    )


def _strip(one: Series, across: Scale, up: Scale) -> list[str]:
    points = [(across.at(place), up.at(count)) for place, count in enumerate(one.counts)]
    base = up.at(0)
    parts = [
        line((LEFT, base), (RIGHT, base), stroke=_RULE, stroke_width=0.8),
        label(one.name, (0, base - 4), font_weight=700, font_size=13),
        element("polyline", points=corners(points), fill="none", stroke=_INK, stroke_width=1.3),
    ]
    for point, count in zip(points, one.counts, strict=True):
        if count:
            parts.append(shape("L", point, 3.4))
            parts.append(label(str(count), (point[0], point[1] - 7), text_anchor="middle", font_weight=600))
    return parts


def _foot(weeks: Sequence[date], across: Scale, base: float) -> list[str]:
    parts = [line((LEFT, base), (RIGHT, base), stroke=_INK, stroke_width=0.8)]
    for place, week in enumerate(weeks):
        at = across.at(place)
        parts.append(line((at, base), (at, base + 4), stroke=_INK, stroke_width=0.8))
        if (len(weeks) - 1 - place) % _EVERY == 0:
            words = f"{week.day} {week:%b}"
            parts.append(label(words, (at, base + 16), text_anchor="middle", fill=_SOFT))
    parts.append(label("week beginning", (0, base + 16), fill=_SOFT))
    return parts
