"""What is asked of the remedies: one assessed load, how to assess it when it is changed, and for how long.

`judge` is the whole assessment, exact, with everything the load was assessed with; whatever a sum in here
proposes is decided by it. `clock` counts seconds; it is handed in, so that nothing here reads one.
"""

from collections.abc import Callable
from dataclasses import dataclass, field
from fractions import Fraction

from loads.balance.aboard import Declared
from loads.balance.prepared import Prepared
from loads.balance.result import Check, Result

Judge = Callable[[Declared], Result]

TENTH = Fraction(1, 10)  # amounts are whole tenths of the unit: the last digit that is printed
OWN_WEIGHTS = ("weight.", "performance.")
# What no load of people and items mends, and what only people mend.
NOT_BY_LOADING = ("tank.", "tank-table.", "persons.", "fuel.")
BY_PEOPLE_ALONE = ("seat.",)


@dataclass
class Question:
    """A load with its result. `until` is the reading of the clock at which to stop; `tried` counts
    assessments.
    """

    declared: Declared
    result: Result
    ready: Prepared
    judge: Judge
    clock: Callable[[], float]
    until: float
    tried: int = field(default=0)

    def assessed(self, declared: Declared) -> Result:
        """Return the result of the load changed like this."""
        self.tried += 1
        return self.judge(declared)

    def left(self) -> float:
        """Return the seconds left; 0 when there are none."""
        return max(self.until - self.clock(), 0.0)

    def breaks(self, *kinds: str) -> bool:
        """Return whether a limit is broken whose code begins like one of these."""
        return any(check.code.startswith(kinds) for check in broken(self.result))

    def weight_range(self) -> tuple[Fraction | None, Fraction | None]:
        """Return by how much every weight of the flight may change, from and to, as the checks of weights
        say; None: no limit that way.
        """
        lows, highs = [], []
        for check in self.result.checks:
            if check.code.startswith(OWN_WEIGHTS) and check.room is not None:
                if check.limit is not None:
                    highs.append(check.room)
                elif check.low is not None:
                    lows.append(-check.room)
        return max(lows, default=None), min(highs, default=None)


def broken(result: Result) -> list[Check]:
    """Return the checks that stop a departure."""
    return [check for check in result.checks if check.outcome in ("fail", "unresolved")]
