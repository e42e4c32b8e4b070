"""The moment of a path over weight, as whole numbers, cut where a corner of an envelope lies.

Over the weight W the moment of a stretch is (u0 + u1*W + u2*W**2) / unit, and a side of a trapezoid of an
envelope is P*moment + A + B*W + C*W**2, whichever plane its edges are straight in. The arm is moment / W, so
the margin to a side is A / W + B + C * W, with A, B and C rational.
"""

from bisect import bisect_left
from collections.abc import Iterator, Sequence
from fractions import Fraction
from math import lcm
from typing import NamedTuple

from fleet.basis import Axis
from fleet.envelope import Slabs, Trapezoid
from loads.balance.path import NOTHING, Stretch


class Curve(NamedTuple):
    """The ends of a stretch, the first in flight on top: weights and moments of one axis, in units of
    1 / `over`; `bend` as in `Stretch`, 0 across the aircraft.
    """

    stretch: Stretch
    top: int
    bottom: int
    top_moment: int
    bottom_moment: int
    over: int
    bend: Fraction


class Piece(NamedTuple):
    """A part of a stretch between two weights no corner lies between: from top / over down to bottom / under.

    There the moment is (u0 + u1*W + u2*W**2) / unit. Whole numbers, unit above 0.
    """

    stretch: Stretch
    top: int
    over: int
    bottom: int
    under: int
    u0: int
    u1: int
    u2: int
    unit: int


def curves_of(stretches: Sequence[Stretch], axis: Axis) -> list[Curve]:
    """Return the stretches with their moments along the aircraft or, lateral, across it."""
    across = axis == "lateral"
    ends = [
        (knot.weight.as_integer_ratio(), (knot.lateral_moment if across else knot.moment).as_integer_ratio())
        for stretch in stretches
        for knot in (stretch.start, stretch.end)
    ]
    over = lcm(*[weight[1] for weight, _ in ends], *[moment[1] for _, moment in ends])
    whole = [(w * (over // per), m * (over // each)) for (w, per), (m, each) in ends]
    return [
        Curve(stretch, w1, w2, m1, m2, over, NOTHING if across else stretch.bend)
        for stretch, (w1, m1), (w2, m2) in zip(stretches, whole[::2], whole[1::2], strict=True)
    ]


def slab_below(weight: int, over: int, slabs: Slabs) -> int:
    """Return the number of the slab a path comes into that goes down from weight / over: -1 below them all,
    and the number of slabs above them all.
    """
    return bisect_left(slabs.levels, -(-weight * slabs.scale // over)) - 1


def pieces_of(curve: Curve, slabs: Slabs) -> Iterator[tuple[Piece, tuple[Trapezoid, ...]]]:
    """Yield the stretch cut at the weights of the corners, from the top down, each with what lies there."""
    scale, levels = slabs.scale, slabs.levels
    moment = _polynomial(curve)
    top, over = curve.top, curve.over
    index = slab_below(top, over, slabs)
    if index == len(slabs.trapezoids):
        index -= 1
        top, over = levels[-1], scale
    low, per = curve.bottom * scale, curve.over
    while index >= 0 and levels[index + 1] * per > low:
        ends_here = levels[index] * per <= low
        bottom, under = (curve.bottom, per) if ends_here else (levels[index], scale)
        yield Piece(curve.stretch, top, over, bottom, under, *moment), slabs.trapezoids[index]
        if ends_here:
            return
        top, over = bottom, under
        index -= 1


def _polynomial(curve: Curve) -> tuple[int, int, int, int]:
    """Return u0, u1, u2 and the unit of a stretch."""
    _, w1, w2, m1, m2, over, bend = curve
    unit = over * (w1 - w2)
    straight, slope = m2 * w1 - m1 * w2, (m1 - m2) * over
    if not bend:
        return straight, slope, 0, unit
    # bend * (W - start) * (W - end) added, over the common denominator of both parts
    above, below = bend.as_integer_ratio()
    less, more = above * unit, below * over * over
    return (
        straight * more + less * w1 * w2,
        slope * more - less * (w1 + w2) * over,
        less * over * over,
        unit * more,
    )


def side_of(piece: Piece, p: int, a: int, b: int, c: int) -> tuple[int, int, int]:
    """Return A, B, C of the margin to one side, times |P| and the piece's unit."""
    unit = piece.unit
    return p * piece.u0 + a * unit, p * piece.u1 + b * unit, p * piece.u2 + c * unit
