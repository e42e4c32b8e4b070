r"""The worst point of a path against a lateral limit that varies with the longitudinal CG, exact.

Over the weight W the moment of a stretch is M = u0 + u1*W + u2*W**2 and its lateral moment L = v0 + v1*W.
A side of the limit is P*y + Q*x + R >= 0 (P is 1 or -1), with x = M / W the longitudinal arm and y the
lateral arm L / W, or the lateral moment L. In either case the margin to it, in the unit of y, is

    A / W + B + C * W

so its least value is at an end, or at W = sqrt(A / C), and two of them are equal at the root of a quadratic.
A stretch is cut where x passes a corner: the root of u0 + (u1 - x)*W + u2*W**2. A transfer is a quadratic of
what has moved. All are numbers with one square root, compared exactly; nothing is sampled.
"""

from collections.abc import Collection, Iterator, Sequence
from fractions import Fraction
from functools import cmp_to_key
from itertools import pairwise
from typing import NamedTuple

from fleet.lateral import Across, LateralByCg, Side
from loads.balance.path import Knot, Leg, Path, Stretch, Turn
from loads.balance.path_course import (
    Course,
    Margin,
    Moved,
    burned,
    rational_between,
    roots,
    strictly_within,
)
from loads.balance.surd import Surd, rational

ZERO, ONE, MINUS = Fraction(0), Fraction(1), Fraction(-1)
BITS = 80  # how finely an irrational weight or margin is bounded: 2**-80 of the unit


class WorstAcross(NamedTuple):
    """The worst point against a limit. `room` is None where it has no part at the longitudinal arm there;
    otherwise `low` and `high` are the ends of its nearest part, `right` tells which of them is the nearer.
    """

    limit: LateralByCg
    stretch: Stretch
    knot: Knot
    low: Fraction | None
    high: Fraction | None
    room: Fraction | None
    right: bool

    @property
    def figure(self) -> Fraction:
        """Return the lateral arm, or the lateral moment, of the point."""
        return lateral_figure(self.limit, self.knot.weight, self.knot.lateral_moment)


class _Found(NamedTuple):
    """A candidate for the worst point between two weights (`bottom`, `top`) of a stretch."""

    course: Course
    weight: Surd
    margin: Surd
    sides: tuple[Side, Side] | None
    right: bool
    bottom: Surd
    top: Surd


def lateral_figure(limit: LateralByCg, weight: Fraction, lateral_moment: Fraction) -> Fraction:
    """Return what a limit judges of a lateral moment: the arm, or the moment itself."""
    return lateral_moment if limit.gives == "moment" else lateral_moment / weight


def courses_of(path: Path, legs: Collection[Leg]) -> list[Course]:
    """Return the parts of a path on some legs: stretches in every setting of gear and flaps, events."""
    found: list[Course] = [burned(each) for each in (*path.stretches, *path.settings) if each.leg in legs]
    for turn in path.turns:
        if turn.leg in legs:
            found += moved(turn)
    return found


def moved(turn: Turn) -> list[Course]:
    """Return an event as points, or as what a transfer goes through.

    A transfer tells the half of each of its parts, so that a part is known as a quadratic of what has moved.
    Where some of it is not known (a gap) the load is unresolved, and what is known is judged point by point.
    """
    knots = [knot for knot, _ in turn.knots]
    if not turn.swept or len(knots) % 2 == 0:
        return [_part(turn, knot, knot, knot) for knot in knots]
    return [_part(turn, *knots[at : at + 3]) for at in range(0, len(knots) - 2, 2)]


def _part(turn: Turn, start: Knot, half: Knot, end: Knot) -> Moved:
    bent = 2 * (start.moment + end.moment - 2 * half.moment)
    straight, across = end.moment - start.moment - bent, end.lateral_moment - start.lateral_moment
    return Moved(
        turn.leg,
        turn.where,
        start.weight,
        start.moment,
        straight,
        bent,
        start.lateral_moment,
        across,
        turn.dry,
    )


def worst_across(courses: Sequence[Course], limit: LateralByCg) -> WorstAcross | None:
    """Return the worst point of these parts against a limit, of equals the first; None without any.

    A point whose longitudinal arm lies off the whole limit is worse than any other; of such the farthest.
    """
    worst: _Found | None = None
    for course in courses:
        for found in _points(course, limit):
            if worst is None or _worse(found, worst):
                worst = found
    return None if worst is None else _settled(worst, limit)


def stays_across(courses: Sequence[Course], limit: LateralByCg) -> bool:
    """Return whether all of these parts lie inside a limit."""
    return all(
        found.sides is not None and found.margin.sign() >= 0
        for course in courses
        for found in _points(course, limit)
    )


def _points(course: Course, limit: LateralByCg) -> Iterator[_Found]:
    """Yield the worst point of each part of a stretch between two longitudinal arms of corners."""
    shape = limit.shape
    for top, bottom in pairwise(_cuts(course, shape)):
        middle = rational_between(bottom, top)
        knot = course.knot(middle)
        pieces = _pieces(shape, knot.moment / knot.weight)
        if pieces:
            yield _worst_of(course, pieces, top, bottom, moments=limit.gives == "moment")
        else:
            yield _off(course, shape, top, bottom)


