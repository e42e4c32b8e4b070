"""Turns every refusal and every failure into a problem body (RFC 9457, `application/problem+json`).

`code` is stable; `type` is a relative reference made of it; `errors` name fields by JSON pointer (RFC
6901), query parameters as `?name`. A failure of ours says nothing about its inside: the log has it under
the request's number.
"""

import logging
import math
from collections.abc import Iterable, Mapping
from http import HTTPStatus
from typing import Any, Final

from django.core.exceptions import PermissionDenied, SuspiciousOperation
from django.db import InterfaceError, OperationalError
from django.http import Http404, HttpRequest, HttpResponse
from django.template.loader import render_to_string
from rest_framework import exceptions

from records.act import request_id
from records.api.render import rendered
from records.refusal import Fault, LockedOut, Refused

log = logging.getLogger(__name__)

MEDIA_TYPE: Final = "application/problem+json"
_FOR_PROGRAMS: Final = frozenset({"/health", "/health/alive", "/metrics"})
CHALLENGE: Final = 'Bearer realm="tarebook"'

# What the framework refuses, by status: code, title, next step.
_FRAMEWORK: Final[Mapping[int, tuple[str, str, str]]] = {
    400: ("unreadable", "unreadable", ""),
    401: ("not-signed-in", "not signed in", "Sign in, or send a token: Authorization: Bearer tb_..."),
    403: ("not-allowed", "not allowed", "Ask somebody who holds the duty, or have it granted."),
    404: ("not-found", "not known", "Check the address; /api/v1/openapi.json lists them all."),
    405: ("method-not-allowed", "method not allowed", "The header Allow names the methods of this address."),
    406: ("not-acceptable", "not acceptable", "Accept application/json, or */*."),
    415: ("media-type-not-read", "media type not read", "Send Content-Type: application/json."),
    429: ("too-many-requests", "too many requests", "Wait as the header Retry-After says."),
}
_REFUSED_BY_DJANGO: Final[Mapping[type[Exception], tuple[int, str]]] = {
    Http404: (404, "There is nothing at this address."),
    PermissionDenied: (403, "This is not allowed."),
    SuspiciousOperation: (400, "The request cannot be read."),
}

_NEXT_OF_PAGE: Final[Mapping[int, str]] = {
    403: "Ask somebody who holds the duty, or have it granted.",
    404: "Check the address, or begin at the day's loads.",
    500: "Try again in a minute; if it stays, report the number below.",
}


def handler(error: Exception, _context: Mapping[str, Any]) -> HttpResponse:
    """This function will answer for any exception an endpoint raised (the EXCEPTION_HANDLER of the API)."""
    if isinstance(error, Refused):
        return refusal(error)
    if isinstance(error, exceptions.APIException):
        return _refused_by_framework(error)
    for kind, (status, words) in _REFUSED_BY_DJANGO.items():
        if isinstance(error, kind):
            return _framework(status, words)
    if isinstance(error, OperationalError | InterfaceError):
        log.error("database not reached in request %s", request_id.get(), exc_info=error)
        return _unavailable()
    log.error("request %s failed", request_id.get(), exc_info=error)
    return _failure()


def refusal(refused: Refused) -> HttpResponse:
    """This function will return the problem body of a refusal."""
    headers = {}
    if isinstance(refused, LockedOut):
        headers["Retry-After"] = str(refused.wait_seconds)
    if refused.status == HTTPStatus.UNAUTHORIZED:
        # RFC 6750 section 3.1: a token that was sent and did not serve is an invalid_token.
        headers["WWW-Authenticate"] = (
            f'{CHALLENGE}, error="invalid_token"' if refused.code.startswith("token-") else CHALLENGE
        )
    return problem(
        refused.status,
        refused.code,
        refused.title,
        refused.detail,
        next_step=refused.next_step,
        faults=refused.faults,
        headers=headers,
    )


def problem(
    status: int,
    code: str,
    title: str,
    detail: str,
    *,
    next_step: str = "",
    faults: Iterable[Fault] = (),
    headers: Mapping[str, str] | None = None,
) -> HttpResponse:
    """This function will return one problem body; `title` is the same for every problem of a status."""
    body = {
        "type": f"/problems/{code}",
        "title": title,
        "status": status,
        "code": code,
        "detail": detail,
        "next_step": next_step,
        "errors": [{"pointer": f.pointer, "code": f.code, "detail": f.detail} for f in faults],
        "request": request_id.get(),
    }
    return HttpResponse(rendered(body), status=status, content_type=MEDIA_TYPE, headers=dict(headers or {}))


