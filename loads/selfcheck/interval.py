"""How long a self-check counts: as the operator's rules say, without one six months.

Six months: EU-OPS Appendix 1 to 1.625 and AMC1 SPO.POL.115 (read): the integrity of what a computer puts out
is verified at intervals not over six months.
"""

from datetime import datetime
from typing import Final

from fleet.rules import Interval, Rules

RULE: Final = "computer-check-interval"
USUAL: Final = Interval(6, "months")


def interval_in(rules: Rules | None, now: datetime) -> Interval | None:
    """Return the interval that counts: the computer serves every aircraft, so of several the shortest. None
    where the rules say that there is none.
    """
    named = [one for one in rules.rules if one.name == RULE] if rules is not None else []
    if not named:
        return USUAL
    asked = [one.interval for one in named if one.interval is not None]
    return min(asked, key=lambda one: one.good_until(now.date())) if asked else None


def is_overdue(checked_at: datetime, now: datetime, interval: Interval | None) -> bool:
    """Return whether what was checked then has lapsed; the last day is still good."""
    return interval is not None and now.date() > interval.good_until(checked_at.date())
