"""Between the page and the document: what is fitted, where seats stand on rails, what items stand on.

Inputs: `condition:NET` (`yes`), `setting:seat:ROW1-L`, `setting:row:1`, and for an item `item:0:length`,
`item:0:spreader_weight` and their like. Lengths of one item share one unit, weights another.
"""

from collections.abc import Mapping
from typing import Any

from loads.web.typed import Typed, begun, clean, count_of, quantity_of, type_quantity

FOOTPRINT_PARTS = ("length", "width", "lies", "feet_lengthwise", "feet_widthwise")
SPREADER_PARTS = ("spreader_weight", "spreader_length", "spreader_width", "spreader_lies")
FLOOR_PARTS = (*FOOTPRINT_PARTS, *SPREADER_PARTS)
FEET = ("feet_lengthwise", "feet_widthwise")
CONDITION, SETTING = "condition:", "setting:"


def fitted_in(typed: Typed, field_of: dict[str, str]) -> dict[str, Any]:
    """This function will return conditions and seat settings as typed; a part nobody typed is left out."""
    conditions: list[str] = []
    settings: list[dict[str, str]] = []
    for name in typed:
        if name.startswith(CONDITION) and clean(typed, name):
            field_of[f"/conditions/{len(conditions)}"] = name
            conditions.append(name.removeprefix(CONDITION))
        elif name.startswith(SETTING) and clean(typed, name):
            kind, _, which = name.removeprefix(SETTING).partition(":")
            field_of[f"/seat_settings/{len(settings)}"] = name
            settings.append({kind: which, "setting": clean(typed, name)})
    return {name: part for name, part in (("conditions", conditions), ("seat_settings", settings)) if part}


def footing_in(typed: Typed, prefix: str, at: str, field_of: dict[str, str]) -> dict[str, Any]:
    """This function will return the footprint and the spreader typed for one item."""
    found: dict[str, Any] = {}
    if begun(typed, prefix, FOOTPRINT_PARTS):
        found["footprint"] = _sides(typed, prefix, "")
        for feet in FEET:
            if clean(typed, f"{prefix}:{feet}"):
                found["footprint"][feet] = count_of(typed, f"{prefix}:{feet}")
    if begun(typed, prefix, SPREADER_PARTS):
        found["spreader"] = _sides(typed, prefix, "spreader_")
        if clean(typed, f"{prefix}:spreader_weight"):
            found["spreader"]["weight"] = quantity_of(typed, f"{prefix}:spreader_weight", f"{prefix}:unit")
    field_of |= {f"{at}/footprint": f"{prefix}:length", f"{at}/spreader": f"{prefix}:spreader_weight"}
    field_of |= {f"{at}/footprint/{part}": f"{prefix}:{part}" for part in FOOTPRINT_PARTS}
    field_of |= {
        f"{at}/spreader/{part.removeprefix('spreader_')}": f"{prefix}:{part}" for part in SPREADER_PARTS
    }
    return found


def _sides(typed: Typed, prefix: str, whose: str) -> dict[str, Any]:
    found: dict[str, Any] = {}
    for side in ("length", "width"):
        if clean(typed, f"{prefix}:{whose}{side}"):
            found[side] = quantity_of(typed, f"{prefix}:{whose}{side}", f"{prefix}:side_unit")
    if clean(typed, f"{prefix}:{whose}lies"):
        found["lies"] = clean(typed, f"{prefix}:{whose}lies")
    return found


def type_fitted(typed: dict[str, str], document: Mapping[str, Any]) -> None:
    """This function will put conditions and seat settings of a document into their inputs."""
    for condition in document.get("conditions", ()):
        typed[f"{CONDITION}{condition}"] = "yes"
    for line in document.get("seat_settings", ()):
        kind = "seat" if "seat" in line else "row"
        typed[f"{SETTING}{kind}:{line.get(kind)}"] = str(line["setting"])


def type_footing(typed: dict[str, str], prefix: str, item: Mapping[str, Any]) -> None:
    """This function will put footprint and spreader of an item into their inputs."""
    for part, whose in (("footprint", ""), ("spreader", "spreader_")):
        given = item.get(part, {})
        for side in ("length", "width"):
            type_quantity(typed, f"{prefix}:{whose}{side}", f"{prefix}:side_unit", given.get(side))
        if "lies" in given:
            typed[f"{prefix}:{whose}lies"] = str(given["lies"])
    for feet in FEET:
        if feet in item.get("footprint", {}):
            typed[f"{prefix}:{feet}"] = str(item["footprint"][feet])
    type_quantity(
        typed, f"{prefix}:spreader_weight", f"{prefix}:unit", item.get("spreader", {}).get("weight")
    )
