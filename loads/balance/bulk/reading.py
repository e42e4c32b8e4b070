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
        self._spots: list[
            int
        ] = []  # where in `held` each weight belongs, all rows being one behind the other
        self._held: list[float] = []
        self._usable: list[float] = []
        self._scalars: list[tuple[float, ...]] = []

    def add(self, document: Mapping[str, Any]) -> bool:
        """Add a load; return False, with nothing added, where the bulk sums do not know all of it."""
        begun = len(self._spots)
        try:
            self._add_lines(document)
            usable, fuel = self._fuel(document["fuel"])
            limits = self._limits(document.get("limits", ()))
        except (Unlike, KeyError, TypeError, AttributeError, ValueError):
            del self._spots[begun:], self._held[begun:]
            return False
        self._usable += usable
        self._scalars.append(fuel + limits)
        self._count += 1
        return True

    def batch(self) -> Batch:
        """Return what was added so far."""
        count, spots = self._count, len(self._known.spots)
        place = np.array(self._spots, dtype=np.intp)
        held = np.bincount(place, weights=np.array(self._held), minlength=count * spots)
        scalars = np.array(self._scalars, dtype=np.float64).reshape(count, 6)
        return Batch(
            held.reshape(count, spots).astype(np.float64, copy=False),
            np.array(self._usable, dtype=np.float64).reshape(count, len(self._tanks)),
            *(np.ascontiguousarray(scalars[:, column]) for column in range(6)),
        )

    def _add_lines(self, document: Mapping[str, Any]) -> None:
        """Add who and what is aboard. Called for every line there is, so each step of it is a plain one."""
        crew, passengers, items = document["crew"], document["passengers"], document["items"]
        if not _TOP.issuperset(document) or len(crew) < self._known.configuration.minimum_crew:
            raise Unlike
        if document["persons_on_board"] != len(crew) + len(passengers):
            raise Unlike
        row = self._count * len(self._known.spots)
        kept, spots, held = self._kept, self._spots, self._held
        for lines, names, hows, at, columns in (
            (crew, _PERSON, _MEASURED, "seat", self._seats["crew"]),
            (passengers, _PERSON, _MEASURED, "seat", self._seats["passenger"]),
            (items, _ITEM, _ITEM_HOWS, "place", self._places),
        ):
            for line in lines:
                if line["how"] not in hows or not names.issuperset(line):
                    raise Unlike
                weight = line["weight"]
                typed = (weight["value"], weight["unit"])
                found = kept.get(typed)
                held.append(self._weight(typed) if found is None else found)
                spots.append(row + columns[line[at]])

    def _fuel(self, fuel: Mapping[str, Any]) -> tuple[list[float], tuple[float, float, float, float]]:
        filled, kept = fuel["at_engine_start"], self._kept
        if fuel.get("not_usable") or not _FUEL.issuperset(fuel) or len(filled) != len(self._tanks):
            raise Unlike
        density = (fuel["density"]["value"], fuel["density"]["unit"])
        usable, planned = [], []
        for tank in self._tanks:
            typed = filled[tank]
            key = (tank, typed["value"], typed["unit"], *density)
            found = kept.get(key)
            usable.append(self._fill(key) if found is None else found)
        for name in ("taxi", "trip", "minimum_at_landing"):
            typed = fuel[name]
            volume = (typed["value"], typed["unit"], *density)
            found = kept.get(volume)
            planned.append(self._volume(volume) if found is None else found)
        taxi, trip, least = planned
        return usable, (self._density(density), taxi, trip, least)

    def _limits(self, lines: Any) -> tuple[float, float]:
        least = {"take-off": NO_LIMIT, "landing": NO_LIMIT}
        for line in lines:
            if not _LIMIT.issuperset(line):
                raise Unlike
            weight = line["weight"]
            typed = (weight["value"], weight["unit"])
            found = self._kept.get(typed)
            least[line["at"]] = min(least[line["at"]], self._weight(typed) if found is None else found)
        return least["take-off"], least["landing"]

    def _weight(self, typed: tuple[str, str]) -> float:
        return self._keep(typed, in_unit(_quantity(*typed), self._basis.weight_unit))

    def _density(self, typed: tuple[str, str]) -> float:
        key = ("density", *typed)
        found = self._kept.get(key)
        if found is None:
            unit = density_unit(self._basis.weight_unit, self._basis.volume_unit)
            found = self._keep(key, in_unit(_quantity(*typed), unit))
        return found

    def _volume(self, key: tuple[str, str, str, str]) -> float:
        return self._keep(key, self._exact_volume(*key))

    def _fill(self, key: tuple[str, str, str, str, str]) -> float:
        """Return what a tank holds; a tank filled to its brim is the rule, so that is compared exactly."""
        tank, *typed = key
        exact = self._exact_volume(*typed)
        if exact > self._capacity[tank]:
            raise Unlike
        return self._keep(key, exact)

    def _exact_volume(self, value: str, unit: str, *density: str) -> Fraction:
        amount = _quantity(value, unit)
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
