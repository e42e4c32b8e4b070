"""One sound row for each table of what an operator lays down, and what breaks each of its constraints."""

import uuid
from typing import Any

from fleet.actions.approve_permit import approve_permit
from fleet.actions.enter_permit import enter_permit
from fleet.actions.enter_restriction import enter_restriction
from fleet.actions.lift_restriction import lift_restriction
from fleet.models import Provision
from tests.cast import actor
from tests.fleet.constraint_rows import SOON, Scene
from tests.pure.loads.papers import lb, permit_document, restriction_document

LOWER = {"effect": "limit", "limit": "take_off", "weight": lb("8000")}


def entered_permit(scene: Scene) -> Provision:
    return enter_permit(actor(scene.people.maintenance), scene.aircraft, permit_document(LOWER))


def entered_restriction(scene: Scene) -> Provision:
    return enter_restriction(actor(scene.people.maintenance), scene.aircraft, restriction_document(LOWER))


def provision(scene: Scene, **changes: Any) -> dict[str, Any]:
    row = {
        "operator_id": scene.people.operator.code,
        "aircraft_id": scene.aircraft.id,
        "kind": "restriction",
        "number": 77,
        "document": "{}",
        "digest": "0" * 64,
        "true_from": SOON,
        "true_until": None,
        "entered_by_id": scene.people.maintenance.id,
        "entered_at": SOON,
    }
    return row | changes


def provision_approval(scene: Scene, **changes: Any) -> dict[str, Any]:
    row = {
        "operator_id": scene.people.operator.code,
        "provision_id": changes.pop("of", None) or entered_permit(scene).id,
        "kind": "permit",
        "entered_by_id": scene.people.maintenance.id,
        "approved_by_id": scene.people.approver.id,
        "known_from": SOON,
    }
    return row | changes


def provision_end(scene: Scene, **changes: Any) -> dict[str, Any]:
    row = {
        "operator_id": scene.people.operator.code,
        "provision_id": changes.pop("of", None) or entered_restriction(scene).id,
        "kind": "restriction",
        "entered_by_id": scene.people.maintenance.id,
        "ended_by_id": scene.people.approver.id,
        "true_from": SOON,
        "known_from": SOON,
        "reason": "repaired",
    }
    return row | changes


def due_notice(scene: Scene, **changes: Any) -> dict[str, Any]:
    row = {
        "operator_id": scene.people.operator.code,
        "aircraft_id": scene.aircraft.id,
        "about": "weighing wheels",
        "what": "weighing on wheels",
        "lapses": SOON,
        "threshold_days": 7,
        "mail_addresses": 0,
        "told_at": SOON,
        "act": uuid.UUID(int=1),
    }
    return row | changes


def _numbered(scene: Scene) -> dict[str, Any]:
    return provision(scene, number=entered_restriction(scene).number)


def _approved(scene: Scene) -> dict[str, Any]:
    permit = entered_permit(scene)
    approve_permit(actor(scene.people.approver), scene.aircraft, permit)
    return provision_approval(scene, of=permit.id)


def _lifted(scene: Scene) -> dict[str, Any]:
    restriction = entered_restriction(scene)
    lift_restriction(actor(scene.people.approver), scene.aircraft, restriction, reason="repaired")
    return provision_end(scene, of=restriction.id)


PROVISION_BREAKS: dict[str, tuple[str, Any]] = {
    "provision_number_of_an_aircraft_is_taken_once": ("provision", _numbered),
    "provision_is_the_operators_or_one_aircrafts": (
        "provision",
        lambda s: provision(s, kind="rules"),
    ),
    "provision_permit_lapses": ("provision", lambda s: provision(s, kind="permit")),
    "provision_digest_is_sha256": ("provision", lambda s: provision(s, digest="0" * 63)),
    "provision_counts_from_one": ("provision", lambda s: provision(s, number=0)),
    "provision_is_of_the_aircrafts_operator": (
        "provision",
        lambda s: provision(s, aircraft_id=s.their_aircraft.id),
    ),
    "provision_is_entered_within_the_operator": (
        "provision",
        lambda s: provision(s, entered_by_id=s.others.manager.id),
    ),
    "provision_approval_is_by_a_second_person": (
        "provisionapproval",
        lambda s: provision_approval(s, approved_by_id=s.people.maintenance.id),
    ),
    "provision_approval_is_of_what_needs_one": (
        "provisionapproval",
        lambda s: provision_approval(s, of=entered_restriction(s).id, kind="restriction"),
    ),
    "provision_approval_names_the_author": (
        "provisionapproval",
        lambda s: provision_approval(s, entered_by_id=s.people.pilot.id),
    ),
    "provision_approval_names_the_kind": (
        "provisionapproval",
        lambda s: provision_approval(s, kind="rules"),
    ),
    "provision_approval_is_within_the_operator": (
        "provisionapproval",
        lambda s: provision_approval(s, approved_by_id=s.others.manager.id),
    ),
    "fleet_provisionapproval_provision_id_key": ("provisionapproval", _approved),
    "provision_end_of_a_restriction_is_by_a_second_person": (
        "provisionend",
        lambda s: provision_end(s, ended_by_id=s.people.maintenance.id),
    ),
    "provision_end_says_why": ("provisionend", lambda s: provision_end(s, reason="")),
    "provision_end_names_the_author": (
        "provisionend",
        lambda s: provision_end(s, entered_by_id=s.people.pilot.id),
    ),
    "provision_end_names_the_kind": ("provisionend", lambda s: provision_end(s, kind="permit")),
    "provision_end_is_within_the_operator": (
        "provisionend",
        lambda s: provision_end(s, ended_by_id=s.others.manager.id),
    ),
    "fleet_provisionend_provision_id_key": ("provisionend", _lifted),
    "due_notice_is_of_the_aircrafts_operator": (
        "duenotice",
        lambda s: due_notice(s, aircraft_id=s.their_aircraft.id),
    ),
}
# Targets of ties; and ties whose other operator's row the witness refuses before they are asked.
PROVISION_TARGETS = {
    "provision_is_of_one_operator",
    "provision_has_one_author",
    "provision_is_of_one_kind",
}
# Broken by two rows at a time: `tests/fleet/test_provision_ties.py`.
PROVISION_PAIRS = {
    "due_notice_is_given_once",
    "provision_approval_is_of_the_operator",
    "provision_end_is_of_the_operator",
}
