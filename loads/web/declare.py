"""The pages on which a load is declared, and revised."""

from collections.abc import Mapping
from dataclasses import dataclass
from datetime import datetime
from typing import Any
from uuid import UUID
from zoneinfo import ZoneInfo

from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.shortcuts import render, resolve_url
from django.utils import timezone
from django.views.decorators.http import require_http_methods

from fleet.basis import Basis, Configuration
from fleet.models import Aircraft
from fleet.queries.aircraft import aircraft_of, all_aircraft
from fleet.queries.figures import basis_of
from fleet.queries.in_force import basis_in_force
from loads.actions.revise_load import revise_load
from loads.actions.stepping import reason_in
from loads.actions.submit_load import submit_load
from loads.queries.computation import compute
from loads.queries.current import Current, load_of
from loads.queries.declaration import declared_now
from loads.web.arranging import ARRANGE, arranged
from loads.web.asking import typed_in, zone_of, zone_words
from loads.web.copied import can_carry, typed_of
from loads.web.desk import lay_desk, wrong_inputs
from loads.web.form import document_of, field_of
from loads.web.next_leg import CARRIED
from loads.web.remedies import remedied
from loads.web.shown import stops, verdict_words
from loads.web.wording import words_at
from records.refusal import Fault, Invalid, NotKnown, Refused
from records.web.asking import actor_of, operator_of, signed_in

NEXT_STEP = "Have one entered and approved, or submit the load through the API: it is kept as unresolved."


@dataclass(frozen=True, slots=True)
class Table:
    """What a load is declared on: aircraft, the basis in force at the departure, configuration."""

    aircraft: Aircraft
    basis: Basis
    configuration: Configuration


@require_http_methods(["GET", "HEAD", "POST"])
@signed_in
def declare(request: HttpRequest) -> HttpResponse:
    """This function will ask for aircraft and departure, then show the table, compute and submit."""
    typed = typed_in(request) if request.method == "POST" else {k: str(v) for k, v in request.GET.items()}
    zone = zone_of(request)
    departure = _departure(typed, zone)
    table = _table(request, typed, departure)
    if table is None or (departure is None and request.method != "POST"):
        return _first_page(request, typed, departure)
    if request.method != "POST" or ARRANGE in typed:
        return _desk_page(request, table, arranged(typed) if ARRANGE in typed else typed, zone)
    document, fields = _document(table, typed, departure)
    try:
        if typed.get("do") != "submit":
            return _previewed(request, table, typed, zone, document)
        submitted = submit_load(document, by=actor_of(request))
    except Refused as refusal:
        return _desk_page(request, table, typed, zone, refusal=_refused(refusal, fields))
    return HttpResponseRedirect(resolve_url("load", submitted.load.id))


@require_http_methods(["GET", "HEAD", "POST"])
@signed_in
def revise(request: HttpRequest, load: UUID) -> HttpResponse:
    """This function will show an earlier load's figures, marked as copied until confirmed, and replace the
    load.
    """
    current, zone = load_of(operator_of(request), load), zone_of(request)
    declared = _begun_from(request, current)
    local = current.load.departure.astimezone(zone)
    copied = typed_of(declared) | {
        "date": f"{local:%Y-%m-%d}",
        "time": f"{local:%H:%M}",
        "step": str(current.step.number),
    }
    typed = typed_in(request) if request.method == "POST" else copied
    departure = _departure(typed, zone)
    table = _table(request, typed, departure)
    if table is None or not _carries(declared, table):
        return render(
            request,
            "loads/declare.html",
            {"heading": "Revise", "typed": typed, "refusal": _not_here(), "back": load},
            status=409,
        )
    if request.method != "POST" or ARRANGE in typed:
        typed = arranged(typed) if ARRANGE in typed else typed
        return _desk_page(request, table, typed, zone, revised=load)
    document, fields = _document(table, typed, departure)
    try:
        if typed.get("do") != "submit":
            return _previewed(request, table, typed, zone, document, revised=load)
        if typed.get("checked") != "yes":
            raise Invalid(Fault("/checked", "not-confirmed", "confirm that every copied figure was checked"))
        reason = reason_in({"reason": typed.get("reason", "").strip()})
        revision = revise_load(
            load, document, reason=reason, seen=typed.get("step", ""), by=actor_of(request)
        )
    except Refused as refusal:
        fields |= {"/checked": "checked", "/reason": "reason"}
        return _desk_page(request, table, typed, zone, refusal=_refused(refusal, fields), revised=load)
    return HttpResponseRedirect(resolve_url("load", revision.load.id))


def _begun_from(request: HttpRequest, current: Current) -> dict[str, Any]:
    """This function will return what a revision begins from: what was declared, with a remedy of the load's
    page put in where one was chosen.
    """
    number = request.GET.get("remedy", "")
    changed = remedied(current, number, timezone.now()) if number else None
    return declared_now(current) if changed is None else changed


