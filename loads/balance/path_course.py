"""Parts of a flight as polynomials of one parameter, and the exact numbers they lead to.

    a stretch of the burn      parameter W, the weight     margins  A / W + B + C * W
    a transfer at one weight   parameter V, what moved     margins  A + B * V + C * V**2

with A, B and C rational. Either is nothing, or two of them are equal, where A + B * t + C * t**2 is: at the
root of a quadratic; and either has at most one turn.
"""

from fractions import Fraction
from typing import NamedTuple, Protocol

from fleet.lateral import Side
from loads.balance.path import Knot, Leg, Stretch
from loads.balance.surd import Surd, rational, root

ZERO, ONE = Fraction(0), Fraction(1)
Margin = tuple[Fraction, Fraction, Fraction]  # A, B, C


class Course(Protocol):
    """A part of the flight over a parameter that runs from `high` down to `low`."""

    @property
    def stretch(self) -> Stretch:
        """Return where on the flight it is; of a transfer a stretch in which nothing burns."""

    @property
    def low(self) -> Fraction:
        """Return the least of the parameter."""

    @property
    def high(self) -> Fraction:
        """Return the greatest of the parameter."""

    def knot(self, at: Fraction) -> Knot:
        """Return the aircraft at a parameter."""

    def arm(self) -> Margin:
        """Return the longitudinal arm."""

    def less(self, a: Fraction, b: Fraction, c: Fraction, figure: Fraction) -> Margin:
        """Return A, B, C less a figure."""

    def margin(self, side: Side, *, moments: bool) -> Margin:
        """Return the margin to a side of a limit that gives lateral arms, or moments."""

    def value(self, margin: Margin, at: Surd) -> Surd:
        """Return a margin at a parameter, under the root that stands in it."""

    def turn(self, margin: Margin) -> Surd | None:
        """Return the parameter above 0 at which a margin neither rises nor falls; None without one."""


class Burned(NamedTuple):
    """A stretch of the burn: the moments M = u0 + u1*W + u2*W**2 and L = v0 + v1*W over the weight W."""

    stretch: Stretch
    u0: Fraction
    u1: Fraction
    u2: Fraction
    v0: Fraction
    v1: Fraction

    @property
    def low(self) -> Fraction:
        """Return the least weight."""
        return self.stretch.end.weight

    @property
    def high(self) -> Fraction:
        """Return the greatest weight."""
        return self.stretch.start.weight

    def knot(self, at: Fraction) -> Knot:
        """Return the aircraft at a weight."""
        return self.stretch.at(at)

    def arm(self) -> Margin:
        """Return the longitudinal arm, M / W."""
        return self.u0, self.u1, self.u2

    def less(self, a: Fraction, b: Fraction, c: Fraction, figure: Fraction) -> Margin:
        """Return A / W + B + C * W less a figure."""
        return a, b - figure, c

    def margin(self, side: Side, *, moments: bool) -> Margin:
        """Return P*y + Q*x + R with x = M / W, and y = L / W or L."""
        p, q, r = side
        if moments:
            return q * self.u0, p * self.v0 + q * self.u1 + r, p * self.v1 + q * self.u2
        return p * self.v0 + q * self.u0, p * self.v1 + q * self.u1 + r, q * self.u2

    def value(self, margin: Margin, at: Surd) -> Surd:
        """Return A / W + B + C * W."""
        a, b, c = margin
        whole, factor, under = at
        if not factor:
            return rational(a / whole + b + c * whole)
        norm = whole * whole - factor * factor * under
        return Surd(a * whole / norm + b + c * whole, c * factor - a * factor / norm, under)

    def turn(self, margin: Margin) -> Surd | None:
        """Return sqrt(A / C), where both are of one sign."""
        a, _, c = margin
        return root(ZERO, ONE, a / c) if a * c > 0 else None


class Moved(NamedTuple):
    """A part of a transfer at one weight, from nothing moved (V = 0) to all of the part (V = 1): the moments
    M = m0 + m1*V + m2*V**2 and L = v0 + v1*V.
    """

    leg: Leg
    where: str
    weight: Fraction
    m0: Fraction
    m1: Fraction
    m2: Fraction
    v0: Fraction
    v1: Fraction
    dry: Fraction

    @property
    def stretch(self) -> Stretch:
        """Return the transfer as a stretch in which nothing burns."""
        return Stretch(self.leg, (), self.knot(ZERO), self.knot(ONE), ZERO, ({}, ZERO), self.dry, self.where)

    @property
    def low(self) -> Fraction:
        """Return nothing moved."""
        return ZERO

    @property
    def high(self) -> Fraction:
        """Return all of this part moved."""
        return ONE

    def knot(self, at: Fraction) -> Knot:
        """Return the aircraft with a share of the part moved."""
        moment = self.m0 + at * (self.m1 + at * self.m2)
        return Knot(self.weight, moment, self.v0 + at * self.v1)

    def arm(self) -> Margin:
        """Return the longitudinal arm, M over the one weight."""
        return self.m0 / self.weight, self.m1 / self.weight, self.m2 / self.weight

    def less(self, a: Fraction, b: Fraction, c: Fraction, figure: Fraction) -> Margin:
        """Return A + B * V + C * V**2 less a figure."""
        return a - figure, b, c

    def margin(self, side: Side, *, moments: bool) -> Margin:
        """Return P*y + Q*x + R with y the lateral arm, or the lateral moment."""
        p, q, r = side
        a, b, c = self.arm()
        over = ONE if moments else self.weight
        return p * self.v0 / over + q * a + r, p * self.v1 / over + q * b, q * c

    def value(self, margin: Margin, at: Surd) -> Surd:
        """Return A + B * V + C * V**2."""
        a, b, c = margin
        whole, factor, under = at
        squared = whole * whole + factor * factor * under
        return Surd(a + b * whole + c * squared, b * factor + 2 * c * whole * factor, under)

    def turn(self, margin: Margin) -> Surd | None:
        """Return -B / 2C."""
        _, b, c = margin
        return rational(-b / (2 * c)) if c else None


def burned(stretch: Stretch) -> Burned:
    """Return the polynomials of a stretch of the burn."""
    start, end, bend = stretch.start, stretch.end, stretch.bend
    weight = start.weight - end.weight
    slope = (start.moment - end.moment) / weight
    across = (start.lateral_moment - end.lateral_moment) / weight
    return Burned(
        stretch,
        start.moment - slope * start.weight + bend * start.weight * end.weight,
        slope - bend * (start.weight + end.weight),
        bend,
        start.lateral_moment - across * start.weight,
        across,
    )


def roots(a: Fraction, b: Fraction, c: Fraction) -> list[Surd]:
    """Return the t at which a + b * t + c * t**2 is nothing."""
    if not c:
        return [rational(-a / b)] if b else []
    square = b * b - 4 * a * c
    if square < 0:
        return []
    return [root(-b / (2 * c), sign / (2 * c), square) for sign in (ONE, -ONE)]


def strictly_within(at: Surd, low: Surd, high: Surd) -> bool:
    """Return whether a number lies between two others, at neither of them."""
    return low.below(at) and at.below(high)


def rational_between(low: Surd, high: Surd) -> Fraction:
    """Return a rational between two different numbers."""
    bits = 8
    while True:
        middle = (low.floor(bits) + high.floor(bits)) / 2
        if strictly_within(rational(middle), low, high):
            return middle
        bits *= 2
