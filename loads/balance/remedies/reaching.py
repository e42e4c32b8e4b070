"""How far a load can change before the first limit breaks: the greatest whole last digit below that, exact.

Some limits can only break once as a load grows: weights, what a seat, a place, a zone or a tank holds. The
greatest amount that keeps them is found by halving. Up to there the centre of gravity, the trim and the
balance of the fuel may break and be kept again; every amount at which they may turn is known
(`remedies.varying`), and nothing turns between two of them: so one look between each two proves all of it.
"""

from collections.abc import Sequence
from dataclasses import dataclass
from fractions import Fraction
from itertools import pairwise
from math import floor

from loads.balance.aboard import Declared
from loads.balance.polynomial import Root
from loads.balance.remedies.question import TENTH, Question, broken
from loads.balance.remedies.varying import Change, Varying
from loads.balance.result import Check

ZERO = Fraction(0)
MOST_TENTHS = 1_000_000
# Checks that may be broken and kept again as a load grows. What a table does not know is looked at with both.
COMES_BACK = ("cg.", "lateral.", "lateral-by-cg.", "path.", "trim.", "fuel-balance.")


@dataclass(frozen=True, slots=True)
class Reach:
    """So many last digits more still hold; `stop` is the check that breaks first beyond (None: none does up
    to the greatest amount asked). `sought` is False where the time was up before all was asked: such a figure
    is not told.
    """

    count: int
    stop: Check | None
    sought: bool = True

    @property
    def stopped_by(self) -> str | None:
        """The limit that breaks first, in words."""
        return None if self.stop is None else self.stop.title


NOT_SOUGHT = Reach(0, None, sought=False)


def reached(question: Question, change: Change, most: int) -> Reach:
    """Return the greatest count up to `most` up to which everything holds, every amount between counts too.

    `change` makes the load with so many last digits more.
    """
    if not question.left():
        return NOT_SOUGHT
    if most < 0:
        return Reach(0, None)
    varying = Varying(question, change)
    last = _last_that_keeps(varying, most)
    if not question.left():
        return NOT_SOUGHT
    left = _first_left(varying, last)
    if not question.left():
        return NOT_SOUGHT
    return left or Reach(last, next(iter(_stops(varying, Fraction(last + 1))), None))


def bound_of(question: Question, room: Fraction | None) -> int:
    """Return the tenths of a weight that the weights of the flight and one place leave."""
    _, heavier = question.weight_range()
    known = [each for each in (room, heavier) if each is not None]
    return floor(min(known) / TENTH) if known else MOST_TENTHS


def _last_that_keeps(varying: Varying, most: int) -> int:
    """Return the greatest count that breaks no limit of those that break once and for all."""
    low, high = 0, most + 1
    middle = most
    while high - low > 1 and varying.question.left():
        if any(not check.code.startswith(COMES_BACK) for check in _stops(varying, Fraction(middle))):
            high = middle
        else:
            low = middle
        middle = (low + high) // 2
    return low


def _first_left(varying: Varying, last: int) -> Reach | None:
    """Return how far it is to the first turn beyond which something breaks; None when nothing does."""
    end = Root(Fraction(last), Fraction(last))
    turns = [Root(ZERO, ZERO), *varying.turns(ZERO, end.low), end]
    for turn, following in pairwise(turns):
        if turn.high < following.low:
            stops = _stops(varying, (turn.high + following.low) / 2)
            if stops:
                return Reach(_whole_below(varying, turn), stops[0])
    return None


def _whole_below(varying: Varying, turn: Root) -> int:
    """Return the greatest whole count not beyond a turn; where floats of it could not tell, that count is
    asked.
    """
    low, high = floor(turn.low), floor(turn.high)
    if low != high and not _stops(varying, Fraction(high)):
        return high
    return low


def _stops(varying: Varying, count: Fraction) -> Sequence[Check]:
    """Return the checks that break with so many more; () when none does."""
    if not count:
        return ()
    result = varying.result(count)
    return (_overfilled(varying, varying.change.at(count)),) if result is None else broken(result)


def _overfilled(varying: Varying, more: Declared) -> Check:
    """Return the check of the tank that would be asked to take more on the flight than its table knows.

    Raises StopIteration where no tank holds other fuel than before: then the load itself could not be flown.
    """
    question = varying.question
    usable = {held.tank.id: held.usable for held in question.declared.fuel.tanks}
    fuller = {f"tank.{held.tank.id}" for held in more.fuel.tanks if held.usable != usable[held.tank.id]}
    return next(check for check in question.result.checks if check.code in fuller)
