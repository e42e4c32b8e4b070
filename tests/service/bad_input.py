"""Every field of a request document, spoiled in every way a program or a person spoils one.

A pointer names a field (RFC 6901). Of a list the first element stands for all. What is spoiled is written as
JSON text, since NaN, a key sent twice and half a surrogate pair are things no document in memory has.
"""

import copy
import json
import re
from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from typing import Any, Final

_HERE: Final = "\ue000here\ue000"  # a character of the private area: it stands in no document
LONG: Final = json.dumps("9" * 70_000)

# What stands in the place of any value at all.
ANYWHERE: Final[Mapping[str, str]] = {
    "null": "null",
    "NaN": "NaN",
    "infinity": "-Infinity",
    "an exponent": "1e9999999",
    "too many digits": "1" * 40,
    "NUL": '"a\\u0000b"',
    "half a character": '"\\ud800"',
    "a huge text": LONG,
}
# What stands in the place of a value of one kind.
INSTEAD: Final[Mapping[type, Mapping[str, str]]] = {
    str: {"a list": "[]", "an object": "{}", "true": "true", "empty": '""', "a line break": '"a\\nb"'},
    bool: {"a number": "1", "a text": '"true"', "an object": "{}"},
    int: {"a list": "[]", "true": "true", "a text": '"seven"', "negative": "-1", "huge": "999999999999999"},
    list: {"an object": "{}", "a text": '"a"', "a number": "1"},
    dict: {"a list": "[]", "a text": '"a"', "a number": "1"},
}
# How a field is spoiled whose like was spoiled in every way already.
AGAIN: Final = frozenset({"an object", "a text"})
# A text that is a number or a unit, besides.
NUMBERS: Final[Mapping[str, str]] = {
    "words": '"heavy"',
    "NaN in a text": '"NaN"',
    "infinity in a text": '"Infinity"',
    "an exponent in a text": '"1e3"',
    "forty digits": f'"{"9" * 40}"',
    "a comma": '"1,5"',
    "blanks": '" 1"',
    "negative": '"-5"',
}
UNITS: Final[Mapping[str, str]] = {"another unit": '"furlong"', "a unit of time": '"s"'}


@dataclass(frozen=True, slots=True)
class Schema:
    """The schema of one document, in the description of the API it stands in."""

    schema: Any
    whole: Mapping[str, Any]

    def fields(self) -> set[str]:
        """This function will return every field described: `#` a place in a list, `*` any key."""
        return {pointer for pointer, _ in self._walk(self.schema, "")}

    def required(self) -> set[str]:
        """This function will return the fields that must stand wherever what holds them does."""
        found = list(self._walk(self.schema, ""))
        return {pointer for pointer, must in found if must}

    def _walk(self, schema: Any, pointer: str) -> Iterator[tuple[str, bool]]:
        while "$ref" in schema:
            named: Any = self.whole
            for step in schema["$ref"].removeprefix("#/").split("/"):
                named = named[step]
            schema = named
        choices = [one for which in ("anyOf", "oneOf", "allOf") for one in schema.get(which, ())]
        for one in (*choices, *(schema[which] for which in ("then", "else") if which in schema)):
            # What only one of several forms needs is not needed as such; what stands deeper is.
            deep = pointer.count("/") + 1
            yield from ((place, must and place.count("/") > deep) for place, must in self._walk(one, pointer))
        for key, one in schema.get("properties", {}).items():
            yield f"{pointer}/{key}", key in schema.get("required", ())
            yield from self._walk(one, f"{pointer}/{key}")
        for one in filter(None, (schema.get("additionalProperties"),)):
            yield f"{pointer}/*", False
            yield from self._walk(one, f"{pointer}/*")
        if isinstance(schema.get("items"), dict):
            yield from self._walk(schema["items"], f"{pointer}/#")


@dataclass(frozen=True, slots=True)
class Spoiled:
    """One request body that is wrong at `pointer`."""

    pointer: str
    how: str
    body: bytes


