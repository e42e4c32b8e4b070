r"""Where a flight that varies with one parameter x can touch a limit: every x at which its verdict may turn.

A part of the flight runs over t (the weight, or the share of a transfer) from `low(x)` to `high(x)`, with

    weight W, lateral moment L, and D times the moment M     polynomials of t, their coefficients those of x

so the margin to a side of an envelope, times D, is G = g0(x) + g1(x)*t + g2(x)*t**2. Inside does not turn
outside, nor the other way, but where the part touches the outline, which is

    at an end of the part       G at t = low(x) or high(x)
    between its ends            G is nothing and turns there: g1**2 - 4*g0*g2 is nothing
    at a corner of the outline  the part passes it: a polynomial of x, too

All x at which one of these polynomials is nothing are looked for. What is found besides, because the touch
would lie beyond the end of a side or of the part, is mostly left out, and does no harm where it is not.
"""

from collections.abc import Iterable, Iterator
from fractions import Fraction
from itertools import pairwise
from typing import NamedTuple

from fleet.basis import Axis
from fleet.envelope import Shape
from fleet.lateral import LateralByCg
from loads.balance.far import far_from_nothing
from loads.balance.polynomial import ONE, ZERO, Poly, Root, add, multiply, roots_between, scale, value

Series = tuple[Poly, ...]  # by the power of t, each a polynomial of x
Ends = tuple[Fraction, Fraction]  # the least and the greatest x
NEAR = 1e-6  # of a figure: how far beyond an end a touch still counts


class Varied(NamedTuple):
    """A part of a flight; a point of it has `low` and `high` of 0 and series of one term."""

    low: Poly
    high: Poly
    weight: Series
    moment: Series  # D * M
    lateral: Series
    over: Poly  # D, above 0

    @property
    def is_point(self) -> bool:
        """Whether it is one point, or one that a transfer leaves where it is."""
        return len(self.moment) == 1


def touching_envelope(part: Varied, shape: Shape, axis: Axis, ends: Ends) -> Iterator[Root]:
    """Yield where a part may touch the outline of an envelope."""
    across = axis == "lateral"
    figure, over = (part.lateral, (ONE,)) if across else (part.moment, part.over)
    weights = _weights(part, ends)
    levels = (Fraction(each, shape.slabs.scale) for each in shape.slabs.levels)
    for level in (each for each in levels if _within(each, *weights)):
        for end in dict.fromkeys((part.low, part.high)):
            yield from roots_between(add(_at(part.weight, end), (-level,)), *ends)
    if not part.is_point and len(part.weight) == 1:
        return  # a transfer at one weight: its greatest and least moments are points of their own
    floats = [[float(each) for each in row] for row in figure], [float(each) for each in over]
    corners: dict[tuple[Fraction, Fraction], None] = {}
    for line, reach in _sides(shape):
        low, high = max(weights[0], reach[0]), min(weights[1], reach[1])
        if not _within(low, low, high):
            continue
        a, b, c = line
        corners |= {(level, a + level * (b + level * c)): None for level in reach}
        if part.is_point or not _clear(*floats, line, ends, (low, high)):
            yield from _along(part, _margin(part, figure, over, line), reach, ends)
    if not part.is_point:
        for level, at in corners:
            if _within(level, *weights):
                yield from _past_corner(part, figure, (level, scale(over, at)), ends)


def _past_corner(part: Varied, figure: Series, corner: tuple[Fraction, Poly], ends: Ends) -> Iterator[Root]:
    """Yield where a stretch passes a corner: its weight, and what makes nothing of the figure there."""
    level, at = corner
    passes = add(*(scale(each, level**power) for power, each in enumerate(figure)), at)
    for found in roots_between(passes, *ends):
        if _within(level, value(part.low, found.low), value(part.high, found.low)):
            yield found


def _weights(part: Varied, ends: Ends) -> tuple[Fraction, Fraction]:
    """Return the least and the greatest weight of a part; its ends vary evenly with x."""
    found = [value(_at(part.weight, end), x) for end in (part.low, part.high) for x in ends]
    return min(found), max(found)


def _clear(
    figure: list[list[float]],
    over: list[float],
    line: tuple[Fraction, Fraction, Fraction],
    ends: Ends,
    reach: tuple[Fraction, Fraction],
) -> bool:
    """Return whether floats can tell that a stretch does not come to a side: its margin, as `_margin` has it,
    is far from nothing all over. The sums are made anew in floats, since most sides are far away.
    """
    rows = []
    for power in range(3):
        row = list(figure[power]) if power < len(figure) else []
        row += [0.0] * (len(over) - len(row))
        factor = float(line[power])
        for at, each in enumerate(over):
            row[at] += factor * each
        rows.append(row)
    return far_from_nothing(rows, ends, reach)


def _sides(shape: Shape) -> Iterator[tuple[tuple[Fraction, Fraction, Fraction], tuple[Fraction, Fraction]]]:
    """Yield each side, moment + A + B * W + C * W**2, with the weights it reaches from and to."""
    slabs = shape.slabs
    levels = [Fraction(level, slabs.scale) for level in slabs.levels]
    for reach, pieces in zip(pairwise(levels), slabs.trapezoids, strict=True):
        for sides in pieces:
            for p, a, b, c in (sides[:4], sides[4:]):
                yield (Fraction(a, p), Fraction(b, p), Fraction(c, p)), reach


