"""Between the page that declares a load and the document `tarebook.load/1`, both ways; no Django here.

Inputs are named after what they hold: `seat:ROW1-L:weight`, `item:0:place`, `tank:LEFT-MAIN:quantity`.
Nothing is filled in that was not typed, and nothing typed is dropped: a line begun and not finished goes to
the reader of the document as it is, which refuses it with its field.
"""

from collections.abc import Mapping, Sequence
from typing import Any

# More rows than one load has; the page offers no row beyond, so what is typed is never cut short.
MOST_ROWS = 200
FUEL_FIGURES = ("taxi", "trip", "minimum_at_landing")
LONGEST_COUNT = 9  # digits; a longer count stays text and is refused as one
# What makes a line a line. A unit does not: lists of units always have one chosen.
SEAT_PARTS = (
    "name",
    "weight",
    "how",
    "position",
    "person",
    "category",
    "infant",
    "infant_weight",
    "infant_how",
)
ITEM_PARTS = ("kind", "what", "place", "how", "weight")
LIMIT_PARTS = ("weight", "source")

Typed = Mapping[str, str]


def _clean(typed: Typed, name: str) -> str:
    return typed.get(name, "").strip()


def _begun(typed: Typed, prefix: str, parts: Sequence[str]) -> bool:
    return any(_clean(typed, f"{prefix}:{part}") for part in parts)


def _count(typed: Typed, name: str, otherwise: str = "") -> int | str:
    count = _clean(typed, name) or otherwise
    return int(count) if count.isascii() and count.isdigit() and len(count) <= LONGEST_COUNT else count


def _quantity(typed: Typed, name: str, unit_name: str) -> dict[str, str]:
    return {"value": _clean(typed, name), "unit": _clean(typed, unit_name)}


class _Builder:
    """Collects the document and, beside it, which input every pointer came from."""

    def __init__(self, typed: Typed) -> None:
        self.typed = typed
        self.field_of: dict[str, str] = {}

    def person(self, seat: str, at: str) -> dict[str, Any]:
        """This function will return what was typed for the person in `seat`, for the pointer `at`."""
        prefix = f"seat:{seat}"
        person: dict[str, Any] = {"name": _clean(self.typed, f"{prefix}:name"), "seat": seat}
        person["how"] = _clean(self.typed, f"{prefix}:how")
        if _clean(self.typed, f"{prefix}:weight"):
            person["weight"] = _quantity(self.typed, f"{prefix}:weight", f"{prefix}:unit")
        for part in ("category", "person"):
            if word := _clean(self.typed, f"{prefix}:{part}"):
                person[part] = word
        if _begun(self.typed, prefix, ("infant", "infant_weight", "infant_how")):
            person["lap_infant"] = self.infant(prefix)
        parts = ("name", "weight", "how", "position", "person", "category")
        self.field_of |= {f"{at}/{part}": f"{prefix}:{part}" for part in parts}
        self.field_of |= {
            at: f"{prefix}:name",
            f"{at}/lap_infant": f"{prefix}:infant",
            f"{at}/lap_infant/weight": f"{prefix}:infant_weight",
            f"{at}/lap_infant/how": f"{prefix}:infant_how",
        }
        return person

    def infant(self, prefix: str) -> dict[str, Any]:
        """This function will return the infant on the lap of the person in a seat."""
        infant: dict[str, Any] = {"name": _clean(self.typed, f"{prefix}:infant")}
        if _clean(self.typed, f"{prefix}:infant_weight"):
            infant["weight"] = _quantity(self.typed, f"{prefix}:infant_weight", f"{prefix}:unit")
        if how := _clean(self.typed, f"{prefix}:infant_how"):
            infant["how"] = how
        return infant

    def people(self, seats: Sequence[str]) -> tuple[list[dict[str, Any]], list[dict[str, Any]]]:
        """This function will return crew and passengers: a seat with anything typed in it is taken."""
        crew: list[dict[str, Any]] = []
        passengers: list[dict[str, Any]] = []
        for seat in seats:
            if not _begun(self.typed, f"seat:{seat}", SEAT_PARTS):
                continue
            if position := _clean(self.typed, f"seat:{seat}:position"):
                crew.append(self.person(seat, f"/crew/{len(crew)}") | {"position": position})
            else:
                passengers.append(self.person(seat, f"/passengers/{len(passengers)}"))
        return crew, passengers

    def items(self) -> list[dict[str, Any]]:
        """This function will return the rows of the items table in which something was typed."""
        found: list[dict[str, Any]] = []
        for row in range(MOST_ROWS):
            prefix = f"item:{row}"
            if not _begun(self.typed, prefix, ITEM_PARTS):
                continue
            at = f"/items/{len(found)}"
            item: dict[str, Any] = {
                part: _clean(self.typed, f"{prefix}:{part}") for part in ("kind", "what", "place", "how")
            }
            if _clean(self.typed, f"{prefix}:weight"):
                item["weight"] = _quantity(self.typed, f"{prefix}:weight", f"{prefix}:unit")
            found.append(item)
            self.field_of |= {f"{at}/{part}": f"{prefix}:{part}" for part in ITEM_PARTS} | {
                at: f"{prefix}:what"
            }
        return found

    def fuel(self, tanks: Sequence[str]) -> dict[str, Any]:
        """This function will return the fuel section; a tank left empty is not declared."""
        fuel: dict[str, Any] = {
            "density": _quantity(self.typed, "density", "density:unit")
            | {"source": _clean(self.typed, "density:source")},
            "at_engine_start": {},
            "not_usable": {},
        }
        self.field_of |= {"/fuel/density": "density", "/fuel/density/source": "density:source"}
        for tank in tanks:
            self.field_of[f"/fuel/at_engine_start/{tank}"] = f"tank:{tank}:quantity"
            if _clean(self.typed, f"tank:{tank}:quantity"):
                fuel["at_engine_start"][tank] = _quantity(
                    self.typed, f"tank:{tank}:quantity", f"tank:{tank}:unit"
                )
            self.field_of[f"/fuel/not_usable/{tank}"] = f"tank:{tank}:not_usable"
            if _clean(self.typed, f"tank:{tank}:not_usable"):
                fuel["not_usable"][tank] = _quantity(
                    self.typed, f"tank:{tank}:not_usable", f"tank:{tank}:unit"
                )
        for figure in FUEL_FIGURES:
            self.field_of[f"/fuel/{figure}"] = figure
            if _clean(self.typed, figure):
                fuel[figure] = _quantity(self.typed, figure, f"{figure}:unit")
        return fuel

    def limits(self) -> list[dict[str, Any]]:
        """This function will return the performance limits typed."""
        found: list[dict[str, Any]] = []
        for row in range(MOST_ROWS):
            prefix = f"limit:{row}"
            if not _begun(self.typed, prefix, LIMIT_PARTS):
                continue
            at = f"/limits/{len(found)}"
            self.field_of |= {f"{at}/{part}": f"{prefix}:{part}" for part in ("at", *LIMIT_PARTS)}
            limit: dict[str, Any] = {
                part: _clean(self.typed, f"{prefix}:{part}") for part in ("at", "source")
            }
            if _clean(self.typed, f"{prefix}:weight"):
                limit["weight"] = _quantity(self.typed, f"{prefix}:weight", f"{prefix}:unit")
            found.append(limit)
        return found


