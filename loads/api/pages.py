"""Reading filters and cursors of the list of loads, and writing the address of the next page."""

import base64
import binascii
from collections.abc import Mapping
from datetime import datetime
from urllib.parse import urlencode
from uuid import UUID

from rest_framework.request import Request

from loads.lifecycle import STATES
from loads.queries.listing import MOST_ROWS, Filters, Place
from records.api.asking import instant
from records.refusal import Fault, Invalid

PARAMETERS = ("aircraft", "from", "to", "state", "verdict", "reference", "limit", "cursor")
VERDICTS = ("within", "outside", "unresolved")
USUAL_ROWS = 50
_LIMITS = frozenset(str(rows) for rows in range(1, MOST_ROWS + 1))


def filters_in(asked: Mapping[str, str]) -> Filters:
    """This function will return the filters asked for; raises Invalid."""
    return Filters(
        since=instant(asked["from"], where="?from") if "from" in asked else None,
        until=instant(asked["to"], where="?to") if "to" in asked else None,
        aircraft=asked.get("aircraft", ""),
        state=_one_of(asked, "state", STATES),
        verdict=_one_of(asked, "verdict", VERDICTS),
        reference=asked.get("reference", ""),
    )


def page_asked(asked: Mapping[str, str]) -> tuple[Place | None, int]:
    """This function will return where the page begins and how many rows it has; raises Invalid."""
    limit = asked.get("limit", str(USUAL_ROWS))
    if limit not in _LIMITS:
        raise Invalid(Fault("?limit", "out-of-range", f"write a whole number from 1 to {MOST_ROWS}"))
    return (_place_in(asked["cursor"]) if "cursor" in asked else None), int(limit)


def next_address(request: Request, after: Place) -> str:
    """This function will return the address of the page after `after`, with the same filters."""
    token = (
        base64.urlsafe_b64encode(f"{after.departure.isoformat()} {after.load}".encode()).decode().rstrip("=")
    )
    asked = {name: value for name, value in request.query_params.items() if name != "cursor"}
    return f"{request.path}?{urlencode({**asked, 'cursor': token})}"


def _place_in(token: str) -> Place:
    try:
        text = base64.urlsafe_b64decode(token + "=" * (-len(token) % 4)).decode("ascii")
        departure, load = text.split(" ")
        place = Place(datetime.fromisoformat(departure), UUID(load))
    except (ValueError, binascii.Error):
        place = None
    if place is None or place.departure.tzinfo is None:
        raise Invalid(
            Fault("?cursor", "cursor-malformed", "send a cursor as the link to the next page gives it")
        )
    return place


def _one_of(asked: Mapping[str, str], name: str, words: tuple[str, ...]) -> str:
    word = asked.get(name, "")
    if word and word not in words:
        raise Invalid(Fault(f"?{name}", "choice", f"one of: {', '.join(words)}"))
    return word
