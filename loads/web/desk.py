"""The table of inputs on which a load is declared, as plain values for the page; no Django here."""

from collections.abc import Mapping, Sequence
from typing import Any

from fleet.basis import Basis, Configuration
from loads.web.desk_fitted import condition_inputs, floor_inputs, restraints_asked, setting_inputs
from loads.web.desk_rules import category_inputs, kind_input
from loads.web.form import ITEM_PARTS, LIMIT_PARTS, MOST_ROWS, SEAT_PARTS
from loads.web.inputs import Choices, Field, Maker

WEIGHT_UNITS: Choices = (("lb", "lb"), ("kg", "kg"))
VOLUME_UNITS: Choices = (("US gal", "US gal"), ("imp gal", "imp gal"), ("l", "l"))
DENSITY_UNITS: Choices = (("lb/US gal", "lb/US gal"), ("lb/imp gal", "lb/imp gal"), ("kg/l", "kg/l"))
HOW: Choices = (
    ("", "choose"),
    ("weighed", "weighed"),
    ("declared", "declared"),
    ("standard", "standard"),
    ("estimated", "estimated"),
)
INFANT_HOW: Choices = tuple(choice for choice in HOW if choice[0] != "standard")
POSITIONS: Choices = (
    ("", "passenger"),
    ("pilot in command", "pilot in command"),
    ("second pilot", "second pilot"),
    ("cabin attendant", "cabin attendant"),
    ("other crew", "other crew"),
)
CATEGORIES: Choices = (("", "none"), ("adult", "adult"), ("child", "child"), ("infant", "infant"))
KINDS: Choices = (
    ("", "choose"),
    ("baggage", "baggage"),
    ("cargo", "cargo"),
    ("ballast", "ballast"),
    ("equipment", "equipment"),
    ("consumable", "consumable"),
)
OPERATIONS: Choices = (
    ("", "choose"),
    ("passenger-charter", "passenger charter"),
    ("cargo-charter", "cargo charter"),
    ("air-taxi", "air taxi"),
    ("aerial-work", "aerial work"),
    ("positioning", "positioning"),
    ("training", "training"),
)
LIMITS_AT: Choices = (("take-off", "take-off"), ("landing", "landing"))
EMPTY_ITEM_ROWS = 4
FEWEST_ITEM_ROWS = 6


def _own_unit_first(choices: Choices, unit: str) -> Choices:
    return tuple(sorted(choices, key=lambda choice: choice[0] != unit))


def _flight(make: Maker, zone: str) -> list[Field]:
    return [
        make.text("reference", "Flight reference", maximum=40),
        make.figure("leg", "Leg", hint="1 if left empty"),
        make.text("date", "Departure date", kind="date"),
        make.text("time", "Departure time", kind="time", hint=zone),
        make.text("origin", "From", maximum=12),
        make.text("destination", "To", maximum=12),
        make.choice("operation", "Operation", OPERATIONS),
    ]


def _seat(
    make: Maker, seat_id: str, serves: str, weights: Choices, *, restraints: bool
) -> list[Field | None]:
    """This function will return the inputs of one seat; None where the seat has no use for one and none was
    typed.
    """
    prefix = f"seat:{seat_id}"
    typed = {part for part in SEAT_PARTS if make.typed.get(f"{prefix}:{part}")}
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


def _item(make: Maker, row: int, places: Choices, weights: Choices) -> list[Field]:
    prefix, number = f"item:{row}", row + 1
    return [
        make.choice(f"{prefix}:place", f"Place of item {number}", places),
        make.choice(f"{prefix}:kind", f"Kind of item {number}", KINDS),
        make.text(f"{prefix}:what", f"What item {number} is"),
        make.figure(f"{prefix}:weight", f"Weight of item {number}"),
        make.choice(f"{prefix}:unit", f"Unit of item {number}", weights),
        make.choice(f"{prefix}:how", f"How the weight of item {number} was got", HOW),
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
    make = Maker(typed, faults)
    weights = _own_unit_first(WEIGHT_UNITS, basis.weight_unit.value)
    volumes = _own_unit_first(VOLUME_UNITS, basis.volume_unit.value)
    density_unit = f"{basis.weight_unit.value}/{basis.volume_unit.value}"
    densities = _own_unit_first(DENSITY_UNITS, density_unit)
    seats = [seat for seat in basis.seats if seat.id in configuration.seats]
    places: Choices = (
        ("", "choose"),
        *((place.id, place.name) for place in basis.places if place.id in configuration.places),
    )
    item_rows = min(MOST_ROWS, max(FEWEST_ITEM_ROWS, _rows_typed(typed, "item") + EMPTY_ITEM_ROWS))
    restraints = restraints_asked(make, basis)
    limit_rows = min(MOST_ROWS, max(1, _rows_typed(typed, "limit")) + 1)
    return {
        "type": basis.aircraft_type,
        "configuration_name": configuration.name,
        "flight": [*_flight(make, zone), *category_inputs(make, basis)],
        "seats": [
            {
                "id": seat.id,
                "name": seat.name,
                "fields": _seat(make, seat.id, seat.serves, weights, restraints=restraints),
            }
            for seat in seats
        ],
        "persons": make.figure(
            "persons_on_board", "Persons on board", hint="counted at the aircraft, infants too"
        ),
        "restraints": restraints,
        "items": [_item(make, row, places, weights) for row in range(item_rows)],
        "floor": floor_inputs(make, basis, configuration, item_rows),
        "fitted": [*condition_inputs(make, basis), *setting_inputs(make, basis)],
        "tanks": [_tank(make, basis, number, volumes + weights) for number in range(len(basis.tanks))],
        "fuel": _fuel(make, weights, volumes, densities),
        "limits": [_limit(make, row, weights) for row in range(limit_rows)],
    }


def _tank(make: Maker, basis: Basis, number: int, units: Choices) -> dict[str, Any]:
    tank = basis.tanks[number]
    prefix = f"tank:{tank.id}"
    return {
        "id": tank.id,
        "name": tank.name,
        "holds": f"{float(tank.capacity):g} {basis.volume_unit.value}",
        "fields": [
            make.figure(f"{prefix}:quantity", f"Fuel in {tank.name}"),
            make.figure(f"{prefix}:not_usable", f"Trapped fuel in {tank.name}"),
            make.choice(f"{prefix}:unit", f"Unit of {tank.name}", units),
        ],
    }


def wrong_inputs(named: Sequence[tuple[str, str]]) -> dict[str, str]:
    """This function will return one sentence an input, joining what was found wrong with it."""
    found: dict[str, str] = {}
    for name, detail in named:
        if name:
            found[name] = f"{found[name]} {detail}" if name in found else detail
    return found
