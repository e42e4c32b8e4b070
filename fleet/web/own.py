"""The page of oneself: the password, the sessions, and who signed in lately."""

from django.contrib.auth import update_session_auth_hash
from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.shortcuts import render, resolve_url
from django.utils import timezone
from django.views.decorators.debug import sensitive_post_parameters
from django.views.decorators.http import require_POST, require_safe

from fleet.actions.change_mail import change_mail
from fleet.actions.change_password import change_password
from fleet.actions.confirm_password import confirm_password
from fleet.actions.end_sessions import end_sessions
from fleet.people_reading import read_mail, read_password
from fleet.queries.duties import roles_of
from fleet.web.access_log import WORDS
from fleet.web.asking import faults_by_input, local, person_of_page, zone_of
from records.queries import events_of
from records.refusal import Fault, Invalid, Refused
from records.web.asking import actor_of, operator_of, signed_in

_SHOWN_EVENTS = 10
_DONE = {
    "password": "The password is changed, and every other session of yours has ended.",
    "mail": "The mail address is kept.",
    "sessions": "Every other session of yours has ended.",
}


@require_safe
@signed_in
def own(request: HttpRequest) -> HttpResponse:
    """This function will show the person signed in what is theirs."""
    return _page(request)


@sensitive_post_parameters("current", "new", "again")
@require_POST
@signed_in
def password(request: HttpRequest) -> HttpResponse:
    """This function will change the password, and keep only the session that asked."""
    person = person_of_page(request)
    try:
        typed = read_password({name: request.POST.get(name, "") for name in ("current", "new")})
        if request.POST.get("again", "") != typed.new:
            raise Invalid(
                Fault("/again", "password-differs", "this is not what stands above; type both again")
            )
        confirm_password(request, person, typed.current, pointer="/current")
        change_password(actor_of(request), person, current=typed.current, new=typed.new)
    except Refused as refusal:
        return _page(request, refusal)
    update_session_auth_hash(request, person)
    return HttpResponseRedirect(f"{resolve_url('own')}?done=password")


@require_POST
@signed_in
def mail(request: HttpRequest) -> HttpResponse:
    """This function will keep the mail address typed; an empty one takes it out."""
    try:
        typed = read_mail({"mail": request.POST.get("mail", "").strip()})
        change_mail(actor_of(request), person_of_page(request), typed)
    except Refused as refusal:
        return _page(request, refusal)
    return HttpResponseRedirect(f"{resolve_url('own')}?done=mail")


@require_POST
@signed_in
def sessions(request: HttpRequest) -> HttpResponse:
    """This function will end every session of the person but the one that asked."""
    person = end_sessions(actor_of(request), person_of_page(request))
    update_session_auth_hash(request, person)
    return HttpResponseRedirect(f"{resolve_url('own')}?done=sessions")


def _page(request: HttpRequest, refusal: Refused | None = None) -> HttpResponse:
    person, zone = person_of_page(request), zone_of(request)
    events = events_of(operator_of(request), key=f"person:{person.pk}", most=_SHOWN_EVENTS)
    context = {
        "login": person.login,
        "name": person.name,
        "mail": request.POST.get("mail", person.mail),
        "roles": ", ".join(roles_of(person, timezone.now())),
        "events": [
            {"at": local(one.at, zone), "what": WORDS[one.what], "origin": one.origin[:8]} for one in events
        ],
        "faults": faults_by_input(refusal),
        "refusal": refusal,
        "done": _DONE.get(request.GET.get("done", "")),
    }
    return render(request, "fleet/own.html", context, status=refusal.status if refusal else 200)
