"""What the aircraft pages show, as plain values."""

import json
from datetime import datetime
from typing import Any
from zoneinfo import ZoneInfo

from django.urls import reverse

from fleet import acts
from fleet.models import Aircraft, EmptyWeight, LoadingBasis
from fleet.queries.falling_due import Due, falling_due
from fleet.queries.history import VersionHistory, empty_weight_history, loading_basis_history
from fleet.queries.in_force import basis_in_force, empty_weights_in_force
from fleet.queries.provisions import provisions_at
from fleet.web.as_typed import as_typed, sided
from fleet.web.margins import margin_rows, presentation_rows
from fleet.web.positions_shown import position_rows
from fleet.web.rules_shown import rule_rows
from fleet.web.shown_provisions import paper_shown
from fleet.web.stations_shown import limit_row, station_rows
from records.actor import Actor

LIMIT_TITLES = (
    ("ramp", "Maximum ramp weight"),
    ("take_off", "Maximum take-off weight"),
    ("zero_fuel", "Maximum zero fuel weight"),
    ("landing", "Maximum landing weight"),
    ("minimum_flying", "Minimum flying weight"),
)


def list_line(aircraft: Aircraft, now: datetime) -> dict[str, str]:
    """This function will return one line of the list: the aircraft and what is in force at `now`."""
    basis = basis_in_force(aircraft, now, now)
    weights = empty_weights_in_force(aircraft, now, now)
    return {
        "registration": aircraft.registration,
        "type": aircraft.type,
        "serial_number": aircraft.serial_number,
        "empty_weight": "; ".join(_weight_words(weight) for weight in weights) or "none in force",
        "loading_basis": f"revision {basis.revision}" if basis else "none in force",
    }


def aircraft_page(aircraft: Aircraft, now: datetime, actor: Actor) -> dict[str, Any]:
    """This function will return the values of one aircraft's page at `now`, for this actor."""
    zone = ZoneInfo(aircraft.operator.time_zone)
    basis = basis_in_force(aircraft, now, now)
    weights = empty_weights_in_force(aircraft, now, now)
    figures = [
        {
            "title": f"Empty weight, {weight.fit}",
            "value": _weight_words(weight),
            "small": _weight_lines(weight),
        }
        for weight in weights
    ] or [{"title": "Empty weight", "value": "none in force", "small": ["No load can be signed."]}]
    figures.append(
        {
            "title": "Loading basis",
            "value": f"revision {basis.revision}" if basis else "none in force",
            "small": [_document_words(basis)] if basis else ["No load can be signed."],
        }
    )
    return {
        "aircraft": aircraft,
        "figures": figures,
        "limits": _limits(basis),
        "papers": _papers(aircraft, now),
        "due": [_due(one, zone, now) for one in falling_due(aircraft, now)],
        "stations": _stations(basis),
        "kinds": [
            {
                "anchor": "empty-weights",
                "title": "Empty weights",
                "next_step": "Enter one through the API: POST …/weighings.",
                "versions": [
                    _version(one, aircraft, now, zone, actor) for one in empty_weight_history(aircraft)
                ],
            },
            {
                "anchor": "loading-bases",
                "title": "Loading bases",
                "next_step": "Enter one through the API: POST …/loading-bases.",
                "versions": [
                    _version(one, aircraft, now, zone, actor) for one in loading_basis_history(aircraft)
                ],
            },
        ],
    }


def _papers(aircraft: Aircraft, now: datetime) -> list[dict[str, str]]:
    held = provisions_at(aircraft.operator_id, aircraft, now, now)
    return [paper_shown(one) for one in (*held.permits, *held.restrictions)]


def _due(one: Due, zone: ZoneInfo, now: datetime) -> dict[str, Any]:
    """This function will say what lapses when, and how long that still is; half a day is not rounded up."""
    days = (one.lapses - now).days
    left = "past due" if one.lapses <= now else f"{days} day{'' if days == 1 else 's'}"
    return {
        "what": one.what,
        "good_until": _local(one.lapses, zone),
        "left": left,
        "past": one.lapses <= now,
        "source": one.source,
    }


def _weight_words(weight: EmptyWeight) -> str:
    return as_typed(json.loads(weight.document)["weight"])


def _weight_lines(weight: EmptyWeight) -> list[str]:
    document = json.loads(weight.document)
    titles = (
        ("moment", "moment"),
        ("arm", "arm"),
        ("lateral_moment", "lateral moment"),
        ("lateral_arm", "lateral arm"),
    )
    lines = [f"{title} {sided(part, document[part])}" for part, title in titles if part in document]
    return [*lines, f"by {document['how']}, {document['date']}, report {document['report']}"]


def _document_words(basis: LoadingBasis) -> str:
    document = json.loads(basis.document)["document"]
    return f"{document['title']} {document['number']} rev {document['revision']}"


def _limits(basis: LoadingBasis | None) -> list[dict[str, str]]:
    if basis is None:
        return []
    document = json.loads(basis.document)
    rows = [limit_row(document, title, document["limits"].get(name)) for name, title in LIMIT_TITLES]
    if higher := document["limits"].get("with_external_load"):
        rows.append(limit_row(document, "Maximum weight with a jettisonable external load", higher))
    return [
        *rows,
        *rule_rows(document),
        *position_rows(document),
        *margin_rows(document),
        *presentation_rows(document),
    ]


def _stations(basis: LoadingBasis | None) -> list[dict[str, str]]:
    return [] if basis is None else station_rows(json.loads(basis.document))


def _version(
    one: VersionHistory, aircraft: Aircraft, now: datetime, zone: ZoneInfo, actor: Actor
) -> dict[str, Any]:
    version = one.version
    if isinstance(version, EmptyWeight):
        title, figures, needs, address = (
            f"{version.fit}",
            [_weight_words(version), *_weight_lines(version)],
            acts.APPROVE_EMPTY_WEIGHT,
            "approve-empty-weight",
        )
    else:
        title, figures, needs, address = (
            f"revision {version.revision}",
            [_document_words(version)],
            acts.APPROVE_LOADING_BASIS,
            "approve-loading-basis",
        )
    return {
        "title": title,
        "figures": figures,
        "digest": version.digest,
        "true_from": _local(one.true_from, zone) or "not yet",
        "entered_at": _local(version.entered_at, zone),
        "entered_by": one.entered_by,
        "approved_at": _local(one.approved_at, zone),
        "approved_by": one.approved_by,
        "can_approve": one.approved_by is None
        and needs.name in actor.may
        and actor.person != version.entered_by_id,
        "approve_address": reverse(address, args=[aircraft.registration, version.id]),
        "standing": _standing(one, now),
    }


def _local(instant: datetime | None, zone: ZoneInfo) -> str:
    return instant.astimezone(zone).isoformat(sep=" ", timespec="minutes") if instant else ""


def _standing(one: VersionHistory, now: datetime) -> str:
    """This function will say in words what the version is at `now`, as known now."""
    known = [window for window in one.windows if window.known_until is None]
    if any(
        window.valid_from <= now and (window.valid_until is None or now < window.valid_until)
        for window in known
    ):
        return "in force"
    if any(window.valid_from > now for window in known):
        return "in force later"
    return "superseded" if one.windows else "not approved"
