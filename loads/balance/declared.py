"""Reading a load document `tarebook.load/1` against the loading basis it will be assessed with.

Nothing is assumed: what is missing, doubled, out of place or beyond belief is a fault, and all faults of a
document are returned at once. What may be left out: `limits`, `certification_category`, `conditions`,
`seat_settings`, `sequence`, `fuel/not_usable`, a crew member's `person` and `category`, of a passenger
`category`, `lap_infant` and `restraint`, and of an item what it stands on. Equipment of the empty weight that
is not aboard is an item of kind `equipment` with `removed: true`; its weight is typed positive and counts as
negative.
"""

from typing import cast

from fleet.basis import Basis, Configuration
from fleet.conversion import in_unit
from fleet.flight_rules import PERFORMANCE_KINDS, PerformanceKind
from fleet.quantities import Dimension
from fleet.standard_weights import StandardWeights
from loads.balance.aboard import Declared, LimitedPhase, StatedLimit
from loads.balance.category import in_category, read_category
from loads.balance.coming import parted, read_coming, with_comers
from loads.balance.events import Event
from loads.balance.fields import Faults, Fields
from loads.balance.fitted import read_conditions, read_settings
from loads.balance.fuelling import read_fuel
from loads.balance.items import read_items
from loads.balance.outline import OPTIONAL, REQUIRED, outline_in, read_outline
from loads.balance.people import Seating, read_crew, read_passengers
from loads.balance.sequencing import Loaded, event_fields, read_sequence
from loads.balance.standard import with_standards
from records.refusal import Invalid

__all__ = ["read_load", "read_outline"]

LIMIT_FIELDS = ("at", "weight", "source")
LIMIT_OPTIONAL = ("kind",)
LONGEST_SOURCE = 200
MOST_LIMITS = 20
MOST_PERSONS = 1000


def read_load(document: object, basis: Basis, table: StandardWeights | None = None) -> Declared:
    """Return the load a document declares, converted once and exactly into the units of the basis.

    Standard weights come from the `table` in force; without one they are not known.

    Raises `Invalid` with every fault (at most 100), each naming its field by JSON pointer.
    """
    faults = Faults()
    fields = Fields(document, "", faults, REQUIRED, OPTIONAL)
    outline = outline_in(fields)
    configuration = _configuration(fields, basis)
    # Without a configuration seats are still read, against the whole basis: no fault waits for another.
    conditions, settings = read_conditions(fields, basis), read_settings(fields, basis)
    seating = Seating(basis, configuration or _everything(basis), settings)
    crew = read_crew(fields, seating)
    passengers = read_passengers(fields, seating)
    lines = event_fields(fields) if "sequence" in fields else ()
    coming = read_coming(lines, seating) if lines else {}
    standards = None
    if table is not None and outline is not None:
        people = with_comers((crew, passengers), coming) if coming else (crew, passengers)
        crew, passengers, standards = with_standards(people, table, outline.flight, basis, faults)
        if coming:
            (crew, passengers), coming = parted((crew, passengers), coming)
    items = read_items(fields, basis, seating.configuration)
    fuel = read_fuel(fields, basis)
    limits = _limits(fields, basis)
    category = read_category(fields, basis)
    events: tuple[Event, ...] = ()
    if lines:
        events = read_sequence(lines, basis, seating, Loaded(crew, passengers, items, fuel, coming))
    persons = _persons_on_board(fields)
    if faults.all():
        raise Invalid(*faults.all())
    if outline is None or configuration is None or fuel is None or persons is None:
        raise AssertionError("a part of the load is missing and no fault was noted")
    aboard = (persons, crew, passengers, items, fuel, limits)
    besides = (conditions, settings, events, standards)
    return Declared(outline, in_category(configuration, category), *aboard, *besides, category=category)


def _configuration(fields: Fields, basis: Basis) -> Configuration | None:
    wanted = fields.raw("configuration")
    found = next((one for one in basis.configurations if one.id == wanted), None)
    if found is None and isinstance(wanted, str) and wanted:
        known = ", ".join(one.id for one in basis.configurations)
        fields.note("configuration", "unknown-configuration", f"no such configuration; the basis has {known}")
    return found


def _everything(basis: Basis) -> Configuration:
    seats = tuple(seat.id for seat in basis.seats)
    places = tuple(place.id for place in basis.places)
    return Configuration("unknown", "unknown", seats, places, 0, basis.fits[0], (), (), basis.limits)


def _limits(fields: Fields, basis: Basis) -> tuple[StatedLimit, ...]:
    found = []
    for line in fields.objects("limits", MOST_LIMITS, LIMIT_FIELDS, LIMIT_OPTIONAL):
        at = line.choice("at", ("take-off", "landing"))
        weight = line.quantity("weight", Dimension.WEIGHT, zero=False)
        source = line.text("source", LONGEST_SOURCE)
        kind = cast("PerformanceKind | None", line.choice("kind", PERFORMANCE_KINDS))
        if at is not None and weight is not None and source is not None:
            phase: LimitedPhase = "take-off" if at == "take-off" else "landing"
            found.append(StatedLimit(phase, in_unit(weight, basis.weight_unit), source, kind))
    return tuple(found)


def _persons_on_board(fields: Fields) -> int | None:
    """Return the declared count; it must equal the lines: crew, passengers and lap infants, counted as
    sent.
    """
    declared = fields.whole("persons_on_board", 1, MOST_PERSONS)
    crew, passengers = fields.raw("crew"), fields.raw("passengers")
    if declared is None or not isinstance(crew, list | tuple) or not isinstance(passengers, list | tuple):
        return declared
    infants = sum(isinstance(line, dict) and "lap_infant" in line for line in passengers)
    listed = len(crew) + len(passengers) + infants
    if declared != listed:
        detail = (
            f"{declared} declared, {listed} listed ({len(crew)} crew, {len(passengers)} passengers, "
            f"{infants} lap infants); count again and correct the one that is wrong"
        )
        fields.note("persons_on_board", "persons-mismatch", detail)
    return declared
