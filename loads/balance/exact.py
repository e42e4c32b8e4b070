"""Exact sums of rationals. Additions share one common denominator, so that a long sum costs one reduction."""

from collections.abc import Iterable, Sequence
from fractions import Fraction
from math import lcm

Ratio = tuple[int, int]  # numerator, denominator > 0; not necessarily reduced


def product(one: Fraction, other: Fraction) -> Ratio:
    """Multiply two rationals and leave the result unreduced, ready for `total`."""
    above, below = one.as_integer_ratio()
    over, under = other.as_integer_ratio()
    return above * over, below * under


def times(one: Fraction, other: Fraction) -> Fraction:
    """Multiply two rationals; the same as `*`, without asking what else they could be."""
    above, below = one.as_integer_ratio()
    over, under = other.as_integer_ratio()
    return Fraction(above * over, below * under)


def total(ratios: Sequence[Ratio]) -> Fraction:
    """Add unreduced rationals exactly; the sum of nothing is 0."""
    shared = lcm(*[below for _, below in ratios])
    return Fraction(sum([above * (shared // below) for above, below in ratios]), shared)


def added(values: Iterable[Fraction]) -> Fraction:
    """Add rationals exactly; the sum of nothing is 0."""
    return total([value.as_integer_ratio() for value in values])
