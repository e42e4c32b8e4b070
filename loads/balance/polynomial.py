"""Polynomials of one parameter with rational coefficients, the constant first, and where they are nothing.

A root is told exactly where it is rational and a quadratic tells it; else between two rationals less than
2**-80 apart. Floats only ever say that a polynomial has no root between two ends, and only where they are far
from nothing.
"""

from collections.abc import Iterator, Sequence
from fractions import Fraction
from itertools import pairwise
from typing import NamedTuple

from loads.balance.surd import root

Poly = tuple[Fraction, ...]
ZERO, ONE = Fraction(0), Fraction(1)
BITS = 80
SURE = 1e-9  # of the largest part of a sum: floats are a million times finer
STRAIGHT, SQUARE = 2, 3


class Root(NamedTuple):
    """Where something is nothing: from `low` to `high`, the two the same where it is known exactly."""

    low: Fraction
    high: Fraction


def add(*parts: Sequence[Fraction]) -> Poly:
    """Return the sum of polynomials."""
    longest = max(map(len, parts))
    return tuple(sum((part[at] for part in parts if at < len(part)), ZERO) for at in range(longest))


def scale(part: Sequence[Fraction], by: Fraction | int) -> Poly:
    """Return a polynomial times a number."""
    return tuple(each * by for each in part)


def multiply(one: Sequence[Fraction], other: Sequence[Fraction]) -> Poly:
    """Return the product of two polynomials."""
    found = [ZERO] * (len(one) + len(other) - 1)
    for at, each in enumerate(one):
        if each:
            for further, more in enumerate(other):
                found[at + further] += each * more
    return tuple(found)


def value(part: Sequence[Fraction], at: Fraction) -> Fraction:
    """Return a polynomial at one parameter."""
    found = ZERO
    for each in reversed(part):
        found = found * at + each
    return found


def through(points: Sequence[tuple[Fraction, Fraction]]) -> Poly:
    """Return the polynomial through so many points, of a degree one less than these."""
    found: Poly = (ZERO,)
    for at, (x, y) in enumerate(points):
        part: Poly = (y,)
        for other, (further, _) in enumerate(points):
            if other != at:
                part = scale(multiply(part, (-further, ONE)), 1 / (x - further))
        found = add(found, part)
    return found


def roots_between(part: Sequence[Fraction], low: Fraction, high: Fraction) -> list[Root]:
    """Return where a polynomial is nothing from `low` to `high`, rising; [] where it is nothing all over.

    Where it comes so near to nothing, without a change of sign, that it may touch it, that counts.
    """
    least = _cut(part)
    if len(least) < STRAIGHT or _far_from_nothing(least, float(low), float(high)):
        return []
    if len(least) == STRAIGHT:
        at = -least[0] / least[1]
        return [Root(at, at)] if low <= at <= high else []
    found = _of_square(least) if len(least) == SQUARE else _bisected(least, low, high)
    return sorted(each for each in found if each.high >= low and each.low <= high)


def _cut(part: Sequence[Fraction]) -> Poly:
    found = list(part)
    while found and not found[-1]:
        found.pop()
    return tuple(found)


def _far_from_nothing(part: Poly, low: float, high: float) -> bool:
    """Return whether floats can tell that there is no root: all parts of the sum that the polynomial is
    between two parameters (Bernstein's) are of one sign and none of them is small.
    """
    width, degree = high - low, len(part) - 1
    moved = [float(each) for each in part]
    size = max(abs(each) * max(abs(low), abs(high), 1.0) ** at for at, each in enumerate(moved))
    for begin in range(degree):  # the same polynomial of (x - low)
        for at in range(degree - 1, begin - 1, -1):
            moved[at] += low * moved[at + 1]
    share = [each * width**at / _choose(degree, at) for at, each in enumerate(moved)]
    parts = [
        sum(_choose(at, further) * share[further] for further in range(at + 1)) for at in range(degree + 1)
    ]
    sure = SURE * size
    return all(each > sure for each in parts) or all(each < -sure for each in parts)


def _choose(of: int, some: int) -> int:
    found = 1
    for at in range(some):
        found = found * (of - at) // (at + 1)
    return found


def _of_square(part: Poly) -> Iterator[Root]:
    c, b, a = part
    square = b * b - 4 * a * c
    if square < 0:
        return
    for sign in (ONE, -ONE):
        at = root(-b / (2 * a), sign / (2 * a), square)
        low = at.floor(BITS)
        yield Root(low, low if not at.factor else low + Fraction(1, 1 << BITS))


def _bisected(part: Poly, low: Fraction, high: Fraction) -> Iterator[Root]:
    """Yield the roots between those of the slope, where it neither rises nor falls; and these where the
    polynomial may touch nothing.
    """
    slope = tuple(each * at for at, each in enumerate(part))[1:]
    turns = roots_between(slope, low, high)
    marks = [low, *(end for turn in turns for end in dict.fromkeys(turn) if low < end < high), high]
    for one, other in pairwise(sorted(set(marks))):
        first, last = value(part, one), value(part, other)
        if not first:
            yield Root(one, one)
        if (first < 0 < last) or (last < 0 < first):
            yield _halved(part, one, other)
    if not value(part, high):
        yield Root(high, high)
    for turn in turns:
        if turn.low < turn.high and abs(value(part, turn.low)) * (1 << (BITS // 2)) < max(map(abs, part)):
            yield turn


def _halved(part: Poly, low: Fraction, high: Fraction) -> Root:
    rises = value(part, high) > 0
    while high - low > Fraction(1, 1 << BITS):
        middle = (low + high) / 2
        at = value(part, middle)
        if not at:
            return Root(middle, middle)
        if (at > 0) is rises:
            high = middle
        else:
            low = middle
    return Root(low, high)
