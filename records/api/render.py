"""Writes answers: JSON whose numbers are exact, and papers as they were filed."""

import json
from datetime import UTC, date, datetime
from decimal import Decimal
from fractions import Fraction
from typing import Any
from uuid import UUID

from rest_framework.renderers import BaseRenderer

from records.canonical import decimal_text


def rendered(document: object) -> bytes:
    """This function will return the document as UTF-8 JSON, keys in the order given.

    Decimals and fractions become decimal strings (a fraction that does not end becomes "n/d"), instants ISO
    8601 in UTC, identifiers their text. Raises TypeError for a binary float, which has no place in an
    answer.
    """
    encoder = json.JSONEncoder(ensure_ascii=False, separators=(",", ":"), allow_nan=False, default=_as_text)
    return encoder.encode(_without_floats(document)).encode("utf-8")


class ExactJSONRenderer(BaseRenderer):
    """JSON as `rendered` writes it."""

    media_type = "application/json"
    format = "json"
    charset = None  # JSON is UTF-8 (RFC 8259 section 8.1); the media type takes no charset parameter

    def render(self, data: Any, *_positional: Any, **_named: Any) -> bytes:
        """This function will return the answer's bytes; nothing for no content."""
        return b"" if data is None else rendered(data)


class PDFRenderer(BaseRenderer):
    """Lets an endpoint be asked for `application/pdf`; the bytes of a paper pass through unchanged."""

    media_type = "application/pdf"
    format = "pdf"
    charset = None
    render_style = "binary"

    def render(self, data: Any, *_positional: Any, **_named: Any) -> bytes:
        """This function will return the bytes it is given; raises TypeError for anything else."""
        if not isinstance(data, bytes):
            raise TypeError(f"a paper is bytes, not {type(data).__name__}")
        return data


def instant_text(value: datetime) -> str:
    """This function will write an instant as ISO 8601 in UTC with a Z; raises ValueError for one without
    offset.
    """
    if value.tzinfo is None:
        raise ValueError("an instant without offset")
    return value.astimezone(UTC).isoformat().replace("+00:00", "Z")


def _as_text(value: object) -> str:
    match value:
        case Decimal():
            return decimal_text(value)
        case Fraction():
            return fraction_text(value)
        case datetime():
            return instant_text(value)
        case date():
            return value.isoformat()
        case UUID():
            return str(value)
        case _:
            raise TypeError(f"{type(value).__name__} has no place in an answer")


def fraction_text(value: Fraction) -> str:
    """This function will write a fraction as a decimal when it ends, and as "n/d" when it does not; nothing
    is rounded.
    """
    twos = fives = 0
    rest = value.denominator
    while rest % 2 == 0:
        rest, twos = rest // 2, twos + 1
    while rest % 5 == 0:
        rest, fives = rest // 5, fives + 1
    if rest != 1:
        return f"{value.numerator}/{value.denominator}"
    places = max(twos, fives)
    digits = str(abs(value.numerator) * 10**places // value.denominator).rjust(places + 1, "0")
    sign = "-" if value < 0 else ""
    return sign + (f"{digits[:-places]}.{digits[-places:]}" if places else digits)


def _without_floats(value: object) -> object:
    """This function will return the value itself; raises TypeError for a float in it, since json would
    write one silently.
    """
    match value:
        case float():
            raise TypeError("a binary float has no place in an answer")
        case dict():
            for member in value.values():
                _without_floats(member)
        case list() | tuple():
            for member in value:
                _without_floats(member)
        case _:
            pass
    return value
