"""The points of an event that can be its worst one.

All of them have one weight, at which an envelope is one or more pieces of arm. So the worst is at the least
or the greatest moment, or, where a transfer crosses the gap between two pieces, halfway.
"""

from collections.abc import Sequence
from fractions import Fraction
from itertools import pairwise

from fleet.basis import Axis
from fleet.envelope import Stretch as Piece
from loads.balance.fuel import Contents
from loads.balance.path import Knot, Turn

Point = tuple[Knot, Contents]  # the aircraft, and what the tanks hold; {} where that is not told


def turn_points(turn: Turn, pieces: Sequence[Piece], axis: Axis) -> list[Point]:
    """Return the points of an event to be judged, given the pieces of arm of an envelope at its weight."""
    points = list(turn.knots)
    if not turn.swept:
        return points
    weight = points[0][0].weight
    moments = [moment_of(knot, axis) for knot, _ in points]
    for (_, low), (high, _) in pairwise(pieces):
        halfway = (low + high) / 2 * weight
        if min(moments) < halfway < max(moments):
            points.append((_crossing([knot for knot, _ in turn.knots], halfway, axis), {}))
    return points


def moment_of(knot: Knot, axis: Axis) -> Fraction:
    """Return the moment along the aircraft or, lateral, across it."""
    return knot.moment if axis == "longitudinal" else knot.lateral_moment


def _crossing(knots: Sequence[Knot], moment: Fraction, axis: Axis) -> Knot:
    """Return the point of a transfer at which the moment of one axis is this; that of the other, which is
    only told beside it, is taken in the same share between the two knots around it.
    """
    for one, other in pairwise(knots):
        start, end = moment_of(one, axis), moment_of(other, axis)
        if start != end and min(start, end) <= moment <= max(start, end):
            share = (moment - start) / (end - start)
            along = one.moment + share * (other.moment - one.moment)
            across = one.lateral_moment + share * (other.lateral_moment - one.lateral_moment)
            return Knot(one.weight, along, across)
    raise ValueError("a transfer does not pass this moment")
