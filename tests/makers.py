"""Makes what tests need through the real actions: documents, an aircraft, approved versions of it."""

import copy
from datetime import UTC, datetime
from typing import Any

from fleet.actions.approve_empty_weight import approve_empty_weight
from fleet.actions.approve_loading_basis import approve_loading_basis
from fleet.actions.enter_aircraft import enter_aircraft
from fleet.actions.enter_empty_weight import enter_empty_weight
from fleet.actions.enter_loading_basis import enter_loading_basis
from fleet.entering import NewAircraft
from fleet.models import Aircraft, EmptyWeight, LoadingBasis
from tests.cast import Cast, actor

LONG_AGO = datetime(2026, 1, 1, tzinfo=UTC)


def q(value: str, unit: str) -> dict[str, Any]:
    """This function will write a quantity."""
    return {"value": value, "unit": unit}


def page(number: str) -> dict[str, str]:
    """This function will write a source: a page of the basis's own document."""
    return {"page": number}


def limit(value: str, unit: str, on: str) -> dict[str, Any]:
    """This function will write a limit with its page."""
    return {**q(value, unit), "source": page(on)}


def _seat(name: str, serves: str, arm: str, lateral: str) -> dict[str, Any]:
    return {
        "id": name,
        "name": name.lower().replace("-", " "),
        "for": serves,
        "arm": q(arm, "in"),
        "lateral_arm": q(lateral, "in"),
        "maximum": limit("300", "lb", "6-9"),
        "source": page("6-9"),
    }


def _place(name: str, arm: str, maximum: str) -> dict[str, Any]:
    return {
        "id": name,
        "name": name.lower().replace("-", " "),
        "arm": q(arm, "in"),
        "lateral_arm": q("0", "in"),
        "maximum": limit(maximum, "lb", "6-10"),
        "source": page("6-10"),
    }


def _tank(name: str, lateral: str) -> dict[str, Any]:
    return {
        "id": name,
        "name": f"{name.lower()} tank",
        "capacity": q("120", "US gal"),
        "lateral_arm": q(lateral, "in"),
        "table": {
            "against": "volume",
            "against_unit": "US gal",
            "gives": "arm",
            "gives_unit": "in",
            "straight_in": "arm",
            "points": [["0", "132.0"], ["60", "133.0"], ["120", "133.5"]],
        },
        "source": page("6-14"),
    }


def basis_document(**changes: Any) -> dict[str, Any]:
    """This function will write the loading basis of an invented light twin, lb and in, with fields changed.

    Wheels and skis, four seats in the cabin, two holds, two tanks, a sloping envelope, no lateral limits.
    """
    document = {
        "schema": "tarebook.loading-basis/1",
        "aircraft_type": "Fenlark 9",
        "category": "aeroplane",
        "engines": 2,
        "passenger_seats_installed": 4,
        "document": {"title": "Fenlark 9 flight manual", "number": "FL9-FM", "revision": "C"},
        "units": {"weight": "lb", "length": "in", "volume": "US gal"},
        "datum": {"name": "forward bulkhead", "source": page("6-2")},
        "lateral_positive": "right",
        "chord": {"leading_edge": q("110.0", "in"), "length": q("62.0", "in"), "source": page("6-3")},
        "fits": ["wheels", "skis"],
        "seats": [
            _seat("COCKPIT-L", "crew", "100.0", "-11.0"),
            _seat("COCKPIT-R", "either", "100.0", "11.0"),
            _seat("ROW1-L", "passenger", "138.0", "-12.0"),
            _seat("ROW1-R", "passenger", "138.0", "12.0"),
            _seat("ROW2-L", "passenger", "170.0", "-12.0"),
            _seat("ROW2-R", "passenger", "170.0", "12.0"),
        ],
        "places": [_place("NOSE-HOLD", "60.0", "200"), _place("AFT-HOLD", "205.0", "250")],
        "zones": [
            {
                "id": "AFT-CABIN",
                "name": "row 2 and aft hold together",
                "members": ["ROW2-L", "ROW2-R", "AFT-HOLD"],
                "maximum": limit("700", "lb", "6-10"),
            }
        ],
        "tanks": [_tank("LEFT", "-80.0"), _tank("RIGHT", "80.0")],
        "burn_order": [{"tanks": ["LEFT", "RIGHT"]}],
        "burn_order_source": page("2-11"),
        "limits": {
            "ramp": limit("8800", "lb", "2-4"),
            "take_off": limit("8750", "lb", "2-4"),
            "zero_fuel": limit("7900", "lb", "2-4"),
            "landing": limit("8600", "lb", "2-4"),
            "minimum_flying": {"none": True, "source": page("2-4")},
        },
        "envelopes": [
            {
                "id": "normal",
                "axis": "longitudinal",
                "phases": ["ramp", "take-off", "landing", "zero-fuel"],
                "plane": "arm",
                "points": [
                    ["5000", "116.0"],
                    ["6800", "116.0"],
                    ["8800", "122.0"],
                    ["8800", "134.0"],
                    ["5000", "134.0"],
                ],
                "weight_unit": "lb",
                "unit": "in",
                "source": page("2-5"),
            }
        ],
        "lateral_limits": {"none": True, "source": page("2-5")},
        "configurations": [
            _configuration("four-seat", "wheels"),
            _configuration("four-seat-skis", "skis"),
        ],
        "sample_loads": [
            {
                "name": "manual sample 1",
                "weights": [
                    {"what": "empty aircraft", "weight": q("5200", "lb"), "moment": q("640000", "lb in")},
                    {"what": "pilot", "weight": q("180", "lb"), "arm": q("100.0", "in")},
                ],
                "total_weight": q("5380", "lb"),
                "total_moment": q("658000", "lb in"),
                "tolerance_moment": q("50", "lb in"),
                "within": True,
                "phase": "take-off",
                "source": page("6-20"),
            }
        ],
    }
    return copy.deepcopy(document | changes)


