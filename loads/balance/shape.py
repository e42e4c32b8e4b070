"""The general shape of a load document for which no loading basis is in force: lists, words, numbers and
units.

What only a basis can tell (which seats, places and tanks there are, and how much they take) is not asked
here. A load kept on its shape alone is unresolved, and is read again in full when it is assessed again.
"""

from fleet.flight_rules import PERFORMANCE_KINDS
from fleet.quantities import Dimension
from loads.balance.aboard import HOWS, KINDS
from loads.balance.category import FIELD as CATEGORY
from loads.balance.declared import (
    LIMIT_FIELDS,
    LIMIT_OPTIONAL,
    MOST_LIMITS,
    MOST_PERSONS,
)
from loads.balance.fields import Faults, Fields
from loads.balance.fitted import settings_form
from loads.balance.footing import footing_form
from loads.balance.fuelling import FUEL_FIELDS, FUEL_OPTIONAL, LONGEST_SOURCE, WEIGHT_OR_VOLUME
from loads.balance.items import ITEM_FIELDS, ITEM_OPTIONAL, LONGEST_WHAT, MOST_ITEMS
from loads.balance.outline import LONGEST_ID, OPTIONAL, REQUIRED, outline_in
from loads.balance.people import (
    CREW_FIELDS,
    CREW_OPTIONAL,
    INFANT_FIELDS,
    INFANT_OPTIONAL,
    LONGEST_NAME,
    MOST_CREW,
    MOST_PASSENGERS,
    PASSENGER_FIELDS,
    PASSENGER_OPTIONAL,
)
from loads.balance.sequencing import check_sequence_shape
from records.refusal import Invalid

MOST_TANKS = 100


def check_shape(document: object) -> None:
    """Raise `Invalid` with every fault of the document that can be seen without a loading basis."""
    faults = Faults()
    fields = Fields(document, "", faults, REQUIRED, OPTIONAL)
    outline_in(fields)
    fields.whole("persons_on_board", 1, MOST_PERSONS)
    for line in fields.objects("crew", MOST_CREW, CREW_FIELDS, CREW_OPTIONAL):
        _person(line)
        line.text("position", LONGEST_NAME)
        line.text("person", LONGEST_ID)
    for line in fields.objects("passengers", MOST_PASSENGERS, PASSENGER_FIELDS, PASSENGER_OPTIONAL):
        _person(line)
        _infant(line)
    for line in fields.objects("items", MOST_ITEMS, ITEM_FIELDS, ITEM_OPTIONAL):
        _item(line)
    for line in fields.objects("limits", MOST_LIMITS, LIMIT_FIELDS, LIMIT_OPTIONAL):
        line.choice("at", ("take-off", "landing"))
        line.quantity("weight", Dimension.WEIGHT, zero=False)
        line.text("source", LONGEST_SOURCE)
        line.choice("kind", PERFORMANCE_KINDS)
    fields.text(CATEGORY, LONGEST_ID)
    settings_form(fields)
    check_sequence_shape(fields)
    _fuel(fields, faults)
    if faults.all():
        raise Invalid(*faults.all())


def _person(line: Fields) -> None:
    line.text("name", LONGEST_NAME)
    line.text("seat", LONGEST_ID)
    line.text("category", LONGEST_ID)
    line.choice("how", HOWS)
    line.quantity("weight", Dimension.WEIGHT, zero=False)


def _infant(line: Fields) -> None:
    line.quantity("restraint", Dimension.WEIGHT, zero=False)
    infant = line.inner("lap_infant", INFANT_FIELDS, INFANT_OPTIONAL)
    if infant is not None:
        infant.text("name", LONGEST_NAME)
        infant.choice("how", HOWS)
        infant.quantity("weight", Dimension.WEIGHT, zero=False)


def _item(line: Fields) -> None:
    line.choice("kind", KINDS)
    line.text("what", LONGEST_WHAT)
    line.text("place", LONGEST_ID)
    line.choice("how", HOWS)
    line.flag("removed")
    line.flag("jettisonable")
    footing_form(line)
    line.quantity("weight", Dimension.WEIGHT, zero=False)


def _fuel(fields: Fields, faults: Faults) -> None:
    fuel = fields.inner("fuel", FUEL_FIELDS, FUEL_OPTIONAL)
    if fuel is None:
        return
    fuel.quantity("density", Dimension.DENSITY, zero=False, also=frozenset({"source"}))
    for name in ("taxi", "trip", "minimum_at_landing"):
        fuel.quantity(name, WEIGHT_OR_VOLUME, zero=True)
    for name in ("at_engine_start", "not_usable"):
        held = fuel.raw(name)
        if held is None:
            continue
        if not isinstance(held, dict) or len(held) > MOST_TANKS:
            fuel.note(name, "object-form", f"an object of at most {MOST_TANKS} tanks is needed here")
            continue
        tanks = Fields(held, fuel.at(name), faults, (), tuple(held))
        for tank in held:
            tanks.quantity(tank, WEIGHT_OR_VOLUME, zero=True)
