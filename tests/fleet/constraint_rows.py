"""One sound row for each table of the room, as columns and values; a test breaks one thing in it."""

from dataclasses import dataclass
from datetime import UTC, datetime, timedelta
from typing import Any

from fleet.actions.issue_token import issue_token
from fleet.actions.rotate_token import rotate_token
from fleet.models import Aircraft, EmptyWeight, LoadingBasis, Person
from tests.cast import Cast, Strangers, actor

SOON = datetime(2026, 6, 1, tzinfo=UTC)
OPEN = "[2026-06-01 00:00:00+00,)"


@dataclass
class Scene:
    """Two versions entered and not approved, two approved, another aircraft, and another operator's."""

    people: Cast
    others: Strangers
    aircraft: Aircraft
    sister: Aircraft
    their_aircraft: Aircraft
    basis: LoadingBasis
    weight: EmptyWeight
    approved_basis: LoadingBasis
    approved_weight: EmptyWeight


def approval(scene: Scene, **changes: Any) -> dict[str, Any]:
    row = {
        "operator_id": scene.people.operator.code,
        "aircraft_id": scene.aircraft.id,
        "loading_basis_id": scene.basis.id,
        "empty_weight_id": None,
        "entered_by_id": scene.people.maintenance.id,
        "approved_by_id": scene.people.approver.id,
        "true_from": SOON,
        "known_from": SOON,
    }
    return row | changes


def weight_approval(scene: Scene, **changes: Any) -> dict[str, Any]:
    of_weight = {
        "loading_basis_id": None,
        "empty_weight_id": scene.weight.id,
        "true_from": scene.weight.true_from,
    }
    return approval(scene, **(of_weight | changes))


def standing(scene: Scene, **changes: Any) -> dict[str, Any]:
    row = {
        "operator_id": scene.people.operator.code,
        "aircraft_id": scene.aircraft.id,
        "kind": "empty weight",
        "fit": "wheels",
        "version": scene.approved_weight.id,
        "valid": "[2020-01-01 00:00:00+00,2020-02-01 00:00:00+00)",
        "known": OPEN,
    }
    return row | changes


def basis(scene: Scene, **changes: Any) -> dict[str, Any]:
    row = {
        "operator_id": scene.people.operator.code,
        "aircraft_id": scene.aircraft.id,
        "revision": 77,
        "document": "{}",
        "digest": "0" * 64,
        "entered_by_id": scene.people.maintenance.id,
        "entered_at": SOON,
    }
    return row | changes


def weight(scene: Scene, **changes: Any) -> dict[str, Any]:
    row = basis(scene) | {"fit": "wheels", "true_from": SOON, "salt": b"0" * 32}
    del row["revision"]
    return row | changes


def aircraft(scene: Scene, **changes: Any) -> dict[str, Any]:
    row = {
        "operator_id": scene.people.operator.code,
        "registration": "Q9-NEW",
        "serial_number": "9-0077",
        "type": "Fenlark 9",
        "category": "aeroplane",
        "engines": 2,
        "passenger_seats": 4,
    }
    return row | changes


def person(scene: Scene, **changes: Any) -> dict[str, Any]:
    row = {
        "operator_id": scene.people.operator.code,
        "login": "new.person",
        "name": "New",
        "password": "!",
        "salt": b"0" * 32,
        "is_active": True,
        "session_series": 0,
        "mail": "",
    }
    return row | changes


def duty(scene: Scene, **changes: Any) -> dict[str, Any]:
    row = {
        "operator_id": scene.people.operator.code,
        "person_id": scene.people.pilot.id,
        "role": "auditor",
        "granted": True,
        "since": SOON,
    }
    return row | changes


def token(scene: Scene, **changes: Any) -> dict[str, Any]:
    row = {
        "operator_id": scene.people.operator.code,
        "person_id": scene.people.pilot.id,
        "label": "test",
        "digest": "0" * 64,
        "scopes": ["read"],
        "registrations": [],
        "integration": False,
        "issued_at": SOON,
        "expires_at": datetime(2026, 7, 1, tzinfo=UTC),
    }
    return row | changes


def rotation(scene: Scene, whose: Person | None = None, **changes: Any) -> dict[str, Any]:
    """The second rotation of a token that has one."""
    person, day, may = whose or scene.people.pilot, timedelta(days=1), frozenset({"read"})
    issued = issue_token(actor(person), person, label="x", scopes=may, grantable=may, valid_for=day)
    rotate_token(actor(person), issued.token.pk, overlap=timedelta(0), valid_for=day)
    row = {
        "operator_id": scene.people.operator.code,
        "token_id": issued.token.pk,
        "number": 2,
        "digest": "1" * 64,
        "issued_at": SOON,
        "expires_at": datetime(2026, 7, 1, tzinfo=UTC),
        "previous_ends_at": SOON,
    }
    return row | changes


def settings(scene: Scene, **changes: Any) -> dict[str, Any]:
    row = {
        "operator_id": scene.people.operator.code,
        "number": 2,
        "true_from": SOON,
        "known_from": SOON,
        "entered_by_id": scene.people.manager.id,
        "reason": "test",
        "last_minute_weight": "30",
        "last_minute_unit": "kg",
        "last_minute_persons": 1,
        "weighing_threshold_percent": "0.5",
        "operations_mail": [],
        "salt": b"0" * 32,
        "prepare_and_accept_by_one": True,
        "estimates_may_be_signed": False,
        "rule_set": "US",
        "procedure": "manual",
        "weight_method": "weighed",
    }
    return row | changes


# What breaks each constraint: its name, the table, the row.
