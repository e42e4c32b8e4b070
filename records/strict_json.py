"""Reads a JSON body (RFC 8259, RFC 7493) and refuses whatever two readers could understand differently.

Numbers never become binary floats: whole numbers come out as `int`, others as `Decimal`, with every digit
typed. What is refused is refused before anything computes: the exponent of `1e9999999` is seen, never
applied.
"""

import json
import re
from collections import Counter
from decimal import Decimal
from itertools import accumulate
from typing import Final, TypeAlias

from records.refusal import Fault, TooLarge, Unreadable

# A document that was read: objects, lists, texts, true, false, null, whole numbers and decimals.
JSON: TypeAlias = "dict[str, JSON] | list[JSON] | str | bool | int | Decimal | None"

MOST_BYTES: Final = 1024 * 1024
MOST_DIGITS: Final = 15
MOST_DEPTH: Final = 32

# Texts are matched whole and only once, so a body of nothing but quotes is still read in linear time.
_TEXT: Final = re.compile(rb'"[^"\\]*+(?:\\.[^"\\]*+)*+"?', re.DOTALL)
_NO_BRACKET: Final = bytes(byte for byte in range(256) if byte not in b"[]{}")
_STEP: Final = {ord("["): 1, ord("{"): 1, ord("]"): -1, ord("}"): -1}

_SENTENCES: Final = {
    "json-number-exponent": "a number is written with an exponent; write its digits out",
    "json-number-too-long": f"a number has more than {MOST_DIGITS} digits",
    "json-not-a-number": "NaN and Infinity are not numbers; write a decimal number",
    "json-duplicate-key": "a key occurs twice in one object",
    "json-nul": "a text holds the character NUL",
    "json-lone-surrogate": "a text holds half a surrogate pair, which is no character",
}


class _Bad:
    """Stands in a document where something was refused, until its place is known."""

    def __init__(self, code: str, key: str | None = None) -> None:
        self.code = code
        self.key = key


def read(body: bytes) -> JSON:
    """This function will return the document in `body`.

    Raises TooLarge above 1 MiB and Unreadable otherwise; `code` is the first fault's, and every fault that
    can be placed carries a JSON pointer (RFC 6901).
    """
    if len(body) > MOST_BYTES:
        raise TooLarge(
            "body-too-large",
            f"The body has {len(body)} bytes; at most {MOST_BYTES} are read.",
            next_step="Send less in one request.",
        )
    text = _text_of(body)
    if _depth(body) > MOST_DEPTH:
        raise Unreadable("json-too-deep", f"The body nests deeper than {MOST_DEPTH} levels.")
    parsing = _Parsing()
    try:
        document = parsing.decoder.decode(text)
    except json.JSONDecodeError as problem:
        raise Unreadable(
            "json-malformed",
            f"Line {problem.lineno}, column {problem.colno}: {problem.msg}.",
            next_step="Send JSON.",
        ) from problem
    # Only an escape can bring in NUL or half a surrogate pair: raw ones are no JSON, or no UTF-8.
    if parsing.refused or b"\\u" in body:
        faults: list[Fault] = []
        _find(document, "", faults)
        if faults:
            raise Unreadable(faults[0].code, f"{_sentence(faults[0])}.", faults=tuple(faults[:50]))
    return document  # type: ignore[no-any-return]  # what the decoder's own types leave open


def pointer_step(key: str | int) -> str:
    """This function will return one step of a JSON pointer, slash included, escaped as RFC 6901 section 3
    says.
    """
    return "/" + str(key).replace("~", "~0").replace("/", "~1")


class _Parsing:
    """One reading: a decoder whose hooks leave a `_Bad` in the document and note that they did."""

    def __init__(self) -> None:
        self.refused = False
        self.decoder = json.JSONDecoder(
            object_pairs_hook=self._object,
            parse_float=self._fraction,
            parse_int=self._whole,
            parse_constant=lambda _: self._bad("json-not-a-number"),
        )

    def _bad(self, code: str, key: str | None = None) -> _Bad:
        self.refused = True
        return _Bad(code, key)

    def _object(self, pairs: list[tuple[str, object]]) -> object:
        members = dict(pairs)
        if len(members) != len(pairs):
            key, _ = Counter(key for key, _ in pairs).most_common(1)[0]
            return self._bad("json-duplicate-key", key)
        return members

    def _whole(self, digits: str) -> object:
        return int(digits) if _digits(digits) <= MOST_DIGITS else self._bad("json-number-too-long")

    def _fraction(self, digits: str) -> object:
        if "e" in digits or "E" in digits:
            return self._bad("json-number-exponent")
        return Decimal(digits) if _digits(digits) <= MOST_DIGITS else self._bad("json-number-too-long")


def _digits(number: str) -> int:
    return len(number) - number.count("-") - number.count(".")


def _text_of(body: bytes) -> str:
    if body.startswith((b"\xef\xbb\xbf", b"\xff\xfe", b"\xfe\xff")):
        raise Unreadable("json-byte-order-mark", "The body begins with a byte order mark; send plain UTF-8.")
    try:
        text = body.decode("utf-8")
    except UnicodeDecodeError as problem:
        raise Unreadable("json-not-utf-8", f"Byte {problem.start} of the body is not UTF-8.") from problem
    if not text.strip(" \t\r\n"):
        raise Unreadable("body-empty", "The request has no body.", next_step="Send a JSON document.")
    return text


def _depth(body: bytes) -> int:
    """This function will return how deep brackets nest, seen before anything recurses; brackets in texts do
    not count.
    """
    if body.count(b"[") + body.count(b"{") <= MOST_DEPTH:
        return 0
    # Without a backslash each quote begins or ends a text: every other piece between quotes is outside.
    outside = _TEXT.sub(b"", body) if b"\\" in body else b"".join(body.split(b'"')[::2])
    brackets = outside.translate(None, _NO_BRACKET)
    return max(accumulate(map(_STEP.__getitem__, brackets)), default=0)


def _find(value: object, pointer: str, faults: list[Fault]) -> None:
    match value:
        case _Bad():
            place = pointer if value.key is None or _ill(value.key) else pointer + pointer_step(value.key)
            faults.append(_fault(place, value.code))
        case dict():
            for key, member in value.items():
                if code := _ill(key):
                    faults.append(_fault(pointer, code))
                else:
                    _find(member, pointer + pointer_step(key), faults)
        case list():
            for index, member in enumerate(value):
                _find(member, pointer + pointer_step(index), faults)
        case str():
            if code := _ill(value):
                faults.append(_fault(pointer, code))
        case _:
            pass


def _ill(text: str) -> str | None:
    if "\x00" in text:
        return "json-nul"
    if text.isascii():
        return None
    try:
        text.encode("utf-8")
    except UnicodeEncodeError:
        return "json-lone-surrogate"
    return None


def _fault(pointer: str, code: str) -> Fault:
    return Fault(pointer, code, _SENTENCES[code])


def _sentence(fault: Fault) -> str:
    return f"At {fault.pointer or 'the top of the document'}: {fault.detail}"
