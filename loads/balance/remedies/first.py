"""The least whole count with which a load is within, by proof: none below it holds.

Between two turns (`remedies.varying`) the centre of gravity, trim and the balance of fuel stay as they are:
kept, or broken. Every other limit turns once at most as the count rises, from broken to kept or the other
way. So of each range between two turns at most three counts and a halving have to be looked at.
"""

from collections.abc import Iterator, Sequence
from fractions import Fraction
from math import ceil, floor

from loads.balance.polynomial import Root
from loads.balance.remedies.question import broken
from loads.balance.remedies.reaching import COMES_BACK
from loads.balance.remedies.varying import Varying
from loads.balance.result import Result

STAYS = (*COMES_BACK, "tank-table.")  # between two turns: kept or broken all along
NOT_FLOWN = frozenset({"no such load"})


def first_that_holds(varying: Varying, least: int, most: int) -> tuple[int, Result] | None:
    """Return the least count from `least` to `most` with which the load is within, and its result; None when
    there is none. Where the time runs out, one that may not be the least, or None.
    """
    if least > most:
        return None
    turns = varying.turns(Fraction(least), Fraction(most))
    for first, last in _ranges(turns, least, most):
        if not varying.question.left():
            return None
        count = _first_of(varying, first, last)
        if count is not None:
            result = varying.result(Fraction(count))
            if result is not None:
                return count, result
    return None


def _ranges(turns: Sequence[Root], least: int, most: int) -> Iterator[tuple[int, int]]:
    """Yield the whole counts between two turns as (first, last), and those at a turn each by itself."""
    begin = least
    for turn in turns:
        at, beyond = max(ceil(turn.low), begin), floor(turn.high) + 1
        if begin < at:
            yield begin, at - 1
        yield from ((count, count) for count in range(at, beyond))
        begin = max(begin, at, beyond)
    if begin <= most:
        yield begin, most


def _first_of(varying: Varying, first: int, last: int) -> int | None:
    """Return the first count of a range between two turns that holds; None when none does."""
    codes = _broken(varying, first)
    if not codes:
        return first
    if first == last or codes & NOT_FLOWN or any(code.startswith(STAYS) for code in codes):
        return None
    if codes & _broken(varying, last):
        return None  # broken at both ends is broken all along
    low, high = first, last
    while high - low > 1 and varying.question.left():
        middle = (low + high) // 2
        if codes & _broken(varying, middle):
            low = middle
        else:
            high = middle
    return None if _broken(varying, high) else high


def _broken(varying: Varying, count: int) -> frozenset[str]:
    result = varying.result(Fraction(count))
    return NOT_FLOWN if result is None else frozenset(check.code for check in broken(result))