def _departure(typed: Mapping[str, str], zone: ZoneInfo) -> datetime | None:
    try:
        local = datetime.fromisoformat(f"{typed.get('date', '').strip()}T{typed.get('time', '').strip()}")
    except ValueError:
        return None
    return local.replace(tzinfo=zone) if local.tzinfo is None and 1950 <= local.year <= 2150 else None  # noqa: PLR2004  # the years of loads.balance.outline


def _table(request: HttpRequest, typed: Mapping[str, str], departure: datetime | None) -> Table | None:
    """This function will return the table for what was chosen, None while something of it is missing."""
    basis, aircraft = _basis(request, typed, departure)
    if basis is None or aircraft is None:
        return None
    found = next((one for one in basis.configurations if one.id == typed.get("configuration")), None)
    return Table(aircraft, basis, found) if found else None


def _basis(
    request: HttpRequest, typed: Mapping[str, str], departure: datetime | None
) -> tuple[Basis | None, Aircraft | None]:
    if not typed.get("aircraft"):
        return None, None
    try:
        aircraft = aircraft_of(operator_of(request), typed["aircraft"].strip())
    except NotKnown:
        return None, None
    # A form sent without its time is shown again on what is in force now, with all that was typed.
    now = timezone.now()
    version = basis_in_force(aircraft, departure or now, now)
    return (basis_of(version) if version else None), aircraft


def _first_page(request: HttpRequest, typed: Mapping[str, str], departure: datetime | None) -> HttpResponse:
    basis, aircraft = _basis(request, typed, departure) if departure else (None, None)
    context = {
        "heading": "Declare a load",
        "aircraft": all_aircraft(operator_of(request)),
        "configurations": basis.configurations if basis else (),
        "no_basis": NEXT_STEP if aircraft is not None and basis is None else "",
        "typed": typed,
        "zone": zone_words(zone_of(request), timezone.now()),
        "carried": [(name, typed[name]) for name in CARRIED if typed.get(name)],
    }
    return render(request, "loads/declare.html", context)


def _document(
    table: Table, typed: Mapping[str, str], departure: datetime | None
) -> tuple[dict[str, Any], dict[str, str]]:
    return document_of(
        typed,
        departure=departure.isoformat() if departure else "",
        seats=table.configuration.seats,
        tanks=[tank.id for tank in table.basis.tanks],
    )


def _carries(declared: Mapping[str, Any], table: Table) -> bool:
    return can_carry(declared, seats=table.configuration.seats, tanks=[tank.id for tank in table.basis.tanks])


def _previewed(
    request: HttpRequest,
    table: Table,
    typed: Mapping[str, str],
    zone: ZoneInfo,
    document: dict[str, Any],
    *,
    revised: UUID | None = None,
) -> HttpResponse:
    result: dict[str, Any] = compute(operator_of(request), document, timezone.now()).result
    words = words_at(operator_of(request), timezone.now())
    preview = {
        "verdict": result["verdict"],
        "verdict_words": verdict_words(result["verdict"]),
        "lines": [words.said(result["governing"][part]) for part in ("weight", "cg")],
        "stops": stops(result, words),
        "not_assessed": result["not_assessed"],
    }
    return _desk_page(request, table, typed, zone, revised=revised, preview=preview)


def _desk_page(
    request: HttpRequest,
    table: Table,
    typed: Mapping[str, str],
    zone: ZoneInfo,
    *,
    refusal: dict[str, Any] | None = None,
    revised: UUID | None = None,
    preview: dict[str, Any] | None = None,
) -> HttpResponse:
    faults = (
        wrong_inputs([(fault["field"], fault["detail"]) for fault in refusal["faults"]]) if refusal else {}
    )
    context = {
        "heading": "Revise" if revised else "Declare a load",
        "desk": lay_desk(
            table.basis,
            table.configuration,
            typed=typed,
            faults=faults,
            zone=zone_words(zone, timezone.now()),
        ),
        "typed": typed,
        "step": typed.get("step", ""),
        "copied": revised is not None,
        "revised": revised,
        "refusal": refusal,
        "preview": preview,
        "submit_words": "Replace the load" if revised else "Submit the load",
    }
    return render(request, "loads/declare.html", context, status=refusal["status"] if refusal else 200)


def _refused(refusal: Refused, fields: Mapping[str, str]) -> dict[str, Any]:
    return {
        "title": refusal.title,
        "detail": refusal.detail,
        "next_step": refusal.next_step,
        "status": refusal.status,
        "faults": [
            {"field": field_of(fault.pointer, fields), "pointer": fault.pointer, "detail": fault.detail}
            for fault in refusal.faults
        ],
    }


def _not_here() -> dict[str, Any]:
    return {
        "title": "this load cannot be revised on this page",
        "detail": "It holds a part this page has no input for, or no loading basis is in force then.",
        "next_step": "Revise it through the API.",
    }
