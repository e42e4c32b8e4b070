"""The table of inputs on which a load is declared, as plain values for the page; no Django here."""

from collections.abc import Mapping, Sequence
from typing import Any

from fleet.basis import Basis, Configuration, Seat, Tank
from loads.web.arranging import FOCUS
from loads.web.choices import (
    CATEGORIES,
    DENSITY_UNITS,
    HOW,
    INFANT_HOW,
    KINDS,
    LIMITS_AT,
    OPERATIONS,
    POSITIONS,
    RELEASED,
    VOLUME_UNITS,
    WEIGHT_UNITS,
    own_unit_first,
)
from loads.web.desk_events import Aboard, lay_events
from loads.web.desk_fitted import condition_inputs, floor_inputs, restraints_asked, setting_inputs
from loads.web.desk_rules import category_inputs, kind_input
from loads.web.form import LIMIT_PARTS, MOST_ROWS, also_typed
from loads.web.form_lines import ITEM_PARTS, PERSON_PARTS
from loads.web.inputs import Choices, Field, Maker

EMPTY_ITEM_ROWS = 4
FEWEST_ITEM_ROWS = 6


def _flight(make: Maker, zone: str) -> list[Field]:
    return [
        make.text("reference", "Flight reference", maximum=40),
        make.figure("leg", "Leg", hint="1 if left empty"),
        make.text("date", "Departure date", kind="date"),
        make.text("time", "Departure time", kind="time", hint=zone),
        make.text("origin", "From", maximum=12),
        make.text("destination", "To", maximum=12),
        make.choice("operation", "Operation", OPERATIONS),
        *([make.text("follows", "Follows the load", hint="its number")] if make.typed.get("follows") else ()),
    ]


def _seat(
    make: Maker, seat_id: str, serves: str, weights: Choices, *, restraints: bool
) -> list[Field | None]:
    """This function will return the inputs of one seat; None where the seat has no use for one and none was
    typed.
    """
    prefix = f"seat:{seat_id}"
    typed = {part for part in PERSON_PARTS if make.typed.get(f"{prefix}:{part}")}
    crew = serves != "passenger" or bool(typed & {"position", "person"})
    passenger = serves != "crew" or bool(typed & {"infant", "infant_weight", "infant_how"})
    strapped = [
        make.figure(f"{prefix}:restraint", f"Weight of a restraint in {seat_id}") if passenger else None
    ]
    positions = POSITIONS if passenger else (("", "nobody"), *POSITIONS[1:])
    return [
        make.text(f"{prefix}:name", f"Name in {seat_id}", maximum=80),
        make.choice(f"{prefix}:position", f"Position in {seat_id}", positions) if crew else None,
        make.text(f"{prefix}:person", f"Login in {seat_id}", maximum=60) if crew else None,
        make.figure(f"{prefix}:weight", f"Weight in {seat_id}"),
        make.choice(f"{prefix}:unit", f"Unit of the weight in {seat_id}", weights),
        make.choice(f"{prefix}:how", f"How the weight in {seat_id} was got", HOW),
        make.choice(f"{prefix}:category", f"Category in {seat_id}", CATEGORIES),
        make.text(f"{prefix}:infant", f"Infant on the lap in {seat_id}", maximum=80) if passenger else None,
        make.figure(f"{prefix}:infant_weight", f"Weight of the infant in {seat_id}") if passenger else None,
        make.choice(f"{prefix}:infant_how", f"How the infant's weight in {seat_id} was got", INFANT_HOW)
        if passenger
        else None,
        *(strapped if restraints else ()),
    ]


def _item(make: Maker, row: int, places: Choices, weights: Choices, *, released: bool) -> list[Field]:
    prefix, number = f"item:{row}", row + 1
    return [
        make.choice(f"{prefix}:place", f"Place of item {number}", places),
        make.choice(f"{prefix}:kind", f"Kind of item {number}", KINDS),
        make.text(f"{prefix}:what", f"What item {number} is"),
        make.figure(f"{prefix}:weight", f"Weight of item {number}"),
        make.choice(f"{prefix}:unit", f"Unit of item {number}", weights),
        make.choice(f"{prefix}:how", f"How the weight of item {number} was got", HOW),
        *(
            [make.choice(f"{prefix}:jettisonable", f"Item {number} can be released", RELEASED)]
            if released
            else ()
        ),
    ]


def _fuel(make: Maker, weights: Choices, volumes: Choices, densities: Choices) -> list[dict[str, Any]]:
    density = [
        make.figure("density", "Density"),
        make.choice("density:unit", "Unit of the density", densities),
        make.text("density:source", "Source of the density", maximum=120),
    ]
    rows: list[dict[str, Any]] = [{"name": "Density, as delivered", "fields": density}]
    for name, title in (
        ("taxi", "Taxi fuel"),
        ("trip", "Trip fuel"),
        ("minimum_at_landing", "Minimum at landing"),
    ):
        fields = [
            make.figure(name, title),
            make.choice(f"{name}:unit", f"Unit of {title.lower()}", weights + volumes),
        ]
        rows.append({"name": title, "fields": fields})
    return rows


