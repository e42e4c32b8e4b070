"""The moments of a stretch of the path as polynomials of the weight, and the exact numbers they lead to.

Every figure here has the form A / W + B + C * W over the weight W, with A, B and C rational; where two such
are equal, or one is a given figure, W is the root of a quadratic.
"""

from fractions import Fraction
from typing import NamedTuple

from fleet.lateral import Side
from loads.balance.path import Stretch
from loads.balance.surd import Surd, rational, root

Margin = tuple[Fraction, Fraction, Fraction]  # A, B, C


class Course(NamedTuple):
    """A stretch with its moments over the weight: M = u0 + u1*W + u2*W**2, L = v0 + v1*W."""

    stretch: Stretch
    u0: Fraction
    u1: Fraction
    u2: Fraction
    v0: Fraction
    v1: Fraction

    def arm(self) -> Margin:
        """Return the longitudinal arm as A, B, C of A / W + B + C * W."""
        return self.u0, self.u1, self.u2

    def margin(self, side: Side, *, moments: bool) -> Margin:
        """Return the margin to a side."""
        p, q, r = side
        if moments:
            return q * self.u0, p * self.v0 + q * self.u1 + r, p * self.v1 + q * self.u2
        return p * self.v0 + q * self.u0, p * self.v1 + q * self.u1 + r, q * self.u2


def course_of(stretch: Stretch) -> Course:
    """Return the polynomials of a stretch."""
    start, end, bend = stretch.start, stretch.end, stretch.bend
    burned = start.weight - end.weight
    slope = (start.moment - end.moment) / burned
    across = (start.lateral_moment - end.lateral_moment) / burned
    return Course(
        stretch,
        start.moment - slope * start.weight + bend * start.weight * end.weight,
        slope - bend * (start.weight + end.weight),
        bend,
        start.lateral_moment - across * start.weight,
        across,
    )


def value(margin: Margin, weight: Surd) -> Surd:
    """Return A / W + B + C * W, under the root that stands in W."""
    a, b, c = margin
    whole, factor, under = weight
    if not factor:
        return rational(a / whole + b + c * whole)
    norm = whole * whole - factor * factor * under
    return Surd(a * whole / norm + b + c * whole, c * factor - a * factor / norm, under)


def roots(a: Fraction, b: Fraction, c: Fraction) -> list[Surd]:
    """Return the W at which a + b * W + c * W**2 is nothing."""
    if not c:
        return [rational(-a / b)] if b else []
    square = b * b - 4 * a * c
    return (
        [root(-b / (2 * c), sign / (2 * c), square) for sign in (Fraction(1), Fraction(-1))]
        if square >= 0
        else []
    )


def strictly_within(weight: Surd, low: Surd, high: Surd) -> bool:
    """Return whether a number lies between two others, at neither of them."""
    return low.below(weight) and weight.below(high)


def rational_between(low: Surd, high: Surd) -> Fraction:
    """Return a rational between two different numbers."""
    bits = 8
    while True:
        middle = (low.floor(bits) + high.floor(bits)) / 2
        if low.below(rational(middle)) and rational(middle).below(high):
            return middle
        bits *= 2
