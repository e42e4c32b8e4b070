"""The page of one day's loads, by departure."""

from collections.abc import Mapping
from datetime import UTC, date, datetime, time, timedelta
from typing import Any
from zoneinfo import ZoneInfo

from django.http import HttpRequest, HttpResponse
from django.shortcuts import render
from django.utils import timezone
from django.views.decorators.http import require_safe

from loads.lifecycle import GONE, ways_out
from loads.manifest.pilot_block import permits_said
from loads.manifest.words import Words
from loads.queries.current import Current
from loads.queries.listing import MOST_ROWS, Filters, list_loads
from loads.queries.stale import stale_parts
from loads.web.asking import zone_of, zone_words
from loads.web.shown import stops
from loads.web.wording import words_at
from records.web.asking import operator_of, signed_in

ONE_DAY = timedelta(days=1)
FEW = 2  # of what is in the way; the page of the load and the rejects desk tell all


@require_safe
@signed_in
def day(request: HttpRequest) -> HttpResponse:
    """This function will show the loads that depart on one day of the operator's own clock, today's if none
    is named.
    """
    zone, now = zone_of(request), timezone.now()
    wanted = _day_asked(request, now.astimezone(zone).date())
    since = datetime.combine(wanted, time(), tzinfo=zone)
    until = datetime.combine(wanted + ONE_DAY, time(), tzinfo=zone)
    page = list_loads(operator_of(request), Filters(since=since, until=until), most=MOST_ROWS)
    words = words_at(operator_of(request), now)
    lines = [_line(current, zone, now, words) for current in page.loads]
    context = {
        "day": wanted,
        "zone": zone_words(zone, since),
        "before": wanted - ONE_DAY,
        "after": wanted + ONE_DAY,
        "loads": lines,
        "count_line": _counted(lines, more=page.after is not None),
    }
    return render(request, "loads/day.html", context)


def _day_asked(request: HttpRequest, today: date) -> date:
    try:
        wanted = date.fromisoformat(request.GET.get("day", ""))
    except ValueError:
        return today
    # The neighbours of the first and the last day of the calendar could not be named.
    return wanted if date(1950, 1, 1) <= wanted <= date(2150, 1, 1) else today


def _line(current: Current, zone: ZoneInfo, now: datetime, words: Words) -> dict[str, Any]:
    load, result = current.load, current.result()
    paper = getattr(load, "paper", None)
    return {
        "id": load.id,
        "local_time": load.departure.astimezone(zone).strftime("%H:%M"),
        "utc_time": load.departure.astimezone(UTC).strftime("%H:%M"),
        "registration": load.aircraft.registration,
        "reference": load.reference,
        "leg": load.leg,
        "origin": load.origin,
        "destination": load.destination,
        "verdict": current.assessment.verdict,
        "permits": permits_said(result),
        "lines": _nearest(result, words),
        "state": current.state,
        "gone": current.state in GONE,
        "stale": _stale(current, now),
        "number": paper.number if paper else None,
    }


def _stale(current: Current, now: datetime) -> str:
    """This function will say what is to be done with a load that went stale before its departure."""
    if not ways_out(current.state) or not stale_parts(current, now):
        return ""
    return "revise" if current.state == "accepted" else "assess again"


def _nearest(result: Mapping[str, Any], words: Words) -> list[str]:
    """This function will return the first two checks in the way and how many more are, or the two governing
    lines when nothing is.
    """
    if in_the_way := stops(result, words):
        told = [f"{stop['title']}: {stop['margin']}" for stop in in_the_way[:FEW]]
        more = len(in_the_way) - len(told)
        return [*told, f"and {more} more in the way"] if more else told
    governing = result.get("governing") or {}
    return [words.said(line) for line in (governing.get("weight"), governing.get("cg")) if line]


def _counted(lines: list[dict[str, Any]], *, more: bool) -> str:
    standing = [line for line in lines if not line["gone"]]
    rejects = sum(line["verdict"] != "within" for line in standing)
    counted = f"{len(standing)} load{'' if len(standing) == 1 else 's'} standing"
    words = f"{counted}, {rejects} not within limits." if rejects else f"{counted}, all within limits."
    if not standing:
        words = "No load stands."
    return f"{words} Only the first {MOST_ROWS} are shown." if more else words