def document_of(
    typed: Typed, *, departure: str, seats: Sequence[str], tanks: Sequence[str]
) -> tuple[dict[str, Any], dict[str, str]]:
    """This function will return the document `tarebook.load/1` of what was typed, and the input behind each
    pointer.

    `departure` is the instant with its offset, already made of the typed date, time and the operator's time
    zone.
    """
    builder = _Builder(typed)
    crew, passengers = builder.people(seats)
    flight_parts = ("reference", "origin", "destination", "operation")
    builder.field_of |= {f"/flight/{part}": part for part in flight_parts}
    builder.field_of |= {
        "/flight/departure": "time" if _clean(typed, "date") else "date",
        "/flight/leg": "leg",
        "/persons_on_board": "persons_on_board",
    }
    document: dict[str, Any] = {
        "schema": "tarebook.load/1",
        "aircraft": _clean(typed, "aircraft"),
        "configuration": _clean(typed, "configuration"),
        "flight": {part: _clean(typed, part) for part in flight_parts}
        | {"leg": _count(typed, "leg", "1"), "departure": departure},
        "persons_on_board": _count(typed, "persons_on_board"),
        "crew": crew,
        "passengers": passengers,
        "items": builder.items(),
        "fuel": builder.fuel(tanks),
        "limits": builder.limits(),
    }
    return document, builder.field_of


def field_of(pointer: str, fields: Mapping[str, str]) -> str:
    """This function will return the input that a fault's pointer belongs to: its own, or that of its
    nearest parent.
    """
    while pointer:
        if pointer in fields:
            return fields[pointer]
        pointer = pointer.rpartition("/")[0]
    return ""


def _typed_quantity(
    typed: dict[str, str], name: str, unit_name: str, quantity: Mapping[str, Any] | None
) -> None:
    if quantity:
        typed[name] = str(quantity["value"])
        typed[unit_name] = str(quantity["unit"])


def _typed_people(typed: dict[str, str], document: Mapping[str, Any]) -> None:
    for person in (*document.get("crew", ()), *document.get("passengers", ())):
        prefix = f"seat:{person['seat']}"
        for part in ("name", "how", "position", "person", "category"):
            if person.get(part):
                typed[f"{prefix}:{part}"] = str(person[part])
        _typed_quantity(typed, f"{prefix}:weight", f"{prefix}:unit", person.get("weight"))
        if infant := person.get("lap_infant"):
            typed[f"{prefix}:infant"] = str(infant["name"])
            typed[f"{prefix}:infant_how"] = str(infant.get("how", ""))
            _typed_quantity(typed, f"{prefix}:infant_weight", f"{prefix}:unit", infant.get("weight"))


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
        _typed_quantity(typed, f"item:{row}:weight", f"item:{row}:unit", item.get("weight"))
    fuel = document.get("fuel", {})
    _typed_quantity(typed, "density", "density:unit", fuel.get("density"))
    typed["density:source"] = str(fuel.get("density", {}).get("source", ""))
    for tank, quantity in fuel.get("at_engine_start", {}).items():
        _typed_quantity(typed, f"tank:{tank}:quantity", f"tank:{tank}:unit", quantity)
    for tank, quantity in fuel.get("not_usable", {}).items():
        _typed_quantity(typed, f"tank:{tank}:not_usable", f"tank:{tank}:unit", quantity)
    for figure in FUEL_FIGURES:
        _typed_quantity(typed, figure, f"{figure}:unit", fuel.get(figure))
    for row, limit in enumerate(document.get("limits", ())):
        typed |= {f"limit:{row}:at": str(limit["at"]), f"limit:{row}:source": str(limit["source"])}
        _typed_quantity(typed, f"limit:{row}:weight", f"limit:{row}:unit", limit["weight"])
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
    """This function will return the document with its people and items in a fixed order and empty parts
    left out.
    """
    parts = dict(document)
    fuel = {name: part for name, part in parts.pop("fuel", {}).items() if part != {}}
    flight = {"leg": 1} | parts.pop("flight")
    people = {
        kind: sorted(map(repr, map(_sorted, parts.pop(kind, ()))))
        for kind in ("crew", "passengers", "items", "limits")
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
