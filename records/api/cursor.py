"""Pages of a long list: the cursor says after which row the next page begins (a keyset, never a count)."""

import base64
import binascii
from collections.abc import Mapping
from typing import Final
from urllib.parse import urlencode
from uuid import UUID

from rest_framework.request import Request

from records.refusal import Fault, Invalid

USUAL_ROWS: Final = 50


def cursor_text(row: UUID | int) -> str:
    """This function will write the cursor of the page that begins after this row."""
    return base64.urlsafe_b64encode(str(row).encode()).decode().rstrip("=")


def uuid_in(cursor: str) -> UUID:
    """This function will read a cursor that names a row by UUID; raises Invalid."""
    try:
        return UUID(_inside(cursor))
    except ValueError:
        raise _malformed() from None


def number_in(cursor: str) -> int:
    """This function will read a cursor that names a row by a number, 1 to 2,147,483,647; raises Invalid."""
    text = _inside(cursor)
    if not (text.isascii() and text.isdigit()) or not 0 < int(text[:11]) < 2**31:
        raise _malformed()
    return int(text)


def limit_in(asked: Mapping[str, str], most: int, usual: int = USUAL_ROWS) -> int:
    """This function will return how many rows a page has, from `?limit`; raises Invalid."""
    text = asked.get("limit", str(usual))
    if not (text.isascii() and text.isdigit()) or not 1 <= int(text[:6]) <= most or text[0] == "0":
        raise Invalid(Fault("?limit", "out-of-range", f"write a whole number from 1 to {most}"))
    return int(text)


def next_page(request: Request, cursor: str) -> str:
    """This function will return the address of the page at the cursor, with the same filters."""
    asked = {name: value for name, value in request.query_params.items() if name != "cursor"}
    return f"{request.path}?{urlencode({**asked, 'cursor': cursor})}"


def _inside(cursor: str) -> str:
    try:
        return base64.urlsafe_b64decode(cursor + "=" * (-len(cursor) % 4)).decode("ascii")
    except (ValueError, binascii.Error):
        raise _malformed() from None


def _malformed() -> Invalid:
    return Invalid(
        Fault("?cursor", "cursor-malformed", "send a cursor as the link to the next page gives it")
    )
