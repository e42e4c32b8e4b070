"""The page of the operator's settings: what holds, every version, and a form for the next one."""

from datetime import datetime
from typing import Any
from zoneinfo import ZoneInfo

from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.shortcuts import render, resolve_url
from django.utils import timezone
from django.views.decorators.http import require_http_methods

from fleet.actions.change_settings import change_settings
from fleet.acts import CHANGE_SETTINGS
from fleet.models import Operator, OperatorSettings
from fleet.queries.settings import Settings, last_number, settings_at, settings_history, settings_of
from fleet.settings_reading import read_settings
from records.refusal import Invalid, Refused
from records.web.asking import actor_of, operator_of, signed_in

# Which input a fault belongs to, by the beginning of its pointer.
_INPUT_OF = (
    ("/last_minute_bound/weight", "last_minute_weight"),
    ("/last_minute_bound/persons", "last_minute_persons"),
    ("/operations_mail", "operations_mail"),
    ("/weighing_threshold_percent", "weighing_threshold_percent"),
    ("/true_from", "true_from"),
    ("/procedure", "procedure"),
    ("/weight_method", "weight_method"),
    ("/reason", "reason"),
)
_MOST_PERSONS_DIGITS = 3


@require_http_methods(["GET", "HEAD", "POST"])
@signed_in
def settings(request: HttpRequest) -> HttpResponse:
    """This function will show the settings, and enter a new version when the form is sent."""
    if request.method != "POST":
        return _page(request)
    zone = _zone(operator_of(request))
    try:
        change = read_settings(_document(request, zone))
        change_settings(actor_of(request), change, seen=request.POST.get("seen", ""))
    except Refused as refusal:
        return _page(request, refusal)
    return HttpResponseRedirect(resolve_url("settings"))


def _page(request: HttpRequest, refusal: Refused | None = None) -> HttpResponse:
    operator, now = operator_of(request), timezone.now()
    zone = _zone(operator)
    held = settings_at(operator, now, now)
    typed = {name: str(value) for name, value in request.POST.items()} if refusal else _typed(held)
    context = {
        "held": _lines(held, zone),
        "versions": [_version(row, zone, now) for row in settings_history(operator)],
        "may_change": CHANGE_SETTINGS.name in actor_of(request).may,
        "typed": typed,
        "seen": typed.get("seen", last_number(operator)),
        "faults": _faults(refusal),
        "refusal": refusal,
        "zone": f"UTC{now.astimezone(zone).isoformat()[-6:]}",
    }
    return render(request, "fleet/settings.html", context, status=refusal.status if refusal else 200)


def _zone(operator: str) -> ZoneInfo:
    return ZoneInfo(Operator.objects.values_list("time_zone", flat=True).get(code=operator))


def _document(request: HttpRequest, zone: ZoneInfo) -> dict[str, Any]:
    """This function will write the form as the document that the API reads, so that both are read alike."""
    typed = {name: str(value).strip() for name, value in request.POST.items()}
    document: dict[str, Any] = {
        name: typed.get(name, "") for name in ("reason", "rule_set", "procedure", "weight_method")
    }
    document["prepare_and_accept_by_one"] = typed.get("prepare_and_accept_by_one") == "yes"
    document["estimates_may_be_signed"] = typed.get("estimates_may_be_signed") == "yes"
    document["weighing_threshold_percent"] = typed.get("weighing_threshold_percent") or None
    document["operations_mail"] = typed.get("operations_mail", "").split()
    document["last_minute_bound"] = _bound(typed)
    if typed.get("true_from"):
        document["true_from"] = _instant(typed["true_from"], zone)
    return document


def _bound(typed: dict[str, str]) -> dict[str, Any] | None:
    weight, persons = typed.get("last_minute_weight", ""), typed.get("last_minute_persons", "")
    if not weight and not persons:
        return None
    plain = persons.isascii() and persons.isdigit() and len(persons) <= _MOST_PERSONS_DIGITS
    return {
        "weight": {"value": weight, "unit": typed.get("last_minute_unit", "")},
        "persons": int(persons) if plain else persons,
    }


