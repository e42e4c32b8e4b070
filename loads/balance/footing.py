"""What an item stands on: its footprint, and a pallet, a net or a spreader that goes with it.

    footprint            length x width of one contact area as the item stands, not of its outline
    feet                 how many such areas there are lengthwise and widthwise; one by one where it is flat
    lies                 whether the length lies along the aircraft or across it
    pallet, spreader     with a length and width of their own they stand on the floor in the item's stead

What lies lowest counts: the spreader, else the pallet, else the footprint. Pallet, net and spreader weigh,
too. The running length is what touches the floor along one way, gaps between feet left out: nothing is
assumed of how a floor spreads what feet put on it (common practice, and the careful side of it).
"""

from fractions import Fraction
from itertools import pairwise
from typing import NamedTuple, cast

from fleet.basis import Basis
from fleet.conversion import in_unit
from fleet.quantities import Dimension, Unit
from fleet.stations import Way
from loads.balance.fields import Fields

PARTS = ("pallet", "net", "spreader")  # each weighs; the first and the last may be stood on
FOOTING_FIELDS = ("footprint", *PARTS)
SIDES = ("length", "width", "lies")
FEET = ("feet_lengthwise", "feet_widthwise")
WAYS: tuple[Way, ...] = ("along", "across")
MOST_FEET = 100


class Contact(NamedTuple):
    """What touches the floor: the area (length unit squared), and how far it runs along and across."""

    area: Fraction
    along: Fraction
    across: Fraction

    def run(self, way: Way) -> Fraction:
        """Return how far the contact runs one way, gaps left out."""
        return self.along if way == "along" else self.across


class Rigging(NamedTuple):
    """A pallet, net or spreader: what it weighs, and the pointer of its line."""

    part: str
    weight: Fraction
    pointer: str


class Footing(NamedTuple):
    """What an item stands on (None: not stated), and what goes with it."""

    contact: Contact | None
    rigging: tuple[Rigging, ...]


def read_footing(line: Fields, basis: Basis) -> Footing:
    """Return what an item's line says of how it stands, noting faults."""
    return _read(line, basis.weight_unit, basis.length_unit)


def footing_form(line: Fields) -> None:
    """Note what of it can be seen to be wrong without a basis."""
    _read(line, Unit.KG, Unit.MM)


def _read(line: Fields, weight_unit: Unit, length_unit: Unit) -> Footing:
    if line.raw("removed") is True:
        for name in FOOTING_FIELDS:
            if name in line:
                line.note(name, "removed-stands-nowhere", "what is taken out stands nowhere; leave this out")
    contacts = [_footprint(line, length_unit)]
    rigging = []
    for part in PARTS:
        found = line.inner(part, ("weight",), () if part == "net" else SIDES)
        if found is None:
            continue
        weight = found.quantity("weight", Dimension.WEIGHT, zero=False)
        if weight is not None:
            rigging.append(Rigging(part, in_unit(weight, weight_unit), found.pointer))
        if any(side in found for side in SIDES):
            for side in SIDES:
                if side not in found:
                    found.note(side, "missing", "length, width and how it lies go together; state all three")
            contacts.append(_contact(found, length_unit))
    stated = [contact for contact in contacts if contact is not None]
    _demand_larger(line, stated)
    return Footing(stated[-1] if stated else None, tuple(rigging))


def _footprint(line: Fields, length_unit: Unit) -> Contact | None:
    found = line.inner("footprint", SIDES, FEET)
    if found is None:
        return None
    lengthwise, widthwise = (
        1 if name not in found else found.whole(name, 1, MOST_FEET) or 1 for name in FEET
    )
    return _contact(found, length_unit, lengthwise, widthwise)


def _contact(line: Fields, length_unit: Unit, lengthwise: int = 1, widthwise: int = 1) -> Contact | None:
    length = line.quantity("length", Dimension.LENGTH, zero=False)
    width = line.quantity("width", Dimension.LENGTH, zero=False)
    lies = cast("Way | None", line.choice("lies", WAYS))
    if length is None or width is None or lies is None:
        return None
    sides = tuple(
        count * in_unit(side, length_unit) for count, side in ((lengthwise, length), (widthwise, width))
    )
    along, across = sides if lies == "along" else sides[::-1]
    return Contact(sides[0] * sides[1], along, across)


def _demand_larger(line: Fields, stated: list[Contact]) -> None:
    """Note a pallet or spreader that is smaller than what stands on it: it would spread nothing."""
    if any(lower.area < upper.area for upper, lower in pairwise(stated)):
        name = next(part for part in reversed(FOOTING_FIELDS) if part in line)
        line.note(name, "smaller-than-contact", "smaller than what stands on it; check both sizes")
