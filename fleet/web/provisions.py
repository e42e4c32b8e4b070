"""The pages of tables of standard weights, rules, restrictions and permits: every version, with what may be
done about it.
"""

from collections.abc import Callable
from dataclasses import dataclass
from functools import cache
from pathlib import Path
from uuid import UUID

from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.shortcuts import render
from django.urls import reverse
from django.utils import timezone
from django.views.decorators.http import require_http_methods, require_POST

from fleet import acts
from fleet.actions.approve_permit import approve_permit
from fleet.actions.approve_rules import approve_rules
from fleet.actions.approve_standard_weights import approve_standard_weights
from fleet.actions.end_permit import end_permit
from fleet.actions.enter_permit import enter_permit
from fleet.actions.enter_restriction import enter_restriction
from fleet.actions.enter_rules import enter_rules
from fleet.actions.enter_standard_weights import enter_standard_weights
from fleet.actions.lift_restriction import lift_restriction
from fleet.entering import read_ending
from fleet.models import Aircraft, Provision
from fleet.provisions import PERMIT, RESTRICTION, RULES, STANDARD_WEIGHTS
from fleet.queries.aircraft import aircraft_of
from fleet.queries.provisions import provision_history, provision_of, provisions_at
from fleet.web.asking import zone_of
from fleet.web.document_inputs import Form, paper_form, rules_form
from fleet.web.shown_provisions import version_shown
from fleet.web.typed_document import Typed, paper_in, rules_in
from records.actor import Actor
from records.kind import Kind
from records.refusal import Refused
from records.strict_json import JSON, read
from records.web.asking import actor_of, operator_of, signed_in

SAMPLES = Path(__file__).resolve().parents[1] / "samples"


@dataclass(frozen=True, slots=True)
class Desk:
    """What one of these pages is about: its words, and which acts are offered on it."""

    kind: str
    address: str
    title: str
    lead: str
    schema: str
    sample: str  # the file in fleet/samples that shows how such a document is written
    enters: Kind
    approves: Kind | None = None
    ends: Kind | None = None
    end_word: str = ""


WEIGHTS = Desk(
    STANDARD_WEIGHTS,
    "standard-weights",
    "Tables of standard weights",
    "What a person counts who was not weighed. One table holds at a time; another person approves it.",
    "tarebook.standard-weights/1",
    "standard-weights-eu.json",
    acts.ENTER_STANDARD_WEIGHTS,
    acts.APPROVE_STANDARD_WEIGHTS,
)
RULE_VALUES = Desk(
    RULES,
    "rules",
    "Rule values",
    "How often something is due and which signatures are asked, each with its source; one set at a time.",
    "tarebook.rules/1",
    "rules.json",
    acts.ENTER_RULES,
    acts.APPROVE_RULES,
)
RESTRICTIONS = Desk(
    RESTRICTION,
    "restrictions",
    "Restrictions",
    "What is inoperative, blocked or lowered. Each binds as soon as it is entered; another person lifts it.",
    "tarebook.restriction/1",
    "restriction.json",
    acts.ENTER_RESTRICTION,
    None,
    acts.LIFT_RESTRICTION,
    "Lift",
)
PERMITS = Desk(
    PERMIT,
    "permits",
    "Permits",
    "What an authority widened, for a time. Another person approves it; it lapses by itself.",
    "tarebook.permit/1",
    "permit.json",
    acts.ENTER_PERMIT,
    acts.APPROVE_PERMIT,
    acts.END_PERMIT,
    "End",
)


@require_http_methods(["GET", "HEAD", "POST"])
@signed_in
def standard_weights(request: HttpRequest) -> HttpResponse:
    """This function will show the operator's tables, and enter the one sent."""
    return _desk(
        request, WEIGHTS, None, lambda actor: enter_standard_weights(actor, _document(request, WEIGHTS))
    )


@require_http_methods(["GET", "HEAD", "POST"])
@signed_in
def rules(request: HttpRequest) -> HttpResponse:
    """This function will show the operator's rule values, and enter the set sent."""
    return _desk(
        request, RULE_VALUES, None, lambda actor: enter_rules(actor, _document(request, RULE_VALUES))
    )


@require_http_methods(["GET", "HEAD", "POST"])
@signed_in
def restrictions(request: HttpRequest, registration: str) -> HttpResponse:
    """This function will show an aircraft's restrictions, and enter the one sent."""
    aircraft = aircraft_of(operator_of(request), registration)
    return _desk(
        request,
        RESTRICTIONS,
        aircraft,
        lambda actor: enter_restriction(actor, aircraft, _document(request, RESTRICTIONS)),
    )


@require_http_methods(["GET", "HEAD", "POST"])
@signed_in
def permits(request: HttpRequest, registration: str) -> HttpResponse:
    """This function will show an aircraft's permits, and enter the one sent."""
    aircraft = aircraft_of(operator_of(request), registration)
    return _desk(
        request, PERMITS, aircraft, lambda actor: enter_permit(actor, aircraft, _document(request, PERMITS))
    )


@require_POST
@signed_in
def approve_weights(request: HttpRequest, version: UUID) -> HttpResponse:
    """This function will approve a table on behalf of the person signed in."""
    table = provision_of(operator_of(request), STANDARD_WEIGHTS, version)
    return _desk(request, WEIGHTS, None, lambda actor: approve_standard_weights(actor, table))


@require_POST
@signed_in
def approve_the_rules(request: HttpRequest, version: UUID) -> HttpResponse:
    """This function will approve a set of rule values on behalf of the person signed in."""
    found = provision_of(operator_of(request), RULES, version)
    return _desk(request, RULE_VALUES, None, lambda actor: approve_rules(actor, found))


