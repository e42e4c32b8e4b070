"""A reference load as the documents an operator would send: loading basis, empty weight and load.

So the self-check goes through all that a load goes through: reading, conversion of units, sums, limits.
"""

from collections.abc import Mapping
from typing import Any

Json = dict[str, Any]
_PAGE = {"page": "1"}
_DATUM = "datum of the reference"


def basis_document(given: Mapping[str, Any]) -> Json:
    """Return the loading basis of a reference load: lb, in and US gal, one seat, a place for each line."""
    points = [[weight, arm] for weight, arm in given["envelope"]]
    chord = given.get("chord")
    return {
        "schema": "tarebook.loading-basis/1",
        "aircraft_type": "reference",
        "category": "aeroplane",
        "engines": 1,
        "passenger_seats_installed": 0,
        "document": {"title": "reference load", "number": str(given["id"]), "revision": "1"},
        "units": {"weight": "lb", "length": "in", "volume": "US gal"},
        "datum": {"name": _DATUM, "source": _PAGE},
        "lateral_positive": "right",
        "chord": {"none": True, "source": _PAGE} if chord is None else _chord(chord),
        "fits": ["wheels"],
        "seats": [
            _spot("PILOT", given["pilot"]["arm"]) | {"for": "crew", "maximum": _none()},
        ],
        "places": [
            _spot(f"LINE-{number}", line["arm"]) | {"maximum": _none()}
            for number, line in enumerate(given["lines"], 1)
        ],
        "zones": [],
        "tanks": [_tank(given["tank"])],
        "burn_order": [{"tanks": ["TANK"]}],
        "burn_order_source": _PAGE,
        "limits": _limits(given["most"]),
        "envelopes": [
            {
                "id": "all",
                "axis": "longitudinal",
                "phases": ["ramp", "take-off", "landing"],
                "plane": "arm",
                "points": points,
                "weight_unit": "lb",
                "unit": "in",
                "source": _PAGE,
            }
        ],
        "lateral_limits": _none(),
        "configurations": [_configuration(len(given["lines"]))],
        "sample_loads": [_sample(given)],
    }


def empty_weight_document(given: Mapping[str, Any]) -> Json:
    """Return the empty weight of a reference load, with its moment as recorded."""
    return {
        "schema": "tarebook.empty-weight/1",
        "how": "opening entry",
        "fit": "wheels",
        "weight": _quantity(given["empty"]["weight"]),
        "moment": _quantity(given["empty"]["moment"]),
        "lateral_moment": _quantity(["0", "lb in"]),
        "datum": _DATUM,
        "includes": {"oil": "full", "unusable_fuel": True},
        "date": "2026-01-01",
        "report": "reference",
        "true_from": "2026-01-01T00:00:00Z",
        "signed_by": "reference",
    }


def load_document(given: Mapping[str, Any]) -> Json:
    """Return the load itself: one pilot, the lines as cargo, one tank."""
    return {
        "schema": "tarebook.load/1",
        "aircraft": "REFERENCE",
        "configuration": "one",
        "flight": {
            "reference": str(given["id"]),
            "leg": 1,
            "departure": "2026-06-01T12:00:00Z",
            "origin": "reference",
            "destination": "reference",
            "operation": "reference",
        },
        "persons_on_board": 1,
        "crew": [
            {
                "name": "reference",
                "position": "pilot in command",
                "seat": "PILOT",
                "weight": _quantity(given["pilot"]["weight"]),
                "how": "weighed",
            }
        ],
        "passengers": [],
        "items": [_item(number, line) for number, line in enumerate(given["lines"], 1)],
        "fuel": {
            "density": {**_quantity(given["density"]), "source": "reference"},
            "at_engine_start": {"TANK": _quantity(given["tank"]["holds"])},
            "taxi": _quantity(["0", "lb"]),
            "trip": _quantity(given["trip"]),
            "minimum_at_landing": _quantity(given["least"]),
        },
    }


def _quantity(pair: list[str]) -> dict[str, str]:
    value, unit = pair
    return {"value": value, "unit": unit}


def _none() -> Json:
    return {"none": True, "source": _PAGE}


def _spot(name: str, arm: str) -> Json:
    return {
        "id": name,
        "name": name.lower(),
        "arm": _quantity([arm, "in"]),
        "lateral_arm": _quantity(["0", "in"]),
        "source": _PAGE,
    }


def _chord(chord: Mapping[str, str]) -> Json:
    return {name: _quantity([chord[name], "in"]) for name in ("leading_edge", "length")} | {"source": _PAGE}


def _tank(tank: Mapping[str, Any]) -> Json:
    return {
        "id": "TANK",
        "name": "tank",
        "capacity": _quantity([tank["points"][-1][0], "US gal"]),
        "lateral_arm": _quantity(["0", "in"]),
        "table": {
            "against": "volume",
            "against_unit": "US gal",
            "gives": "arm",
            "gives_unit": "in",
            "straight_in": "arm",
            "points": [list(point) for point in tank["points"]],
        },
        "source": _PAGE,
    }


def _limits(most: str) -> Json:
    named = ("ramp", "take_off", "zero_fuel", "landing")
    return {name: {**_quantity([most, "lb"]), "source": _PAGE} for name in named} | {
        "minimum_flying": _none()
    }


def _configuration(lines: int) -> Json:
    return {
        "id": "one",
        "name": "one",
        "seats": ["PILOT"],
        "places": [f"LINE-{number}" for number in range(1, lines + 1)],
        "minimum_crew": 1,
        "fit": "wheels",
        "equipment": [],
        "operating_items": [],
        "source": _PAGE,
    }


def _item(number: int, line: Mapping[str, Any]) -> Json:
    removed = {"removed": True} if line.get("removed") else {}
    return {
        "kind": "equipment" if removed else "cargo",
        "what": "a line of the reference",
        "place": f"LINE-{number}",
        "weight": _quantity(line["weight"]),
        "how": "weighed",
        **removed,
    }


def _sample(given: Mapping[str, Any]) -> Json:
    """A basis needs one sample load; that of a reference is its empty aircraft, and nothing rests on it."""
    weight, moment = _quantity(given["empty"]["weight"]), _quantity(given["empty"]["moment"])
    return {
        "name": "empty",
        "weights": [{"what": "empty aircraft", "weight": weight, "moment": moment}],
        "total_weight": weight,
        "total_moment": moment,
        "tolerance_moment": _quantity(["1", "lb in"]),
        "within": True,
        "phase": "take-off",
        "source": _PAGE,
    }
