"""The inspector's screen: one aircraft on one day, what it rests on, who could sign, what lacks."""

from datetime import date, datetime, timedelta
from typing import Any
from zoneinfo import ZoneInfo

from django.http import HttpRequest, HttpResponse
from django.shortcuts import render
from django.utils import timezone
from django.views.decorators.http import require_safe

from fleet.models import Aircraft
from fleet.queries.aircraft import aircraft_of, all_aircraft
from fleet.queries.duties import holders_at
from fleet.queries.in_force import in_force_for
from fleet.queries.settings import settings_at
from loads.lifecycle import GONE
from loads.queries.inspection import Flown, flights_without_manifest, loads_of_day, numbers_of
from loads.queries.rechecks import flags_of
from loads.web.asking import zone_of, zone_words
from loads.web.beside import flag_shown
from loads.web.flights import flight_of
from loads.web.inspect_versions import basis_shown, equipment_shown, provisions_shown, weight_shown
from loads.web.looking import Look, begins, ends
from records.refusal import NotKnown
from records.web.asking import operator_of, signed_in

# How far back flights without a manifest are looked for.
DAYS = 90


@require_safe
@signed_in
def inspect(request: HttpRequest) -> HttpResponse:
    """This function will show what is on file for `?aircraft=` on `?day=`, and whether anything lacks."""
    operator, zone, look, now = operator_of(request), zone_of(request), Look(request), timezone.now()
    registration, day = look.word("aircraft"), look.day("day") or now.astimezone(zone).date()
    aircraft = _aircraft(operator, registration, look)
    until = min(now, ends(day, zone) or now)
    since = until - timedelta(days=DAYS)
    context: dict[str, Any] = {
        "look": look,
        "day": day,
        "zone": zone_words(zone, now),
        "fleet": [one.registration for one in all_aircraft(operator)],
        "aircraft": aircraft,
        "numbers": numbers_of(operator),
        "lacking": [flight_of(one, zone) for one in flights_without_manifest(operator, since, until)],
        "days": DAYS,
        "until": until.astimezone(zone).strftime("%Y-%m-%d %H:%M"),
        "now": now.astimezone(zone).strftime("%Y-%m-%d %H:%M"),
    }
    if aircraft is not None:
        context |= _of_day(aircraft, day, zone, now)
    return render(request, "loads/inspect.html", context, status=422 if look.faults else 200)


def _aircraft(operator: str, registration: str, look: Look) -> Aircraft | None:
    if not registration:
        return None
    try:
        return aircraft_of(operator, registration)
    except NotKnown:
        look.faults["aircraft"] = "No aircraft of this registration is entered."
        return None


def _of_day(aircraft: Aircraft, day: date, zone: ZoneInfo, now: datetime) -> dict[str, Any]:
    since, until = begins(day, zone) or now, ends(day, zone) or now
    flown = loads_of_day(aircraft, since, until)
    # Who could sign is asked for the last departure: everybody who signed for the day had the duty by then.
    last = max((one.current.load.departure for one in flown), default=until - timedelta(seconds=1))
    asked_at = min(now, last)
    settings = settings_at(aircraft.operator_id, asked_at, asked_at)
    return {
        "loads": [_load(one, zone, now) for one in flown],
        "with_number": sum(one.paper is not None for one in flown),
        "signers": _signers(aircraft.operator_id, asked_at),
        "asked_at": asked_at.astimezone(zone).strftime("%Y-%m-%d %H:%M"),
        "settings": settings,
        "settings_number": settings.number,
    }


def _load(one: Flown, zone: ZoneInfo, now: datetime) -> dict[str, Any]:
    load, used = one.current.load, one.current.assessment
    held_now = in_force_for(load.aircraft, load.departure, now, load.configuration)
    filed = getattr(one.paper, "filed", None) if one.paper is not None else None
    return flight_of(one.current, zone) | {
        "gone": one.current.state in GONE,
        "number": one.paper.number if one.paper else None,
        "pdf_digest": filed.document_id if filed else None,
        "entry": one.seal.position if one.seal else None,
        "entry_digest": one.seal.digest if one.seal else None,
        "act": one.paper.act if one.paper else None,
        "digest": used.digest,
        "engine": used.engine,
        "assessed": used.assessed_at.astimezone(zone).strftime("%Y-%m-%d %H:%M"),
        "weight": weight_shown(used.empty_weight, held_now.empty_weight, zone),
        "basis": basis_shown(used.loading_basis, held_now.basis, zone),
        "provisions": provisions_shown(used.provisions, zone),
        "flags": [flag_shown(flag) for flag in flags_of(load.id)],
        "equipment": equipment_shown(used.loading_basis, load.configuration),
        "configuration": load.configuration,
        "signatures": [
            {
                "meaning": signature.meaning,
                "name": bytes(signature.name).decode("utf-8", "replace") or "(name no longer kept)",
                "capacity": signature.capacity,
                "at": signature.signed_at.astimezone(zone).strftime("%Y-%m-%d %H:%M:%S"),
                "means": "with a token of their own" if signature.means == "token" else "signed in",
            }
            for signature in one.signatures
        ],
    }


def _signers(operator: str, at: datetime) -> list[dict[str, str]]:
    """This function will say who could sign at `at`, and who could put versions in force."""
    held = holders_at(operator, at)
    asked = [
        ("Accept, as pilot in command of the flight", ("pilot",)),
        ("Sign as prepared", ("load preparer", "pilot", "operations manager")),
        ("Sign as loaded, where the rules ask for it", ("loading supervisor",)),
        ("Approve an empty weight or a loading basis", ("records approver", "operations manager")),
        ("Enter an empty weight or a loading basis", ("maintenance", "operations manager")),
    ]
    return [
        {
            "what": what,
            "who": ", ".join(sorted({person.name for role in roles for person in held.get(role, ())}))
            or "nobody",
        }
        for what, roles in asked
    ]
