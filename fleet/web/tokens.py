"""The page of tokens: the list, and forms to issue one, give it a new secret, revoke it."""

from datetime import datetime
from typing import Any
from zoneinfo import ZoneInfo

from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.shortcuts import render, resolve_url
from django.utils import timezone
from django.views.decorators.http import require_http_methods, require_POST

from fleet import acts
from fleet.actions.issue_token import issue_token
from fleet.actions.revoke_token import revoke_token
from fleet.actions.rotate_token import rotate_token
from fleet.duties import READ_PEOPLE
from fleet.models import Person, Token
from fleet.people_reading import read_reason, read_rotation, read_token
from fleet.queries.grantable import grantable_to
from fleet.queries.people import people_of, person_of
from fleet.queries.tokens import secrets_of, tokens_of
from fleet.web.asking import faults_by_input, local, person_of_page, whole_or_words, without_empty, zone_of
from records.actor import Actor
from records.queries import last_uses
from records.refusal import Refused
from records.web.asking import actor_of, operator_of, signed_in

# What the page shows once, after a secret was made.
Shown = dict[str, Any]


@require_http_methods(["GET", "HEAD", "POST"])
@signed_in
def tokens(request: HttpRequest) -> HttpResponse:
    """This function will show the tokens, and issue one when the form is sent; its secret shows this once."""
    if request.method != "POST":
        return _page(request)
    try:
        new = read_token(_document(request))
        whose = person_of(operator_of(request), new.person or person_of_page(request).pk)
        issued = issue_token(
            actor_of(request),
            whose,
            label=new.label,
            scopes=new.scopes,
            grantable=grantable_to(whose, integration=new.integration),
            valid_for=new.valid_for,
            integration=new.integration,
            registrations=new.registrations,
        )
    except Refused as refusal:
        return _page(request, refusal=refusal)
    shown = {"label": issued.token.label, "secret": issued.secret, "until": issued.token.expires_at}
    return _page(request, shown=shown)


@require_POST
@signed_in
def rotate(request: HttpRequest, token: int) -> HttpResponse:
    """This function will give the token a new secret, which shows this once."""
    typed = {name: whole_or_words(request.POST.get(name, "").strip()) for name in ("overlap_hours", "days")}
    try:
        new = read_rotation(typed)
        made = rotate_token(actor_of(request), token, overlap=new.overlap, valid_for=new.valid_for)
    except Refused as refusal:
        return _page(request, refusal=refusal, about=token)
    shown = {
        "label": made.token.label,
        "secret": made.secret,
        "until": made.rotation.expires_at,
        "before": made.rotation.previous_ends_at,
    }
    return _page(request, shown=shown)


@require_POST
@signed_in
def revoke(request: HttpRequest, token: int) -> HttpResponse:
    """This function will revoke the token for the reason typed."""
    try:
        reason = read_reason(without_empty({"reason": request.POST.get("reason", "")}))
        revoke_token(actor_of(request), token, reason=reason)
    except Refused as refusal:
        return _page(request, refusal=refusal, about=token)
    return HttpResponseRedirect(resolve_url("tokens"))


def _document(request: HttpRequest) -> dict[str, Any]:
    """This function will write the form as the document that the API reads, so that both are read alike."""
    typed = request.POST
    document: dict[str, Any] = {
        "label": typed.get("label", ""),
        "scopes": typed.getlist("scopes"),
        "days": whole_or_words(typed.get("days", "").strip()),
        "integration": typed.get("integration") == "yes",
    }
    if named := typed.get("registrations", "").upper().split():
        document["registrations"] = named
    if typed.get("person"):
        document["person"] = whole_or_words(typed["person"])
    return document


def _page(
    request: HttpRequest,
    *,
    refusal: Refused | None = None,
    shown: Shown | None = None,
    about: int | None = None,
) -> HttpResponse:
    actor, operator, zone, now = actor_of(request), operator_of(request), zone_of(request), timezone.now()
    own = person_of_page(request)
    found = tokens_of(operator, None if READ_PEOPLE in actor.may else own.pk)
    used = last_uses(operator, [one.pk for one in found])
    lines = [_line(one, actor, now, zone, used.get(one.pk)) for one in found]
    enters = acts.ENTER_PERSON.name in actor.may
    context = {
        "live": [one for one in lines if one["secrets"]],
        "gone": [one for one in lines if not one["secrets"]],
        "may_issue": acts.ISSUE_TOKEN.name in actor.may,
        "scopes": _scopes(request, own),
        "programs": [_choice(request, one) for one in people_of(operator) if one.is_active] if enters else [],
        "typed": {name: request.POST.get(name, "") for name in ("label", "registrations", "days")},
        "integration": request.POST.get("integration") == "yes",
        "faults": faults_by_input(refusal) if about is None else {},
        "refusal": refusal,
        "shown": shown and shown | {name: local(shown.get(name), zone) for name in ("until", "before")},
    }
    if shown:
        # What is done does not stand in the form as if it were still to be sent.
        scopes = [one | {"chosen": False} for one in _scopes(request, own)]
        context |= {"typed": {}, "integration": False, "scopes": scopes}
    return render(request, "fleet/tokens.html", context, status=refusal.status if refusal else 200)


def _scopes(request: HttpRequest, person: Person) -> list[dict[str, Any]]:
    chosen = request.POST.getlist("scopes")
    return [
        {"name": scope, "chosen": scope in chosen}
        for scope in sorted(grantable_to(person, integration=False))
    ]


def _choice(request: HttpRequest, person: Person) -> dict[str, Any]:
    chosen = request.POST.get("person") == str(person.pk)
    return {"number": person.pk, "words": f"{person.name} ({person.login})", "chosen": chosen}


def _line(token: Token, actor: Actor, now: datetime, zone: ZoneInfo, used: datetime | None) -> dict[str, Any]:
    secrets = () if token.revoked_at else secrets_of(token)
    own = token.person_id == actor.person
    may_touch = own or (token.integration and acts.ENTER_PERSON.name in actor.may)
    return {
        "number": token.pk,
        "label": token.label,
        "person": token.person.name,
        "kind": "integration" if token.integration else "person",
        "scopes": token.scopes,
        "registrations": ", ".join(token.registrations) or "all",
        "issued": local(token.issued_at, zone),
        "revoked": local(token.revoked_at, zone),
        "used": local(used, zone) or "not yet",
        "secrets": [
            {"number": one.number + 1, "ends": local(one.ends_at, zone)}
            for one in secrets
            if one.ends_at > now
        ],
        "may_rotate": may_touch and acts.ROTATE_TOKEN.name in actor.may,
        "may_revoke": may_touch and acts.REVOKE_TOKEN.name in actor.may,
    }
