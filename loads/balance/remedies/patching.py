"""A remedy as a change to the load document: a JSON Patch (RFC 6902), so that any program can apply it.

No name of a person and no text somebody typed stands in it: a part of an item is a copy of its line. Amounts
are in the units the lines were typed in, rounded so that what is left and what is parted add up to what was
typed; the patched document is read and assessed again before it is offered.
"""

import copy
from collections.abc import Iterable, Mapping, Sequence
from decimal import Decimal
from fractions import Fraction
from typing import Any

from fleet.conversion import converted
from fleet.quantities import DIMENSION_OF, Dimension, Unit
from loads.balance.prepared import Prepared
from loads.balance.remedies.steps import Ballast, Refit, Refuel, Reseat, Shift, Step, Take
from loads.balance.rounding import MOST_PLACES, WEIGHT_PLACES, printed
from records.canonical import decimal_text

Patch = list[dict[str, Any]]


def patch_of(steps: Iterable[Step], document: Mapping[str, Any], density: Fraction, ready: Prepared) -> Patch:
    """Return the operations, in the order they are applied; lines that go come last, the last line first."""
    made, lines = [], len(document.get("items", ()))
    gone: list[int] = []
    typed: dict[str, Fraction] = {}  # by item: how much of what was typed is still there
    for step in steps:
        match step:
            case Reseat(person, end):
                made.append(_replace(f"{person.pointer}/seat", end.id))
            case Shift(item, end, weight) if step.whole:
                made.append(_replace(f"{item.pointer}/place", end.id))
            case Take(item, weight) if step.whole:
                gone.append(int(item.pointer.rpartition("/")[2]))
            case Shift(item, _, weight) | Take(item, weight):
                quantity = _at(document, item.pointer)["weight"]
                part = _in_typed(weight, ready.basis.weight_unit, quantity["unit"])
                left = typed.get(item.pointer, Fraction(str(quantity["value"]))) - part
                typed[item.pointer] = left
                made.append(_replace(f"{item.pointer}/weight", _quantity(left, quantity["unit"])))
                if isinstance(step, Shift):
                    path = f"/items/{lines}"
                    made.append({"op": "copy", "from": item.pointer, "path": "/items/-"})
                    made.append(_replace(f"{path}/place", step.end.id))
                    made.append(_replace(f"{path}/weight", _quantity(part, quantity["unit"])))
                    lines += 1
            case Ballast(place, weight):
                made.append({"op": "add", "path": "/items/-", "value": _ballast(place.id, weight, ready)})
                lines += 1
            case Refuel(tank, volume):
                path = f"/fuel/at_engine_start/{tank.id.replace('~', '~0').replace('/', '~1')}"
                quantity = document["fuel"]["at_engine_start"][tank.id]
                made.append(_replace(path, _fuel(quantity, volume, density, ready)))
            case Refit(configuration):
                made.append(_replace("/configuration", configuration.id))
    made += [{"op": "remove", "path": f"/items/{number}"} for number in sorted(gone, reverse=True)]
    return made


def patched(document: Mapping[str, Any], patch: Patch) -> dict[str, Any]:
    """Return a copy of the document with these operations applied."""
    changed: dict[str, Any] = copy.deepcopy(dict(document))
    for operation in patch:
        parent, _, last = operation["path"].rpartition("/")
        holder: Any = _at(changed, parent)
        value = (
            copy.deepcopy(_at(changed, operation["from"]))
            if operation["op"] == "copy"
            else operation.get("value")
        )
        if operation["op"] == "remove":
            del holder[int(last)]
        elif last == "-":
            holder.append(value)
        elif isinstance(holder, list):
            holder[int(last)] = value
        else:
            holder[last.replace("~1", "/").replace("~0", "~")] = value
    return changed


def _at(document: Any, pointer: str) -> Any:
    for part in pointer.split("/")[1:]:
        document = document[int(part) if isinstance(document, Sequence) else part.replace("~1", "/")]
    return document


def _replace(path: str, value: object) -> dict[str, Any]:
    return {"op": "replace", "path": path, "value": value}


def _in_typed(weight: Fraction, given: Unit, wanted: str) -> Fraction:
    """Return a weight in the unit a line was typed in, whole tenths, rounded up."""
    exact = converted(weight, given, Unit(wanted))
    return Fraction(printed(exact, WEIGHT_PLACES, "up"))


def _fuel(
    quantity: Mapping[str, Any], volume: Fraction, density: Fraction, ready: Prepared
) -> dict[str, str]:
    """Return what a tank then holds, in the unit it was typed in; less is rounded to less."""
    unit = Unit(quantity["unit"])
    if DIMENSION_OF[unit] is Dimension.VOLUME:
        more = converted(volume, ready.basis.volume_unit, unit)
    else:
        more = converted(volume * density, ready.basis.weight_unit, unit)
    more = Fraction(printed(more, WEIGHT_PLACES, "down"))
    return _quantity(max(Fraction(str(quantity["value"])) + more, Fraction(0)), quantity["unit"])


def _ballast(place: str, weight: Fraction, ready: Prepared) -> dict[str, Any]:
    return {
        "kind": "ballast",
        "what": "ballast",
        "place": place,
        "how": "weighed",
        "weight": _quantity(weight, ready.weight),
    }


def _quantity(value: Fraction, unit: str) -> dict[str, str]:
    return {"value": decimal_text(Decimal(printed(value, MOST_PLACES))), "unit": unit}
