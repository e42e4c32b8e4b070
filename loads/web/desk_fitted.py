"""Inputs for what is fitted, where seats stand on rails, and what items stand on; no Django here.

They are shown only where the basis has something they could mean, or where something was typed in them: what
a copied load holds and this basis does not know stays on the page, to be refused by name and not lost.
"""

from collections.abc import Iterable

from fleet.basis import Basis, Configuration, Seat
from loads.web.choices import own_unit_first
from loads.web.form_fitted import CONDITION, FLOOR_PARTS, SETTING
from loads.web.inputs import Choices, Field, Maker

LENGTH_UNITS: Choices = (("in", "in"), ("ft", "ft"), ("mm", "mm"), ("cm", "cm"), ("m", "m"))
LIES: Choices = (("", "choose"), ("along", "along"), ("across", "across"))
FITTED: Choices = (("", "not fitted"), ("yes", "fitted"))
LABELS = {
    "length": "Contact length of item {}",
    "width": "Contact width of item {}",
    "lies": "Which way the length of item {} lies",
    "feet_lengthwise": "Feet lengthwise of item {}",
    "feet_widthwise": "Feet widthwise of item {}",
    "net_weight": "Weight of the net over item {}",
}
LABELS |= {
    f"{part}_{side}": f"{words} of the {part} of item {{}}"
    for part in ("spreader", "pallet")
    for side, words in (("weight", "Weight"), ("length", "Length"), ("width", "Width"), ("lies", "Lie"))
}


def condition_inputs(make: Maker, basis: Basis) -> list[Field]:
    """This function will return one list a condition of the basis, and one for each other that was typed."""
    known = {f"{CONDITION}{one.id}": one.name for one in basis.conditions}
    known |= {name: name.removeprefix(CONDITION) for name in _typed(make, CONDITION) if name not in known}
    return [make.choice(name, title, FITTED, title=title.capitalize()) for name, title in known.items()]


def setting_inputs(make: Maker, basis: Basis) -> list[Field]:
    """This function will return one list for each row and each seat on rails."""
    on_rails = [seat for seat in basis.seats if seat.rail is not None]
    rows = dict.fromkeys(seat.row for seat in on_rails if seat.row is not None)
    asked = [(f"{SETTING}row:{row}", f"Row {row}", [s for s in on_rails if s.row == row]) for row in rows]
    asked += [(f"{SETTING}seat:{seat.id}", seat.name.capitalize(), [seat]) for seat in on_rails]
    known = {name for name, _, _ in asked}
    asked += [(name, name.rpartition(":")[2], []) for name in _typed(make, SETTING) if name not in known]
    return [make.choice(name, f"{title} on the rail", _settings(seats)) for name, title, seats in asked]


def _settings(seats: Iterable[Seat]) -> Choices:
    named = dict.fromkeys(one.name for seat in seats if seat.rail for one in seat.rail.settings)
    return (("", "not stated: both ends"), *((name, name) for name in named))


def floor_inputs(make: Maker, basis: Basis, configuration: Configuration, rows: int) -> list[list[Field]]:
    """This function will return a row of inputs an item, of what it stands on; [] where no floor asks."""
    typed = any(make.typed.get(f"item:{row}:{part}") for row in range(rows) for part in FLOOR_PARTS)
    if not floors_asked(basis, configuration) and not typed:
        return []
    return [floor_row(make, f"item:{row}", row + 1, basis.length_unit.value) for row in range(rows)]


def floors_asked(basis: Basis, configuration: Configuration) -> bool:
    """This function will say whether a floor of the configuration asks what items stand on."""
    return any(place.floor is not None for place in basis.places if place.id in configuration.places)


def floor_row(make: Maker, prefix: str, number: object, unit: str) -> list[Field]:
    """This function will return the inputs of what one item stands on."""

    def asked(part: str) -> Field:
        name, label = f"{prefix}:{part}", LABELS[part].format(number)
        title = part.replace("_", " ").capitalize()
        return (
            make.choice(name, label, LIES, title=title)
            if part.endswith("lies")
            else make.figure(name, label, title=title)
        )

    units = own_unit_first(LENGTH_UNITS, unit)
    listed = make.choice(f"{prefix}:side_unit", f"Unit of the lengths of item {number}", units, title="Unit")
    length, width, *others = map(asked, FLOOR_PARTS)
    return [length, width, listed, *others]


def restraints_asked(make: Maker, basis: Basis) -> bool:
    """This function will say whether restraints are asked: seats are marked for them, or one was typed."""
    marked = any(seat.infant_restraint is not None for seat in basis.seats)
    return marked or any(value and name.endswith(":restraint") for name, value in make.typed.items())


def _typed(make: Maker, start: str) -> list[str]:
    return [name for name, value in make.typed.items() if name.startswith(start) and value]
