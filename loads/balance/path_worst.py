"""The worst point of a whole path on each axis, of all envelopes that hold along it.

Which envelope holds where, as a flight manual means it:

    engine start to take-off                the envelopes of the ramp; without one it is told, not judged
    take-off to the least fuel at landing   those of take-off: the aircraft is in flight until then
    landing to the least fuel at landing    those of landing, too: from there on it may land at any moment

So an envelope for landing alone does not bind before the planned landing. Ends belong to both neighbours.
What is named for the least fuel alone is checked at that phase.

Verdicts are exact. Where the worst point has an irrational weight, its figures are those of a point of the
path beside it, on the same side of the limit, and the room is rounded down (an excess up).
"""

from collections.abc import Mapping, Sequence
from dataclasses import replace
from fractions import Fraction
from typing import NamedTuple

from fleet.basis import Axis, Phase
from fleet.envelope import Trapezoid
from fleet.rational import rational
from loads.balance.exact import quotient
from loads.balance.path import NOTHING, Knot, Leg, Path, Stretch, Turn
from loads.balance.path_curve import curves_of
from loads.balance.path_margin import Beyond, least_margin
from loads.balance.path_outside import Nearest
from loads.balance.path_turns import moment_of, turn_points
from loads.balance.prepared import Bound, Prepared

FLOWN: tuple[Phase, ...] = ("ramp", "take-off", "landing")
AXES: tuple[Axis, ...] = ("longitudinal", "lateral")
BITS = 80  # how finely an irrational weight or margin is bounded: 2**-80 of the unit


class Worst(NamedTuple):
    """The worst point of a path against one envelope; room and limits are None where the envelope has no part
    at its weight. `low` and `high` are the ends of the nearest part, `aft` tells which of them is the nearer.
    """

    bound: Bound
    stretch: Stretch
    knot: Knot
    arm: Fraction
    low: Fraction | None
    high: Fraction | None
    room: Fraction | None
    aft: bool


class Burn(NamedTuple):
    """The path of one load with its worst point on each axis that has an envelope."""

    path: Path
    worst: Mapping[Axis, Worst]


def burn_of(path: Path, ready: Prepared) -> Burn:
    """Return a path with its worst points: of several envelopes the one with the least room counts."""
    worst: dict[Axis, Worst] = {}
    for axis in AXES:
        found = [_settled(bound, point, axis) for bound, point in _points(path, axis, ready)]
        if path.turns:  # of equals an event is named rather than a point beside it
            found = [*_turns(path, axis, ready), *found]
        if found:
            worst[axis] = min(found, key=lambda each: (each.room is not None, each.room or Fraction(0)))
    return Burn(path, worst)


def stays_inside(path: Path, ready: Prepared, along: Fraction, across: Fraction) -> bool:
    """Return whether the whole path lies inside every envelope once these moments are added to it."""
    beside = shifted(path, along, across)
    return all(
        isinstance(point, Nearest) and point.margin.sign() >= 0
        for axis in AXES
        for _, point in _points(beside, axis, ready)
    ) and all(
        worst.room is not None and worst.room >= 0
        for axis in AXES
        for worst in (*_turns(beside, axis, ready), *worst_at_zero_fuel(beside, axis, ready))
    )


def shifted(path: Path, along: Fraction, across: Fraction) -> Path:
    """Return the path with these moments added to every point of it."""
    turns = (_moved_turn(turn, along, across) for turn in path.turns)
    return replace(
        path,
        stretches=tuple(_shifted(stretch, along, across) for stretch in path.stretches),
        turns=tuple(turns),
        zero_fuel=tuple(_moved_turn(turn, along, across) for turn in path.zero_fuel),
        settings=tuple(_shifted(stretch, along, across) for stretch in path.settings),
    )


def _points(path: Path, axis: Axis, ready: Prepared) -> list[tuple[Bound, Nearest | Beyond]]:
    """Return the worst point of the path against each envelope that holds on some of it."""
    ramp, flight = ready.bounds(axis, "ramp"), ready.bounds(axis, "take-off")
    landing = ready.bounds(axis, "landing")
    if not path.stretches or not (ramp or flight or landing):
        return []
    stretches = path.stretches
    if path.settings and (axis == "longitudinal" or ready.deciding):
        stretches += path.settings
    curves = curves_of(stretches, axis)
    found = []
    for bound in _each_once((*flight, *ramp, *landing)):
        legs = _legs(bound, ramp, flight, landing)
        held = [
            curve
            for curve in curves
            if legs[curve.stretch.leg] and ready.holds_in(bound[0], curve.stretch.parts)
        ]
        if held:
            found.append((bound, least_margin(held, bound[1])))
    return found


def bounds_on(leg: Leg, ready: Prepared) -> list[Bound]:
    """Return the longitudinal envelopes that hold on a leg."""
    ramp, flight, landing = (ready.bounds("longitudinal", phase) for phase in FLOWN)
    bounds = _each_once((*flight, *ramp, *landing))
    return [bound for bound in bounds if _legs(bound, ramp, flight, landing)[leg]]


