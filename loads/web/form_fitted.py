"""Between the page and the document: what is fitted, where seats stand on rails, what items stand on.

Inputs: `condition:NET` (`yes`), `setting:seat:ROW1-L`, `setting:row:1`, and for an item `item:0:length`,
`item:0:spreader_weight` and their like. Lengths of one item share one list of units, weights another; a unit
typed behind a figure is its own.
"""

from collections.abc import Mapping
from typing import Any

from loads.web.typed import Typed, begun, clean, count_of, shared_quantity, type_shared

FEET = ("feet_lengthwise", "feet_widthwise")
FOOTPRINT_PARTS = ("length", "width", "lies", *FEET)
RIGGING = {
    part: tuple(f"{part}_{side}" for side in ("weight", "length", "width", "lies"))
    for part in ("pallet", "spreader")
} | {"net": ("net_weight",)}
FLOOR_PARTS = (*FOOTPRINT_PARTS, *RIGGING["spreader"], *RIGGING["pallet"], *RIGGING["net"])
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
    """This function will return the footprint typed for one item, and its pallet, spreader and net."""
    found: dict[str, Any] = {}
    if begun(typed, prefix, FOOTPRINT_PARTS):
        found["footprint"] = _sides(typed, prefix, "")
        for feet in FEET:
            if clean(typed, f"{prefix}:{feet}"):
                found["footprint"][feet] = count_of(typed, f"{prefix}:{feet}")
    field_of |= {f"{at}/footprint": f"{prefix}:length"}
    field_of |= {f"{at}/footprint/{part}": f"{prefix}:{part}" for part in FOOTPRINT_PARTS}
    for part, inputs in RIGGING.items():
        if begun(typed, prefix, inputs):
            found[part] = _sides(typed, prefix, f"{part}_")
            if clean(typed, f"{prefix}:{part}_weight"):
                found[part]["weight"] = shared_quantity(typed, f"{prefix}:{part}_weight", f"{prefix}:unit")
        field_of |= {f"{at}/{part}": f"{prefix}:{part}_weight"}
        field_of |= {f"{at}/{part}/{name.removeprefix(f'{part}_')}": f"{prefix}:{name}" for name in inputs}
    return found


def _sides(typed: Typed, prefix: str, whose: str) -> dict[str, Any]:
    found: dict[str, Any] = {}
    for side in ("length", "width"):
        if clean(typed, f"{prefix}:{whose}{side}"):
            found[side] = shared_quantity(typed, f"{prefix}:{whose}{side}", f"{prefix}:side_unit")
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
    """This function will put footprint, pallet, spreader and net of an item into their inputs."""
    for part, whose in (("footprint", ""), *((part, f"{part}_") for part in RIGGING)):
        given = item.get(part, {})
        for side in ("length", "width"):
            type_shared(typed, f"{prefix}:{whose}{side}", f"{prefix}:side_unit", given.get(side))
        if "lies" in given:
            typed[f"{prefix}:{whose}lies"] = str(given["lies"])
    for feet in FEET:
        if feet in item.get("footprint", {}):
            typed[f"{prefix}:{feet}"] = str(item["footprint"][feet])
    for part in RIGGING:
        weight = item.get(part, {}).get("weight")
        type_shared(typed, f"{prefix}:{part}_weight", f"{prefix}:unit", weight)