def _cuts(course: Course, shape: Across) -> list[Surd]:
    """Return the weights at which a stretch is cut, from the top down, its ends among them."""
    high, low = rational(course.high), rational(course.low)
    a, b, c = course.arm()
    found: list[Surd] = []
    for level in shape.levels:
        passed = roots(*course.less(a, b, c, level))
        found += [each for each in passed if strictly_within(each, low, high)]
    found.sort(key=cmp_to_key(_downwards))
    cuts = [high]
    for each in found:
        if each.below(cuts[-1]):
            cuts.append(each)
    return [*cuts, low]


def _downwards(one: Surd, other: Surd) -> int:
    return -1 if other.below(one) else 1 if one.below(other) else 0


def _pieces(shape: Across, along: Fraction) -> tuple[tuple[Side, Side], ...]:
    """Return the pieces at a longitudinal arm, left to right; on a corner's arm what both sides leave."""
    levels = shape.levels
    if along in levels:
        return tuple(((ONE, ZERO, -low), (MINUS, ZERO, high)) for low, high in shape.stretches(along))
    for (low, high), pieces in zip(pairwise(levels), shape.sides, strict=True):
        if low < along < high:
            return pieces
    return ()


def _worst_of(
    course: Course, pieces: Sequence[tuple[Side, Side]], top: Surd, bottom: Surd, *, moments: bool
) -> _Found:
    """Return the least, over a part, of the margin to the nearest piece."""
    margins = [
        (course.margin(left, moments=moments), course.margin(right, moments=moments))
        for left, right in pieces
    ]
    worst: _Found | None = None
    for weight in (top, *_inside(course, margins, top, bottom), bottom):
        best: _Found | None = None
        for sides, (left, right) in zip(pieces, margins, strict=True):
            to_left, to_right = course.value(left, weight), course.value(right, weight)
            nearer = to_right.below(to_left)
            margin = to_right if nearer else to_left
            if best is None or best.margin.below(margin):
                best = _Found(course, weight, margin, sides, nearer, bottom, top)
        if best is not None and (worst is None or best.margin.below(worst.margin)):
            worst = best
    if worst is None:
        raise ValueError("between two corners a limit has a part")
    return worst


def _inside(
    course: Course, margins: Sequence[tuple[Margin, Margin]], top: Surd, bottom: Surd
) -> Iterator[Surd]:
    """Yield the weights between two others at which a margin, or the nearest piece, can turn."""
    for margin in (margin for pair in margins for margin in pair):
        dip = course.turn(margin)
        if dip is not None and strictly_within(dip, bottom, top):
            yield dip
    for (_, right), (left, _) in pairwise(margins):
        a, b, c = (one - other for one, other in zip(right, left, strict=True))
        yield from (each for each in roots(a, b, c) if strictly_within(each, bottom, top))


def _off(course: Course, shape: Across, top: Surd, bottom: Surd) -> _Found:
    """Return the point of a part that lies off the whole limit farthest from it along the aircraft."""
    first, last = shape.levels[0], shape.levels[-1]
    arm = course.arm()
    weights = [top, bottom]
    turn = course.turn(arm)
    if turn is not None and strictly_within(turn, bottom, top):
        weights.append(turn)
    ahead = course.value(arm, rational(rational_between(bottom, top))).below(rational(first))
    a, b, c = course.less(*arm, first if ahead else last)
    gap = (-a, -b, -c) if ahead else (a, b, c)
    best: _Found | None = None
    for weight in weights:
        found = _Found(course, weight, course.value(gap, weight), None, False, bottom, top)
        if best is None or best.margin.below(found.margin):
            best = found
    if best is None:
        raise ValueError("a part has two ends")
    return best


def _worse(one: _Found, other: _Found) -> bool:
    if (one.sides is None) is not (other.sides is None):
        return one.sides is None
    if one.sides is None:
        return other.margin.below(one.margin)
    return one.margin.below(other.margin)


def _settled(found: _Found, limit: LateralByCg) -> WorstAcross:
    """Return the worst point in rationals: itself, or a point of the path as near as makes no difference,
    which is outside where the worst point is.
    """
    outside = found.sides is None or found.margin.sign() < 0
    bits = BITS
    knot: Knot | None = None
    while knot is None:
        for weight in _near(found, bits):
            here = found.course.knot(weight)
            figure = lateral_figure(limit, here.weight, here.lateral_moment)
            if not outside or not limit.shape.holds(here.moment / here.weight, figure):
                knot = here
                break
        bits *= 2
    stretch = found.course.stretch
    if found.sides is None:
        return WorstAcross(limit, stretch, knot, None, None, None, False)
    along = knot.moment / knot.weight
    (_, q, r), (_, q2, r2) = found.sides
    low, high = -(q * along + r), q2 * along + r2
    return WorstAcross(limit, stretch, knot, low, high, found.margin.floor(BITS), found.right)


def _near(found: _Found, bits: int) -> Iterator[Fraction]:
    """Yield the weight itself where it is rational, else weights beside it within its part."""
    if not found.weight.factor:
        yield found.weight.whole
    step = Fraction(1, 1 << bits)
    below = found.weight.floor(bits)
    for weight in (below, below + step, below - step, below + 2 * step):
        at = rational(weight)
        if not at.below(found.bottom) and not found.top.below(at):
            yield weight
