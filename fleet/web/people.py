"""The pages of people: the list with a form for a new one, and one person with their duties."""

from collections.abc import Callable, Mapping
from datetime import datetime
from typing import Any
from zoneinfo import ZoneInfo

from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.shortcuts import render, resolve_url
from django.utils import timezone
from django.views.decorators.debug import sensitive_post_parameters
from django.views.decorators.http import require_http_methods, require_POST, require_safe

from fleet import acts
from fleet.actions.deactivate_person import deactivate_person
from fleet.actions.end_duty import end_duty
from fleet.actions.enter_person import enter_person
from fleet.actions.grant_duty import grant_duty
from fleet.actions.mail_link import mail_goes
from fleet.duties import READ_PEOPLE, ROLES
from fleet.models import Person
from fleet.people_reading import read_duty, read_person, read_reason
from fleet.queries.duties import roles_of
from fleet.queries.people import duties_in_order, operator_named, people_of, person_of
from fleet.web.asking import faults_by_input, local, without_empty, zone_of
from records.actor import refuse_without_leave
from records.refusal import Refused
from records.web.asking import actor_of, operator_of, signed_in

_TYPED = ("login", "name", "mail", "password", "reason")


@sensitive_post_parameters("password")
@require_http_methods(["GET", "HEAD", "POST"])
@signed_in
def people(request: HttpRequest) -> HttpResponse:
    """This function will show the operator's people, and enter one when the form is sent."""
    refuse_without_leave(actor_of(request), READ_PEOPLE)
    if request.method != "POST":
        return _list(request)
    try:
        new = read_person(without_empty({name: request.POST.get(name, "") for name in _TYPED}))
        person = enter_person(
            actor_of(request),
            operator_named(operator_of(request)),
            login=new.login,
            name=new.name,
            password=new.password,
            mail=new.mail,
            reason=new.reason,
        )
    except Refused as refusal:
        return _list(request, refusal)
    return HttpResponseRedirect(resolve_url("person", person.pk))


@require_safe
@signed_in
def one_person(request: HttpRequest, person: int) -> HttpResponse:
    """This function will show one person with every duty granted or ended."""
    return person_page(request, person)


@require_POST
@signed_in
def change_duty(request: HttpRequest, person: int) -> HttpResponse:
    """This function will grant or end the duty chosen, from now on, for the reason typed."""

    def work(whose: Person) -> None:
        granted = request.POST.get("granted") == "yes"
        typed = without_empty({name: request.POST.get(name, "") for name in ("role", "reason")})
        change = read_duty(typed | {"granted": granted})
        does = grant_duty if granted else end_duty
        does(actor_of(request), whose, change.role, reason=change.reason)

    return _done(request, person, work)


@require_POST
@signed_in
def deactivate(request: HttpRequest, person: int) -> HttpResponse:
    """This function will deactivate the person for the reason typed."""

    def work(whose: Person) -> None:
        reason = read_reason(without_empty({"reason": request.POST.get("reason", "")}))
        deactivate_person(actor_of(request), whose, reason=reason)

    return _done(request, person, work)


def _done(request: HttpRequest, number: int, work: Callable[[Person], None]) -> HttpResponse:
    refuse_without_leave(actor_of(request), READ_PEOPLE)
    whose = person_of(operator_of(request), number)
    try:
        work(whose)
    except Refused as refusal:
        return person_page(request, number, refusal)
    return HttpResponseRedirect(resolve_url("person", number))


def _list(request: HttpRequest, refusal: Refused | None = None) -> HttpResponse:
    now = timezone.now()
    context = {
        "people": [_line(one, now) for one in people_of(operator_of(request))],
        "may_enter": acts.ENTER_PERSON.name in actor_of(request).may,
        # What was typed comes back, but never a password.
        "typed": {name: request.POST.get(name, "") for name in _TYPED if name != "password"},
        "faults": faults_by_input(refusal),
        "refusal": refusal,
    }
    return render(request, "fleet/people.html", context, status=refusal.status if refusal else 200)


def person_page(
    request: HttpRequest, number: int, refusal: Refused | None = None, link: Mapping[str, Any] | None = None
) -> HttpResponse:
    """This function will show the page of one person; `link`: one to choose a password, made just now."""
    actor, now, zone = actor_of(request), timezone.now(), zone_of(request)
    refuse_without_leave(actor, READ_PEOPLE)
    person = person_of(operator_of(request), number)
    held = roles_of(person, now)
    context = {
        "person": _line(person, now),
        "duties": _duties(person, now, zone),
        "to_grant": [role for role in ROLES if role not in held],
        "to_end": held,
        "may_grant": person.is_active and acts.GRANT_DUTY.name in actor.may,
        "may_end": acts.END_DUTY.name in actor.may and bool(held),
        "may_deactivate": person.is_active
        and acts.DEACTIVATE_PERSON.name in actor.may
        and actor.person != person.pk,
        "may_let_choose": person.is_active
        and acts.LET_CHOOSE_PASSWORD.name in actor.may
        and actor.person != person.pk,
        "mail_goes": mail_goes(),
        "link": link,
        "refusal": refusal,
    }
    return render(request, "fleet/person.html", context, status=refusal.status if refusal else 200)


def _line(person: Person, now: datetime) -> dict[str, Any]:
    return {
        "number": person.pk,
        "login": person.login,
        "name": person.name,
        "mail": person.mail,
        "active": person.is_active,
        "roles": ", ".join(roles_of(person, now)) or "none",
    }


def _duties(person: Person, now: datetime, zone: ZoneInfo) -> list[dict[str, Any]]:
    return [
        {
            "role": duty.role,
            "what": "granted" if duty.granted else "ended",
            "since": local(duty.since, zone),
            "later": duty.since > now,
        }
        for duty in duties_in_order(person)
    ]
