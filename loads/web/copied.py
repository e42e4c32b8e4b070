"""From a document back to the page that declares a load, to begin a revision from it; no Django here."""

from collections.abc import Mapping, Sequence
from typing import Any

from loads.web.form import FUEL_FIGURES, document_of
from loads.web.form_events import type_events
from loads.web.form_fitted import type_fitted
from loads.web.form_lines import type_item, type_person
from loads.web.typed import type_quantity, type_shared


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
    for person in (*document.get("crew", ()), *document.get("passengers", ())):
        type_person(typed, f"seat:{person['seat']}", person)
    for row, item in enumerate(document.get("items", ())):
        type_item(typed, f"item:{row}", item)
    type_fitted(typed, document)
    type_events(typed, document)
    fuel = document.get("fuel", {})
    type_quantity(typed, "density", "density:unit", fuel.get("density"))
    typed["density:source"] = str(fuel.get("density", {}).get("source", ""))
    for tank, quantity in fuel.get("at_engine_start", {}).items():
        type_quantity(typed, f"tank:{tank}:quantity", f"tank:{tank}:unit", quantity)
    for tank, quantity in fuel.get("not_usable", {}).items():
        type_shared(typed, f"tank:{tank}:not_usable", f"tank:{tank}:unit", quantity)
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


def can_carry(document: Mapping[str, Any], *, seats: Sequence[str], tanks: Sequence[str]) -> bool:
    """This function will say whether the page can carry every part of `document`, so that a revision loses
    nothing.
    """
    again, _ = document_of(
        typed_of(document), departure=str(document["flight"]["departure"]), seats=seats, tanks=tanks
    )
    return _comparable(again) == _comparable(document)


def _comparable(document: Mapping[str, Any]) -> dict[str, Any]:
    """This function will return the document with its people and items in a fixed order; empty parts and
    what says no more than leaving it out are left out.
    """
    parts = dict(document)
    fuel = {name: part for name, part in parts.pop("fuel", {}).items() if part != {}}
    flight = {"leg": 1} | parts.pop("flight")
    people = {
        kind: sorted(map(repr, map(_sorted, parts.pop(kind, ()))))
        for kind in ("crew", "passengers", "items", "limits", "conditions", "seat_settings")
    }
    return (
        {name: _sorted(part) for name, part in parts.items() if part}
        | people
        | {
            "fuel": _sorted(fuel),
            "flight": _sorted(flight),
        }
    )


SAID_BY_SILENCE = {"removed": False, "jettisonable": False, "since": "take-off"}


def _sorted(part: Any) -> Any:
    """This function will return nested mappings as sorted pairs and lists in their order, with every leaf
    as text.
    """
    if isinstance(part, Mapping):
        said = [(name, value) for name, value in part.items() if SAID_BY_SILENCE.get(name, ...) != value]
        return tuple(sorted((name, _sorted(value)) for name, value in said))
    return tuple(map(_sorted, part)) if isinstance(part, list | tuple) else str(part)
