"""The page of a link by which somebody who forgot their password chooses a new one."""

from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.shortcuts import render, resolve_url
from django.views.decorators.cache import never_cache
from django.views.decorators.debug import sensitive_post_parameters
from django.views.decorators.http import require_http_methods

from fleet.actions.choose_password import choose_password, person_of_link
from fleet.models import Person
from fleet.web.asking import faults_by_input
from records.refusal import Fault, Invalid
from service.actors import actor_of_person


@never_cache
@sensitive_post_parameters("new", "again")
@require_http_methods(["GET", "HEAD", "POST"])
def new_password(request: HttpRequest, person: int, code: str) -> HttpResponse:
    """This function will show the form to whoever has a good link, and keep the password typed there.

    They sign in with it afterwards; a link alone opens no session.
    """
    whose = person_of_link(person, code)
    if request.method != "POST":
        return _page(request, whose)
    try:
        choose_password(actor_of_person(whose), whose, code, new=_typed_twice(request))
    except Invalid as refused:
        return _page(request, whose, refused)
    return HttpResponseRedirect(f"{resolve_url('sign-in')}?chosen=yes")


def _typed_twice(request: HttpRequest) -> str:
    new = request.POST.get("new", "")
    if request.POST.get("again", "") != new:
        raise Invalid(Fault("/again", "password-differs", "this is not what stands above; type both again"))
    return new


def _page(request: HttpRequest, whose: Person, refused: Invalid | None = None) -> HttpResponse:
    context = {"login": whose.login, "faults": faults_by_input(refused)}
    response = render(request, "service/new_password.html", context, status=422 if refused else 200)
    # The address holds the code: no other site may be told it.
    response.headers["Referrer-Policy"] = "no-referrer"
    return response
