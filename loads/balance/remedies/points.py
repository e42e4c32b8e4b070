"""Points of a flight's path that must stay inside while one weight and one moment are added to all of it.

A side of an envelope is P*moment + A + B*W + C*W**2 = 0, so with a weight w added only C*w**2 is not linear.
Between two weights it is replaced by what is never below it: its chord, where C is above 0, else tangents.
What comes out is never stricter than the envelope.
"""

from collections.abc import Iterator
from fractions import Fraction
from typing import NamedTuple

from fleet.basis import Axis
from fleet.envelope import Shape, Trapezoid
from loads.balance.remedies.program import Number
from loads.balance.remedies.question import Question
from loads.balance.remedies.reach import flown, shapes_on

AXES: tuple[Axis, ...] = ("longitudinal", "lateral")
ZERO = Fraction(0)


class Spot(NamedTuple):
    """A point of the path with one envelope that holds there; the moment is that of its axis."""

    axis: Axis
    shape: Shape
    weight: Fraction
    moment: Fraction


def spots_of(question: Question) -> Iterator[Spot]:
    """Yield each point that is judged, once an envelope: phases, and the kinks of the path."""
    result, ready = question.result, question.ready
    seen: set[tuple[int, Fraction, Fraction]] = set()
    for axis in AXES:
        across = axis == "lateral"
        points = [
            (shape, state.weight, state.lateral_moment if across else state.moment)
            for state in result.states
            for shape in ready.shapes_at(axis, state.phase, state.parts)
        ]
        for stretch in flown(result, axis):
            middle = stretch.at((stretch.start.weight + stretch.end.weight) / 2)
            for shape in shapes_on(stretch, axis, ready):
                points += [
                    (shape, knot.weight, knot.lateral_moment if across else knot.moment)
                    for knot in (stretch.start, middle, stretch.end)
                ]
        for shape, weight, moment in points:
            key = (id(shape), weight, moment)
            if key not in seen:
                seen.add(key)
                yield Spot(axis, shape, weight, moment)


def rows_inside(
    spot: Spot,
    sides: Trapezoid,
    weight: dict[int, Number],
    moments: dict[int, Number],
    ends: tuple[Fraction, Fraction],
) -> Iterator[tuple[dict[int, Number], Fraction]]:
    """Yield rows that are at least a bound: a point between two sides, the quadratic part made straight."""
    p, a, b, c, p2, a2, b2, c2 = sides
    at, low, high = spot.weight, ends[0], ends[1]
    for side in ((p, a, b, c), (p2, a2, b2, c2)):
        of, free, each, square = side
        constant = of * spot.moment + free + each * at + square * at * at
        slope = each + 2 * square * at
        if not square:
            straight = [(ZERO, ZERO)]
        elif square > 0:  # a chord is never below the curve
            straight = [(square * (low + high), -square * low * high)]
        else:  # a tangent is never below it, either
            touching = (low, (low + high) / 2, high)
            straight = [(2 * square * t, -square * t * t) for t in touching]
        for more, free_part in straight:
            row = {
                column: of * Fraction(moments[column]) + (slope + more) * Fraction(weight[column])
                for column in weight
            }
            yield dict(row), -(constant + free_part)
