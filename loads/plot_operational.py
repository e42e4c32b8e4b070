"""The operational envelopes on a plot: what an operator's margins leave, as dotted outlines.

A certified envelope is a line or a line of dashes; an operational one is a row of round dots, so that the two
are told apart without colour. It draws and decides nothing.
"""

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from fractions import Fraction
from itertools import pairwise

from fleet.basis import Envelope
from fleet.curtailment import CurtailedShape, Curtailment, holding
from fleet.envelope import Stretch, Trapezoid
from fleet.polygon import Slabs
from loads.plot_scale import Scale
from loads.svg import element, short

STEPS = 6  # straight pieces to a side between two corners: a moment moves an edge along a curve
Line = tuple[tuple[float, float], ...]  # (arm or moment, weight)


@dataclass(frozen=True, slots=True)
class Outline:
    """What is left of an envelope at some of its phases: its name, and the lines around it."""

    name: str
    lines: tuple[Line, ...]

    @property
    def far(self) -> tuple[float, float]:
        """The point farthest aft or right, of such the heaviest."""
        return max(point for line in self.lines for point in line)


def operational(envelopes: Sequence[Envelope], curtailments: Sequence[Curtailment]) -> list[Outline]:
    """This function will return the outlines of these envelopes; of phases with the same margins one."""
    found = []
    for envelope in envelopes:
        phases: dict[tuple[str, ...], list[str]] = {}
        held: dict[tuple[str, ...], tuple[Curtailment, ...]] = {}
        for phase in envelope.phases:
            here = holding(curtailments, phase, envelope.axis)
            if here:
                key = tuple(each.id for each in here)
                phases.setdefault(key, []).append(phase)
                held[key] = here
        for key, words in phases.items():
            shape = CurtailedShape(envelope.shape, held[key], envelope.axis)
            lines = tuple(_lines(shape.slabs, in_moment=envelope.plane == "moment"))
            if lines:
                found.append(Outline(f"{envelope.id} operational: {', '.join(words)}", lines))
    return found


def drawn_outline(outline: Outline, x: Scale, y: Scale) -> str:
    """This function will return an outline as one SVG path of round dots."""
    way = " ".join(
        "M" + " L".join(f"{short(x.at(across))} {short(y.at(up))}" for across, up in line)
        for line in outline.lines
    )
    return element(
        "path", d=way, fill="none", stroke="#000", stroke_width=1.7, stroke_linecap="round",
        stroke_dasharray="0.1 3.6",
    )  # fmt: skip


def _lines(slabs: Slabs, *, in_moment: bool) -> Iterator[Line]:
    """Yield the sides of all pieces, and the level lines between what lies below and above a level."""
    levels = [Fraction(level, slabs.scale) for level in slabs.levels]
    ends: list[tuple[list[Stretch], list[Stretch]]] = [([], []) for _ in levels]  # below, above
    for number, ((low, high), pieces) in enumerate(zip(pairwise(levels), slabs.trapezoids, strict=True)):
        for piece in pieces:
            weights = [low + (high - low) * step / STEPS for step in range(STEPS + 1)]
            rows = [(weight, _arms(piece, weight)) for weight in weights]
            kept = [(weight, arms) for weight, arms in rows if arms[0] <= arms[1]]
            for side in (0, 1):
                yield tuple(_placed(arms[side], weight, in_moment=in_moment) for weight, arms in kept)
            if kept and kept[0][0] == low:
                ends[number][1].append(kept[0][1])
            if kept and kept[-1][0] == high:
                ends[number + 1][0].append(kept[-1][1])
    for level, (below, above) in zip(levels, ends, strict=True):
        for low, high in _of_one_alone(below, above):
            yield tuple(_placed(arm, level, in_moment=in_moment) for arm in (low, high))


def _arms(piece: Trapezoid, weight: Fraction) -> Stretch:
    p, a, b, c, p2, a2, b2, c2 = piece
    return -(a / weight + b + c * weight) / p, -(a2 / weight + b2 + c2 * weight) / p2


def _of_one_alone(below: list[Stretch], above: list[Stretch]) -> Iterator[Stretch]:
    """Yield what lies in one of two rows of stretches and not in the other."""
    marks = sorted({end for stretch in (*below, *above) for end in stretch})
    for low, high in pairwise(marks):
        held = [any(start <= low and high <= end for start, end in row) for row in (below, above)]
        if held[0] != held[1]:
            yield low, high


def _placed(arm: Fraction, weight: Fraction, *, in_moment: bool) -> tuple[float, float]:
    return float(arm * weight if in_moment else arm), float(weight)
