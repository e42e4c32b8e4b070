"""Writes what an operator lays down as the API answers it."""

import json
from collections.abc import Callable
from datetime import datetime
from typing import Any
from uuid import UUID

from django.http import HttpResponse
from rest_framework.request import Request

from fleet.api.answers import shown
from fleet.api.asking import aircraft_asked, clocks_asked
from fleet.models import Aircraft, Provision
from fleet.queries.provisions import provision_history, provision_of, provisions_at
from records.api.asking import document_of, operator_of, parameters_of
from records.api.once import Answer, once
from records.strict_json import JSON


def provisions_answer(request: Request, kind: str, aircraft: Aircraft | None = None) -> HttpResponse:
    """This function will answer with every version of a kind, and which hold on the clocks asked for."""
    operator = operator_of(request)
    at, known = clocks_asked(request)
    held = provisions_at(operator, aircraft, at, known).all()
    return shown(
        {
            "at": at,
            "as_known_at": known,
            "in_force": [one.id for one in held if one.kind == kind],
            "versions": [
                provision_line(one, aircraft) for one in provision_history(operator, kind, aircraft)
            ],
        }
    )


def aircraft_provision_shown(request: Request, kind: str, registration: str, version: UUID) -> HttpResponse:
    """This function will answer with one version of a kind, of one aircraft."""
    parameters_of(request, allowed=())
    aircraft = aircraft_asked(request, registration)
    return shown(provision_line(provision_of(operator_of(request), kind, version, aircraft), aircraft))


def aircraft_provision_entered(
    request: Request, kind: str, registration: str, enter: Callable[[Aircraft, JSON], Provision]
) -> HttpResponse:
    """This function will enter the document sent, once, as a version of a kind of one aircraft."""
    document = document_of(request)

    def work() -> Answer:
        aircraft = aircraft_asked(request, registration)
        place = f"/api/v1/aircraft/{aircraft.registration}/{kind}s"
        return created(enter(aircraft, document), place, aircraft)

    return once(request, work)


def aircraft_provision_changed(
    request: Request,
    kind: str,
    registration: str,
    version: UUID,
    change: Callable[[Aircraft, Provision, JSON], object],
) -> HttpResponse:
    """This function will change one version of a kind as the document sent says, once, and answer with it."""
    document = document_of(request)

    def work() -> Answer:
        aircraft = aircraft_asked(request, registration)
        found = provision_of(operator_of(request), kind, version, aircraft)
        change(aircraft, found, document)
        return now_as_it_is(found, aircraft)

    return once(request, work)


def provision_line(one: Provision, aircraft: Aircraft | None = None) -> dict[str, Any]:
    """This function will write one version with its document."""
    approval, ending = getattr(one, "approval", None), getattr(one, "ending", None)
    return {
        "id": one.id,
        "kind": one.kind,
        "aircraft": aircraft.registration if aircraft else None,
        "number": one.number,
        "true_from": one.true_from,
        "true_until": one.true_until,
        "digest": one.digest,
        "entered_by": f"person:{one.entered_by_id}",
        "entered_at": one.entered_at,
        "approval": _approval(f"person:{approval.approved_by_id}", approval.known_from) if approval else None,
        "ending": {
            "ended_by": f"person:{ending.ended_by_id}",
            "ended_at": ending.known_from,
            "true_from": ending.true_from,
            "reason": ending.reason,
        }
        if ending
        else None,
        "document": json.loads(one.document),
    }


def _approval(by: str, at: datetime) -> dict[str, Any]:
    return {"approved_by": by, "approved_at": at}


def created(one: Provision, place: str, aircraft: Aircraft | None = None) -> Answer:
    """This function will answer that a version was entered; `place` is the address of its list."""
    return 201, {"Location": f"{place}/{one.id}"}, provision_line(one, aircraft)


def now_as_it_is(one: Provision, aircraft: Aircraft | None = None) -> Answer:
    """This function will answer with a version as it stands after what was just written about it."""
    again = provision_of(one.operator_id, one.kind, one.id, aircraft)
    return 201, {}, provision_line(again, aircraft)
