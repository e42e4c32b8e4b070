"""The published JSON Schemas of the documents this room reads, as the API's description shows them."""

import json
from pathlib import Path
from typing import Any

_SCHEMAS = Path(__file__).resolve().parent.parent / "schemas"
_LOCAL = "#/$defs/"


def described(schema: str) -> dict[str, Any]:
    """This function will return the schema the service reads by, whole in one place, for `application/json`.

    References within it are written out, since they would point elsewhere inside the API's own document.
    """
    whole = json.loads((_SCHEMAS / f"{schema}.json").read_text("utf-8"))
    definitions = whole.pop("$defs", {})
    for field in ("$schema", "$id"):
        whole.pop(field, None)
    return {"application/json": _written_out(whole, definitions)}


def _written_out(part: Any, definitions: dict[str, Any]) -> Any:
    if isinstance(part, list):
        return [_written_out(each, definitions) for each in part]
    if not isinstance(part, dict):
        return part
    if "$ref" in part:
        named = definitions[part["$ref"].removeprefix(_LOCAL)]
        beside = {key: value for key, value in part.items() if key != "$ref"}
        return _written_out(named | beside, definitions)
    return {key: _written_out(value, definitions) for key, value in part.items()}
