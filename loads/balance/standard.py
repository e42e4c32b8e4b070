"""Standard weights put into a load: what people count who were not weighed, by the table in force.

A passenger counts the weight of its category in the row that fits: seats installed, operation, route, and
the season of the departure's local date. An infant on a lap is inside a standard adult's weight. A declared
weight counts with the table's additions, where the table has some. Crew count by their kind. Nothing is
guessed: no row, or a position of no kind, leaves a weight unknown.
"""

from collections.abc import Sequence
from dataclasses import replace
from fractions import Fraction

from fleet.basis import Basis
from fleet.conversion import in_unit
from fleet.standard_weights import Row, StandardWeights
from loads.balance.aboard import Flight, Person
from loads.balance.fields import Faults
from loads.balance.standard_use import StandardUse
from records.canonical import decimal_text

ZERO = Fraction(0)


def with_standards(
    people: tuple[tuple[Person, ...], tuple[Person, ...]],
    table: StandardWeights | None,
    flight: Flight,
    basis: Basis,
    faults: Faults,
) -> tuple[tuple[Person, ...], tuple[Person, ...], StandardUse | None]:
    """Return crew and passengers with what the table gives them, and what was taken; None where nothing was.

    Notes a fault for a category the table does not have.
    """
    crew, passengers = people
    wanted = any(one.how == "standard" for one in crew) or any(
        one.how == "standard" or (one.how == "declared" and table is not None and table.declared is not None)
        for one in passengers
    )
    if table is None or not wanted:
        return crew, passengers, None
    put = _Putting(table, flight, basis, faults)
    crew = tuple(put.crew(one) for one in crew)
    passengers = tuple(put.passenger(one) for one in passengers)
    return crew, passengers, put.use()


class _Putting:
    """One load's way through one table."""

    def __init__(self, table: StandardWeights, flight: Flight, basis: Basis, faults: Faults) -> None:
        self._table, self._basis, self._faults = table, basis, faults
        self._day = flight.departure.date()  # as typed, with its offset: the local date decides
        self._row = table.row_for(
            seats=basis.passenger_seats_installed,
            day=self._day,
            operation=flight.operation,
            origin=flight.origin,
            destination=flight.destination,
        )
        self._operation = flight.operation
        declared = table.declared
        self._allowed = declared is not None and declared.allows(basis.passenger_seats_installed)
        self._added = (
            sum((in_unit(one.weight, basis.weight_unit) for one in declared.additions), ZERO)
            if declared is not None and self._allowed
            else ZERO
        )
        self._standard, self._declared = 0, 0
        self._rowless = False
        self._kindless: list[str] = []
        self._refused: list[str] = []

    def crew(self, one: Person) -> Person:
        """Return a crew member with its weight, where it is a standard one."""
        if one.how != "standard":
            return one
        self._standard += 1
        kind = self._table.crew_kind(one.category, one.position)
        if kind is None and one.category is not None:
            self._unknown_category(one, [each.id for each in self._table.crew])
        if kind is None:
            self._kindless.append(one.seat.name)
            return one
        return replace(one, weight=in_unit(kind.weight, self._basis.weight_unit))

    def passenger(self, one: Person) -> Person:
        """Return a passenger with its weight, where the table gives it or adds to it."""
        if one.how == "standard":
            self._standard += 1
            return self._by_category(one)
        if one.how != "declared" or self._table.declared is None or one.weight is None:
            return one
        if not self._allowed:
            self._refused.append(one.seat.name)
            return one
        if not self._added:
            return one
        self._declared += 1
        return replace(one, weight=one.weight + self._added, added=self._added)

    def _by_category(self, one: Person) -> Person:
        category = self._table.category(one.category or "")
        if category is None:
            if one.category is not None:
                self._unknown_category(one, [each.id for each in self._table.categories])
            return one
        if self._row is None:
            self._rowless = True
            return one
        weight = self._row.weights[category.counts_as or category.id]
        return replace(one, weight=in_unit(weight, self._basis.weight_unit))

    def _unknown_category(self, one: Person, known: Sequence[str]) -> None:
        choice = ", ".join(known) or "none"
        self._faults.note(
            f"{one.pointer}/category",
            "unknown-category",
            f"not in the table of standard weights in force, which has {choice}; use one of these",
        )

    def use(self) -> StandardUse:
        """Return what was taken."""
        row, season = self._row, self._table.season_on(self._day)
        declared = self._table.declared
        additions = (
            ", ".join(
                f"{one.what} {decimal_text(one.weight.value)} {one.weight.unit.value}"
                for one in declared.additions
            )
            if declared is not None and self._declared
            else ""
        )
        return StandardUse(
            label=self._table.label or self._table.title,
            source=row.source if row is not None else self._table.source,
            row="" if row is None else _row_words(row),
            season="" if season is None else season.name,
            additions=additions,
            standard=self._standard,
            declared=self._declared,
            unknown=self._why_unknown(),
            refused=", ".join(self._refused),
        )

    def _why_unknown(self) -> str:
        found = []
        if self._rowless:
            seats = self._basis.passenger_seats_installed
            found.append(
                f"no row of {self._table.label or self._table.title} is for {seats} seats installed, "
                f"operation {self._operation}, on {self._day}"
            )
        if self._kindless:
            found.append(f"no kind of crew in the table for {', '.join(self._kindless)}")
        return "; ".join(found)


def _row_words(row: Row) -> str:
    parts = [f"row {row.number}, {row.seats()} installed"]
    parts += [f"operation {' or '.join(row.operations)}"] if row.operations else []
    parts += ["this route"] if row.routes else []
    return ", ".join(parts)
