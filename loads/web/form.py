"""Between the page that declares a load and the document `tarebook.load/1`, both ways; no Django here.

Inputs are named after what they hold: `seat:ROW1-L:weight`, `item:0:place`, `tank:LEFT-MAIN:quantity`.
Nothing is filled in that was not typed, and nothing typed is dropped: a line begun and not finished goes to
the reader of the document as it is, which refuses it with its field.
"""

from collections.abc import Iterable, Mapping, Sequence
from typing import Any

from loads.web.form_events import sequence_in
from loads.web.form_fitted import fitted_in
from loads.web.form_lines import ITEM_PARTS, PERSON_PARTS, item_in, person_in
from loads.web.typed import Typed, begun, clean, count_of, quantity_of, shared_quantity

# As many items as a document may hold; the page offers no row beyond, so what is typed is never cut short.
MOST_ROWS = 400
FUEL_FIGURES = ("taxi", "trip", "minimum_at_landing")
FLIGHT_PARTS = ("reference", "origin", "destination", "operation")
LIMIT_PARTS = ("weight", "source", "kind")


class _Builder:
    """Collects the document and, beside it, which input every pointer came from."""

    def __init__(self, typed: Typed) -> None:
        self.typed = typed
        self.field_of: dict[str, str] = {}

    def people(self, seats: Sequence[str]) -> tuple[list[dict[str, Any]], list[dict[str, Any]]]:
        """This function will return crew and passengers: a seat with anything typed in it is taken."""
        crew: list[dict[str, Any]] = []
        passengers: list[dict[str, Any]] = []
        for seat in seats:
            prefix = f"seat:{seat}"
            if not begun(self.typed, prefix, PERSON_PARTS):
                continue
            position = clean(self.typed, f"{prefix}:position")
            at = f"/crew/{len(crew)}" if position else f"/passengers/{len(passengers)}"
            person = {"seat": seat} | person_in(self.typed, prefix, at, self.field_of)
            if position:
                crew.append(person | {"position": position})
            else:
                passengers.append(person)
        return crew, passengers

    def items(self) -> list[dict[str, Any]]:
        """This function will return the rows of the items table in which something was typed."""
        found: list[dict[str, Any]] = []
        for row in range(MOST_ROWS):
            prefix = f"item:{row}"
            if begun(self.typed, prefix, ITEM_PARTS):
                found.append(item_in(self.typed, prefix, f"/items/{len(found)}", self.field_of))
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
                fuel["not_usable"][tank] = shared_quantity(
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


def also_typed(typed: Typed, start: str, known: Iterable[str]) -> tuple[str, ...]:
    """This function will return the seats (`start` "seat:") or tanks known here, and behind them the others
    in which something was typed: they stay on the page, to be refused by name and not lost.
    """
    begun_in = (name for name in typed if name.startswith(start) and not name.endswith(":unit"))
    strange = (name.removeprefix(start).rpartition(":")[0] for name in begun_in if clean(typed, name))
    return tuple(dict.fromkeys((*known, *filter(None, strange))))


def document_of(
    typed: Typed, *, departure: str, seats: Sequence[str], tanks: Sequence[str]
) -> tuple[dict[str, Any], dict[str, str]]:
    """This function will return the document `tarebook.load/1` of what was typed, and the input behind each
    pointer.

    `departure` is the instant with its offset, already made of the typed date, time and the operator's time
    zone.
    """
    builder = _Builder(typed)
    crew, passengers = builder.people(also_typed(typed, "seat:", seats))
    builder.field_of |= {f"/flight/{part}": part for part in (*FLIGHT_PARTS, "leg", "follows")}
    builder.field_of |= {
        "/flight/departure": "time" if clean(typed, "date") else "date",
        "/persons_on_board": "persons_on_board",
        "/certification_category": "certification_category",
    }
    document: dict[str, Any] = {
        "schema": "tarebook.load/1",
        "aircraft": clean(typed, "aircraft"),
        "configuration": clean(typed, "configuration"),
        "flight": {part: clean(typed, part) for part in FLIGHT_PARTS}
        | {"leg": count_of(typed, "leg", "1"), "departure": departure},
        "persons_on_board": count_of(typed, "persons_on_board"),
        "crew": crew,
        "passengers": passengers,
        "items": builder.items(),
        "fuel": builder.fuel(also_typed(typed, "tank:", tanks)),
        "limits": builder.limits(),
        **fitted_in(typed, builder.field_of),
        **sequence_in(typed, builder.field_of),
    }
    if follows := clean(typed, "follows"):
        document["flight"]["follows"] = follows
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