def touching_across(part: Varied, limit: LateralByCg, ends: Ends) -> Iterator[Root]:
    """Yield where a part may touch the outline of a lateral limit against the longitudinal CG."""
    moments, levels = limit.gives == "moment", limit.shape.levels
    weight = _times(part.weight, (part.over,))
    figure = _times(part.lateral, weight if moments else (part.over,))
    corners: dict[tuple[Fraction, Fraction], None] = {}
    for level in levels:
        for found, _ in _turns(part, _sum(part.moment, _by(weight, -level)), ends):
            yield found
    for reach, pieces in zip(pairwise(levels), limit.shape.sides, strict=True):
        for p, q, r in (side for piece in pieces for side in piece):
            corners |= {(level, -(q * level + r) / p): None for level in reach}
            for found, at in _turns(part, _sum(_by(figure, p), _by(part.moment, q), _by(weight, r)), ends):
                over, under = _valued(part.moment, found.low, at), _valued(weight, found.low, at)
                if _within(over / under, *reach):
                    yield found
    if part.is_point:
        return
    for along, across in corners:
        away = _sum(part.lateral, _by(((ONE,),) if moments else part.weight, -across))
        yield from _both_nothing(_sum(part.moment, _by(weight, -along)), away, part, ends)


def _both_nothing(one: Series, other: Series, part: Varied, ends: Ends) -> Iterator[Root]:
    """Yield where a square and a straight margin are nothing at the same t."""
    (a0, a1, a2), (b0, b1, _) = _three(one), _three(other)
    if not any(b1):
        yield from roots_between(b0, *ends)
        return
    both = add(
        multiply(a0, multiply(b1, b1)),
        scale(multiply(a1, multiply(b0, b1)), -1),
        multiply(a2, multiply(b0, b0)),
    )
    for found in roots_between(both, *ends):
        slope = value(b1, found.low)
        if slope:
            at = -value(b0, found.low) / slope
            if _within(at, value(part.low, found.low), value(part.high, found.low)):
                yield found


def _valued(series: Series, x: Fraction, t: Fraction) -> Fraction:
    return value([value(each, x) for each in series], t)


def each_once(found: Iterable[Root]) -> list[Root]:
    """Return roots in their order; such as cannot be told apart become one."""
    joined: list[Root] = []
    for one in sorted(found):
        if joined and one.low <= joined[-1].high:
            joined[-1] = Root(joined[-1].low, max(joined[-1].high, one.high))
        else:
            joined.append(one)
    return joined


def _along(part: Varied, margin: Series, reach: tuple[Fraction, Fraction], ends: Ends) -> Iterator[Root]:
    """Yield where a part may touch one side, which reaches from one weight to another."""
    if part.is_point:
        for found in roots_between(margin[0], *ends):
            if _within(value(part.weight[0], found.low), *reach):
                yield found
        return
    for end in (part.low, part.high):
        for found in roots_between(_at(margin, end), *ends):
            if _within(value(end, found.low), *reach):
                yield found
    for found, at in _between(margin, ends):
        inside = _within(at, value(part.low, found.low), value(part.high, found.low))
        if inside and _within(at, *reach):
            yield found


def _turns(part: Varied, margin: Series, ends: Ends) -> Iterator[tuple[Root, Fraction]]:
    """Yield where a margin is nothing at an end of a part, or turns there in between, with the t there."""
    for end in dict.fromkeys((part.low, part.high)):
        for found in roots_between(_at(margin, end), *ends):
            yield found, value(end, found.low)
    for found, at in _between(margin, ends):
        if _within(at, value(part.low, found.low), value(part.high, found.low)):
            yield found, at


def _between(margin: Series, ends: Ends) -> Iterator[tuple[Root, Fraction]]:
    """Yield where a margin is nothing and turns, and the t at which it does."""
    g0, g1, g2 = _three(margin)
    if not any(g2):
        return
    square = add(multiply(g1, g1), scale(multiply(g0, g2), -4))
    for found in roots_between(square, *ends):
        bend = value(g2, found.low)
        if bend:
            yield found, -value(g1, found.low) / (2 * bend)


def _margin(part: Varied, figure: Series, over: Poly, line: tuple[Fraction, Fraction, Fraction]) -> Series:
    """Return D times moment + A + B * W + C * W**2."""
    a, b, c = (scale(over, each) for each in line)
    if part.is_point:
        weight = part.weight[0]
        return (add(figure[0], a, multiply(b, weight), multiply(c, multiply(weight, weight))),)
    g0, g1, g2 = _three(figure)
    return add(g0, a), add(g1, b), add(g2, c)


def _three(series: Series) -> tuple[Poly, Poly, Poly]:
    found = (*series, (ZERO,), (ZERO,))
    return found[0], found[1], found[2]


def _at(series: Series, t: Poly) -> Poly:
    """Return a series at a t that is a polynomial of x."""
    found: Poly = (ZERO,)
    for each in reversed(series):
        found = add(multiply(found, t), each)
    return found


def _sum(*parts: Series) -> Series:
    longest = max(map(len, parts))
    return tuple(add((ZERO,), *(part[at] for part in parts if at < len(part))) for at in range(longest))


def _by(series: Series, by: Fraction) -> Series:
    return tuple(scale(each, by) for each in series)


def _times(one: Series, other: Series) -> Series:
    found: list[Poly] = [(ZERO,)] * (len(one) + len(other) - 1)
    for at, each in enumerate(one):
        for further, more in enumerate(other):
            found[at + further] = add(found[at + further], multiply(each, more))
    return tuple(found)


def _within(at: Fraction, low: Fraction, high: Fraction) -> bool:
    """Return whether a figure lies between two others, or so near that floats would not be sure."""
    beyond = NEAR * (abs(float(low)) + abs(float(high)) + 1)
    return float(low) - beyond <= float(at) <= float(high) + beyond
