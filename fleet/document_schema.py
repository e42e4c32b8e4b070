"""Checks a document against its published JSON Schema and names every field at fault.

The schemas in `fleet/schemas/` (JSON Schema 2020-12) are what the service itself reads by, not a
description beside it.
"""

import json
import re
from collections.abc import Iterator
from datetime import date, datetime
from functools import lru_cache
from pathlib import Path
from typing import Any

from jsonschema import Draft202012Validator, FormatChecker
from jsonschema.exceptions import ValidationError

from fleet.quantities import Unit, number_or_fault
from records.refusal import Fault
from records.strict_json import pointer_step

MOST_FAULTS = 200
_SCHEMAS = Path(__file__).parent / "schemas"
_SIGNS = frozenset(unit.value for unit in Unit)
_INSTANT = re.compile(r"\d{4}-\d\d-\d\dT\d\d:\d\d(:\d\d(\.\d{1,6})?)?(Z|[+-]\d\d:\d\d)", re.ASCII)
_FORMATS = FormatChecker(formats=())


@_FORMATS.checks("decimal")
def is_decimal(value: object) -> bool:
    """Return whether a value is a plain decimal number, as `fleet.quantities` reads them."""
    return not isinstance(number_or_fault(value, ""), Fault)


@_FORMATS.checks("date", raises=ValueError)
def is_date(value: object) -> bool:
    """Return whether a text is a day, `2026-05-02`; what is no text is judged by its type."""
    return not isinstance(value, str) or date.fromisoformat(value).isoformat() == value


@_FORMATS.checks("date-time", raises=ValueError)
def is_instant(value: object) -> bool:
    """Return whether a text is an instant with its offset, `2026-05-03T00:00:00Z` (RFC 3339)."""
    if not isinstance(value, str):
        return True
    return bool(_INSTANT.fullmatch(value)) and datetime.fromisoformat(value).tzinfo is not None


def shape_faults(schema: str, document: object) -> list[Fault]:
    """Return every fault of form of a document against `fleet/schemas/<schema>.json`, at most
    `MOST_FAULTS`.
    """
    faults: dict[Fault, None] = {}
    for error in _validator(schema).iter_errors(document):
        for fault in _faults(error):
            faults[fault] = None
        if len(faults) >= MOST_FAULTS:
            break
    return list(faults)[:MOST_FAULTS]


@lru_cache
def _validator(schema: str) -> Draft202012Validator:
    text = (_SCHEMAS / f"{schema}.json").read_text("utf-8")
    return Draft202012Validator(json.loads(text), format_checker=_FORMATS)


def _faults(error: ValidationError) -> Iterator[Fault]:
    """Yield the faults of one error of the library: where, which code, and what to do."""
    at = "".join(pointer_step(step) for step in error.absolute_path)
    schema: dict[str, Any] = dict(error.schema) if isinstance(error.schema, dict) else {}
    found: Any = error.instance
    wanted: Any = error.validator_value
    match error.validator:
        case _ if schema.get("format") == "decimal":
            number = number_or_fault(found, at)
            yield number if isinstance(number, Fault) else Fault(at, "number-form", "not a number; write one")
        case "required":
            for field in wanted:
                if field not in found:
                    yield _missing(at + pointer_step(field), field)
        case "anyOf" | "oneOf":
            names = " or ".join(name for choice in wanted for name in choice.get("required", ()))
            yield Fault(
                at, "one-of", f"needs exactly what it can be reckoned from: {names}; give one of them"
            )
        case "additionalProperties":
            for field in found:
                if field not in schema.get("properties", {}):
                    yield Fault(
                        at + pointer_step(field), "unknown-field", "not a field here; remove or correct it"
                    )
        case "enum":
            yield _not_listed(at, found, wanted)
        case keyword:
            yield Fault(at, *_sentence(str(keyword), at, wanted))


def _missing(at: str, field: str) -> Fault:
    if field == "unit" or field.endswith("_unit"):
        return Fault(at, "unit-missing", "the unit is missing, and none is inferred; state it")
    if field == "source":
        return Fault(at, "source-missing", "every figure names where it stands; give document and page")
    return Fault(at, "missing", f"{field} is missing; give it")


def _not_listed(at: str, found: object, wanted: list[str]) -> Fault:
    choice = ", ".join(wanted)
    if at.endswith(("unit", "/units/weight", "/units/length", "/units/volume")):
        if isinstance(found, str) and found in _SIGNS:
            return Fault(at, "unit-dimension", f"{found} does not measure this; use one of {choice}")
        return Fault(at, "unit-unknown", f"not a known unit; use one of {choice}")
    return Fault(at, "not-a-choice", f"not one of the choices; use one of {choice}")


def _sentence(keyword: str, at: str, wanted: Any) -> tuple[str, str]:
    if keyword == "const":
        return _not_constant(at, wanted)
    return _SENTENCES.get(keyword, ("wrong-form", "does not have the form asked for; see the schema"))


def _not_constant(at: str, wanted: object) -> tuple[str, str]:
    if at == "/lateral_positive":
        return (
            "lateral-positive",
            "lateral arms count right as positive; turn the signs where the manual counts left",
        )
    if at == "/schema":
        return "schema-unknown", f"not a schema this service reads here; write {wanted}"
    return "not-a-choice", f"must be {json.dumps(wanted)} when it is given; otherwise leave it out"


_SENTENCES: dict[str, tuple[str, str]] = {
    "type": ("wrong-type", "not the kind of value asked for here; see the schema"),
    "pattern": (
        "wrong-form",
        "not in the form asked for here (ids: A-Z 0-9 -, at most 24; texts: not blank)",
    ),
    "minLength": ("empty", "is empty; write it out, or leave the field away"),
    "maxLength": ("too-long", "is too long; shorten it"),
    "minItems": ("too-few", "has too few entries; enter the missing ones"),
    "maxItems": ("too-many", "has more entries than are read; split or correct it"),
    "uniqueItems": ("duplicate", "has an entry twice; remove one"),
    "minimum": ("too-small", "is smaller than makes sense; correct it"),
    "maximum": ("too-large", "is larger than makes sense; correct it"),
    "format": (
        "wrong-form",
        "write a day as 2026-05-02, an instant with its offset as 2026-05-03T00:00:00Z",
    ),
}