def is_api(request: HttpRequest) -> bool:
    """This function will say whether the request is one of a program, whose answers are JSON."""
    return request.path_info.startswith("/api/") or request.path_info in _FOR_PROGRAMS


def not_found(request: HttpRequest, exception: Exception | None = None) -> HttpResponse:  # noqa: ARG001  # the form Django calls
    """This function will answer for an address that names nothing (handler404)."""
    words = "There is nothing at this address."
    return _framework(404, words) if is_api(request) else _page(404, words)


def unreadable(request: HttpRequest, exception: Exception | None = None) -> HttpResponse:  # noqa: ARG001  # the form Django calls
    """This function will answer for a request that Django itself refuses to read (handler400)."""
    words = "The request cannot be read."
    return _framework(400, words) if is_api(request) else _page(400, words)


def not_allowed(request: HttpRequest, exception: Exception | None = None) -> HttpResponse:  # noqa: ARG001  # the form Django calls
    """This function will answer for what Django refuses before a view is asked (handler403)."""
    words = "This is not allowed."
    return _framework(403, words) if is_api(request) else _page(403, words)


def failed(request: HttpRequest) -> HttpResponse:
    """This function will answer for an exception nobody caught (handler500); Django has logged it."""
    words = "Something failed here; nothing was stored."
    return _failure() if is_api(request) else _page(500, words)


def forged(_request: HttpRequest, reason: str = "") -> HttpResponse:
    """This function will answer for a form without its token, or from elsewhere (CSRF_FAILURE_VIEW)."""
    log.warning("cross-site check of request %s: %s", request_id.get(), reason)
    return _page(403, "This form was open too long, or came from elsewhere.", "Load the page again.")


def refused_page(refused: Refused) -> HttpResponse:
    """This function will answer with a page for a refusal that no page of its own shows."""
    return _page(refused.status, refused.detail, refused.next_step)


def keep_answer(_request: HttpRequest, answer: HttpResponse, _credentials: Mapping[str, Any]) -> HttpResponse:
    """This function will keep the answer already given for a lock-out, which states the wait
    (AXES_LOCKOUT_CALLABLE).
    """
    return answer


def _refused_by_framework(error: exceptions.APIException) -> HttpResponse:
    if isinstance(error, exceptions.ValidationError):
        faults = tuple(_faults(error.get_full_details(), ""))
        return problem(422, "invalid", "invalid", "Fields of the request are wrong.", faults=faults)
    wait = getattr(error, "wait", None)
    headers = {} if wait is None else {"Retry-After": str(math.ceil(wait))}
    return _framework(error.status_code, f"{str(error.detail).rstrip('.')}.", headers)


def _framework(status: int, detail: str, headers: Mapping[str, str] | None = None) -> HttpResponse:
    code, title, next_step = _FRAMEWORK.get(status, ("refused", "refused", ""))
    if status == HTTPStatus.UNAUTHORIZED:
        headers = {**(headers or {}), "WWW-Authenticate": CHALLENGE}
    return problem(status, code, title, detail, next_step=next_step, headers=headers)


def _unavailable() -> HttpResponse:
    # A connection that breaks while a commit is answered leaves open whether it was done.
    return problem(
        503,
        "database-unavailable",
        "not available",
        "The database could not be reached or gave the request up; nothing is known to have been stored.",
        next_step="Repeat it with the same Idempotency-Key in a few seconds; nothing is done twice.",
        headers={"Retry-After": "5"},
    )


def _failure() -> HttpResponse:
    return problem(
        500,
        "unexpected",
        "failure",
        "Something failed here; nothing was stored.",
        next_step="Report the number of the request; the log has the rest under it.",
    )


def _page(status: int, words: str, next_step: str = "") -> HttpResponse:
    # Rendered without the request: whoever is signed in is not asked for, since the database may be what
    # failed.
    context = {
        "status": status,
        "words": words,
        "next_step": next_step or _NEXT_OF_PAGE.get(status, "Go back and try again."),
        "request_number": request_id.get(),
    }
    return HttpResponse(render_to_string("service/problem.html", context), status=status)


def _faults(details: Any, pointer: str) -> Iterable[Fault]:
    match details:
        case {"message": str(message), "code": str(code)}:
            yield Fault(pointer, code.replace("_", "-"), message)
        case dict():
            for name, inner in details.items():
                yield from _faults(inner, pointer if name == "non_field_errors" else f"{pointer}/{name}")
        case list() if all(
            isinstance(inner, dict) and set(inner) == {"message", "code"} for inner in details
        ):
            for inner in details:
                yield from _faults(inner, pointer)
        case list():
            for index, inner in enumerate(details):
                yield from _faults(inner, f"{pointer}/{index}")
        case _:
            pass
