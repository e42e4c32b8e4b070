"""Signing in and out, and the values every page carries."""

import re
from typing import Any, Final
from urllib.parse import urlsplit

from django.contrib.auth import authenticate, login, logout
from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.shortcuts import render, resolve_url
from django.utils.http import url_has_allowed_host_and_scheme
from django.views.decorators.debug import sensitive_post_parameters
from django.views.decorators.http import require_http_methods, require_POST

from fleet.actions.confirm_password import refuse_locked_out
from fleet.actions.noting import note_login, note_person
from fleet.models import Person
from loads.cautions import CAUTIONS, INVENTED
from records.actor import READ, Actor
from records.refusal import LockedOut

# What any login looks like. Anything else is nobody's, and the table that counts failures could not hold it.
_LOGIN: Final = re.compile(r"[a-z0-9][a-z0-9._-]{1,59}")


def page_context(request: HttpRequest) -> dict[str, Any]:
    """This function will give every page the signed-in person, their operator and the cautions."""
    user = getattr(request, "user", None)
    person = user if isinstance(user, Person) else None
    actor = getattr(request, "actor", None)
    return {
        # What the person signed in may do, by name, for links that only some may follow.
        "may": actor.may if isinstance(actor, Actor) else frozenset(),
        "may_read": isinstance(actor, Actor) and READ in actor.may,
        "operator": person.operator if person else None,
        "person_name": person.name if person else "",
        "cautions": CAUTIONS,
        "invented_words": INVENTED,
    }


def _where_next(request: HttpRequest) -> str:
    """This function will return the page asked for before signing in, if it is one of ours."""
    wanted = request.POST.get("next") or request.GET.get("next") or ""
    allowed = url_has_allowed_host_and_scheme(
        wanted, allowed_hosts={request.get_host()}, require_https=request.is_secure()
    )
    return wanted if allowed and urlsplit(wanted).path else resolve_url("day")


@sensitive_post_parameters("password")
@require_http_methods(["GET", "HEAD", "POST"])
def sign_in(request: HttpRequest) -> HttpResponse:
    """This function will show the sign-in page, and sign a person in who gives the right login and
    password.
    """
    if request.method != "POST":
        context = {"next": _where_next(request), "chosen": "chosen" in request.GET}
        return render(request, "service/sign_in.html", context)
    typed = request.POST.get("login", "")
    name = typed.strip().lower()
    try:
        person = _let_in(request, name, request.POST.get("password", ""))
    except LockedOut as locked:
        note_login(request, "locked-out", name)
        return _again(request, typed, locked)
    if person is None:
        note_login(request, "sign-in-failed", name)
        return _again(request, typed)
    note_person(request, "sign-in", person)
    login(request, person)
    return HttpResponseRedirect(_where_next(request))


def _let_in(request: HttpRequest, name: str, password: str) -> Person | None:
    """This function will return the person behind login and password, or None; raises LockedOut.

    Whoever is locked out is told before the password is looked at, so that a try does not lengthen the wait.
    """
    if _LOGIN.fullmatch(name) is None:
        return None
    refuse_locked_out(request, name)
    person = authenticate(request, username=name, password=password)
    if isinstance(person, Person):
        return person
    refuse_locked_out(request, name)
    return None


def _again(request: HttpRequest, typed: str, locked: LockedOut | None = None) -> HttpResponse:
    context = {"next": _where_next(request), "login": typed, "failed": True, "locked": locked}
    return render(request, "service/sign_in.html", context, status=429 if locked else 422)


@require_POST
def sign_out(request: HttpRequest) -> HttpResponse:
    """This function will end the session."""
    if isinstance(request.user, Person):
        note_person(request, "sign-out", request.user)
    logout(request)
    return HttpResponseRedirect(resolve_url("sign-in"))
