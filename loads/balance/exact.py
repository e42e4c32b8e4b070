"""Exact sums of rationals. Additions share one common denominator, so that a long sum costs one reduction."""

from collections.abc import Iterable, Sequence
from fractions import Fraction
from math import lcm

Ratio = tuple[int, int]  # numerator, denominator > 0; not necessarily reduced


def product(one: Fraction, other: Fraction) -> Ratio:
    """Multiply two rationals and leave the result unreduced, ready for `total`."""
    return one.numerator * other.numerator, one.denominator * other.denominator


def total(ratios: Iterable[Ratio]) -> Fraction:
    """Add unreduced rationals exactly; the sum of nothing is 0."""
    terms = list(ratios)
    shared = lcm(*(below for _, below in terms))
    return Fraction(sum(above * (shared // below) for above, below in terms), shared)


def added(values: Sequence[Fraction]) -> Fraction:
    """Add rationals exactly; the sum of nothing is 0."""
    return total([(one.numerator, one.denominator) for one in values])
