"""Load documents as rows of numbers for bulk sums, quickly; what the sums do not know is left to be read in
full.

The documents are ones that `loads.balance.declared.read_load` of this very engine has read before, against
some basis: what does not depend on the basis is not asked again. What does (seats, places, tanks and their
capacity, the crew a configuration needs) is asked here against the basis at hand, exactly; where it does not
hold, the load is left to the whole reading, which says what is wrong.
"""

from collections.abc import Mapping
from dataclasses import dataclass, fields
from fractions import Fraction
from typing import Any, Final

import numpy as np

from fleet.conversion import density_unit, in_unit, volume_of_weight
from fleet.quantities import DIMENSION_OF, Dimension, Quantity, Unit, number_or_fault
from loads.balance.bulk.known import Floats, Known
from records.refusal import Fault

_TOP: Final = frozenset(
    [
        "schema",
        "aircraft",
        "configuration",
        "flight",
        "persons_on_board",
        "crew",
        "passengers",
        "items",
        "fuel",
        "limits",
    ]
)
_PERSON: Final = frozenset(["name", "position", "seat", "how", "person", "category", "weight"])
_ITEM: Final = frozenset(["kind", "what", "place", "how", "weight"])
_FUEL: Final = frozenset(["density", "at_engine_start", "not_usable", "taxi", "trip", "minimum_at_landing"])
_LIMIT: Final = frozenset(["at", "weight", "source"])
_MEASURED: Final = frozenset({"weighed", "declared"})
_ITEM_HOWS: Final = _MEASURED | {"estimated"}
_MOST_KEPT: Final = 100_000
NO_LIMIT: Final = float("inf")


class Unlike(Exception):
    """The load has something the bulk sums do not know."""


@dataclass(frozen=True, slots=True)
class Batch:
    """Loads of one basis and configuration, a row each, in its units.

    `held` is the weight in each seat and place, `usable` the volume in each tank at engine start; taxi, trip
    and least are volumes, too; `take_off` and `landing` the least limit stated with the load.
    """

    held: Floats
    usable: Floats
    density: Floats
    taxi: Floats
    trip: Floats
    least: Floats
    take_off: Floats
    landing: Floats

    def __len__(self) -> int:
        """How many loads there are."""
        return len(self.density)

    def part(self, rows: slice) -> "Batch":
        """Return some of the rows."""
        return Batch(*(getattr(self, field.name)[rows] for field in fields(self)))


