"""The canonical bytes of a document (RFC 8785) and their digest: what is hashed, signed and compared."""

import hashlib
import json
import re
from collections.abc import Mapping
from decimal import Decimal
from typing import TypeAlias

import rfc8785

_Plain: TypeAlias = "dict[str, _Plain] | list[_Plain] | str | bool | int | None"

# RFC 8785 numbers are IEEE 754 doubles: a whole number beyond this would be rounded there, so it is refused.
_LARGEST_WHOLE = 2**53 - 1
_BEYOND = re.compile("[\ud800-\U0010ffff]")


class NotCanonical(TypeError):
    """A value that a document may not hold: a binary float, a key that is no text, something that is no
    JSON.
    """


def canonical(document: object) -> bytes:
    """This function will return the document as RFC 8785 bytes; a Decimal is written as a text with the
    digits it has.

    Raises NotCanonical for floats, other types, whole numbers beyond 2**53 - 1 and texts that are no UTF-8.
    """
    plain, ascii_keys = _plain(document)
    if not ascii_keys:  # keys are ordered by UTF-16 units, which Python's own order is not
        return rfc8785.dumps(plain)
    try:
        # The same bytes seven times faster: without floats, RFC 8785 is this encoder with ASCII keys in
        # order. A test holds the two together.
        return json.dumps(plain, sort_keys=True, separators=(",", ":"), ensure_ascii=False).encode("utf-8")
    except UnicodeEncodeError as problem:
        raise NotCanonical("a text holds half a surrogate pair") from problem


def canonical_of_exact(document: object) -> bytes:
    """This function will return the bytes `canonical` returns, without looking at every value for what it
    refuses.

    For documents known to hold only texts, whole numbers within 2**53 - 1, Decimals, truth values and nulls
    under text keys: what `records.strict_json` reads, and what our own code makes of texts. It is many times
    faster.
    """
    text = json.dumps(
        document, sort_keys=True, separators=(",", ":"), ensure_ascii=False, default=_text_of_decimal
    )
    # Below the surrogates Python's order of keys is the order of UTF-16 units.
    if text.isascii() or _BEYOND.search(text) is None:
        return text.encode()
    return canonical(document)


def _text_of_decimal(value: object) -> str:
    if isinstance(value, Decimal):
        return decimal_text(value)
    raise NotCanonical(f"{type(value).__name__} has no place in a document")


def digest(document: object) -> str:
    """This function will return the SHA-256 of the canonical bytes as 64 lower-case hexadecimal digits."""
    return hashlib.sha256(canonical(document)).hexdigest()


def _plain(value: object) -> tuple[_Plain, bool]:
    match value:
        case None | bool():
            return value, True
        case str():
            return str(value), True
        case int():
            if abs(value) > _LARGEST_WHOLE:
                raise NotCanonical("a whole number beyond 2**53 - 1; write it as a text")
            return int(value), True
        case Decimal():
            return decimal_text(value), True
        case Mapping():
            return _plain_members(value)
        case list() | tuple():
            pairs = [_plain(member) for member in value]
            return [member for member, _ in pairs], all(flag for _, flag in pairs)
        case _:
            raise NotCanonical(f"{type(value).__name__} has no place in a document")


def _plain_members(value: Mapping[object, object]) -> tuple[_Plain, bool]:
    members: dict[str, _Plain] = {}
    ascii_keys = True
    for key, member in value.items():
        if not isinstance(key, str):
            raise NotCanonical(f"a key is {type(key).__name__}, not a text")
        members[key], inner = _plain(member)
        ascii_keys = ascii_keys and inner and key.isascii()
    return members, ascii_keys


def decimal_text(value: Decimal) -> str:
    """This function will write a Decimal with the digits it has, never with an exponent: 0.00000001, not
    1E-8.
    """
    if not value.is_finite():
        raise NotCanonical("NaN and Infinity are no numbers of a document")
    return format(value, "f")
