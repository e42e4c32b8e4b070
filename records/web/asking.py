"""Who is asking for a page."""

from collections.abc import Callable
from functools import wraps
from typing import Any, cast
from urllib.parse import quote

from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.shortcuts import resolve_url

from records.actor import Actor
from records.refusal import NotAllowed

View = Callable[..., HttpResponse]


def actor_of(request: HttpRequest) -> Actor:
    """This function will return the actor that the switchboard found for this request."""
    return cast("Actor", cast("Any", request).actor)


def operator_of(request: HttpRequest) -> str:
    """This function will return the operator code of the person signed in; raises NotAllowed without one."""
    operator = actor_of(request).operator
    if operator is None:
        raise NotAllowed("no-operator", "This needs somebody who belongs to an operator.")
    return operator


def signed_in(view: View) -> View:
    """This function will make `view` ask for a sign-in first and come back to the page afterwards."""

    @wraps(view)
    def ask_first(request: HttpRequest, *args: Any, **kwargs: Any) -> HttpResponse:
        if actor_of(request).kind == "person":
            return view(request, *args, **kwargs)
        return HttpResponseRedirect(f"{resolve_url('sign-in')}?next={quote(request.get_full_path())}")

    return ask_first