class Reading:
    """Reads documents one after the other into one batch."""

    def __init__(self, known: Known) -> None:
        self._known = known
        self._basis = known.basis
        configuration = known.configuration
        seats = {one.id: one for one in known.basis.seats if one.id in configuration.seats}
        self._seats = {
            role: {name: known.spots[name] for name, seat in seats.items() if seat.serves in (role, "either")}
            for role in ("crew", "passenger")
        }
        self._places = {name: known.spots[name] for name in configuration.places if name in known.spots}
        self._tanks = tuple(tank.id for tank in known.basis.tanks)
        self._capacity = {tank.id: tank.capacity for tank in known.basis.tanks}
        self._kept = known.kept
        self._count = 0
        self._rows: list[int] = []
        self._columns: list[int] = []
        self._held: list[float] = []
        self._usable: list[float] = []
        self._scalars: list[tuple[float, float, float, float, float, float]] = []

    def add(self, document: Mapping[str, Any]) -> bool:
        """Add a load; return False, with nothing added, where the bulk sums do not know all of it."""
        try:
            lines = self._lines(document)
            usable, fuel = self._fuel(document["fuel"])
            take_off, landing = self._limits(document.get("limits", ()))
        except (Unlike, KeyError, TypeError, AttributeError, ValueError):
            return False
        row = self._count
        for column, weight in lines:
            self._rows.append(row)
            self._columns.append(column)
            self._held.append(weight)
        self._usable += usable
        self._scalars.append((*fuel, take_off, landing))
        self._count += 1
        return True

    def batch(self) -> Batch:
        """Return what was added so far."""
        count, spots = self._count, len(self._known.spots)
        place = np.array(self._rows, dtype=np.intp) * spots + np.array(self._columns, dtype=np.intp)
        held = np.bincount(place, weights=np.array(self._held), minlength=count * spots)
        scalars = np.array(self._scalars, dtype=np.float64).reshape(count, 6)
        return Batch(
            held.reshape(count, spots).astype(np.float64, copy=False),
            np.array(self._usable, dtype=np.float64).reshape(count, len(self._tanks)),
            *(np.ascontiguousarray(scalars[:, column]) for column in range(6)),
        )

    def _lines(self, document: Mapping[str, Any]) -> list[tuple[int, float]]:
        crew, passengers, items = document["crew"], document["passengers"], document["items"]
        if document.keys() - _TOP or len(crew) < self._known.configuration.minimum_crew:
            raise Unlike
        if document["persons_on_board"] != len(crew) + len(passengers):
            raise Unlike
        found = []
        for lines, seats in ((crew, self._seats["crew"]), (passengers, self._seats["passenger"])):
            for line in lines:
                if line["how"] not in _MEASURED or not line.keys() <= _PERSON:
                    raise Unlike
                found.append((seats[line["seat"]], self._weight(line["weight"])))
        for line in items:
            if line["how"] not in _ITEM_HOWS or not line.keys() <= _ITEM:
                raise Unlike
            found.append((self._places[line["place"]], self._weight(line["weight"])))
        return found

    def _fuel(self, fuel: Mapping[str, Any]) -> tuple[list[float], tuple[float, float, float, float]]:
        filled = fuel["at_engine_start"]
        if fuel.get("not_usable") or not fuel.keys() <= _FUEL or len(filled) != len(self._tanks):
            raise Unlike
        typed = (fuel["density"]["value"], fuel["density"]["unit"])
        usable = [self._fill(tank, filled[tank], typed) for tank in self._tanks]
        plan = (self._volume(fuel[name], typed) for name in ("taxi", "trip", "minimum_at_landing"))
        taxi, trip, least = plan
        return usable, (self._density(typed), taxi, trip, least)

    def _limits(self, lines: Any) -> tuple[float, float]:
        least = {"take-off": NO_LIMIT, "landing": NO_LIMIT}
        for line in lines:
            if not line.keys() <= _LIMIT:
                raise Unlike
            least[line["at"]] = min(least[line["at"]], self._weight(line["weight"]))
        return least["take-off"], least["landing"]

    def _weight(self, typed: Mapping[str, str]) -> float:
        key = (typed["value"], typed["unit"])
        found = self._kept.get(key)
        if found is None:
            found = self._keep(key, in_unit(_quantity(*key), self._basis.weight_unit))
        return found

    def _density(self, typed: tuple[str, str]) -> float:
        key = ("density", *typed)
        found = self._kept.get(key)
        if found is None:
            unit = density_unit(self._basis.weight_unit, self._basis.volume_unit)
            found = self._keep(key, in_unit(_quantity(*typed), unit))
        return found

    def _volume(self, typed: Mapping[str, str], density: tuple[str, str]) -> float:
        key = (typed["value"], typed["unit"], *density)
        found = self._kept.get(key)
        if found is None:
            found = self._keep(key, self._exact_volume(typed, density))
        return found

    def _fill(self, tank: str, typed: Mapping[str, str], density: tuple[str, str]) -> float:
        """Return what a tank holds; a tank filled to its brim is the rule, so that is compared exactly."""
        key = (tank, typed["value"], typed["unit"], *density)
        found = self._kept.get(key)
        if found is None:
            exact = self._exact_volume(typed, density)
            if exact > self._capacity[tank]:
                raise Unlike
            found = self._keep(key, exact)
        return found

    def _exact_volume(self, typed: Mapping[str, str], density: tuple[str, str]) -> Fraction:
        amount = _quantity(typed["value"], typed["unit"])
        if DIMENSION_OF[amount.unit] is Dimension.VOLUME:
            return in_unit(amount, self._basis.volume_unit)
        return volume_of_weight(amount, _quantity(*density), self._basis.volume_unit)

    def _keep(self, key: tuple[object, ...], exact: Fraction) -> float:
        """Round once, and remember."""
        if len(self._kept) >= _MOST_KEPT:
            self._kept.clear()
        self._kept[key] = rounded = float(exact)
        return rounded


def _quantity(value: object, unit: str) -> Quantity:
    number = number_or_fault(value, "")
    if isinstance(number, Fault):
        raise Unlike
    return Quantity(number, Unit(unit))
