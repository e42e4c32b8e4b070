"""Which features of a loading basis the bulk sums know; a basis that holds any other is not theirs.

A field that a later program adds to a basis counts as unknown from the day it holds anything: only what is
named here is let through.
"""

from collections.abc import Iterable
from dataclasses import MISSING, fields
from typing import Any, Final

from fleet.basis import Basis, Configuration

# Fields of the basis and of its parts that are read here, or that decide nothing.
_BASIS: Final = frozenset(
    [
        "aircraft_type",
        "category",
        "engines",
        "passenger_seats_installed",
        "weight_unit",
        "length_unit",
        "volume_unit",
        "datum",
        "chord",
        "fits",
        "seats",
        "places",
        "zones",
        "tanks",
        "burn_order",
        "taxi_order",
        "limits",
        "envelopes",
        "lateral_limits_entered",
        "configurations",
        "sample_loads",
        "presentation",
        "modifications",
        "other_datums",
    ]
)
_SEAT: Final = frozenset(
    [
        "id",
        "name",
        "serves",
        "arm",
        "lateral_arm",
        "maximum",
        "source",
        "row",
        "exit_row",
        "infant_restraint",
        "attendant",
    ]
)
_PLACE: Final = frozenset(["id", "name", "arm", "lateral_arm", "maximum", "source"])
_ZONE: Final = frozenset(["id", "name", "members", "maximum"])
_TANK: Final = frozenset(["id", "name", "capacity", "lateral_arm", "table", "source"])
_ENVELOPE: Final = frozenset(["id", "axis", "phases", "plane", "points", "source", "shape"])
_CONFIGURATION: Final = frozenset(
    [
        "id",
        "name",
        "seats",
        "places",
        "minimum_crew",
        "fit",
        "equipment",
        "operating_items",
        "limits",
        "modifications",
    ]
)


def asks_for_more(basis: Basis, configuration: Configuration) -> bool:
    """Return whether a basis in a configuration has anything the bulk sums do not know."""
    parts: Iterable[tuple[Iterable[Any], frozenset[str]]] = (
        ((basis,), _BASIS),
        (basis.seats, _SEAT),
        (basis.places, _PLACE),
        (basis.zones, _ZONE),
        (basis.tanks, _TANK),
        (basis.envelopes, _ENVELOPE),
        ((configuration,), _CONFIGURATION),
    )
    marked = any(seat.exit_row or seat.infant_restraint is False for seat in basis.seats)
    if configuration.modifications or marked:
        return True
    return any(_holds_more(one, names) for ones, names in parts for one in ones)


def _holds_more(one: Any, names: frozenset[str]) -> bool:
    """Return whether a field that is not named holds anything but its default."""
    for field in fields(one):
        if field.name in names:
            continue
        default = field.default_factory() if field.default_factory is not MISSING else field.default
        if default is MISSING or getattr(one, field.name) != default:
            return True
    return False
