"""Putting a last-minute change into a declared load, measuring it, and saying it in words.

A settled line is a line as typed together with what it takes off: who left or what, and its weight. It is
what is kept and printed. Measured is what moved, each line by its absolute value: what goes on and what comes
off both count, so many small steps add up. What a table of standard weights adds to a declared passenger
counts with the passenger, and stands in the line.
"""

import copy
from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass
from decimal import Decimal
from fractions import Fraction
from typing import Any

from fleet.conversion import in_unit, weight_of_volume
from fleet.quantities import DIMENSION_OF, Dimension, Quantity, Unit, read_quantity
from loads.balance.fields import Faults
from loads.balance.footing import PARTS
from loads.balance.fuelling import WEIGHT_OR_VOLUME
from loads.balance.late_reading import LateChange
from records.canonical import decimal_text
from records.refusal import Fault, Invalid

Line = Mapping[str, Any]


@dataclass(frozen=True, slots=True)
class Settled:
    """The changed document, its settled lines, and where a part of it comes from (pointer in the document to
    pointer in the change).
    """

    document: dict[str, Any]
    lines: tuple[Line, ...]
    origins: Mapping[str, str]


@dataclass(frozen=True, slots=True)
class Moved:
    """What moved, added up: weight in kilograms, exact, 0 or more; persons, lap infants among them."""

    kilograms: Fraction
    persons: int

    def __add__(self, other: "Moved") -> "Moved":
        """Return both together."""
        return Moved(self.kilograms + other.kilograms, self.persons + other.persons)


NOTHING = Moved(Fraction(0), 0)
PASSENGER_PARTS = ("name", "weight", "how", "lap_infant", "restraint")  # kept of one who leaves


def settle(declared: Mapping[str, Any], change: LateChange, additions: Sequence[Line] = ()) -> Settled:
    """Return the declared load with the change in it; nothing is made less than nothing. `additions` are what
    the table in force adds to each declared passenger: `what`, `value`, `unit`.

    Raises Invalid with every line that does not fit what is aboard. Whether the changed load can be carried
    is the assessment's business.
    """
    document = copy.deepcopy(dict(declared))
    document["persons_on_board"] = change.persons_on_board
    faults, settled = Faults(), []
    for place, line in enumerate(change.lines):
        put = _PUTS[str(line["change"])](document, dict(line), f"/lines/{place}", faults)
        adds = additions and str(line["change"]).startswith("passenger") and put.get("how") == "declared"
        settled.append({**put, "additions": [dict(one) for one in additions]} if adds else put)
    if faults.all():
        raise Invalid(*faults.all())
    return Settled(document, tuple(settled), _origins(document, change.lines))


def measured(lines: Iterable[Line], density: Mapping[str, Any]) -> Moved:
    """Return what settled lines move; fuel by volume weighs what it does at the declared density."""
    moved = NOTHING
    for line in lines:
        if "quantity" in line:
            moved += Moved(_fuel_weight(line["quantity"], density), 0)
            continue
        moved += Moved(_kilograms(line["weight"]), 1 if line["change"].startswith("passenger") else 0)
        infant = line.get("lap_infant")
        if infant is not None:
            moved += Moved(_kilograms(infant["weight"]), 1)
        besides = [line["restraint"]] if "restraint" in line else []
        for weight in (*besides, *map(_weight_in, line.get("additions", ()))):
            moved += Moved(_kilograms(weight), 0)
    return moved


def _weight_in(addition: Line) -> Line:
    return {"value": addition["value"], "unit": addition["unit"]}


def said(line: Line, *, named: bool) -> str:
    """Return a settled line in words; the names of people only where `named` is true."""
    change = str(line["change"])
    if "quantity" in line:
        amount = f"{line['quantity']['value']} {line['quantity']['unit']}"
        return f"fuel {'up' if change.endswith('-on') else 'down'}, {line['tank']}, {amount}"
    to = "on" if change.endswith("-on") else "off"
    weight = f"{line['weight']['value']} {line['weight']['unit']} {line['how']}"
    if change.startswith("item"):
        return f"{line['kind']} “{line['what']}” {to}, {line['place']}, {weight}"
    name = f" {line['name']}" if named else ""
    infant = line.get("lap_infant")
    beside = ""
    if infant is not None:
        called = f" {infant['name']}" if named else ""
        beside = f", with lap infant{called}, {infant['weight']['value']} {infant['weight']['unit']}"
    if "restraint" in line:
        beside += f", with restraint, {line['restraint']['value']} {line['restraint']['unit']}"
    if "additions" in line:
        added = ", ".join(f"{one['what']} {one['value']} {one['unit']}" for one in line["additions"])
        beside += f", and by the table of standard weights {added}"
    return f"passenger{name} {to}, {line['seat']}, {weight}{beside}"


def _passenger_on(document: dict[str, Any], line: dict[str, Any], at: str, faults: Faults) -> Line:  # noqa: ARG001  # the form of all six
    document["passengers"].append({name: value for name, value in line.items() if name != "change"})
    return line


def _passenger_off(document: dict[str, Any], line: dict[str, Any], at: str, faults: Faults) -> Line:
    passengers = document["passengers"]
    found = next((one for one in passengers if one["seat"] == line["seat"]), None)
    if found is None:
        faults.note(f"{at}/seat", "nobody-there", "no passenger is in this seat; name the seat that empties")
        return line
    infant = found.get("lap_infant")
    if "weight" not in found or (infant is not None and "weight" not in infant):
        detail = "the weight of who leaves is a standard one, so what moves is not known; revise the load"
        faults.note(f"{at}/seat", "weight-unknown", detail)
        return line
    passengers.remove(found)
    kept = {name: found[name] for name in PASSENGER_PARTS if name in found}
    return line | kept


