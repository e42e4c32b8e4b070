"""Between the page that declares a load and the document `tarebook.load/1`, both ways; no Django here.

Inputs are named after what they hold: `seat:ROW1-L:weight`, `item:0:place`, `tank:LEFT-MAIN:quantity`.
Nothing is filled in that was not typed, and nothing typed is dropped: a line begun and not finished goes to
the reader of the document as it is, which refuses it with its field.
"""

from collections.abc import Mapping, Sequence
from typing import Any

from loads.web.form_fitted import FLOOR_PARTS, fitted_in, footing_in
from loads.web.typed import Typed, begun, clean, count_of, quantity_of

# More rows than one load has; the page offers no row beyond, so what is typed is never cut short.
MOST_ROWS = 200
FUEL_FIGURES = ("taxi", "trip", "minimum_at_landing")
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
    "restraint",
)
ITEM_PARTS = ("kind", "what", "place", "how", "weight", *FLOOR_PARTS)
LIMIT_PARTS = ("weight", "source", "kind")


class _Builder:
    """Collects the document and, beside it, which input every pointer came from."""

    def __init__(self, typed: Typed) -> None:
        self.typed = typed
        self.field_of: dict[str, str] = {}

    def person(self, seat: str, at: str) -> dict[str, Any]:
        """This function will return what was typed for the person in `seat`, for the pointer `at`."""
        prefix = f"seat:{seat}"
        person: dict[str, Any] = {"name": clean(self.typed, f"{prefix}:name"), "seat": seat}
        person["how"] = clean(self.typed, f"{prefix}:how")
        if clean(self.typed, f"{prefix}:weight"):
            person["weight"] = quantity_of(self.typed, f"{prefix}:weight", f"{prefix}:unit")
        for part in ("category", "person"):
            if word := clean(self.typed, f"{prefix}:{part}"):
                person[part] = word
        if clean(self.typed, f"{prefix}:restraint"):
            person["restraint"] = quantity_of(self.typed, f"{prefix}:restraint", f"{prefix}:unit")
        if begun(self.typed, prefix, ("infant", "infant_weight", "infant_how")):
            person["lap_infant"] = self.infant(prefix)
        parts = ("name", "weight", "how", "position", "person", "category", "restraint")
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
        infant: dict[str, Any] = {"name": clean(self.typed, f"{prefix}:infant")}
        if clean(self.typed, f"{prefix}:infant_weight"):
            infant["weight"] = quantity_of(self.typed, f"{prefix}:infant_weight", f"{prefix}:unit")
        if how := clean(self.typed, f"{prefix}:infant_how"):
            infant["how"] = how
        return infant

    def people(self, seats: Sequence[str]) -> tuple[list[dict[str, Any]], list[dict[str, Any]]]:
        """This function will return crew and passengers: a seat with anything typed in it is taken."""
        crew: list[dict[str, Any]] = []
        passengers: list[dict[str, Any]] = []
        for seat in seats:
            if not begun(self.typed, f"seat:{seat}", SEAT_PARTS):
                continue
            if position := clean(self.typed, f"seat:{seat}:position"):
                crew.append(self.person(seat, f"/crew/{len(crew)}") | {"position": position})
            else:
                passengers.append(self.person(seat, f"/passengers/{len(passengers)}"))
        return crew, passengers

    def items(self) -> list[dict[str, Any]]:
        """This function will return the rows of the items table in which something was typed."""
        found: list[dict[str, Any]] = []
        for row in range(MOST_ROWS):
            prefix = f"item:{row}"
            if not begun(self.typed, prefix, ITEM_PARTS):
                continue
            at = f"/items/{len(found)}"
            item: dict[str, Any] = {
                part: clean(self.typed, f"{prefix}:{part}") for part in ("kind", "what", "place", "how")
            }
            if clean(self.typed, f"{prefix}:weight"):
                item["weight"] = quantity_of(self.typed, f"{prefix}:weight", f"{prefix}:unit")
            item |= footing_in(self.typed, prefix, at, self.field_of)
            found.append(item)
            self.field_of |= {f"{at}/{part}": f"{prefix}:{part}" for part in ITEM_PARTS} | {
                at: f"{prefix}:what"
            }
        return found

    def fuel(self, tanks: Sequence[str]) -> dict[str, Any]:
        """This function will return the fuel section; a tank left empty is not declared."""
        fuel: dict[str, Any] = {
            "density": quantity_of(self.typed, "density", "density:unit")
            | {"source": clean(self.typed, "density:source")},
            "at_engine_start": {},
            "not_usable": {},
        }
        self.field_of |= {"/fuel/density": "density", "/fuel/density/source": "density:source"}
        for tank in tanks:
            self.field_of[f"/fuel/at_engine_start/{tank}"] = f"tank:{tank}:quantity"
            if clean(self.typed, f"tank:{tank}:quantity"):
                fuel["at_engine_start"][tank] = quantity_of(
                    self.typed, f"tank:{tank}:quantity", f"tank:{tank}:unit"
                )
            self.field_of[f"/fuel/not_usable/{tank}"] = f"tank:{tank}:not_usable"
            if clean(self.typed, f"tank:{tank}:not_usable"):
                fuel["not_usable"][tank] = quantity_of(
                    self.typed, f"tank:{tank}:not_usable", f"tank:{tank}:unit"
                )
        for figure in FUEL_FIGURES:
            self.field_of[f"/fuel/{figure}"] = figure
            if clean(self.typed, figure):
                fuel[figure] = quantity_of(self.typed, figure, f"{figure}:unit")
        return fuel

    def limits(self) -> list[dict[str, Any]]:
        """This function will return the performance limits typed."""
        found: list[dict[str, Any]] = []
        for row in range(MOST_ROWS):
            prefix = f"limit:{row}"
            if not begun(self.typed, prefix, LIMIT_PARTS):
                continue
            at = f"/limits/{len(found)}"
            self.field_of |= {f"{at}/{part}": f"{prefix}:{part}" for part in ("at", *LIMIT_PARTS)}
            limit: dict[str, Any] = {part: clean(self.typed, f"{prefix}:{part}") for part in ("at", "source")}
            if clean(self.typed, f"{prefix}:weight"):
                limit["weight"] = quantity_of(self.typed, f"{prefix}:weight", f"{prefix}:unit")
            if kind := clean(self.typed, f"{prefix}:kind"):
                limit["kind"] = kind
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
        "/flight/departure": "time" if clean(typed, "date") else "date",
        "/flight/leg": "leg",
        "/persons_on_board": "persons_on_board",
    }
    document: dict[str, Any] = {
        "schema": "tarebook.load/1",
        "aircraft": clean(typed, "aircraft"),
        "configuration": clean(typed, "configuration"),
        "flight": {part: clean(typed, part) for part in flight_parts}
        | {"leg": count_of(typed, "leg", "1"), "departure": departure},
        "persons_on_board": count_of(typed, "persons_on_board"),
        "crew": crew,
        "passengers": passengers,
        "items": builder.items(),
        "fuel": builder.fuel(tanks),
        "limits": builder.limits(),
        **fitted_in(typed, builder.field_of),
    }
    builder.field_of["/certification_category"] = "certification_category"
    if category := clean(typed, "certification_category"):
        document["certification_category"] = category
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
