"""One person and one item between the page and the document, both ways, wherever the line stands: in a seat,
among the items, or with who and what comes aboard in flight.

Equipment of the empty weight that is not aboard is a kind of its own on the page.
"""

from collections.abc import Mapping
from typing import Any

from loads.web.form_fitted import FLOOR_PARTS, footing_in, type_footing
from loads.web.typed import Typed, begun, clean, quantity_of, shared_quantity, type_quantity, type_shared

# What makes a line a line. A unit does not: lists of units always have one chosen.
PERSON_PARTS = (
    "name",
    "weight",
    "how",
    "position",
    "person",
    "category",
    "infant",
    "infant_weight",
    "infant_how",
    "restraint",
)
ITEM_PARTS = ("kind", "what", "place", "how", "weight", "jettisonable", *FLOOR_PARTS)
INFANT_PARTS = ("infant", "infant_weight", "infant_how")
TAKEN_OUT = "equipment taken out"


def person_in(typed: Typed, prefix: str, at: str, field_of: dict[str, str]) -> dict[str, Any]:
    """This function will return what was typed for a person, for the pointer `at`; the seat is the
    caller's.
    """
    person: dict[str, Any] = {"name": clean(typed, f"{prefix}:name"), "how": clean(typed, f"{prefix}:how")}
    if clean(typed, f"{prefix}:weight"):
        person["weight"] = quantity_of(typed, f"{prefix}:weight", f"{prefix}:unit")
    for part in ("person", "category"):
        if value := clean(typed, f"{prefix}:{part}"):
            person[part] = value
    if begun(typed, prefix, INFANT_PARTS):
        person["lap_infant"] = _infant_in(typed, prefix)
    if clean(typed, f"{prefix}:restraint"):
        person["restraint"] = shared_quantity(typed, f"{prefix}:restraint", f"{prefix}:unit")
    parts = ("name", "weight", "how", "position", "person", "category", "restraint")
    field_of |= {f"{at}/{part}": f"{prefix}:{part}" for part in parts}
    field_of |= {
        at: f"{prefix}:name",
        f"{at}/lap_infant": f"{prefix}:infant",
        f"{at}/lap_infant/weight": f"{prefix}:infant_weight",
        f"{at}/lap_infant/how": f"{prefix}:infant_how",
    }
    return person


def _infant_in(typed: Typed, prefix: str) -> dict[str, Any]:
    infant: dict[str, Any] = {"name": clean(typed, f"{prefix}:infant")}
    if clean(typed, f"{prefix}:infant_weight"):
        infant["weight"] = shared_quantity(typed, f"{prefix}:infant_weight", f"{prefix}:unit")
    if how := clean(typed, f"{prefix}:infant_how"):
        infant["how"] = how
    return infant


def item_in(typed: Typed, prefix: str, at: str, field_of: dict[str, str]) -> dict[str, Any]:
    """This function will return what was typed for an item, for the pointer `at`."""
    item: dict[str, Any] = {
        part: clean(typed, f"{prefix}:{part}") for part in ("kind", "what", "place", "how")
    }
    if item["kind"] == TAKEN_OUT:
        item |= {"kind": "equipment", "removed": True}
    if clean(typed, f"{prefix}:weight"):
        item["weight"] = quantity_of(typed, f"{prefix}:weight", f"{prefix}:unit")
    if clean(typed, f"{prefix}:jettisonable"):
        item["jettisonable"] = True
    field_of |= {f"{at}/{part}": f"{prefix}:{part}" for part in ITEM_PARTS}
    field_of |= {f"{at}/removed": f"{prefix}:kind", at: f"{prefix}:what"}
    return item | footing_in(typed, prefix, at, field_of)


def type_person(typed: dict[str, str], prefix: str, person: Mapping[str, Any]) -> None:
    """This function will put a person of a document into the inputs of a line."""
    for part in ("name", "how", "position", "person", "category"):
        if person.get(part):
            typed[f"{prefix}:{part}"] = str(person[part])
    type_quantity(typed, f"{prefix}:weight", f"{prefix}:unit", person.get("weight"))
    type_shared(typed, f"{prefix}:restraint", f"{prefix}:unit", person.get("restraint"))
    if infant := person.get("lap_infant"):
        typed[f"{prefix}:infant"] = str(infant["name"])
        typed[f"{prefix}:infant_how"] = str(infant.get("how", ""))
        type_shared(typed, f"{prefix}:infant_weight", f"{prefix}:unit", infant.get("weight"))


def type_item(typed: dict[str, str], prefix: str, item: Mapping[str, Any]) -> None:
    """This function will put an item of a document into the inputs of a line."""
    typed |= {f"{prefix}:{part}": str(item.get(part, "")) for part in ("kind", "what", "place", "how")}
    if item.get("removed") and item.get("kind") == "equipment":
        typed[f"{prefix}:kind"] = TAKEN_OUT
    if item.get("jettisonable"):
        typed[f"{prefix}:jettisonable"] = "yes"
    type_quantity(typed, f"{prefix}:weight", f"{prefix}:unit", item.get("weight"))
    type_footing(typed, prefix, item)
