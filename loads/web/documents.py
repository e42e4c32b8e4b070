"""Manifests by number, with a search."""

from typing import Any
from urllib.parse import urlencode
from zoneinfo import ZoneInfo

from django.http import HttpRequest, HttpResponse
from django.shortcuts import render
from django.views.decorators.http import require_safe

from fleet.queries.aircraft import all_aircraft
from loads.queries.documents import Filed, Search, search_documents
from loads.queries.rechecks import flagged_among
from loads.web.asking import zone_of
from loads.web.flights import leg_of
from loads.web.looking import Look, begins, ends
from records.web.asking import operator_of, signed_in

ROWS = 50


@require_safe
@signed_in
def documents(request: HttpRequest) -> HttpResponse:
    """This function will show the manifests that fit the search, the highest number first."""
    operator, zone, look = operator_of(request), zone_of(request), Look(request)
    search = Search(
        number=look.number("number"),
        registration=look.word("registration"),
        reference=look.word("reference"),
        since=begins(look.day("from"), zone),
        until=ends(look.day("to"), zone),
    )
    after = look.number("after")
    context: dict[str, Any] = {
        "look": look,
        "aircraft": [one.registration for one in all_aircraft(operator)],
        "asked": search != Search(),
        "manifests": [],
    }
    if not look.faults:
        found = search_documents(operator, search, after=after, most=ROWS)
        flags = flagged_among({one.paper.load_id for one in found.manifests})
        context["manifests"] = [
            _line(one, zone) | {"flag": flags.get(one.paper.load_id)} for one in found.manifests
        ]
        if found.after is not None:
            typed = {name: value for name, value in look.typed.items() if value}
            context["next"] = f"?{urlencode(typed | {'after': str(found.after)})}"
    return render(request, "loads/documents.html", context, status=422 if look.faults else 200)


def _line(one: Filed, zone: ZoneInfo) -> dict[str, Any]:
    load = one.paper.load
    return {
        "number": one.paper.number,
        "load": load.id,
        **leg_of(load, zone),
        "digest": one.digest,
        "size": f"{-(-one.size // 1000)} kB" if one.size is not None else "",
        "filed": one.filed_at.astimezone(zone).strftime("%Y-%m-%d %H:%M") if one.filed_at else "",
    }
