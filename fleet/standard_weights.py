"""A table of standard weights as frozen values: what a person counts who was not weighed.

One table is one version, approved by the operator. Categories are whatever the table names; their age bounds
are data of the table. A row is chosen by the passenger seats installed in the aircraft, the operation, the
route and the season, and the season by the local date of the departure. Weights stay as typed, with their
unit; a load converts them once.
"""

from collections.abc import Mapping
from dataclasses import dataclass
from datetime import date
from typing import NamedTuple

from fleet.quantities import Quantity


class MonthDay(NamedTuple):
    """A day of any year; 29 February is one, so that a season can be told to the day."""

    month: int
    day: int

    def __str__(self) -> str:
        return f"{self.month:02}-{self.day:02}"


@dataclass(frozen=True, slots=True)
class Category:
    """Whom a weight is for. Ages in years: `from_age` is included, `below_age` not; None: no bound.

    `counts_as` names the category whose weight is taken, such as an infant in its own seat that counts as a
    child.
    """

    id: str
    name: str
    from_age: int | None = None
    below_age: int | None = None
    counts_as: str | None = None

    def ages(self) -> str:
        """Return the age bounds in words, or "" without any."""
        if self.from_age is None and self.below_age is None:
            return ""
        if self.from_age is None:
            return f"under {self.below_age} years"
        if self.below_age is None:
            return f"{self.from_age} years and over"
        return f"{self.from_age} to under {self.below_age} years"


@dataclass(frozen=True, slots=True)
class Season:
    """A part of the year, both days included; it may run over the end of the year."""

    id: str
    name: str
    first: MonthDay
    last: MonthDay

    def holds(self, day: date) -> bool:
        """Return whether a day lies in the season."""
        at = MonthDay(day.month, day.day)
        if self.first <= self.last:
            return self.first <= at <= self.last
        return at >= self.first or at <= self.last


@dataclass(frozen=True, slots=True)
class Row:
    """One row of a table: when it is taken, and the weight of each category.

    `to_seats` None: any number from `from_seats` on. Without operations, routes or a season it holds for all.
    """

    number: int
    from_seats: int
    to_seats: int | None
    season: str | None
    operations: tuple[str, ...]
    routes: tuple[tuple[str, str], ...]
    weights: Mapping[str, Quantity]
    source: str

    def seats(self) -> str:
        """Return the seats installed it is for, in words."""
        if self.to_seats is None:
            return f"{self.from_seats} seats or more"
        if self.to_seats == self.from_seats:
            return f"{self.from_seats} seat{'' if self.from_seats == 1 else 's'}"
        return f"{self.from_seats} to {self.to_seats} seats"


@dataclass(frozen=True, slots=True)
class Addition:
    """What is added to a passenger's declared weight, such as clothing or hand baggage."""

    what: str
    weight: Quantity


@dataclass(frozen=True, slots=True)
class DeclaredRule:
    """Whether a passenger's declared weight may be used, and what is added to it.

    `below_seats`: only in aircraft with fewer passenger seats installed; None: in all. `allowed` False:
    never.
    """

    allowed: bool
    below_seats: int | None
    additions: tuple[Addition, ...]
    source: str

    def allows(self, seats: int) -> bool:
        """Return whether declared weights may be used in an aircraft with so many passenger seats."""
        return self.allowed and (self.below_seats is None or seats < self.below_seats)


@dataclass(frozen=True, slots=True)
class CrewKind:
    """A standard weight of a kind of crew, and the positions that are of that kind."""

    id: str
    name: str
    positions: tuple[str, ...]
    weight: Quantity
    source: str


@dataclass(frozen=True, slots=True)
class StandardWeights:
    """One version of an operator's table. `label` says which, in words, for whoever reads a load."""

    title: str
    source: str
    categories: tuple[Category, ...]
    seasons: tuple[Season, ...]
    rows: tuple[Row, ...]
    declared: DeclaredRule | None
    crew: tuple[CrewKind, ...]
    label: str = ""

    def season_on(self, day: date) -> Season | None:
        """Return the season a day lies in; None where the table has no seasons."""
        return next((season for season in self.seasons if season.holds(day)), None)

    def row_for(self, *, seats: int, day: date, operation: str, origin: str, destination: str) -> Row | None:
        """Return the first row that fits, or None. `seats` are the passenger seats installed, whoever sits
        in them; `day` is the local date of the departure.
        """
        season = self.season_on(day)
        for row in self.rows:
            if (
                row.from_seats <= seats
                and (row.to_seats is None or seats <= row.to_seats)
                and (row.season is None or (season is not None and row.season == season.id))
                and (not row.operations or operation in row.operations)
                and (not row.routes or (origin, destination) in row.routes)
            ):
                return row
        return None

    def category(self, name: str) -> Category | None:
        """Return a category by its id."""
        return next((each for each in self.categories if each.id == name), None)

    def crew_kind(self, category: str | None, position: str | None) -> CrewKind | None:
        """Return the kind of crew a member is of: by the category stated, else by its position."""
        if category is not None:
            return next((kind for kind in self.crew if kind.id == category), None)
        return next((kind for kind in self.crew if position in kind.positions), None)
