"""The least margin of a path to an envelope: along the arm at the same weight, exact, nothing sampled.

    margin(W) = A / W + B + C * W          to one side of the envelope, W the weight

As W is above zero this bends only one way: its least value is at an end, or, where A and C are above zero,
at W = sqrt(A / C), where it is B + 2 * sqrt(A * C). So whether a stretch stays inside is the sign at two ends
and, at the most, that of B*B - 4*A*C. Ends are kinks of the path and the weights of the envelope's corners.
Between two such weights the pieces of the envelope lie apart, so a path that stays inside stays in one.

Where a corner's weight makes the envelope jump, the margins of both sides count, as limits: as near as that
the path does come.
"""

from collections.abc import Iterator, Sequence
from fractions import Fraction
from typing import NamedTuple

from fleet.envelope import Shape, Slabs, Trapezoid
from fleet.rational import rational as ratio
from loads.balance.path import Stretch
from loads.balance.path_curve import Curve, Piece, pieces_of, side_of, slab_below
from loads.balance.path_outside import Nearest, worst_outside
from loads.balance.surd import rational, root

ZERO, ONE = Fraction(0), Fraction(1)


class Beyond(NamedTuple):
    """The end of a path that lies above or below a whole envelope, by a weight above 0."""

    stretch: Stretch
    weight: Fraction
    by: Fraction


class Reached(NamedTuple):
    """The least margin at the ends of pieces so far: above / below, below > 0, at the weight top / over.

    `floor` is the least weight the sides reach down to in this stretch, as two whole numbers.
    """

    above: int
    below: int
    top: int
    over: int
    stretch: Stretch
    sides: Trapezoid
    aft: bool
    floor: tuple[int, int]


def least_margin(curves: Sequence[Curve], shape: Shape) -> Nearest | Beyond:
    """Return the worst point of at least one curve against an envelope; of equals the first in flight.

    A point at whose weight the envelope has no part is worse than any other; of such the farthest in weight.
    """
    slabs = shape.slabs
    ends: list[Reached] = []
    between: list[Nearest] = []
    beyond: list[Beyond] = []
    for curve in curves:
        whole = _straight_inside(curve, slabs)
        if whole is not None:
            ends.append(whole)
            continue
        beyond += _beyond(curve, shape)
        for piece, trapezoids in pieces_of(curve, slabs):
            for sides in trapezoids:
                found = _inside(piece, sides, between)
                if found is not None:
                    ends.append(found)
                    break
            else:
                between.append(worst_outside(piece, trapezoids))
    if beyond:
        return max(beyond, key=lambda each: each.by)
    worst = _exact(_least(ends)) if ends else None
    for each in between:
        if worst is None or each.margin.below(worst.margin):
            worst = each
    if worst is None:
        raise ValueError("a path without a stretch has no margin")
    return worst


def _least(reached: Sequence[Reached]) -> Reached:
    """Return the least of them, of equals the first."""
    least = reached[0]
    for each in reached[1:]:
        if each.above * least.below < least.above * each.below:
            least = each
    return least


def _straight_inside(curve: Curve, slabs: Slabs) -> Reached | None:
    """Return the least margin of the common case, or None: a straight stretch that crosses no corner's
    weight, inside the one piece there is, neither of whose sides lets the margin dip in between (C <= 0).
    """
    stretch, top, bottom, top_moment, bottom_moment, over, bend = curve
    index = slab_below(top, over, slabs)
    if bend or not 0 <= index < len(slabs.trapezoids) or slabs.levels[index] * over > bottom * slabs.scale:
        return None
    sides = slabs.trapezoids[index][0]
    p, a, b, c, p2, a2, b2, c2 = sides
    if slabs.trapezoids[index][1:] or c > 0 or c2 > 0:
        return None
    least: Reached | None = None
    for weight, moment in ((top, top_moment), (bottom, bottom_moment)):
        even, square, unit = over * over, weight * weight, weight * over
        forward = (p * moment + b * weight) * over + a * even + c * square
        rear = (p2 * moment + b2 * weight) * over + a2 * even + c2 * square
        if forward < 0 or rear < 0:
            return None
        aft = rear * p < -forward * p2
        above, below = (rear, -p2 * unit) if aft else (forward, p * unit)
        if least is None or above * least.below < least.above * below:
            least = Reached(above, below, weight, over, stretch, sides, aft, (bottom, over))
    return least


def _beyond(curve: Curve, shape: Shape) -> Iterator[Beyond]:
    """Yield the ends of a stretch that lie above or below the whole envelope."""
    scale, levels = shape.slabs.scale, shape.slabs.levels
    if curve.top * scale > levels[-1] * curve.over:
        weight = curve.stretch.start.weight
        yield Beyond(curve.stretch, weight, weight - shape.highest)
    if curve.bottom * scale < levels[0] * curve.over:
        weight = curve.stretch.end.weight
        yield Beyond(curve.stretch, weight, shape.lowest - weight)


def _inside(piece: Piece, sides: Trapezoid, between: list[Nearest]) -> Reached | None:
    """Return the least margin at the ends of a piece, or None when some of it is outside these sides.

    What is less between the ends is added to `between`, when all is inside.
    """
    stretch, top, over, bottom, under = piece[:5]
    dips: list[Nearest] = []
    reached: list[Reached] = []
    for aft, line in ((False, sides[:4]), (True, sides[4:])):
        a, b, c = side_of(piece, *line)
        at_top = (c * top + b * over) * top + a * over * over
        at_bottom = (c * bottom + b * under) * bottom + a * under * under
        if at_top < 0 or at_bottom < 0:
            return None
        each = abs(line[0]) * piece.unit
        if a > 0 and c > 0 and a * over * over < c * top * top and c * bottom * bottom < a * under * under:
            if b < 0 and b * b > 4 * a * c:
                return None
            low = root(Fraction(b, each), Fraction(2, each), Fraction(a * c))
            where = root(ZERO, ONE, Fraction(a, c))
            dips.append(Nearest(stretch, where, low, sides, aft, Fraction(bottom, under)))
        for above, weight, per in ((at_top, top, over), (at_bottom, bottom, under)):
            reached.append(
                Reached(above, each * weight * per, weight, per, stretch, sides, aft, (bottom, under))
            )
    between += dips
    return _least(reached)


def _exact(ends: Reached) -> Nearest:
    weight, margin = ratio(ends.top, ends.over), ratio(ends.above, ends.below)
    return Nearest(ends.stretch, rational(weight), rational(margin), ends.sides, ends.aft, ratio(*ends.floor))
