"""The pages of the aircraft: the list, and one aircraft with its versions."""

from uuid import UUID

from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.shortcuts import render, resolve_url
from django.utils import timezone
from django.views.decorators.http import require_POST, require_safe

from fleet.actions.approve_empty_weight import approve_empty_weight
from fleet.actions.approve_loading_basis import approve_loading_basis
from fleet.entering import read_approval
from fleet.queries.aircraft import aircraft_of, all_aircraft, empty_weight_of, loading_basis_of
from fleet.web.shown import aircraft_page, list_line
from records.refusal import Refused
from records.web.asking import actor_of, operator_of, signed_in


@require_safe
@signed_in
def aircraft_list(request: HttpRequest) -> HttpResponse:
    """This function will show the operator's aircraft with what is in force now."""
    now = timezone.now()
    lines = [list_line(aircraft, now) for aircraft in all_aircraft(operator_of(request))]
    return render(request, "fleet/aircraft_list.html", {"aircraft": lines})


@require_safe
@signed_in
def one_aircraft(request: HttpRequest, registration: str) -> HttpResponse:
    """This function will show one aircraft, what is in force and every version ever entered."""
    return _page(request, registration)


@require_POST
@signed_in
def approve_basis(request: HttpRequest, registration: str, version: UUID) -> HttpResponse:
    """This function will approve a loading basis on behalf of the person signed in."""
    try:
        aircraft = aircraft_of(operator_of(request), registration)
        approve_loading_basis(
            actor_of(request), aircraft, loading_basis_of(aircraft, version), reason=_reason(request)
        )
    except Refused as refusal:
        return _page(request, registration, refusal)
    return HttpResponseRedirect(resolve_url("aircraft", registration))


@require_POST
@signed_in
def approve_weight(request: HttpRequest, registration: str, version: UUID) -> HttpResponse:
    """This function will approve an empty weight on behalf of the person signed in."""
    try:
        aircraft = aircraft_of(operator_of(request), registration)
        approve_empty_weight(
            actor_of(request), aircraft, empty_weight_of(aircraft, version), reason=_reason(request)
        )
    except Refused as refusal:
        return _page(request, registration, refusal)
    return HttpResponseRedirect(resolve_url("aircraft", registration))


def _reason(request: HttpRequest) -> str:
    """Return the remark typed beside an approval, read as the API reads it; "" without one."""
    typed = request.POST.get("reason", "").strip()
    return read_approval({"reason": typed}).reason if typed else ""


def _page(request: HttpRequest, registration: str, refusal: Refused | None = None) -> HttpResponse:
    aircraft = aircraft_of(operator_of(request), registration)
    context = aircraft_page(aircraft, timezone.now(), actor_of(request))
    status = 200 if refusal is None else refusal.status
    return render(request, "fleet/aircraft.html", context | {"refusal": refusal}, status=status)