def _limit(make: Maker, row: int, weights: Choices) -> list[Field]:
    prefix, number = f"limit:{row}", row + 1
    return [
        make.choice(f"{prefix}:at", f"Phase of limit {number}", LIMITS_AT),
        make.figure(f"{prefix}:weight", f"Weight of limit {number}"),
        make.choice(f"{prefix}:unit", f"Unit of limit {number}", weights),
        make.text(f"{prefix}:source", f"Source of limit {number}", maximum=120),
        kind_input(make, row),
    ]


def _rows_typed(typed: Mapping[str, str], prefix: str) -> int:
    """This function will return how many rows reach to the last one typed in, of those ever offered."""
    return max(
        (
            row + 1
            for row in range(MOST_ROWS)
            if any(typed.get(f"{prefix}:{row}:{part}") for part in (*ITEM_PARTS, *LIMIT_PARTS))
        ),
        default=0,
    )


def lay_desk(
    basis: Basis,
    configuration: Configuration,
    *,
    typed: Mapping[str, str],
    faults: Mapping[str, str],
    zone: str,
) -> dict[str, Any]:
    """This function will return the inputs for one configuration of one basis, filled with what was typed.

    Units stand first in the basis's own; no weight and no figure is ever proposed.
    """
    make = Maker(typed, faults, typed.get(FOCUS, ""))
    weights = own_unit_first(WEIGHT_UNITS, basis.weight_unit.value)
    volumes = own_unit_first(VOLUME_UNITS, basis.volume_unit.value)
    density_unit = f"{basis.weight_unit.value}/{basis.volume_unit.value}"
    densities = own_unit_first(DENSITY_UNITS, density_unit)
    known = {seat.id: seat for seat in basis.seats}
    tanks = {tank.id: tank for tank in basis.tanks}
    fitted = [place for place in basis.places if place.id in configuration.places]
    places: Choices = (("", "choose"), *((place.id, place.name) for place in fitted))
    item_rows = min(MOST_ROWS, max(FEWEST_ITEM_ROWS, _rows_typed(typed, "item") + EMPTY_ITEM_ROWS))
    restraints = restraints_asked(make, basis)
    released = any(place.external for place in fitted) or any(
        value and name.endswith(":jettisonable") for name, value in typed.items()
    )
    limit_rows = min(MOST_ROWS, max(1, _rows_typed(typed, "limit")) + 1)
    asked = {"restraints": restraints, "released": released}
    return {
        "type": basis.aircraft_type,
        "configuration_name": configuration.name,
        "flight": [*_flight(make, zone), *category_inputs(make, basis)],
        "seats": [
            _seat_row(make, seat, known.get(seat), weights, restraints=restraints)
            for seat in also_typed(typed, "seat:", _in_the_order_of(basis, configuration))
        ],
        "persons": make.figure(
            "persons_on_board", "Persons on board", hint="counted at the aircraft, infants too"
        ),
        **asked,
        "items": [_item(make, row, places, weights, released=released) for row in range(item_rows)],
        "floor": floor_inputs(make, basis, configuration, item_rows),
        "fitted": [*condition_inputs(make, basis), *setting_inputs(make, basis)],
        "tanks": [
            _tank(make, tank, tanks.get(tank), basis.volume_unit.value, volumes + weights)
            for tank in also_typed(typed, "tank:", tanks)
        ],
        "fuel": _fuel(make, weights, volumes, densities),
        "limits": [_limit(make, row, weights) for row in range(limit_rows)],
        "events": lay_events(make, Aboard(basis, configuration, item_rows, weights, volumes, **asked)),
    }


def _in_the_order_of(basis: Basis, configuration: Configuration) -> list[str]:
    return [seat.id for seat in basis.seats if seat.id in configuration.seats]


def _seat_row(
    make: Maker, seat_id: str, seat: Seat | None, weights: Choices, *, restraints: bool
) -> dict[str, Any]:
    serves = "either" if seat is None else seat.serves
    return {
        "id": seat_id,
        "name": "not here" if seat is None else seat.name,
        "fields": _seat(make, seat_id, serves, weights, restraints=restraints),
    }


def _tank(make: Maker, tank_id: str, tank: Tank | None, unit: str, units: Choices) -> dict[str, Any]:
    prefix, name = f"tank:{tank_id}", tank_id if tank is None else tank.name
    return {
        "id": tank_id,
        "name": name,
        "holds": "nothing here" if tank is None else f"{float(tank.capacity):g} {unit}",
        "fields": [
            make.figure(f"{prefix}:quantity", f"Fuel in {name}"),
            make.figure(f"{prefix}:not_usable", f"Trapped fuel in {name}"),
            make.choice(f"{prefix}:unit", f"Unit of {name}", units),
        ],
    }


def wrong_inputs(named: Sequence[tuple[str, str]]) -> dict[str, str]:
    """This function will return one sentence an input, joining what was found wrong with it."""
    found: dict[str, str] = {}
    for name, detail in named:
        if name:
            found[name] = f"{found[name]} {detail}" if name in found else detail
    return found
