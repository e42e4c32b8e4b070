"""The rejects desk: what cannot depart, why, who has it, what was said, what became of it, and the trend."""

from datetime import date, datetime, time, timedelta
from time import thread_time
from typing import Any
from uuid import UUID
from zoneinfo import ZoneInfo

from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.shortcuts import render, resolve_url
from django.utils import timezone
from django.utils.safestring import mark_safe
from django.views.decorators.http import require_POST, require_safe

from loads.actions.remark_reject import LONGEST_REMARK, read_remark, remark_reject
from loads.acts import REMARK_REJECT, REVISE_LOAD
from loads.manifest.words import Words
from loads.models import Remark
from loads.queries.current import result_in
from loads.queries.rejects import (
    MOST_REJECTS,
    Reject,
    Settled,
    open_rejects,
    people_who_may_hold,
    settled_rejects,
)
from loads.queries.remedies import SECONDS
from loads.queries.trend import WEEK, Trend, reject_trend
from loads.trend_chart import Series, trend_chart
from loads.web.asking import zone_of, zone_words
from loads.web.flights import flight_of
from loads.web.remedies import first_sentence
from loads.web.shown import stops
from loads.web.wording import words_at
from records.refusal import Refused
from records.web.asking import actor_of, operator_of, signed_in

DAYS = 90
MOST_LIMITS = 12


@require_safe
@signed_in
def rejects(request: HttpRequest) -> HttpResponse:
    """This function will show the rejects desk."""
    return _page(request)


@require_POST
@signed_in
def remark(request: HttpRequest, load: UUID) -> HttpResponse:
    """This function will add a remark to a rejected load, and show the desk again."""
    typed = {"words": request.POST.get("words", "").strip(), "holder": request.POST.get("holder", "")}
    try:
        remark_reject(load, read_remark(typed), by=actor_of(request))
    except Refused as refusal:
        return _page(request, refusal, about=load, typed=typed)
    return HttpResponseRedirect(f"{resolve_url('rejects')}#load-{load}")


def _page(
    request: HttpRequest,
    refusal: Refused | None = None,
    *,
    about: UUID | None = None,
    typed: dict[str, str] | None = None,
) -> HttpResponse:
    operator, actor, now, zone = operator_of(request), actor_of(request), timezone.now(), zone_of(request)
    until = datetime.combine(now.astimezone(zone).date() + timedelta(days=1), time(), tzinfo=zone)
    since = until - timedelta(days=DAYS)
    found = open_rejects(operator)
    words = words_at(operator, now)
    lines = [_reject(one, zone, now, words) for one in found]
    by = thread_time() + SECONDS  # in all; what is left is told on the page of each load
    for line, one in zip(lines, found, strict=True):
        line["remedy"] = first_sentence(one.current, words, now, by - thread_time())
    if about is not None:
        for line in lines:
            line["typed"] = typed if line["id"] == about else None
    context = {
        "rejects": lines,
        "more": len(found) == MOST_REJECTS,
        "zone": zone_words(zone, now),
        "may_remark": REMARK_REJECT.name in actor.may,
        "may_revise": REVISE_LOAD.name in actor.may,
        "people": people_who_may_hold(operator) if found else (),
        "longest": LONGEST_REMARK,
        "settled": [_settled(one, zone, words) for one in settled_rejects(operator, since, until, most=50)],
        "days": DAYS,
        "trend": _trend(reject_trend(operator, since, until), zone),
        "refusal": refusal,
    }
    return render(request, "loads/rejects.html", context, status=refusal.status if refusal else 200)


def _reject(one: Reject, zone: ZoneInfo, now: datetime, words: Words) -> dict[str, Any]:
    load, result = one.current.load, one.current.result()
    governing: Any = result.get("governing") or {}
    return flight_of(one.current, zone) | {
        "past": load.departure < now,
        "stops": stops(result, words),
        "governing": [
            words.said(line)
            for line in (governing.get("weight"), governing.get("cg"))
            if line and line != "not known"
        ],
        "holder": one.holder,
        "remarks": [_remark(said, zone) for said in one.remarks],
    }


def _remark(one: Remark, zone: ZoneInfo) -> dict[str, str]:
    return {
        "at": one.at.astimezone(zone).strftime("%Y-%m-%d %H:%M"),
        "by": one.person.name,
        "words": one.words,
        "holder": one.holder.name if one.holder is not None else "",
    }


def _settled(one: Settled, zone: ZoneInfo, words: Words) -> dict[str, Any]:
    load = one.current.load
    return flight_of(one.current, zone) | {
        "rejected": one.rejected.verdict,
        "stops": [f"{stop['title']}: {stop['margin']}" for stop in stops(result_in(one.rejected), words)],
        "became": _became(one),
        "end": one.end.load.id if one.end.load.id != load.id else None,
        "remarks": [_remark(said, zone) for said in one.remarks],
    }


def _became(one: Settled) -> str:
    """This function will say in a sentence what became of a rejected load."""
    if one.end.load.id != one.current.load.id:
        return f"replaced by a revision: {one.end.assessment.verdict}, {one.end.state}"
    if one.current.state == "withdrawn":
        return f"withdrawn: {one.current.step.reason}"
    return f"assessed again: {one.current.assessment.verdict}, {one.current.state}"


def _trend(trend: Trend, zone: ZoneInfo) -> dict[str, Any]:
    rejected = [one for one in trend.aircraft if one.rejected]
    count = len(trend.aircraft[0].weeks) if trend.aircraft else 0
    weeks: list[date] = [
        (trend.until - WEEK * (count - place)).astimezone(zone).date() for place in range(count)
    ]
    chart = trend_chart([Series(one.registration, one.weeks) for one in rejected], weeks)
    return {
        "chart": mark_safe(chart),  # noqa: S308  # drawn by loads.trend_chart, which escapes every word
        "aircraft": [
            {
                "registration": one.registration,
                "declared": one.declared,
                "rejected": one.rejected,
                "share": f"{round(100 * one.rejected / one.declared)} %",
            }
            for one in trend.aircraft
        ],
        "limits": [
            {
                "registration": one.registration,
                "title": one.title,
                "result": "beyond the limit" if one.result == "fail" else "could not be checked",
                "loads": one.loads,
                "last": one.last.astimezone(zone).strftime("%Y-%m-%d"),
            }
            for one in trend.limits[:MOST_LIMITS]
        ],
        "more": max(len(trend.limits) - MOST_LIMITS, 0),
    }
