"""The phases on a plot: each has a shape and a letter of its own, so nothing depends on colour."""

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import product
from math import cos, pi, sin

from loads.plot_scale import Scale
from loads.svg import corners, element, label, line

# Letters of the phases: R ramp, T take-off, Z zero fuel, L landing, M minimum at landing.
MARKS = {"ramp": "R", "take-off": "T", "zero fuel": "Z", "landing": "L", "minimum at landing": "M"}
WORST = "W"  # the worst point of the burn: a cross, which leaves the shape of a phase below it in sight
RADIUS = 4.2
LETTER = 11.0  # height and width kept free around a letter
# Corners and the direction of the first one: a square, a triangle, a lozenge, a triangle on its tip.
SHAPES = {"R": (4, pi / 4), "T": (3, -pi / 2), "Z": (4, 0.0), "M": (3, pi / 2)}
REACHES = (11.0, 20.0, 30.0, 42.0, 56.0)
TURNS = (0.0, pi, -pi / 2, pi / 2, -pi / 4, pi / 4, 2.4, -2.4)

Box = tuple[float, float, float, float]


@dataclass(frozen=True, slots=True)
class Mark:
    """One phase: its letter, its name, arm or moment, and weight."""

    letter: str
    phase: str
    x: float
    y: float


def drawn_marks(marks: Sequence[Mark], x: Scale, y: Scale, right: float) -> list[str]:
    """This function will return the marks as SVG: shapes where they belong, letters clear of each other."""
    places = [(x.at(mark.x), y.at(mark.y)) for mark in marks]
    taken = [_box(place, 2 * RADIUS) for place in places]
    parts = [shape(mark.letter, place) for mark, place in zip(marks, places, strict=True)]
    for mark, place in zip(marks, places, strict=True):
        at, far = _free_place(place, taken, right)
        taken.append(_box(at, LETTER))
        if far:
            parts.append(line(place, at, stroke_width=0.4))
        # A white ground keeps the letter legible on a line of the grid or an envelope.
        parts.append(element("circle", cx=at[0], cy=at[1], r=5, fill="#fff"))
        parts.append(
            label(mark.letter, (at[0], at[1] + 3.8), text_anchor="middle", font_size=10.5, font_weight=700)
        )
    return parts


def shape(letter: str, at: tuple[float, float], size: float = RADIUS) -> str:
    """This function will return the shape that belongs to a letter, around a point."""
    if letter == WORST:
        reach = size * 1.5
        ends = [
            ((at[0] - reach, at[1] + way * reach), (at[0] + reach, at[1] - way * reach)) for way in (1, -1)
        ]
        return element("g", *(line(start, end, stroke_width=1.0) for start, end in ends))
    fill = "#000" if letter == "T" else "#fff"
    if letter not in SHAPES:
        return element("circle", cx=at[0], cy=at[1], r=size, fill=fill, stroke="#000", stroke_width=1.2)
    sides, turn = SHAPES[letter]
    reach = size * 1.25
    around = [turn + 2 * pi * number / sides for number in range(sides)]
    points = corners([(at[0] + reach * cos(angle), at[1] + reach * sin(angle)) for angle in around])
    return element("polygon", points=points, fill=fill, stroke="#000", stroke_width=1.2)


def _free_place(
    at: tuple[float, float], taken: Sequence[Box], right: float
) -> tuple[tuple[float, float], bool]:
    """Find the nearest place for a letter that covers nothing, and whether it needs a line to its mark."""
    for reach, turn in product(REACHES, TURNS):
        place = at[0] + reach * cos(turn), at[1] + reach * sin(turn)
        box = _box(place, LETTER)
        if box[2] < right and not any(_overlap(box, other) for other in taken):
            return place, reach > REACHES[0]
    return (at[0] + LETTER, at[1]), False


def _box(at: tuple[float, float], size: float) -> Box:
    return at[0] - size / 2, at[1] - size / 2, at[0] + size / 2, at[1] + size / 2


def _overlap(a: Box, b: Box) -> bool:
    return a[0] < b[2] and b[0] < a[2] and a[1] < b[3] and b[1] < a[3]
