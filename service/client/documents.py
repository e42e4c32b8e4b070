"""The load document `tarebook.load/1` for a type checker. Any mapping of the same form does as well.

A number may be a whole number, a Decimal, a decimal text or a float; it is kept as it was written.
"""

from decimal import Decimal
from typing import Literal, NotRequired, TypedDict

How = Literal["weighed", "declared", "standard", "estimated"]


class Quantity(TypedDict):
    """A number and its unit; a unit is never inferred."""

    value: int | float | str | Decimal
    unit: str


class Density(Quantity):
    """The delivered density of the fuel, and the document that states it."""

    source: str


class Flight(TypedDict):
    """Which flight; `departure` carries its offset: 2026-12-01T08:30:00-06:00."""

    reference: str
    leg: int
    departure: str
    origin: str
    destination: str
    operation: str


class LapInfant(TypedDict):
    """An infant on a lap."""

    name: str
    weight: NotRequired[Quantity]
    how: NotRequired[Literal["weighed", "declared", "estimated"]]


class CrewMember(TypedDict):
    """One of the crew; `person` is a login, which the pilot in command needs."""

    name: str
    position: str
    seat: str
    how: How
    person: NotRequired[str]
    category: NotRequired[str]
    weight: NotRequired[Quantity]


class Passenger(TypedDict):
    """One passenger in a seat."""

    name: str
    seat: str
    how: How
    category: NotRequired[str]
    weight: NotRequired[Quantity]
    lap_infant: NotRequired[LapInfant]


class Item(TypedDict):
    """What is aboard besides people and fuel."""

    kind: Literal["baggage", "cargo", "ballast", "equipment", "consumable"]
    what: str
    place: str
    how: How
    weight: NotRequired[Quantity]
    removed: NotRequired[bool]


class Fuel(TypedDict):
    """Usable fuel per tank at engine start, and what of it is meant to burn."""

    density: Density
    at_engine_start: dict[str, Quantity]
    not_usable: NotRequired[dict[str, Quantity]]
    taxi: Quantity
    trip: Quantity
    minimum_at_landing: Quantity


class StatedLimit(TypedDict):
    """A limit of this flight and its source."""

    at: Literal["take-off", "landing"]
    weight: Quantity
    source: str


class LoadDocument(TypedDict):
    """A load as submitted."""

    schema: Literal["tarebook.load/1"]
    aircraft: str
    configuration: str
    flight: Flight
    persons_on_board: int
    crew: list[CrewMember]
    passengers: list[Passenger]
    items: list[Item]
    fuel: Fuel
    limits: NotRequired[list[StatedLimit]]
