"""Reading items: what lies or hangs where, how heavy, and how that is known."""

from collections.abc import Mapping
from fractions import Fraction
from typing import cast

from fleet.basis import Basis, Configuration, Place
from fleet.conversion import in_unit
from loads.balance.aboard import HOWS, KINDS, How, Item, Kind
from loads.balance.exact import added
from loads.balance.fields import Fields
from loads.balance.footing import FOOTING_FIELDS, read_footing

ITEM_FIELDS = ("kind", "what", "place", "how")
ITEM_OPTIONAL = ("weight", "removed", "jettisonable", *FOOTING_FIELDS)
LONGEST_WHAT = 120
LONGEST_ID = 64
MOST_ITEMS = 400


def read_items(fields: Fields, basis: Basis, configuration: Configuration) -> tuple[Item, ...]:
    """Return the items, noting faults."""
    known = {place.id: place for place in basis.places}
    lines = fields.objects("items", MOST_ITEMS, ITEM_FIELDS, ITEM_OPTIONAL)
    items = (read_item(line, known, configuration, basis) for line in lines)
    return tuple(item for item in items if item is not None)


def read_item(
    line: Fields, known: Mapping[str, Place], configuration: Configuration, basis: Basis
) -> Item | None:
    """Return the item of a line, noting faults; None where too much of it is missing."""
    kind = cast("Kind | None", line.choice("kind", KINDS))
    what = line.text("what", LONGEST_WHAT)
    closed = dict(basis.closed) if basis.closed else None
    place = _place(line, known, configuration, closed)
    how = cast("How | None", line.choice("how", HOWS))
    removed = line.flag("removed") or False
    if removed and kind is not None and kind != "equipment":
        line.note(
            "removed", "removed-not-equipment", "only equipment of the empty weight can be removed; drop it"
        )
    weight = _item_weight(line, how, basis)
    footing = read_footing(line, basis) if any(name in line for name in FOOTING_FIELDS) else None
    jettisonable = _jettisonable(line, place)
    if kind is None or what is None or place is None or how is None:
        return None
    signed = -weight if removed and weight is not None else weight
    if footing is None:
        return Item(kind, what, place, signed, how, removed, line.pointer, jettisonable=jettisonable)
    whole = None if signed is None else added((signed, *(part.weight for part in footing.rigging)))
    stands = (footing.rigging, footing.contact)
    return Item(kind, what, place, whole, how, removed, line.pointer, *stands, jettisonable)


def _place(
    line: Fields, known: Mapping[str, Place], configuration: Configuration, closed: dict[str, str] | None
) -> Place | None:
    wanted = line.text("place", LONGEST_ID)
    if wanted is None:
        return None
    has = ", ".join(configuration.places) or "no places"
    place = known.get(wanted)
    if place is None:
        line.note("place", "unknown-place", f"no such place; configuration {configuration.id} has {has}")
        return None
    if closed is not None and wanted in closed:
        line.note(
            "place", "place-closed", f"{place.name} is closed by {closed[wanted]}; choose another place"
        )
        return None
    if wanted not in configuration.places:
        detail = f"not in configuration {configuration.id}, which has {has}; choose one of these"
        line.note("place", "place-not-in-configuration", detail)
        return None
    return place


def _jettisonable(line: Fields, place: Place | None) -> bool:
    """Return whether an item can be released in flight; only what hangs outside can."""
    wanted = line.flag("jettisonable") or False
    if wanted and place is not None and not place.external:
        detail = f"{place.name} is not outside the aircraft by the basis; leave it out, or correct the place"
        line.note("jettisonable", "jettisonable-inside", detail)
    elif wanted and line.raw("removed") is True:
        detail = "equipment that is not aboard cannot be released; leave one of the two out"
        line.note("jettisonable", "jettisonable-removed", detail)
    return wanted


def _item_weight(line: Fields, how: How | None, basis: Basis) -> Fraction | None:
    quantity = line.weight_got(how)
    return None if quantity is None else in_unit(quantity, basis.weight_unit)
