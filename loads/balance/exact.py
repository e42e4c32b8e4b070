"""Exact arithmetic of rationals, where it is done hundreds of times for one load.

Sums share one common denominator, so that a long one costs one reduction. Two operands are taken as what they
are, rationals: the operators of `Fraction` ask that first, which takes longer than the arithmetic.
"""

from collections.abc import Iterable
from fractions import Fraction
from math import lcm

from fleet.rational import rational

Ratio = tuple[int, int]  # numerator, denominator > 0; not necessarily reduced


def product(one: Fraction, other: Fraction) -> Ratio:
    """Multiply two rationals and leave the result unreduced, ready for `total`."""
    above, below = one.as_integer_ratio()
    over, under = other.as_integer_ratio()
    return above * over, below * under


def times(one: Fraction, other: Fraction) -> Fraction:
    """Multiply two rationals."""
    above, below = one.as_integer_ratio()
    over, under = other.as_integer_ratio()
    return rational(above * over, below * under)


def quotient(one: Fraction, other: Fraction) -> Fraction:
    """Divide a rational by another. Raises `ZeroDivisionError`."""
    above, below = one.as_integer_ratio()
    over, under = other.as_integer_ratio()
    return rational(above * under, below * over)


def plus(one: Fraction, other: Fraction) -> Fraction:
    """Add two rationals."""
    over, under = other.as_integer_ratio()
    if not over:
        return one
    above, below = one.as_integer_ratio()
    return rational(above * under + over * below, below * under)


def minus(one: Fraction, other: Fraction) -> Fraction:
    """Take a rational from another."""
    above, below = one.as_integer_ratio()
    over, under = other.as_integer_ratio()
    return rational(above * under - over * below, below * under)


def total(ratios: Iterable[Ratio], factor: Ratio = (1, 1)) -> Fraction:
    """Add unreduced rationals exactly, and multiply the sum; the sum of nothing is 0."""
    above, below = 0, 1
    for over, under in ratios:
        if under == below:
            above += over
            continue
        if below % under:
            shared = lcm(below, under)
            above, below = above * (shared // below), shared
        above += over * (below // under)
    return rational(above * factor[0], below * factor[1])


def added(values: Iterable[Fraction]) -> Fraction:
    """Add rationals exactly; the sum of nothing is 0."""
    return total([value.as_integer_ratio() for value in values])
