"""How far a load can change before the first limit breaks: the greatest whole last digit that still holds.

It was assessed and found within, and the next one was not, so the figure is exact and rounded down. It is
looked for between nothing and a bound that some limit sets in any case: first at four points up to the bound,
which is all there is to do where nothing else binds; otherwise by halving. An envelope that is left and
entered again between two points looked at could be passed over.
"""

from collections.abc import Callable
from dataclasses import dataclass
from fractions import Fraction
from math import floor

from fleet.tanks import OutsideTable
from loads.balance.aboard import Declared
from loads.balance.remedies.question import TENTH, Question, broken
from loads.balance.result import Check

Changed = Callable[[int], Declared]  # the load with so many last digits more
MOST_TENTHS = 1_000_000


@dataclass(frozen=True, slots=True)
class Reach:
    """So many last digits more still hold; `stop` is the check that breaks with the next one (None: none
    does up to the greatest amount asked). `sought` is False where the time was up before anything was asked:
    such a figure is not told.
    """

    count: int
    stop: Check | None
    sought: bool = True

    @property
    def stopped_by(self) -> str | None:
        """The limit that breaks first, in words."""
        return None if self.stop is None else self.stop.title


def reached(question: Question, changed: Changed, most: int) -> Reach:
    """Return the greatest count up to `most` that is found to hold with every count looked at below it."""
    if not question.left():
        return Reach(0, None, sought=False)
    if most < 0:
        return Reach(0, None)
    low, high = 0, most + 1
    for count in sorted({most // 4, most // 2, 3 * most // 4, most}):
        if count > low:
            if _stops(question, changed, count) is not None:
                high = count
                break
            low = count
    while high - low > 1 and question.left():
        middle = (low + high) // 2
        if _stops(question, changed, middle) is None:
            low = middle
        else:
            high = middle
    return Reach(low, _stops(question, changed, low + 1))


def _stops(question: Question, changed: Changed, count: int) -> Check | None:
    """Return the check that breaks with so many more, the worst of a kind first; None when none does."""
    if not count:
        return None
    more = changed(count)
    try:
        stops = broken(question.assessed(more))
    except OutsideTable:
        return _overfilled(question, more)
    return next(iter(stops), None)


def _overfilled(question: Question, more: Declared) -> Check:
    """Return the check of the tank that would be asked to take more on the flight than its table knows.

    Raises StopIteration where no tank holds other fuel than before: then the load itself could not be flown.
    """
    usable = {held.tank.id: held.usable for held in question.declared.fuel.tanks}
    fuller = {f"tank.{held.tank.id}" for held in more.fuel.tanks if held.usable != usable[held.tank.id]}
    return next(check for check in question.result.checks if check.code in fuller)


def bound_of(question: Question, room: Fraction | None) -> int:
    """Return the tenths of a weight that the weights of the flight and one place leave."""
    _, heavier = question.weight_range()
    known = [each for each in (room, heavier) if each is not None]
    return floor(min(known) / TENTH) if known else MOST_TENTHS
