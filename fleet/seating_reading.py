"""Reads the document `tarebook.seating-variation/1`: a cabin, and what each passenger weighs."""

from collections.abc import Mapping
from decimal import Decimal
from fractions import Fraction
from typing import Any, NamedTuple

from fleet.conversion import in_unit
from fleet.document_schema import shape_faults
from fleet.quantities import Quantity, Unit
from fleet.seating import CabinRow
from records.refusal import Fault, Invalid

SCHEMA = "seating-variation-1"


class Cabin(NamedTuple):
    """What was asked, exact: arms in `length`, the unit of the first row; the weight as typed in `unit`."""

    rows: tuple[CabinRow, ...]
    weight: Fraction
    assumed: Mapping[str, Fraction]
    unit: Unit
    length: Unit


def read_cabin(document: object) -> Cabin:
    """Return the cabin of a document. Raises `Invalid` with every fault, each with its JSON pointer."""
    faults = shape_faults(SCHEMA, document)
    if faults or not isinstance(document, Mapping):
        raise Invalid(*faults)
    length = Unit(document["rows"][0]["arm"]["unit"])
    rows = tuple(
        CabinRow(
            entry["row"],
            _in(entry["arm"], length),
            entry["window"],
            entry["aisle"],
            entry["remaining"],
            entry.get("section", ""),
        )
        for entry in document["rows"]
    )
    weight = Quantity(Decimal(document["weight"]["value"]), Unit(document["weight"]["unit"]))
    assumed = {entry.get("section", ""): _in(entry["arm"], length) for entry in document.get("assumed", ())}
    faults = [*_row_faults(rows), *_assumed_faults(document, rows)]
    if weight.value <= 0:
        faults.append(Fault("/weight/value", "not-above-zero", "must be above zero; correct it"))
    if faults:
        raise Invalid(*faults)
    return Cabin(rows, Fraction(weight.value), assumed, weight.unit, length)


def _row_faults(rows: tuple[CabinRow, ...]) -> list[Fault]:
    found = []
    names: set[str] = set()
    for number, row in enumerate(rows):
        if row.name in names:
            found.append(
                Fault(f"/rows/{number}/row", "duplicate", f"row {row.name} stands here twice; remove one")
            )
        names.add(row.name)
        if not row.seats:
            found.append(
                Fault(
                    f"/rows/{number}",
                    "row-without-seats",
                    "this row has no seat; enter its seats or leave it out",
                )
            )
    return found


def _assumed_faults(document: Mapping[str, Any], rows: tuple[CabinRow, ...]) -> list[Fault]:
    found = []
    known = {row.section for row in rows}
    seen: set[str] = set()
    for number, entry in enumerate(document.get("assumed", ())):
        section = entry.get("section", "")
        at = f"/assumed/{number}/section"
        if section not in known:
            found.append(Fault(at, "unknown-id", "no row is counted in this section; correct or remove it"))
        elif section in seen:
            found.append(Fault(at, "duplicate", "this section stands here twice; remove one"))
        seen.add(section)
    return found


def _in(given: Mapping[str, Any], length: Unit) -> Fraction:
    return in_unit(Quantity(Decimal(given["value"]), Unit(given["unit"])), length)
