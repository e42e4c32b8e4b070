"""The forms of one load's page: each takes one step of its life and shows the page again."""

from collections.abc import Callable
from uuid import UUID

from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.shortcuts import resolve_url
from django.utils import timezone
from django.views.decorators.debug import sensitive_post_parameters
from django.views.decorators.http import require_POST

from fleet.actions.confirm_password import confirm_password
from fleet.models import Person
from loads.actions.accept_load import accept_load
from loads.actions.assess_again import assess_again
from loads.actions.confirm_loading import confirm_loading
from loads.actions.depart_load import depart_load
from loads.actions.prepare_load import prepare_load
from loads.actions.self_check import check_when_overdue
from loads.actions.signing import Signing, refuse_unless_signer
from loads.actions.stepping import reason_in
from loads.actions.withdraw_load import withdraw_load
from loads.acts import ACCEPT_LOAD, CONFIRM_LOADING, PREPARE_LOAD
from loads.queries.current import Current
from loads.web.load import load_answer
from records.refusal import Fault, Invalid, NotSignedIn, Refused
from records.web.asking import actor_of, signed_in

_KINDS = {"prepared": PREPARE_LOAD, "loaded": CONFIRM_LOADING, "accepted": ACCEPT_LOAD}
_ACTIONS = {"prepared": prepare_load, "loaded": confirm_loading, "accepted": accept_load}


@sensitive_post_parameters("password")
@require_POST
@signed_in
def sign(request: HttpRequest, load: UUID) -> HttpResponse:
    """This function will sign the digest that the page showed, once the password is right."""
    return _answered(request, load, "sign", lambda: _sign(request, load))


def _sign(request: HttpRequest, load: UUID) -> Current:
    meaning, actor = request.POST.get("meaning", ""), actor_of(request)
    if meaning not in _ACTIONS:
        raise Invalid(Fault("/meaning", "choice", "sign as prepared, as loaded or as accepted"))
    refuse_unless_signer(_KINDS[meaning], actor)
    if not isinstance(request.user, Person):
        raise NotSignedIn("not-signed-in", "Only a person signs.")
    confirm_password(request, request.user, request.POST.get("password", ""))
    check_when_overdue(actor.chain)
    signing = Signing(request.POST.get("digest", ""), str(request.META.get("REMOTE_ADDR", "")))
    return _ACTIONS[meaning](load, signing, seen=_seen(request), by=actor)


@require_POST
@signed_in
def assess(request: HttpRequest, load: UUID) -> HttpResponse:
    """This function will assess a stale load again."""
    return _answered(
        request, load, "assess", lambda: assess_again(load, seen=_seen(request), by=actor_of(request))
    )


@require_POST
@signed_in
def depart(request: HttpRequest, load: UUID) -> HttpResponse:
    """This function will record that the load departs now."""
    now = timezone.now()
    return _answered(
        request, load, "depart", lambda: depart_load(load, at=now, seen=_seen(request), by=actor_of(request))
    )


@require_POST
@signed_in
def withdraw(request: HttpRequest, load: UUID) -> HttpResponse:
    """This function will withdraw the load for the reason typed."""

    def step() -> Current:
        reason = reason_in({"reason": request.POST.get("reason", "").strip()})
        return withdraw_load(load, reason=reason, seen=_seen(request), by=actor_of(request))

    return _answered(request, load, "withdraw", step)


def _seen(request: HttpRequest) -> str:
    return request.POST.get("step", "")


def _answered(request: HttpRequest, load: UUID, about: str, step: Callable[[], Current]) -> HttpResponse:
    try:
        step()
    except Refused as refusal:
        return load_answer(request, load, refusal, about)
    return HttpResponseRedirect(resolve_url("load", load))
