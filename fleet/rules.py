"""An operator's rule values as dated, sourced data: how often something is due, which signatures are asked.

A rule says to which aircraft and operations it applies; the first of its name that applies counts, and
`none` is a value: there is no such rule for these. An interval in calendar months runs to the end of the
month; in months, years or days to the same day, which is still good. What is good until a day lapses with its
last minute.
"""

import calendar
from collections.abc import Sequence
from dataclasses import dataclass
from datetime import date, timedelta
from typing import Final, Literal

Name = Literal[
    "weighing-interval",
    "scale-calibration-interval",
    "computer-check-interval",
    "manifest-retention",
    "loading-signature",
]
NAMES: Final[dict[str, str]] = {
    "weighing-interval": "weighing of the aircraft",
    "scale-calibration-interval": "calibration of scales",
    "computer-check-interval": "check of the computer",
    "manifest-retention": "keeping of manifests",
    "loading-signature": "signature of the loading supervisor",
}
IntervalUnit = Literal["days", "months", "calendar months", "years"]
MONTHS_A_YEAR: Final = 12


@dataclass(frozen=True, slots=True)
class Interval:
    """A span of time, as a rule states it."""

    count: int
    unit: IntervalUnit

    def good_until(self, day: date) -> date:
        """Return the last day on which what was done on `day` still serves."""
        if self.unit == "days":
            return day + min(timedelta(days=self.count), date.max - day)
        months = self.count * (MONTHS_A_YEAR if self.unit == "years" else 1)
        return _months_on(day, months, to_the_end=self.unit == "calendar months")

    def __str__(self) -> str:
        return f"{self.count} {self.unit[:-1] if self.count == 1 else self.unit}"


def _months_on(day: date, months: int, *, to_the_end: bool) -> date:
    """Return the same day some months on, or the last of that month where it has no such day."""
    years, month = divmod(day.month - 1 + months, MONTHS_A_YEAR)
    year, month = day.year + years, month + 1
    if year > date.max.year:
        return date.max
    last = calendar.monthrange(year, month)[1]
    return date(year, month, last if to_the_end else min(day.day, last))


@dataclass(frozen=True, slots=True)
class Applies:
    """To what a rule applies; what is None or empty does not matter to it."""

    category: str | None = None
    from_engines: int | None = None
    to_engines: int | None = None
    from_seats: int | None = None
    to_seats: int | None = None
    operations: tuple[str, ...] = ()

    def to_aircraft(self, aircraft: "Subject") -> bool:
        """Return whether it applies to an aircraft, in one operation of it at least."""
        return (
            self.category in {None, aircraft.category}
            and _within(aircraft.engines, self.from_engines, self.to_engines)
            and _within(aircraft.seats, self.from_seats, self.to_seats)
        )

    def to_flight(self, aircraft: "Subject", operation: str) -> bool:
        """Return whether it applies to a flight of an aircraft."""
        return self.to_aircraft(aircraft) and (not self.operations or operation in self.operations)


@dataclass(frozen=True, slots=True)
class Subject:
    """An aircraft as rules ask for it; `seats` are the passenger seats installed."""

    category: str
    engines: int
    seats: int


@dataclass(frozen=True, slots=True)
class Rule:
    """One rule. `interval` None and not `demanded`: there is no such rule for what it applies to."""

    name: str
    interval: Interval | None
    demanded: bool
    source: str
    applies: Applies

    @property
    def is_none(self) -> bool:
        """Whether it says that there is none."""
        return self.interval is None and not self.demanded

    def words(self) -> str:
        """Return what it asks, in words."""
        if self.is_none:
            return "none"
        return str(self.interval) if self.interval is not None else "demanded"


@dataclass(frozen=True, slots=True)
class Rules:
    """One version of an operator's rules, in the order in which they are asked."""

    title: str
    rules: tuple[Rule, ...]

    def for_flight(self, name: str, aircraft: Subject, operation: str) -> Rule | None:
        """Return the rule of a name that binds a flight; None without one, or where it says none."""
        found = next(
            (one for one in self.rules if one.name == name and one.applies.to_flight(aircraft, operation)),
            None,
        )
        return None if found is None or found.is_none else found

    def for_aircraft(self, name: str, aircraft: Subject) -> Sequence[Rule]:
        """Return the rules of a name that bind some operation of an aircraft, up to one that binds all."""
        found: list[Rule] = []
        for one in self.rules:
            if one.name == name and one.applies.to_aircraft(aircraft):
                found.append(one)
                if not one.applies.operations:
                    break
        return [one for one in found if not one.is_none]


def _within(value: int, least: int | None, most: int | None) -> bool:
    return (least is None or value >= least) and (most is None or value <= most)
