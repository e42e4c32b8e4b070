"""What an endpoint asks of a request: who is asking, the document sent, parameters, the state last seen."""

import re
from collections.abc import Collection
from datetime import datetime
from typing import Final

from django.http import HttpRequest
from rest_framework.request import Request

from records.actor import Actor
from records.refusal import Fault, Invalid, NotAllowed, NotSignedIn, PreconditionFailed, PreconditionMissing
from records.strict_json import JSON

LONGEST_PARAMETER: Final = 400
# Any instant between them can be turned into any zone; those at the ends of the calendar cannot.
EARLIEST_YEAR, LATEST_YEAR = 1900, 2900
_ETAG: Final = re.compile(r'"[\x21\x23-\x7e]{1,100}"')


def actor_of(request: Request | HttpRequest) -> Actor:
    """This function will return who is asking, as authentication found out; raises NotSignedIn when nobody
    did.
    """
    actor = getattr(request, "actor", None)  # a DRF request hands on what the plain one has
    if not isinstance(actor, Actor) or actor.kind == "stranger":
        raise NotSignedIn(
            "not-signed-in",
            "Nobody is signed in.",
            next_step="Sign in, or send a token: Authorization: Bearer tb_...",
        )
    return actor


def operator_of(request: Request | HttpRequest) -> str:
    """This function will return the operator code of who is asking; raises NotAllowed without one."""
    operator = actor_of(request).operator
    if operator is None:
        raise NotAllowed("no-operator", "This needs somebody who belongs to an operator.")
    return operator


def document_of(request: Request) -> dict[str, JSON]:
    """This function will return the document sent, which must be an object; raises Unreadable and Invalid."""
    document = request.data
    if not isinstance(document, dict):
        raise Invalid(Fault("", "not-an-object", "the body must be a JSON object"))
    return document


def parameters_of(request: Request | HttpRequest, *, allowed: Collection[str]) -> dict[str, str]:
    """This function will return the query parameters by name; raises Invalid (pointers `?name`).

    Refused: a name that is not in `allowed` (a mistyped filter must not look like no filter), one sent
    twice, an empty one, control characters, more than 400 characters.
    """
    query = request.query_params if isinstance(request, Request) else request.GET
    faults: list[Fault] = []
    found: dict[str, str] = {}
    for name, values in query.lists():
        where = f"?{name[:40]}"
        if name not in allowed:
            known = ", ".join(sorted(allowed)) or "none"
            faults.append(
                Fault(where, "parameter-unknown", f"there is no such parameter here; known: {known}")
            )
        elif len(values) > 1:
            faults.append(Fault(where, "parameter-repeated", "this parameter may be sent once"))
        elif not values[0].isprintable() or not 0 < len(values[0]) <= LONGEST_PARAMETER:
            faults.append(Fault(where, "parameter-malformed", "this needs 1 to 400 printable characters"))
        else:
            found[name] = values[0]
    if faults:
        raise Invalid(*faults)
    return found


def instant(text: str, *, where: str) -> datetime:
    """This function will read an ISO 8601 instant with its offset; raises Invalid at `where` (a pointer or
    `?name`).
    """
    try:
        # A plus sign that was not escaped arrives as a space, and can have meant nothing else.
        value = datetime.fromisoformat(text.replace(" ", "+") if "T" in text else text)
    except ValueError:
        value = None
    if value is None or value.tzinfo is None or not EARLIEST_YEAR <= value.year <= LATEST_YEAR:
        raise Invalid(
            Fault(where, "instant-malformed", "write date, time and offset, like 2026-12-01T08:30:00-06:00")
        )
    return value


def etag(state: int | str) -> str:
    """This function will return the strong entity tag (RFC 9110 section 8.8.3) of a state, like "3"."""
    return f'"{state}"'


def state_seen(request: Request) -> str:
    """This function will return what stands in `If-Match`, without its quotes; raises PreconditionMissing
    (428) without.

    One strong tag is expected: a `*` or a list would let through what this header is here to stop.
    """
    given = request.headers.get("If-Match", "").strip()
    if not given:
        raise PreconditionMissing(
            "if-match-missing",
            "This step needs the state it is taken from.",
            next_step="Read the record and send its ETag as If-Match.",
        )
    if not _ETAG.fullmatch(given):
        raise PreconditionFailed(
            "if-match-malformed",
            "If-Match must be one strong entity tag, as the record's ETag gives it.",
            next_step="Read the record again and send its ETag.",
        )
    return given[1:-1]


def refuse_stale(request: Request, current: int | str) -> None:
    """This function will do nothing when `If-Match` names the current state; raises PreconditionMissing or
    PreconditionFailed.
    """
    if state_seen(request) != str(current):
        raise PreconditionFailed(
            "state-moved-on",
            "The record has changed since it was read.",
            next_step="Read it again, look at what changed, and send its new ETag.",
        )
