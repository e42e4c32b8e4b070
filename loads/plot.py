r"""The plot of a load: envelopes, weight limits, the phases and the burn between them, as one SVG text.

    weight ^        .--------------  take-off limit    limits: broken lines, named at the right
           |   ____/ R T     \       8750 lb           envelopes: closed lines, named at the right
           |  /      M L   Z  |----  normal envelope   phases: a shape and a letter each
           +------------------------> arm, or moment where the envelope's edges are straight in it

Where an operator's margins move edges in, what is left is a row of round dots inside the certified line.

Black on white; nothing depends on colour. It draws and decides nothing: binary floats are used here and
nowhere near a verdict.
"""

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass
from fractions import Fraction
from typing import Any

from fleet.basis import Axis, Envelope
from fleet.curtailment import Curtailment
from loads.plot_marks import MARKS, Mark, drawn_marks
from loads.plot_operational import Outline, drawn_outline, operational
from loads.plot_path import burn_line, worst_mark
from loads.plot_scale import Scale, ticks
from loads.svg import corners, element, label, line, picture, short

DASHES = ("none", "7 3", "2 2", "9 3 2 3")
LONGEST_WHOLE = 4  # figures before the point that are not set apart
ROW = 10.0  # from one line of a label to the next
NAMES = {
    ("longitudinal", "arm"): "centre of gravity, arm",
    ("longitudinal", "moment"): "moment",
    ("lateral", "arm"): "lateral centre of gravity, arm",
    ("lateral", "moment"): "lateral moment",
}


@dataclass(frozen=True, slots=True)
class Frame:
    """The drawing and the rectangle of the curves in it, in SVG units; names stand to the right of that."""

    width: float = 470.0
    height: float = 300.0
    left: float = 50.0
    right: float = 342.0
    top: float = 10.0
    bottom: float = 266.0


STANDARD = Frame()


def plot(
    result: Mapping[str, Any],
    envelopes: Sequence[Envelope],
    *,
    axis: Axis = "longitudinal",
    weight_word: str = "weight",
    frame: Frame = STANDARD,
    curtailments: Sequence[Curtailment] = (),
) -> str:
    """This function will return an SVG text of the result document against the envelopes of one axis.

    `envelopes` are in the units of the result (`result["units"]`); those of the other axis are left out, and
    so are `curtailments` that move no edge of theirs.
    Returns "" when there is nothing to draw: no phases, or no envelope of that axis. Aft and right: positive.
    """
    shown = [envelope for envelope in envelopes if envelope.axis == axis]
    if not shown or not result["phases"]:
        return ""
    plane = shown[0].plane
    shown = [envelope for envelope in shown if envelope.plane == plane]
    inside = operational(shown, curtailments) if curtailments else []
    marks = _marks(result, axis, plane)
    units = result["units"]
    limits = _weight_limits(result["checks"], units["weight"])
    corner_points = [point for envelope in shown for point in envelope.points]
    across = [float(point[0]) for point in corner_points] + [mark.x for mark in marks]
    up = [float(point[1]) for point in corner_points] + [mark.y for mark in marks] + list(limits)
    x, y = Scale.around(across, frame.left, frame.right), Scale.around(up, frame.bottom, frame.top)
    unit = units["moment" if plane == "moment" else "length"]
    parts = [
        *grid(x, y, frame, sided=axis == "lateral"),
        *titles(frame, f"{NAMES[axis, plane]}, {unit}", f"{weight_word}, {units['weight']}"),
        *(_curve(envelope, number, x, y) for number, envelope in enumerate(shown)),
        *(drawn_outline(outline, x, y) for outline in inside),
        *(line((frame.left, y.at(v)), (frame.right, y.at(v)), stroke_dasharray="4 2") for v in limits),
        *_names(_wanted(shown, inside, limits, x, y, right=frame.right), frame),
        *burn_line(result, axis, plane, x, y),
        *drawn_marks(marks, x, y, frame.right),
    ]
    told = "; ".join(
        f"{mark.phase}: {short(mark.y)} {units['weight']} at {short(mark.x)} {unit}" for mark in marks
    )
    return picture(parts, frame.width, frame.height, told)


def _marks(result: Mapping[str, Any], axis: Axis, plane: str) -> list[Mark]:
    """The marks of the phases, and of the worst point of the burn."""
    phases = [
        Mark(
            MARKS[phase["phase"]],
            phase["phase"],
            _across(phase, axis, plane),
            float(Fraction(phase["weight"])),
        )
        for phase in result["phases"]
    ]
    return phases + worst_mark(result, axis, plane)


def _across(phase: Mapping[str, Any], axis: Axis, plane: str) -> float:
    if axis == "longitudinal":
        return float(Fraction(phase["moment"] if plane == "moment" else phase["arm"]))
    arm = Fraction(phase["lateral_arm"])
    return float(arm * Fraction(phase["weight"]) if plane == "moment" else arm)


