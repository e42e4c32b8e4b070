"""Enters the invented aircraft with their loading bases and empty weights, through the API, by two people."""

import json
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from service.demo.client import Client
from service.demo.day import HELICOPTER, TURBOPROP, TWIN, TWIN_UNWEIGHED

DATA = Path(__file__).parent / "data"
# All that was entered on paper before counts from here on.
TRUE_FROM = "2026-04-01T00:00:00Z"


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
)


def enter_aircraft(maintenance: Client, approver: Client) -> None:
    """This function will enter every airframe; the same keys again have no second effect."""
    for one in AIRFRAMES:
        _enter(one, maintenance, approver)


def _enter(one: Airframe, maintenance: Client, approver: Client) -> None:
    basis = _document(f"{one.documents}.loading-basis.json")
    weight = _document(f"{one.documents}.empty-weight.json")
    key, path = f"invented-{one.registration}", f"/aircraft/{one.registration}"
    maintenance.post(
        "/aircraft",
        {
            "registration": one.registration,
            "serial_number": one.serial_number,
            "type": basis["aircraft_type"],
            "category": basis["category"],
            "engines": basis["engines"],
            "passenger_seats": basis["passenger_seats_installed"],
        },
        key=f"{key}-aircraft",
    )
    entered = maintenance.post(f"{path}/loading-bases", basis, key=f"{key}-basis").body
    approval: dict[str, Any] = {"true_from": TRUE_FROM, "reason": "checked against the manual's sample loads"}
    approver.post(f"{path}/loading-bases/{entered['id']}/approval", approval, key=f"{key}-basis-approval")
    weighed = maintenance.post(f"{path}/weighings", weight, key=f"{key}-weight").body
    if one.weight_approved:
        approver.post(
            f"{path}/empty-weights/{weighed['id']}/approval",
            {"reason": "compared with the report"},
            key=f"{key}-weight-approval",
        )


def _document(name: str) -> dict[str, Any]:
    document: dict[str, Any] = json.loads((DATA / name).read_text("utf-8"))
    return document
