"""Enters the invented aircraft with their loading bases and empty weights, through the API, by two people."""

import json
from dataclasses import dataclass
from datetime import UTC, datetime
from pathlib import Path
from typing import Any

from service.client import Tarebook
from service.demo.day import COMMUTER, HELICOPTER, TURBOPROP, TWIN, TWIN_UNWEIGHED

DATA = Path(__file__).parent / "data"
# All that was entered on paper before counts from here on.
TRUE_FROM = datetime(2026, 4, 1, tzinfo=UTC)


@dataclass(frozen=True, slots=True)
class Airframe:
    """One invented airframe and the documents it has; the one without an approved empty weight cannot be
    signed for.
    """

    registration: str
    serial_number: str
    documents: str
    weight_approved: bool = True


AIRFRAMES = (
    Airframe(TWIN.registration, "K62-0118", "twin"),
    Airframe(TWIN_UNWEIGHED.registration, "K62-0131", "twin", weight_approved=False),
    Airframe(TURBOPROP.registration, "F9-207", "turboprop"),
    Airframe(HELICOPTER.registration, "H4-0052", "helicopter"),
    Airframe(COMMUTER.registration, "W19-0044", "commuter"),
)


def enter_aircraft(maintenance: Tarebook, approver: Tarebook) -> None:
    """This function will enter every airframe; the same keys again have no second effect."""
    for one in AIRFRAMES:
        _enter(one, maintenance, approver)


def _enter(one: Airframe, maintenance: Tarebook, approver: Tarebook) -> None:
    basis = _document(f"{one.documents}.loading-basis.json")
    weight = _document(f"{one.documents}.empty-weight.json")
    key, registration = f"invented-{one.registration}", one.registration
    maintenance.enter_aircraft(
        {
            "registration": registration,
            "serial_number": one.serial_number,
            "type": basis["aircraft_type"],
            "category": basis["category"],
            "engines": basis["engines"],
            "passenger_seats": basis["passenger_seats_installed"],
        },
        key=f"{key}-aircraft",
    )
    entered = maintenance.enter_loading_basis(registration, basis, key=f"{key}-basis")
    approver.approve_loading_basis(
        registration,
        entered,
        "checked against the manual's sample loads",
        true_from=TRUE_FROM,
        key=f"{key}-basis-approval",
    )
    weighed = maintenance.enter_empty_weight(registration, weight, key=f"{key}-weight")
    if one.weight_approved:
        approver.approve_empty_weight(
            registration, weighed, "compared with the report", key=f"{key}-weight-approval"
        )


def _document(name: str) -> dict[str, Any]:
    document: dict[str, Any] = json.loads((DATA / name).read_text("utf-8"))
    return document