def _weight_limits(checks: Iterable[Mapping[str, Any]], unit: str) -> dict[float, tuple[str, ...]]:
    """The upper limit of each weight check, with the lines of its label."""
    named: dict[float, list[str]] = {}
    for check in checks:
        family = check["code"].partition(".")[0]
        if family in {"weight", "performance"} and check["limit"]:
            name = (check["phase"] or "in-flight") if family == "weight" else check["source"]
            if check["code"].endswith("-internal"):
                name = "without external load"
            names = named.setdefault(float(Fraction(check["limit"])), [])
            if name not in names:
                names.append(name)
    return {v: broken(f"{', '.join(phases)} limit {short(v)} {unit}") for v, phases in named.items()}


def grid(x: Scale, y: Scale, frame: Frame, *, sided: bool, sided_up: bool = False) -> list[str]:
    """This function will return the frame with its lines; figures of a sided axis are written L and R."""
    parts = []
    for value in ticks(x):
        at = x.at(value)
        parts += [
            line((at, frame.top), (at, frame.bottom), stroke="#ccc"),
            label(_tick(value, sided=sided), (at, frame.bottom + 11), text_anchor="middle"),
        ]
    for value in ticks(y):
        at = y.at(value)
        parts += [
            line((frame.left, at), (frame.right, at), stroke="#ccc"),
            label(_tick(value, sided=sided_up), (frame.left - 4, at + 3), text_anchor="end"),
        ]
    edge = element(
        "rect",
        x=frame.left,
        y=frame.top,
        width=frame.right - frame.left,
        height=frame.bottom - frame.top,
        fill="none",
        stroke="#000",
        stroke_width=0.6,
    )
    return [*parts, edge]


def _tick(value: float, *, sided: bool = False) -> str:
    """A figure on an axis: thousands of long ones set apart, sides as letters, never as a bare sign."""
    whole, _, part = short(abs(value)).partition(".")
    if len(whole) > LONGEST_WHOLE:
        whole = f"{int(whole):,}".replace(",", "\u00a0")
    side = ("L " if sided else "\u2212") if value < 0 else "R " if sided and value > 0 else ""
    return f"{side}{whole}.{part}" if part else f"{side}{whole}"


def titles(frame: Frame, across: str, up: str) -> list[str]:
    """This function will return the titles of both axes."""
    middle, height = (frame.left + frame.right) / 2, (frame.top + frame.bottom) / 2
    turned = f"translate(10 {short(height)}) rotate(-90)"
    return [
        label(across, (middle, frame.height - 9), text_anchor="middle"),
        element("text", words=up, transform=turned, text_anchor="middle"),
    ]


def _curve(envelope: Envelope, number: int, x: Scale, y: Scale) -> str:
    points = corners([(x.at(float(across)), y.at(float(weight))) for across, weight in envelope.points])
    dash = DASHES[number % len(DASHES)]
    return element(
        "polygon", points=points, fill="none", stroke="#000", stroke_width=1.5, stroke_dasharray=dash
    )


@dataclass(frozen=True, slots=True)
class Name:
    """A label at the right of the curves: what it names begins at `start`, its lines of words follow."""

    start: tuple[float, float]
    lines: tuple[str, ...]


def _wanted(
    envelopes: Sequence[Envelope],
    inside: Sequence[Outline],
    limits: Mapping[float, tuple[str, ...]],
    x: Scale,
    y: Scale,
    *,
    right: float,
) -> list[Name]:
    names = [Name((x.at(outline.far[0]), y.at(outline.far[1])), broken(outline.name)) for outline in inside]
    names += [Name((right, y.at(value)), words) for value, words in limits.items()]
    for envelope in envelopes:
        far = max(envelope.points, key=lambda point: (point[0], -point[1]))
        words = f"{envelope.id} envelope: {', '.join(envelope.phases)}"
        names.append(Name((x.at(float(far[0])), y.at(float(far[1]))), broken(words)))
    return sorted(names, key=lambda name: name.start[1])


def _names(names: Sequence[Name], frame: Frame) -> list[str]:
    """Write the labels below each other, each as near to its own height as the ones above leave room."""
    parts = []
    free = frame.top + 3
    for name in names:
        top = max(name.start[1], free)
        way = [name.start, (frame.right, name.start[1]), (frame.right + 8, top)]
        parts.append(element("polyline", points=corners(way), fill="none", stroke="#000", stroke_width=0.5))
        for row, words in enumerate(name.lines):
            parts.append(label(words, (frame.right + 11, top + 3 + row * ROW), font_size=8.5))
        free = top + ROW * len(name.lines) + 1
    return parts


def broken(text: str, width: int = 25) -> tuple[str, ...]:
    """This function will break a label into lines of at most `width` characters; a longer word is cut."""
    lines = [""]
    for word in text.split():
        if lines[-1] and len(lines[-1]) + len(word) >= width:
            lines.append("")
        lines[-1] = f"{lines[-1]} {word[:width]}".strip()
    return tuple(lines)
