r"""How far the path of a load may shift, and stay inside every envelope: exact.

What is moved aboard leaves all weights of a flight as they are, and adds one moment to the whole path. So the
moments that may be added are intervals, one for each way between the sides of an envelope:

    moment ^  /          \        the path p may shift by any moment that keeps all of it
           | /  <--p-->   \       between the sides; where the envelope has a notch,
           |/______________\      there may be several such intervals
           +----------------> weight

Over the weight W a side of an envelope is P*moment + A + B*W + C*W**2 = 0 and a stretch of the path is a
quadratic, so the least way to a side is at an end of a piece or at the turn of a quadratic: all rational.
"""

from collections.abc import Iterable, Iterator, Mapping, Sequence
from fractions import Fraction
from typing import NamedTuple

from fleet.basis import Axis, Phase
from fleet.envelope import Shape, Trapezoid
from loads.balance.path import Leg, Stretch
from loads.balance.path_curve import Curve, Piece, curves_of, pieces_of
from loads.balance.prepared import Prepared
from loads.balance.result import Result, State

# What holds on each leg: `loads.balance.path_worst` judges by the same, and every offer once more.
HOLDS: Mapping[Leg, tuple[Phase, ...]] = {
    "taxi": ("ramp",),
    "flight": ("take-off",),
    "reserve": ("take-off", "landing"),
}
Interval = tuple[Fraction, Fraction]


class Ways(NamedTuple):
    """The moments that may be added, along and across; None: any, (): none."""

    along: tuple[Interval, ...] | None
    across: tuple[Interval, ...] | None


def ways_of(result: Result, ready: Prepared) -> Ways:
    """Return the moments that may be added to all of a flight, its weights unchanged."""
    return Ways(_axis(result, ready, "longitudinal"), _axis(result, ready, "lateral"))


def shapes_on(stretch: Stretch, axis: Axis, ready: Prepared) -> list[Shape]:
    """Return the envelopes that hold on a stretch of the flight."""
    shapes = (each for phase in HOLDS[stretch.leg] for each in ready.shapes_at(axis, phase, stretch.parts))
    return list({id(shape): shape for shape in shapes}.values())


def _axis(result: Result, ready: Prepared, axis: Axis) -> tuple[Interval, ...] | None:
    ways: tuple[Interval, ...] | None = None
    for state in result.states:
        for shape in ready.shapes_at(axis, state.phase, state.parts):
            ways = _both(ways, _at(state, shape, axis))
    stretches = flown(result, axis)
    if stretches:
        for curve in curves_of(stretches, axis):
            for shape in shapes_on(curve.stretch, axis, ready):
                for part in _along(curve, shape):
                    ways = _both(ways, part)
    return ways


def flown(result: Result, axis: Axis) -> tuple[Stretch, ...]:
    """Return the stretches of the path that count on an axis: gear and flaps move nothing across."""
    if result.burn is None:
        return ()
    path = result.burn.path
    return path.stretches + path.settings if axis == "longitudinal" else path.stretches


def _at(state: State, shape: Shape, axis: Axis) -> tuple[Interval, ...]:
    moment = state.moment if axis == "longitudinal" else state.lateral_moment
    return tuple(
        (low * state.weight - moment, high * state.weight - moment)
        for low, high in shape.arms_at(state.weight)
    )


def _along(curve: Curve, shape: Shape) -> Iterator[tuple[Interval, ...]]:
    """Yield, for each piece of a stretch between two corners' weights, what may be added to it."""
    scale, levels = shape.slabs.scale, shape.slabs.levels
    if curve.top * scale > levels[-1] * curve.over or curve.bottom * scale < levels[0] * curve.over:
        yield ()
        return
    for piece, trapezoids in pieces_of(curve, shape.slabs):
        yield tuple(way for sides in trapezoids if (way := _between(piece, sides)) is not None)


def _between(piece: Piece, sides: Trapezoid) -> Interval | None:
    p, a, b, c, p2, a2, b2, c2 = sides
    low = _greatest(piece, p, a, b, c)
    high = -_greatest(piece, p2, a2, b2, c2, turned=True)
    return (low, high) if low <= high else None


def _greatest(piece: Piece, p: int, a: int, b: int, c: int, *, turned: bool = False) -> Fraction:
    """Return the greatest of -(a + b*W + c*W**2) / p - moment over the weights of a piece; `turned`: of the
    negative.
    """
    sign = -1 if turned else 1
    unit = piece.unit
    zero, one, two = (
        -sign * (Fraction(side, p) + Fraction(part, unit))
        for side, part in ((a, piece.u0), (b, piece.u1), (c, piece.u2))
    )
    top, bottom = Fraction(piece.top, piece.over), Fraction(piece.bottom, piece.under)
    weights = [top, bottom]
    if two < 0 and bottom < -one / (2 * two) < top:
        weights.append(-one / (2 * two))
    return max(zero + one * weight + two * weight * weight for weight in weights)


def _both(ways: tuple[Interval, ...] | None, other: Sequence[Interval]) -> tuple[Interval, ...]:
    """Return what lies in both; intervals that overlap are joined where they came from one weight."""
    if ways is None:
        return tuple(other)
    found = [
        (max(low, low2), min(high, high2))
        for low, high in ways
        for low2, high2 in other
        if max(low, low2) <= min(high, high2)
    ]
    return tuple(_joined(found))


def _joined(found: Iterable[Interval]) -> Iterator[Interval]:
    last: Interval | None = None
    for low, high in sorted(found):
        if last is None:
            last = low, high
        elif low <= last[1]:
            last = last[0], max(last[1], high)
        else:
            yield last
            last = low, high
    if last is not None:
        yield last
