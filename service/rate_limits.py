"""How many requests a minute are answered: of a token or a person, and of an address nobody is known at.

Signing in is limited by address and signing by person besides, for both try a password. The headers follow
draft-ietf-httpapi-ratelimit-headers-10 (remembered, not read): `RateLimit-Policy: "known";q=1200;w=60` and
`RateLimit: "known";r=1187;t=1`.
"""

import hashlib
from collections.abc import Callable
from typing import Final

from django.conf import settings
from django.http import HttpRequest
from django.http.response import HttpResponseBase
from django.urls import Resolver404, resolve

from fleet.models import Person, Token
from records.refusal import LockedOut
from service import pace
from service.addresses import address_of
from service.problems import is_api, refusal, refused_page

# Asked by monitors, and by whoever finds out why nothing else answers.
EXEMPT: Final = frozenset({"health", "api-health", "alive", "metrics"})
SIGNING_IN: Final = frozenset({"sign-in", "new-password"})
# Whatever tries the password of somebody who is signed in.
SIGNING: Final = frozenset(
    {
        "api-load-signatures",
        "sign-load",
        "api-load-late-changes",
        "change-load-late",
        "api-own-password",
        "own-password",
    }
)


class RateLimitMiddleware:
    """Lets a request through or answers 429, before anything is looked up in the database."""

    def __init__(self, get_response: Callable[[HttpRequest], HttpResponseBase]) -> None:
        self.get_response = get_response

    def __call__(self, request: HttpRequest) -> HttpResponseBase:
        """This function will answer the request, or refuse it when it comes too soon."""
        name = _name_of(request)
        if name in EXEMPT:
            return self.get_response(request)
        mark = _mark_of(request)
        found = pace.asked(mark, address_of(request), _further(request, name))
        if found.refused:
            response = _refused(request, found)
        else:
            response = self.get_response(request)
            if mark and not found.known and (holder := _holder(request)):
                pace.note_holder(mark, holder)
        _tell(response, found)
        return response


def _name_of(request: HttpRequest) -> str:
    try:
        return resolve(request.path_info).url_name or ""
    except Resolver404:
        return ""


def _mark_of(request: HttpRequest) -> str:
    """This function will return a digest of the token or session that came, which says nothing about it."""
    credential = request.headers.get("Authorization", "") or request.COOKIES.get(
        settings.SESSION_COOKIE_NAME, ""
    )
    return hashlib.sha256(credential.encode("utf-8", "surrogatepass")).hexdigest()[:40] if credential else ""


def _further(request: HttpRequest, name: str) -> list[tuple[str, str, int]]:
    limits = settings.RATE_LIMITS
    if request.method != "POST":
        return []
    if name in SIGNING_IN:
        return [("sign-in", "address", limits["sign-in"])]
    if name in SIGNING:
        return [("signing", "who", limits["signing"])]
    return []


def _holder(request: HttpRequest) -> str:
    """This function will return who turned out to ask, once the request was answered; "" for a stranger."""
    # The framework of the API leaves both on the request it was given.
    token, person = getattr(request, "auth", None), getattr(request, "user", None)
    if isinstance(token, Token):
        return f"token:{token.pk}"
    return f"person:{person.pk}" if isinstance(person, Person) else ""


def _refused(request: HttpRequest, found: pace.Pace) -> HttpResponseBase:
    quota = next(one.quota for one in found.allowances if one.name == found.refused)
    error = LockedOut(
        "too-many-requests",
        f"More than {quota} requests a minute came ({found.refused}).",
        wait_seconds=found.wait_seconds,
        next_step=f"Send it again in {found.wait_seconds} s, as the header Retry-After says.",
    )
    response = refusal(error) if is_api(request) else refused_page(error)
    response.headers["Retry-After"] = str(found.wait_seconds)
    return response


def _tell(response: HttpResponseBase, found: pace.Pace) -> None:
    if found.allowances:
        response.headers["RateLimit-Policy"] = ", ".join(
            f'"{one.name}";q={one.quota};w={pace.WINDOW_SECONDS}' for one in found.allowances
        )
        response.headers["RateLimit"] = ", ".join(
            f'"{one.name}";r={one.left};t={one.whole_after}' for one in found.allowances
        )
