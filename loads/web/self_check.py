"""The page on which the computer proves itself."""

import json
from datetime import UTC
from typing import Any
from zoneinfo import ZoneInfo

from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.shortcuts import render, resolve_url
from django.utils import timezone
from django.views.decorators.http import require_http_methods

from loads.actions.self_check import run_self_check
from loads.acts import RUN_SELF_CHECK
from loads.models import SelfCheck
from loads.queries.self_checks import last_checks, standing_of
from loads.web.asking import zone_of
from records.web.asking import actor_of, operator_of, signed_in

CAUSES = {
    "start": "at a start of the service",
    "daily": "the daily one",
    "asked": "asked for",
    "overdue": "because it was overdue",
}


@require_http_methods(["GET", "HEAD", "POST"])
@signed_in
def self_check(request: HttpRequest) -> HttpResponse:
    """This function will show the last self-checks, and run one when the form is sent."""
    if request.method == "POST":
        run_self_check("asked", by=actor_of(request))
        return HttpResponseRedirect(resolve_url("self-check"))
    operator, zone = operator_of(request), zone_of(request)
    stands = standing_of(operator, timezone.now())
    checks = last_checks(operator)
    context = {
        "failed": stands.failed,
        "overdue": stands.overdue,
        "interval": stands.interval,
        "newest": _shown(checks[0], zone) if checks else None,
        "loads": _answers(checks[0]) if checks else [],
        "checks": [_shown(one, zone) for one in checks],
        "may_run": RUN_SELF_CHECK.name in actor_of(request).may,
    }
    return render(request, "loads/self_check.html", context)


def _answers(one: SelfCheck) -> list[dict[str, Any]]:
    """This function will return the reference loads of a self-check, each with how many answers are wrong."""
    loads: list[dict[str, Any]] = json.loads(one.document)["loads"]
    return [{**each, "wrong": sum(not found["right"] for found in each["findings"])} for each in loads]


def _shown(one: SelfCheck, zone: ZoneInfo) -> dict[str, Any]:
    return {
        "local": one.checked_at.astimezone(zone).strftime("%Y-%m-%d %H:%M"),
        "utc": one.checked_at.astimezone(UTC).strftime("%H:%M"),
        "cause": CAUSES[one.cause],
        "passed": one.passed,
        "engine": one.engine,
        "references": one.references,
        "act": one.act,
        "ours": one.chain != "house",
    }
