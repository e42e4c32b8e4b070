"""The worst point of a path that leaves an envelope, exact.

The worst point is the least, over the path, of the margin to the nearest piece of the envelope. The margin
to one side of a piece is A / W + B + C * W at the weight W, so the worst point is at an end of the stretch,
where one such margin is least (W = sqrt(A / C)), where two pieces are equally near, or where an operator's
margins use a piece up, so that another is the nearest from there on: roots of quadratics. All of them are
looked at and compared exactly; where a piece is just used up, with it and without it.
"""

from collections.abc import Iterator, Sequence
from fractions import Fraction
from itertools import chain, combinations
from typing import NamedTuple

from fleet.envelope import Trapezoid
from loads.balance.path import Stretch
from loads.balance.path_curve import Piece, side_of
from loads.balance.surd import Surd, rational, root

ZERO, ONE = Fraction(0), Fraction(1)
Margin = tuple[Fraction, Fraction, Fraction]  # A, B, C


class Nearest(NamedTuple):
    """A point of the path and its margin; `sides` are those of the piece of the envelope it is measured to,
    which reach down to the weight `floor`; `aft`: its right side is the nearer one.
    """

    stretch: Stretch
    weight: Surd
    margin: Surd
    sides: Trapezoid
    aft: bool
    floor: Fraction


def worst_outside(piece: Piece, trapezoids: Sequence[Trapezoid]) -> Nearest:
    """Return the worst point of a piece that is not inside one trapezoid all along."""
    margins = []
    for sides in trapezoids:
        pair = []
        for line in (sides[:4], sides[4:]):
            each = abs(line[0]) * piece.unit
            a, b, c = side_of(piece, *line)
            pair.append((Fraction(a, each), Fraction(b, each), Fraction(c, each)))
        margins.append(pair)
    top, bottom = Fraction(piece.top, piece.over), Fraction(piece.bottom, piece.under)
    worst: Nearest | None = None
    for weight in _candidates(margins, top, bottom):
        for least_width in (0, 1):
            best = _nearest(trapezoids, margins, weight, least_width)
            if worst is None or best[0].below(worst.margin):
                worst = Nearest(piece.stretch, weight, best[0], best[1], best[2], bottom)
    if worst is None:
        raise ValueError("between two weights of corners an envelope has a part")
    return worst


def _nearest(
    trapezoids: Sequence[Trapezoid], margins: Sequence[Sequence[Margin]], weight: Surd, least_width: int
) -> tuple[Surd, Trapezoid, bool]:
    """Return the margin to the nearest piece at a weight, its sides and which of them is the nearer.

    Near its tip a piece may be used up by an operator's margins: one that is there is the nearer. With a
    least width of 1 a piece without any width is not there, with 0 it is.
    """
    best: tuple[Surd, Trapezoid, bool] | None = None
    there = False
    for sides, (low, high) in zip(trapezoids, margins, strict=True):
        forward, rear = _value(low, weight), _value(high, weight)
        aft = rear.below(forward)
        margin = rear if aft else forward
        width = Surd(forward.whole + rear.whole, forward.factor + rear.factor, weight.under)
        left = width.sign() >= least_width
        if best is None or (left and not there) or (left == there and best[0].below(margin)):
            best, there = (margin, sides, aft), left
    if best is None:
        raise ValueError("between two weights of corners an envelope has a part")
    return best


def _candidates(margins: Sequence[Sequence[Margin]], top: Fraction, bottom: Fraction) -> Iterator[Surd]:
    """Yield every weight at which the worst point can be, from the top down where that is plain."""
    yield rational(top)
    found: list[Surd] = []
    for a, _, c in (margin for pair in margins for margin in pair):
        if a > 0 and c > 0:
            found.append(root(ZERO, ONE, a / c))
    equally_near = (
        tuple(one - other for one, other in zip(high, low, strict=True))
        for (_, high), (low, _) in combinations(margins, 2)
    )
    used_up = (tuple(one + other for one, other in zip(low, high, strict=True)) for low, high in margins)
    for a, b, c in chain(equally_near, used_up):
        if c:
            square = b * b - 4 * a * c
            if square >= 0:
                found += [root(-b / (2 * c), sign / (2 * c), square) for sign in (ONE, -ONE)]
        elif b:
            found.append(rational(-a / b))
    for weight in found:
        if rational(bottom).below(weight) and weight.below(rational(top)):
            yield weight
    yield rational(bottom)


def _value(margin: Margin, weight: Surd) -> Surd:
    """Return A / W + B + C * W, under the root that stands in W."""
    a, b, c = margin
    whole, factor, under = weight
    if not factor:
        return rational(a / whole + b + c * whole)
    norm = whole * whole - factor * factor * under
    return Surd(a * whole / norm + b + c * whole, c * factor - a * factor / norm, under)