def _instant(text: str, zone: ZoneInfo) -> str:
    """This function will write a time of the operator's clock with its offset; what is none stays so."""
    try:
        return datetime.fromisoformat(text).replace(tzinfo=zone).isoformat()
    except (ValueError, OverflowError):
        return text


def _faults(refusal: Refused | None) -> dict[str, str]:
    found: dict[str, str] = {}
    if isinstance(refusal, Invalid):
        for fault in refusal.faults:
            name = next((name for start, name in _INPUT_OF if fault.pointer.startswith(start)), "")
            found.setdefault(name, fault.detail)
    return found


def _typed(held: Settings) -> dict[str, str]:
    def words(value: object) -> str:
        return "" if value is None else f"{value}"

    return {
        "last_minute_weight": words(held.last_minute_bound_weight),
        "last_minute_unit": held.last_minute_bound_unit or ("kg" if held.rule_set == "EU-UK" else "lb"),
        "last_minute_persons": words(held.last_minute_bound_persons),
        "weighing_threshold_percent": words(held.weighing_threshold_percent),
        "operations_mail": " ".join(held.operations_mail),
        "prepare_and_accept_by_one": "yes" if held.prepare_and_accept_by_one else "no",
        "estimates_may_be_signed": "yes" if held.estimates_may_be_signed else "no",
        "rule_set": held.rule_set,
        "procedure": held.procedure,
        "weight_method": held.weight_method,
    }


def _lines(held: Settings, zone: ZoneInfo) -> list[dict[str, Any]]:
    bound = "none: nothing may change at the last minute"
    if held.last_minute_bound_weight is not None:
        persons = held.last_minute_bound_persons or 0
        bound = (
            f"{held.last_minute_bound_weight} {held.last_minute_bound_unit} and {persons}"
            f" {'person' if persons == 1 else 'persons'}, added up over a load"
        )
    threshold = "not set"
    if held.weighing_threshold_percent is not None:
        threshold = f"{held.weighing_threshold_percent} % of the landing weight limit"
    since = f"since {_local(held.true_from, zone)}" if held.true_from else "as entered with the operator"
    return [
        {"title": "Most that may change at the last minute", "value": bound},
        {"title": "Signatures", "value": _by_one(held)},
        {"title": "Estimated weights of people", "value": _estimates(held)},
        {"title": "Operations are told at", "value": ", ".join(held.operations_mail) or "no address"},
        {"title": "Change of empty weight that needs a cause", "value": threshold},
        {"title": "Procedure, as manifests name it", "value": held.procedure},
        {"title": "How weights are got", "value": held.weight_method},
        {"title": "Rule set", "value": held.rule_set},
        {"title": "This version", "value": f"No. {held.number}, {since}" if held.number else since},
    ]


def _by_one(held: Settings) -> str:
    if held.prepare_and_accept_by_one:
        return "one person may prepare and accept"
    return "another person prepares than accepts"


def _estimates(held: Settings) -> str:
    if held.estimates_may_be_signed:
        return "may be signed by the procedure"
    return "cannot be signed"


def _version(row: OperatorSettings, zone: ZoneInfo, now: datetime) -> dict[str, Any]:
    held = settings_of(row)
    return {
        "number": row.number,
        "true_from": _local(row.true_from, zone),
        "known_from": _local(row.known_from, zone),
        "later": row.true_from > now,
        "by": row.entered_by.name,
        "reason": row.reason,
        "lines": [f"{line['title']}: {line['value']}" for line in _lines(held, zone)[:-1]],
    }


def _local(instant: datetime | None, zone: ZoneInfo) -> str:
    return instant.astimezone(zone).strftime("%Y-%m-%d %H:%M") if instant else ""
