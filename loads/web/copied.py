"""From a document back to the page that declares a load, to begin a revision from it; no Django here."""

from collections.abc import Mapping, Sequence
from typing import Any

from loads.web.form import FUEL_FIGURES, document_of
from loads.web.form_fitted import type_fitted, type_footing
from loads.web.typed import type_quantity


def _typed_people(typed: dict[str, str], document: Mapping[str, Any]) -> None:
    for person in (*document.get("crew", ()), *document.get("passengers", ())):
        prefix = f"seat:{person['seat']}"
        for part in ("name", "how", "position", "person", "category"):
            if person.get(part):
                typed[f"{prefix}:{part}"] = str(person[part])
        type_quantity(typed, f"{prefix}:weight", f"{prefix}:unit", person.get("weight"))
        type_quantity(typed, f"{prefix}:restraint", f"{prefix}:unit", person.get("restraint"))
        if infant := person.get("lap_infant"):
            typed[f"{prefix}:infant"] = str(infant["name"])
            typed[f"{prefix}:infant_how"] = str(infant.get("how", ""))
            type_quantity(typed, f"{prefix}:infant_weight", f"{prefix}:unit", infant.get("weight"))


def typed_of(document: Mapping[str, Any]) -> dict[str, str]:
    """This function will return what would have been typed for `document`, to begin a revision from it.

    Departure date and time are the caller's: they depend on the operator's time zone.
    """
    typed = {
        "aircraft": str(document["aircraft"]),
        "configuration": str(document["configuration"]),
        "persons_on_board": str(document["persons_on_board"]),
    }
    typed |= {part: str(value) for part, value in document["flight"].items() if part != "departure"}
    _typed_people(typed, document)
    for row, item in enumerate(document.get("items", ())):
        typed |= {f"item:{row}:{part}": str(item.get(part, "")) for part in ("kind", "what", "place", "how")}
        type_quantity(typed, f"item:{row}:weight", f"item:{row}:unit", item.get("weight"))
        type_footing(typed, f"item:{row}", item)
    type_fitted(typed, document)
    fuel = document.get("fuel", {})
    type_quantity(typed, "density", "density:unit", fuel.get("density"))
    typed["density:source"] = str(fuel.get("density", {}).get("source", ""))
    for tank, quantity in fuel.get("at_engine_start", {}).items():
        type_quantity(typed, f"tank:{tank}:quantity", f"tank:{tank}:unit", quantity)
    for tank, quantity in fuel.get("not_usable", {}).items():
        type_quantity(typed, f"tank:{tank}:not_usable", f"tank:{tank}:unit", quantity)
    for figure in FUEL_FIGURES:
        type_quantity(typed, figure, f"{figure}:unit", fuel.get(figure))
    for row, limit in enumerate(document.get("limits", ())):
        typed |= {f"limit:{row}:at": str(limit["at"]), f"limit:{row}:source": str(limit["source"])}
        type_quantity(typed, f"limit:{row}:weight", f"limit:{row}:unit", limit["weight"])
        if "kind" in limit:
            typed[f"limit:{row}:kind"] = str(limit["kind"])
    if "certification_category" in document:
        typed["certification_category"] = str(document["certification_category"])
    return typed


def needs_the_api(document: Mapping[str, Any]) -> bool:
    """This function will say whether `document` states what the page has no input for: what happens in
    flight, or which leg it follows.
    """
    return bool(document.get("sequence")) or "follows" in document["flight"]


def can_carry(document: Mapping[str, Any], *, seats: Sequence[str], tanks: Sequence[str]) -> bool:
    """This function will say whether the page can carry every part of `document`, so that a revision loses
    nothing.
    """
    again, _ = document_of(
        typed_of(document), departure=str(document["flight"]["departure"]), seats=seats, tanks=tanks
    )
    return _comparable(again) == _comparable(document)


def _comparable(document: Mapping[str, Any]) -> dict[str, Any]:
    """This function will return the document with its people and items in a fixed order and empty parts
    left out.
    """
    parts = dict(document)
    fuel = {name: part for name, part in parts.pop("fuel", {}).items() if part != {}}
    flight = {"leg": 1} | parts.pop("flight")
    people = {
        kind: sorted(map(repr, map(_sorted, parts.pop(kind, ()))))
        for kind in ("crew", "passengers", "items", "limits", "conditions", "seat_settings")
    }
    return (
        {name: part for name, part in parts.items() if part}
        | people
        | {
            "fuel": _sorted(fuel),
            "flight": _sorted(flight),
        }
    )


def _sorted(part: Any) -> Any:
    """This function will return nested mappings as sorted pairs, with every leaf as text."""
    if isinstance(part, Mapping):
        return tuple(sorted((name, _sorted(value)) for name, value in part.items()))
    return str(part)