def _item_on(document: dict[str, Any], line: dict[str, Any], at: str, faults: Faults) -> Line:  # noqa: ARG001  # as above
    document["items"].append({name: value for name, value in line.items() if name != "change"})
    return line


def _item_off(document: dict[str, Any], line: dict[str, Any], at: str, faults: Faults) -> Line:
    items = document["items"]
    found = [
        one
        for one in items
        if (one["what"], one["place"]) == (line["what"], line["place"]) and one["kind"] != "equipment"
    ]
    if len(found) != 1:
        count = "nothing" if not found else "more than one item"
        detail = f"{count} is called so there; write it as it was declared, or revise the load"
        faults.note(f"{at}/what", "no-such-item" if not found else "several-such-items", detail)
        return line
    item = found[0]
    if any(part in item for part in PARTS):
        detail = "it stands on a pallet or spreader, or under a net, which leaves or stays; revise the load"
        faults.note(f"{at}/what", "item-rigged", detail)
        return line
    if "weight" not in item:
        faults.note(f"{at}/what", "weight-unknown", "its weight was not declared; revise the load")
        return line
    taken = line.get("weight", item["weight"])
    left = _less(item["weight"], taken, f"{at}/weight", faults)
    if left == 0:
        items.remove(item)
    elif left is not None:
        item["weight"] = {"value": decimal_text(left), "unit": item["weight"]["unit"]}
    return line | {"kind": item["kind"], "how": item["how"], "weight": taken}


def _fuel(document: dict[str, Any], line: dict[str, Any], at: str, faults: Faults) -> Line:
    tanks = document["fuel"]["at_engine_start"]
    held = tanks.get(line["tank"])
    if held is None:
        faults.note(f"{at}/tank", "unknown-tank", f"no such tank; the load has {', '.join(tanks)}")
        return line
    if line["change"] == "fuel-off":
        new = _less(held, line["quantity"], f"{at}/quantity", faults)
    elif _same_unit(held, line["quantity"], f"{at}/quantity", faults):
        new = Decimal(str(held["value"])) + Decimal(str(line["quantity"]["value"]))
    else:
        new = None
    if new is not None:
        tanks[line["tank"]] = {"value": decimal_text(new), "unit": held["unit"]}
    return line


def _less(held: Line, taken: Line, at: str, faults: Faults) -> Decimal | None:
    """Return what is left, exactly; None where more is taken than is there, or in another unit."""
    if not _same_unit(held, taken, at, faults):
        return None
    left = Decimal(str(held["value"])) - Decimal(str(taken["value"]))
    if left < 0:
        there = f"{held['value']} {held['unit']}"
        faults.note(at, "below-zero", f"only {there} is there, and no more can come off; correct it")
        return None
    return left


def _same_unit(held: Line, given: Line, at: str, faults: Faults) -> bool:
    if held["unit"] == given["unit"]:
        return True
    detail = f"this was declared in {held['unit']}; write the change in the same unit"
    faults.note(f"{at}/unit", "unit-differs", detail)
    return False


_PUTS = {
    "passenger-on": _passenger_on,
    "passenger-off": _passenger_off,
    "item-on": _item_on,
    "item-off": _item_off,
    "fuel-on": _fuel,
    "fuel-off": _fuel,
}


def faults_in_the_change(faults: Sequence[Fault], origins: Mapping[str, str]) -> tuple[Fault, ...]:
    """Return faults of a changed document, each at the line of the change it comes from, if it does."""
    return tuple(Fault(_pointed(fault.pointer, origins), fault.code, fault.detail) for fault in faults)


def _pointed(pointer: str, origins: Mapping[str, str]) -> str:
    for start, origin in origins.items():
        if pointer == start or pointer.startswith(f"{start}/"):
            return origin + pointer[len(start) :]
    return pointer


def _origins(document: Mapping[str, Any], lines: Sequence[Line]) -> dict[str, str]:
    found: dict[str, str] = {}
    for kind, part in (("passenger-on", "passengers"), ("item-on", "items")):
        added = [place for place, line in enumerate(lines) if line["change"] == kind]
        # What went on stands last, in the order of its lines; a line that comes off again leaves no mark.
        first = len(document[part]) - len(added)
        found |= {f"/{part}/{first + turn}": f"/lines/{place}" for turn, place in enumerate(added)}
    for place, line in enumerate(lines):
        if "quantity" in line:
            found[f"/fuel/at_engine_start/{line['tank']}"] = f"/lines/{place}/quantity"
    return found


def _kilograms(weight: Line) -> Fraction:
    return in_unit(_quantity(weight, Dimension.WEIGHT), Unit.KG)


def _fuel_weight(amount: Line, density: Mapping[str, Any]) -> Fraction:
    quantity = _quantity(amount, WEIGHT_OR_VOLUME)
    if DIMENSION_OF[quantity.unit] is Dimension.WEIGHT:
        return in_unit(quantity, Unit.KG)
    per_volume = read_quantity(density, "/fuel/density", Dimension.DENSITY, also=frozenset({"source"}))
    return weight_of_volume(quantity, per_volume, Unit.KG)


def _quantity(value: Line, dimension: Dimension | tuple[Dimension, ...]) -> Quantity:
    return read_quantity(value, "", dimension)
