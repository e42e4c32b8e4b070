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
    follows: NotRequired[str]


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
    restraint: NotRequired[Quantity]


class Footprint(TypedDict):
    """What touches the floor as the item stands: one area, and how many there are."""

    length: Quantity
    width: Quantity
    lies: Literal["along", "across"]
    feet_lengthwise: NotRequired[int]
    feet_widthwise: NotRequired[int]


class Spreader(TypedDict):
    """A pallet or spreader; with a size of its own it stands on the floor in the item's stead."""

    weight: Quantity
    length: NotRequired[Quantity]
    width: NotRequired[Quantity]
    lies: NotRequired[Literal["along", "across"]]


class Net(TypedDict):
    """A net over an item."""

    weight: Quantity


class Item(TypedDict):
    """What is aboard besides people and fuel."""

    kind: Literal["baggage", "cargo", "ballast", "equipment", "consumable"]
    what: str
    place: str
    how: How
    weight: NotRequired[Quantity]
    removed: NotRequired[bool]
    jettisonable: NotRequired[bool]
    footprint: NotRequired[Footprint]
    pallet: NotRequired[Spreader]
    net: NotRequired[Net]
    spreader: NotRequired[Spreader]


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
    kind: NotRequired[str]


class SeatSetting(TypedDict):
    """Where a seat, or every seat on a rail in a row, stands on its rail: one of seat and row."""

    setting: str
    seat: NotRequired[str]
    row: NotRequired[str]


class Departing(TypedDict):
    """Who or what leaves in flight: a person by the seat, an item by place and what."""

    seat: NotRequired[str]
    place: NotRequired[str]
    what: NotRequired[str]
    weight: NotRequired[Quantity]


class Shifting(TypedDict):
    """Who or what moves in flight, and to which seat or place."""

    to: str
    seat: NotRequired[str]
    place: NotRequired[str]
    what: NotRequired[str]


class ComingAboard(TypedDict):
    """Who or what comes aboard in flight: a person with a seat, or an item with a place."""

    how: How
    name: NotRequired[str]
    seat: NotRequired[str]
    at: NotRequired[str]
    position: NotRequired[str]
    category: NotRequired[str]
    lap_infant: NotRequired[LapInfant]
    restraint: NotRequired[Quantity]
    kind: NotRequired[Literal["baggage", "cargo", "ballast", "equipment", "consumable"]]
    what: NotRequired[str]
    place: NotRequired[str]
    jettisonable: NotRequired[bool]
    footprint: NotRequired[Footprint]
    pallet: NotRequired[Spreader]
    net: NotRequired[Net]
    spreader: NotRequired[Spreader]
    weight: NotRequired[Quantity]


# `from` is no name that Python takes.
FuelTransfer = TypedDict("FuelTransfer", {"from": str, "to": str, "quantity": Quantity})


class FlightEvent(TypedDict):
    """What happens at one moment of the flight: one of leave, move, come_aboard, transfer, position."""

    after_burning: Quantity
    since: NotRequired[Literal["engine start", "take-off"]]
    leave: NotRequired[list[Departing]]
    move: NotRequired[list[Shifting]]
    come_aboard: NotRequired[list[ComingAboard]]
    transfer: NotRequired[FuelTransfer]
    position: NotRequired[dict[str, str]]


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
    certification_category: NotRequired[str]
    sequence: NotRequired[list[FlightEvent]]
    conditions: NotRequired[list[str]]
    seat_settings: NotRequired[list[SeatSetting]]
