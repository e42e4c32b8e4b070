"""Who is asking for a page."""

from collections.abc import Callable
from functools import wraps
from typing import Any, cast
from urllib.parse import quote

from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.shortcuts import resolve_url

from records.actor import READ, Actor
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
    """This function will make `view` ask for a sign-in first and come back to the page afterwards.

    Whoever is signed in and holds no duty is refused: raises NotAllowed.
    """

    @wraps(view)
    def ask_first(request: HttpRequest, *args: Any, **kwargs: Any) -> HttpResponse:
        actor = actor_of(request)
        if actor.kind != "person":
            return HttpResponseRedirect(f"{resolve_url('sign-in')}?next={quote(request.get_full_path())}")
        if READ not in actor.may:
            raise NotAllowed(
                "read-not-allowed",
                f"{actor.name} holds no duty, so there is nothing to see here.",
                next_step="Have the operations manager grant a duty.",
            )
        return view(request, *args, **kwargs)

    return ask_first
