"""Exact numbers with one square root in them: a + b * sqrt(d), all three rational, d of 0 or more.

The extreme of a margin between two kinks lies at the root of a quadratic, so these numbers are all that a
decision ever meets. Signs are decided by squaring, never by a decimal expansion: of a + b * sqrt(d) with a
and b of unlike signs the sign is that of the one whose square is greater.
"""

from fractions import Fraction
from math import isqrt
from typing import NamedTuple

NOTHING = Fraction(0)


class Surd(NamedTuple):
    """The number whole + factor * sqrt(under). A rational has a factor of 0."""

    whole: Fraction
    factor: Fraction
    under: Fraction

    def sign(self) -> int:
        """Return -1, 0 or 1; exact."""
        return _sign(self.whole, self.factor, self.under)

    def below(self, other: "Surd") -> bool:
        """Return whether this number is less than another, under whatever root; exact."""
        return _sign_of_two(self.whole - other.whole, self.factor, self.under, -other.factor, other.under) < 0

    def floor(self, bits: int) -> Fraction:
        """Return a rational at most 2**-bits below this number and never above it."""
        if not self.factor:
            return self.whole
        square = self.factor * self.factor * self.under
        scale = 1 << bits
        # sqrt(n / m) = sqrt(n * m) / m, so only whole numbers are rooted.
        above, below = square.numerator * square.denominator * scale * scale, square.denominator * scale
        root = isqrt(above)
        if self.factor.numerator > 0:
            return self.whole + Fraction(root, below)
        return self.whole - Fraction(root + (root * root < above), below)


def rational(value: Fraction) -> Surd:
    """Return a rational as a number of this kind."""
    return Surd(value, NOTHING, NOTHING)


def root(whole: Fraction, factor: Fraction, under: Fraction) -> Surd:
    """Return whole + factor * sqrt(under), as a rational where the root is one; `under` is 0 or more."""
    above, below = isqrt(under.numerator), isqrt(under.denominator)
    if above * above == under.numerator and below * below == under.denominator:
        return rational(whole + factor * Fraction(above, below))
    return Surd(whole, factor, under)


def _sign(whole: Fraction, factor: Fraction, under: Fraction) -> int:
    """Return the sign of whole + factor * sqrt(under)."""
    one = _plain(whole)
    other = _plain(factor) if under.numerator else 0
    if one == other or not other:
        return one
    if not one:
        return other
    return one * _plain(whole * whole - factor * factor * under)


def _sign_of_two(whole: Fraction, factor: Fraction, under: Fraction, second: Fraction, over: Fraction) -> int:
    """Return the sign of whole + factor * sqrt(under) + second * sqrt(over)."""
    one = _plain(whole)
    other = _sign_of_roots(factor, under, second, over)
    if one == other or not other:
        return one
    if not one:
        return other
    # Unlike signs: the greater square tells. The square of the roots' sum has a root of its own.
    squares = whole * whole - factor * factor * under - second * second * over
    return one * _sign(squares, -2 * factor * second, under * over)


def _sign_of_roots(factor: Fraction, under: Fraction, second: Fraction, over: Fraction) -> int:
    one = _plain(factor) if under.numerator else 0
    other = _plain(second) if over.numerator else 0
    if one == other or not other:
        return one
    if not one:
        return other
    return one * _plain(factor * factor * under - second * second * over)


def _plain(value: Fraction) -> int:
    above = value.numerator
    return (above > 0) - (above < 0)