def spoiled(
    document: Mapping[str, Any], schema: Schema, *, seen: set[str], one_in: int = 1
) -> Iterator[Spoiled]:
    """This function will return the document once for each field and each way of spoiling it.

    A field whose name was `seen` before is spoiled in a few ways only; one that stood in a document before is
    left alone. The names and pointers met are added. Left out is only what the schema requires. Of the ways
    of a field `one_in` so many is taken, at least one, and of the next field another.
    """
    required = schema.required()
    for place, (pointer, value) in enumerate(fields(document)):
        where, name = plain(pointer), name_of(pointer, value)
        if where in seen:
            continue
        again = name in seen
        seen |= {where, name}
        ways = [way for way in _ways(pointer, value) if not again or way[0] in AGAIN]
        for how, text in ways[place % min(one_in, len(ways)) :: one_in]:
            yield Spoiled(pointer, how, _written(document, pointer, text))
        if where in required:
            yield Spoiled(pointer, "left out", _without(document, pointer))
        if not again:
            yield Spoiled(pointer, "sent twice", _twice(document, pointer))
            if isinstance(value, dict):
                yield Spoiled(f"{pointer}/furlongs", "unknown", _with(document, pointer))
    yield Spoiled("/furlongs", "unknown", _with(document, ""))


def name_of(pointer: str, value: Any) -> str:
    """This function will name what fields that are alike have in common."""
    return f"{plain(pointer).rpartition('/')[2]} {type(value).__name__}"


def fields(value: Any, pointer: str = "") -> Iterator[tuple[str, Any]]:
    """This function will return every field below a value; of most lists the first element only."""
    if isinstance(value, dict):
        for key, inner in value.items():
            yield f"{pointer}/{key}", inner
            yield from fields(inner, f"{pointer}/{key}")
    elif isinstance(value, list):
        for place, inner in enumerate(value):
            if place and not isinstance(inner, dict):
                break
            yield f"{pointer}/{place}", inner
            yield from fields(inner, f"{pointer}/{place}")


def plain(pointer: str) -> str:
    """This function will write a pointer with `#` for each place in a list."""
    return re.sub(r"/\d+(?=/|$)", "/#", pointer)


def _ways(pointer: str, value: Any) -> Iterator[tuple[str, str]]:
    yield from ANYWHERE.items()
    yield from INSTEAD[type(value)].items()
    if isinstance(value, str) and re.fullmatch(r"-?\d+(\.\d+)?", value):
        yield from NUMBERS.items()
    if pointer.endswith(("unit", "unit_name")):
        yield from UNITS.items()


def _written(document: Mapping[str, Any], pointer: str, text: str) -> bytes:
    changed = copy.deepcopy(document)
    holder, key = _holder(changed, pointer)
    holder[key] = _HERE
    return json.dumps(changed).replace(json.dumps(_HERE), text).encode()


def _twice(document: Mapping[str, Any], pointer: str) -> bytes:
    """A key of an object a second time; an element of a list is sent a second time, whole."""
    changed = copy.deepcopy(document)
    holder, key = _holder(changed, pointer)
    again = json.dumps(holder[key])
    holder[key] = _HERE
    second = f"{again}, {again}" if isinstance(key, int) else f"{again}, {json.dumps(key)}: {again}"
    return json.dumps(changed).replace(json.dumps(_HERE), second).encode()


def _without(document: Mapping[str, Any], pointer: str) -> bytes:
    changed = copy.deepcopy(document)
    holder, key = _holder(changed, pointer)
    del holder[key]
    return json.dumps(changed).encode()


def _with(document: Mapping[str, Any], pointer: str) -> bytes:
    changed = copy.deepcopy(document)
    place: Any = changed
    for step in pointer.split("/")[1:]:
        place = place[int(step) if isinstance(place, list) else step]
    place["furlongs"] = 1
    return json.dumps(changed).encode()


def _holder(document: Any, pointer: str) -> tuple[Any, Any]:
    *steps, last = pointer.split("/")[1:]
    for step in steps:
        document = document[int(step) if isinstance(document, list) else step]
    return document, int(last) if isinstance(document, list) else last