def _configuration(name: str, fit: str) -> dict[str, Any]:
    return {
        "id": name,
        "name": name.replace("-", " "),
        "seats": ["COCKPIT-L", "COCKPIT-R", "ROW1-L", "ROW1-R", "ROW2-L", "ROW2-R"],
        "places": ["NOSE-HOLD", "AFT-HOLD"],
        "minimum_crew": 1,
        "fit": fit,
        "equipment": [],
        "operating_items": [
            {
                "what": "survival kit",
                "weight": q("22", "lb"),
                "arm": q("190.0", "in"),
                "lateral_arm": q("0", "in"),
            }
        ],
        "source": page("6-18"),
    }


def empty_weight_document(**changes: Any) -> dict[str, Any]:
    """This function will write an empty weight of the twin on wheels, with fields changed."""
    document = {
        "schema": "tarebook.empty-weight/1",
        "how": "weighing",
        "fit": "wheels",
        "weight": q("5214", "lb"),
        "moment": q("641000", "lb in"),
        "lateral_moment": q("-900", "lb in"),
        "datum": "forward bulkhead",
        "includes": {"oil": "full", "unusable_fuel": True},
        "date": "2025-12-30",
        "report": "W-2025-31",
        "true_from": "2026-01-01T00:00:00Z",
        "signed_by": "N. Tarrow",
    }
    return copy.deepcopy(document | changes)


def make_aircraft(people: Cast, registration: str = "Q9-KTB", **changes: Any) -> Aircraft:
    """This function will enter the twin."""
    fields: dict[str, Any] = {
        "registration": registration,
        "type": "Fenlark 9",
        "serial_number": f"9-{registration}",
        "category": "aeroplane",
        "engines": 2,
        "passenger_seats": 4,
    }
    return enter_aircraft(actor(people.maintenance), NewAircraft(**(fields | changes)))


def make_basis(
    people: Cast,
    aircraft: Aircraft,
    document: dict[str, Any] | None = None,
    *,
    true_from: datetime | None = LONG_AGO,
) -> LoadingBasis:
    """This function will enter a loading basis and have it approved by a second person."""
    basis = enter_loading_basis(actor(people.maintenance), aircraft, document or basis_document())
    approve_loading_basis(actor(people.approver), aircraft, basis, true_from=true_from)
    return basis


def make_empty_weight(
    people: Cast, aircraft: Aircraft, document: dict[str, Any] | None = None
) -> EmptyWeight:
    """This function will enter an empty weight and have it approved by a second person."""
    weight = enter_empty_weight(actor(people.maintenance), aircraft, document or empty_weight_document())
    approve_empty_weight(actor(people.approver), aircraft, weight)
    return weight


def ready_aircraft(
    people: Cast, registration: str = "Q9-KTB", basis: dict[str, Any] | None = None
) -> Aircraft:
    """This function will enter the twin with an approved loading basis and empty weight on wheels."""
    aircraft = make_aircraft(people, registration)
    make_basis(people, aircraft, basis)
    make_empty_weight(people, aircraft)
    return aircraft