@require_POST
@signed_in
def lift(request: HttpRequest, registration: str, version: UUID) -> HttpResponse:
    """This function will lift a restriction from now on."""
    aircraft, found = _of_aircraft(request, registration, RESTRICTION, version)
    return _desk(
        request,
        RESTRICTIONS,
        aircraft,
        lambda actor: lift_restriction(actor, aircraft, found, reason=_reason(request)),
    )


@require_POST
@signed_in
def approve_a_permit(request: HttpRequest, registration: str, version: UUID) -> HttpResponse:
    """This function will approve a permit on behalf of the person signed in."""
    aircraft, found = _of_aircraft(request, registration, PERMIT, version)
    return _desk(request, PERMITS, aircraft, lambda actor: approve_permit(actor, aircraft, found))


@require_POST
@signed_in
def end_a_permit(request: HttpRequest, registration: str, version: UUID) -> HttpResponse:
    """This function will end a permit from now on."""
    aircraft, found = _of_aircraft(request, registration, PERMIT, version)
    return _desk(
        request, PERMITS, aircraft, lambda actor: end_permit(actor, aircraft, found, reason=_reason(request))
    )


def _of_aircraft(
    request: HttpRequest, registration: str, kind: str, version: UUID
) -> tuple[Aircraft, Provision]:
    aircraft = aircraft_of(operator_of(request), registration)
    return aircraft, provision_of(operator_of(request), kind, version, aircraft)


def _document(request: HttpRequest, desk: Desk) -> JSON:
    """Return what was sent: a document pasted, or what was typed in the inputs."""
    if "typed" not in request.POST:
        return read(request.POST.get("document", "").encode())
    return _made(_typed(request), desk)


def _typed(request: HttpRequest) -> Typed:
    return Typed({name: str(value) for name, value in request.POST.items()}, zone_of(request))


def _made(typed: Typed, desk: Desk) -> JSON:
    return rules_in(typed) if desk.kind == RULES else paper_in(typed, desk.kind)


def _form(request: HttpRequest, desk: Desk, refusal: Refused | None) -> Form | None:
    """Return the inputs of a page, each with what was wrong with it; None where a document is pasted only."""
    if desk.kind == STANDARD_WEIGHTS:
        return None
    typed = _typed(request)
    faults: dict[str, str] = {}
    if refusal is not None and "typed" in request.POST:
        _made(typed, desk)
        for fault in refusal.faults:
            faults.setdefault(typed.input_at(fault.pointer), fault.detail)
    zone = str(typed.zone).replace("_", " ")
    return (
        rules_form(typed, faults, zone) if desk.kind == RULES else paper_form(typed, faults, desk.kind, zone)
    )


def _reason(request: HttpRequest) -> str:
    return read_ending({"reason": request.POST.get("reason", "").strip()}).reason


def _desk(
    request: HttpRequest, desk: Desk, aircraft: Aircraft | None, do: Callable[[Actor], object]
) -> HttpResponse:
    """Do what was sent and show the page again, or show it; a refusal shows on it."""
    refusal = None
    if request.method == "POST":
        try:
            do(actor_of(request))
        except Refused as refused:
            refusal = refused
        else:
            return HttpResponseRedirect(_address(desk.address, aircraft))
    operator, actor, now = operator_of(request), actor_of(request), timezone.now()
    held = frozenset(one.id for one in provisions_at(operator, aircraft, now, now).all())
    zone = zone_of(request)
    versions = [
        version_shown(one, zone, now, held) | _offers(desk, one, aircraft, actor)
        for one in provision_history(operator, desk.kind, aircraft)
    ]
    context = {
        "title": desk.title,
        "lead": desk.lead,
        "schema": desk.schema,
        "sample": sample_text(desk.sample) if desk.enters.name in actor.may else "",
        "ends": desk.ends is not None,
        "end_word": desk.end_word,
        "aircraft": aircraft,
        "versions": versions,
        "may_enter": desk.enters.name in actor.may,
        "typed": request.POST.get("document", ""),
        "form": _form(request, desk, refusal) if desk.enters.name in actor.may else None,
        "refusal": refusal,
    }
    return render(request, "fleet/provisions.html", context, status=refusal.status if refusal else 200)


@cache
def sample_text(name: str) -> str:
    """This function will return a sample document of the folder `fleet/samples`, as it stands there."""
    return (SAMPLES / name).read_text("utf-8")


def _offers(desk: Desk, one: Provision, aircraft: Aircraft | None, actor: Actor) -> dict[str, str]:
    """Return the addresses of what this actor may do about a version now; the actions ask all of it again."""
    approved = desk.approves is None or getattr(one, "approval", None) is not None
    author = actor.person == one.entered_by_id
    offers = {}
    if desk.approves is not None and not approved and not author and desk.approves.name in actor.may:
        offers["approve_address"] = _address(desk.approves.name, aircraft, one)
    open_still = getattr(one, "ending", None) is None
    may_end = open_still and (not author or desk.ends is acts.END_PERMIT)
    if desk.ends is not None and may_end and desk.ends.name in actor.may:
        offers["end_address"] = _address(desk.ends.name, aircraft, one)
    return offers


def _address(name: str, aircraft: Aircraft | None, one: Provision | None = None) -> str:
    parts = [*([aircraft.registration] if aircraft else []), *([one.id] if one else [])]
    return reverse(name, args=parts)
