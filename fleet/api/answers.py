"""Writes rows as the API answers them."""

import hashlib
import json
from datetime import datetime
from typing import Any

from django.http import HttpResponse

from fleet.models import Aircraft, Approval, EmptyWeight, LoadingBasis
from fleet.queries.falling_due import falling_due
from fleet.queries.figures import basis_of
from fleet.queries.history import VersionHistory
from fleet.queries.in_force import basis_in_force, empty_weights_in_force
from records.api.asking import etag
from records.api.render import rendered


def shown(body: dict[str, Any]) -> HttpResponse:
    """This function will answer a reading request, with an entity tag made of the answer's bytes."""
    answer = rendered(body)
    tag = etag(hashlib.sha256(answer).hexdigest()[:32])
    return HttpResponse(answer, content_type="application/json", headers={"ETag": tag})


def aircraft_line(aircraft: Aircraft) -> dict[str, Any]:
    """This function will write one aircraft."""
    fields = ("id", "registration", "type", "serial_number", "category", "engines", "passenger_seats")
    return {field: getattr(aircraft, field) for field in fields}


def aircraft_answer(aircraft: Aircraft, now: datetime) -> dict[str, Any]:
    """This function will write one aircraft with what is in force at `now`."""
    return aircraft_line(aircraft) | {
        "loading_basis": basis_named(basis_in_force(aircraft, now, now)),
        "empty_weights": [weight_named(each) for each in empty_weights_in_force(aircraft, now, now)],
        "falling_due": [
            {"what": one.what, "lapses": one.lapses, "past_due": one.lapses <= now, "source": one.source}
            for one in falling_due(aircraft, now)
        ],
    }


def basis_named(basis: LoadingBasis | None) -> dict[str, Any] | None:
    """This function will name a loading basis, if there is one."""
    if basis is None:
        return None
    return {"id": basis.id, "revision": basis.revision, "digest": basis.digest}


def weight_named(weight: EmptyWeight) -> dict[str, Any]:
    """This function will name an empty weight."""
    return {"id": weight.id, "fit": weight.fit, "digest": weight.digest}


def version_line(one: VersionHistory, aircraft: Aircraft) -> dict[str, Any]:
    """This function will write one version with author, approval and windows, without its document."""
    version = one.version
    own: dict[str, Any] = (
        {"revision": version.revision}
        if isinstance(version, LoadingBasis)
        else {"fit": version.fit, "true_from": version.true_from}
    )
    return {
        "id": version.id,
        "aircraft": aircraft.registration,
        **own,
        "digest": version.digest,
        "entered_by": f"person:{version.entered_by_id}",
        "entered_at": version.entered_at,
        "approval": approval_given(getattr(version, "approval", None)),
        "windows": [
            {
                "valid_from": window.valid_from,
                "valid_until": window.valid_until,
                "known_from": window.known_from,
                "known_until": window.known_until,
            }
            for window in one.windows
        ],
    }


def version_answer(one: VersionHistory, aircraft: Aircraft) -> dict[str, Any]:
    """This function will write one version with its document."""
    return version_line(one, aircraft) | {"document": json.loads(one.version.document)}


def approval_given(approval: Approval | None) -> dict[str, Any] | None:
    """This function will write an approval, if it was given."""
    if approval is None:
        return None
    return {
        "approved_by": f"person:{approval.approved_by_id}",
        "approved_at": approval.known_from,
        "true_from": approval.true_from,
    }


def configurations_of(version: LoadingBasis | None) -> list[dict[str, Any]]:
    """This function will write the configurations of a loading basis, numbers as typed."""
    if version is None:
        return []
    fits = {each.id: each.fit for each in basis_of(version).configurations}
    return [
        {
            "id": each["id"],
            "name": each["name"],
            "fit": fits[each["id"]],
            "seats": each["seats"],
            "places": each["places"],
            "minimum_crew": each["minimum_crew"],
            "equipment": each.get("equipment", []),
            "operating_items": each.get("operating_items", []),
        }
        for each in json.loads(version.document)["configurations"]
    ]
