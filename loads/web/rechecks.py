"""Pages of rechecks: starting one, watching it without script, and its table."""

import re
from datetime import UTC, date, datetime
from typing import Any
from uuid import UUID
from zoneinfo import ZoneInfo

from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.shortcuts import render, resolve_url
from django.views.decorators.http import require_http_methods, require_safe

from fleet.queries.aircraft import all_aircraft
from loads.actions.ask_recheck import FIELDS, ask_recheck
from loads.acts import RECHECK_LOADS
from loads.models import Recheck
from loads.queries.recheck_choices import against, choices_of
from loads.queries.rechecks import last_rechecks, progress_of, recheck_of, table_page
from loads.web.asking import typed_in, zone_of
from loads.web.looking import begins, ends
from records.refusal import Fault, Invalid, Refused
from records.web.asking import actor_of, operator_of, signed_in

SECONDS_TO_REFRESH = 3
_PLACE = re.compile(r"(\d{1,9})\.(\d{1,18})", re.ASCII)


@require_http_methods(["GET", "HEAD", "POST"])
@signed_in
def rechecks(request: HttpRequest) -> HttpResponse:
    """This function will show the rechecks and the form for one, and ask for one when the form is sent."""
    if request.method != "POST":
        return _page(request)
    typed = typed_in(request)
    try:
        recheck = ask_recheck(_document(typed, zone_of(request)), by=actor_of(request))
    except Refused as refusal:
        return _page(request, refusal, typed)
    return HttpResponseRedirect(resolve_url("recheck", recheck.id))


@require_safe
@signed_in
def recheck(request: HttpRequest, recheck: UUID) -> HttpResponse:
    """This function will show how far a recheck is, and its table; while it runs the page renews itself."""
    found = recheck_of(operator_of(request), recheck)
    zone = zone_of(request)
    place = _PLACE.fullmatch(request.GET.get("after", ""))
    page = table_page(found, (int(place[1]), int(place[2])) if place else None)
    stands = progress_of(found)
    context = {
        "recheck": _line(found, zone),
        "stands": stands,
        "counts": stands.counts,
        "flights": [_flight(one, zone) for one in page.rows],
        "next": f"?after={page.after[0]}.{page.after[1]}" if page.after else "",
    }
    answer = render(request, "loads/recheck.html", context)
    if stands.state != "finished":
        answer["Refresh"] = str(SECONDS_TO_REFRESH)  # works without script
    return answer


def _page(
    request: HttpRequest, refusal: Refused | None = None, typed: dict[str, str] | None = None
) -> HttpResponse:
    operator, zone = operator_of(request), zone_of(request)
    faults = {fault.pointer.removeprefix("/"): fault.detail for fault in refusal.faults} if refusal else {}
    context = {
        "rechecks": [_line(one, zone) for one in last_rechecks(operator)],
        "may_ask": RECHECK_LOADS.name in actor_of(request).may,
        "aircraft": [one.registration for one in all_aircraft(operator)],
        "choices": choices_of(operator, zone),
        "typed": typed or {},
        "faults": faults | ({"until": faults["to"]} if "to" in faults else {}),
        "refusal": refusal,
    }
    return render(request, "loads/rechecks.html", context, status=refusal.status if refusal else 200)


def _document(typed: dict[str, str], zone: ZoneInfo) -> dict[str, Any]:
    """Return what the form asks; days are whole days of the operator's clock, the last one included."""
    found: dict[str, Any] = {name: typed[name].strip() for name in FIELDS if typed.get(name, "").strip()}
    faults = []
    for name, instant in (("from", begins), ("to", ends)):
        if name not in found:
            continue
        try:
            day = date.fromisoformat(found[name])
        except ValueError:
            faults.append(Fault(f"/{name}", "instant-malformed", "write a day like 2026-12-01"))
            continue
        at = instant(day, zone)
        found[name] = at.isoformat() if at is not None else ""
    if faults:
        raise Invalid(*faults)
    return found


def _line(one: Recheck, zone: ZoneInfo) -> dict[str, Any]:
    return {
        "id": one.id,
        "asked": _when(one.asked_at, zone),
        "by": one.asked_by.name if one.asked_by else "the command line",
        "aircraft": one.aircraft.registration if one.aircraft else "",
        "against": against(one, zone),
        "span": _span(one, zone),
        "reason": one.reason,
        "engine": one.engine,
        "result": getattr(one, "result", None),
        "act": one.act,
    }


def _span(one: Recheck, zone: ZoneInfo) -> str:
    since = f"from {_when(one.since, zone)}" if one.since else ""
    until = f"before {_when(one.until, zone)}" if one.until else ""
    return " ".join(word for word in (since, until) if word) or "of every departure"


def _flight(one: Any, zone: ZoneInfo) -> dict[str, Any]:
    load = one.load
    return {
        "load": load.id,
        "registration": load.aircraft.registration,
        "reference": load.reference,
        "leg": load.leg,
        "local": _when(load.departure, zone),
        "utc": load.departure.astimezone(UTC).strftime("%H:%M"),
        "verdict": one.verdict,
        "now": one.now,
        "limit": one.limit,
        "excess": one.excess,
    }


def _when(at: datetime, zone: ZoneInfo) -> str:
    return at.astimezone(zone).strftime("%Y-%m-%d %H:%M")
