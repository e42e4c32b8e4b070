"""Writes what an operator lays down as the API answers it."""

import json
from datetime import datetime
from typing import Any

from django.http import HttpResponse
from rest_framework.request import Request

from fleet.api.answers import shown
from fleet.api.asking import clocks_asked
from fleet.models import Aircraft, Provision
from fleet.queries.provisions import provision_history, provision_of, provisions_at
from records.api.asking import operator_of
from records.api.once import Answer


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