def _legs(
    bound: Bound, ramp: Sequence[Bound], flight: Sequence[Bound], landing: Sequence[Bound]
) -> Mapping[Leg, bool]:
    """Return on which legs an envelope holds."""
    return {
        "taxi": any(bound is each for each in ramp),
        "flight": any(bound is each for each in flight),
        "reserve": any(bound is each for each in (*flight, *landing)),
    }


def _turns(path: Path, axis: Axis, ready: Prepared) -> list[Worst]:
    """Return the worst point of each event against each envelope that holds there."""
    if not path.turns:
        return []
    ramp, flight, landing = (ready.bounds(axis, phase) for phase in FLOWN)
    found = []
    for bound in _each_once((*flight, *ramp, *landing)):
        legs = _legs(bound, ramp, flight, landing)
        found += [
            worst_turn(bound, turn, axis)
            for turn in path.turns
            if legs[turn.leg] and ready.holds_in(bound[0], turn.parts)
        ]
    return found


def worst_at_zero_fuel(path: Path, axis: Axis, ready: Prepared) -> list[Worst]:
    """Return the worst point at zero fuel, after whatever event and in whatever setting; [] where the manual
    gives no envelope for it, or there is one such point alone, which is a phase.
    """
    if not path.zero_fuel:
        return []
    found = [
        worst_turn(bound, turn, axis)
        for bound in ready.bounds(axis, "zero fuel")
        for turn in path.zero_fuel
        if ready.holds_in(bound[0], turn.parts)
    ]
    return [min(found, key=lambda each: (each.room is not None, each.room or NOTHING))] if found else []


def worst_turn(bound: Bound, turn: Turn, axis: Axis) -> Worst:
    """Return the worst point of one event against one envelope."""
    _, shape = bound
    weight = turn.knots[0][0].weight
    pieces = shape.arms_at(weight)
    found = []
    for knot, held in turn_points(turn, pieces, axis):
        arm = moment_of(knot, axis) / weight
        here = Stretch(turn.leg, (), knot, knot, NOTHING, (held, NOTHING), turn.dry, turn.where)
        margins = [(min(arm - low, high - arm), low, high) for low, high in pieces]
        if not margins:
            return Worst(bound, here, knot, arm, None, None, None, False)
        room, low, high = max(margins, key=lambda each: each[0])
        found.append(Worst(bound, here, knot, arm, low, high, room, high - arm < arm - low))
    return min(found, key=lambda each: each.room or NOTHING)


def _each_once(bounds: Sequence[Bound]) -> list[Bound]:
    return list({id(bound): bound for bound in bounds}.values())


def _shifted(stretch: Stretch, along: Fraction, across: Fraction) -> Stretch:
    start, end = (_moved(knot, along, across) for knot in (stretch.start, stretch.end))
    return stretch._replace(start=start, end=end)


def _moved_turn(turn: Turn, along: Fraction, across: Fraction) -> Turn:
    return turn._replace(knots=tuple((_moved(knot, along, across), held) for knot, held in turn.knots))


def _moved(knot: Knot, along: Fraction, across: Fraction) -> Knot:
    return knot._replace(moment=knot.moment + along, lateral_moment=knot.lateral_moment + across)


def _settled(bound: Bound, point: Nearest | Beyond, axis: Axis) -> Worst:
    """Return the worst point in rationals: itself, or a point of the path as near as makes no difference."""
    _, shape = bound
    stretch = point.stretch
    if isinstance(point, Beyond):
        knot = stretch.at(point.weight)
        return Worst(bound, stretch, knot, moment_of(knot, axis) / knot.weight, None, None, None, False)
    outside, bits = point.margin.sign() < 0, BITS
    while True:
        weight = point.weight.floor(bits)
        if weight >= point.floor:
            knot = stretch.at(weight)
            moment = moment_of(knot, axis)
            if not outside or not point.weight.factor or not shape.holds(weight, moment):
                break
        bits *= 2
    low, high = _sides_at(weight, point.sides)
    if low > high:  # the very tip of an envelope, which an operator's margins have cut off
        return Worst(bound, stretch, knot, quotient(moment, weight), None, None, None, False)
    room = point.margin.floor(BITS)
    return Worst(bound, stretch, knot, quotient(moment, weight), low, high, room, point.aft)


def _sides_at(weight: Fraction, sides: Trapezoid) -> tuple[Fraction, Fraction]:
    """Return the arms of the sides of a piece at a weight, -(A / W + B + C * W) / P each."""
    p, a, b, c, p2, a2, b2, c2 = sides
    above, below = weight.as_integer_ratio()
    even, per, square = below * below, above * below, above * above
    left = rational(-(a * even + b * per + c * square), p * per)
    return left, rational(-(a2 * even + b2 * per + c2 * square), p2 * per)
