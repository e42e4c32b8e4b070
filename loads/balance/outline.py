"""Reading what must be known of a load before its loading basis is: aircraft, configuration, flight."""

import re
from datetime import datetime

from loads.balance.aboard import Flight, Outline
from loads.balance.fields import Faults, Fields
from records.refusal import Invalid

SCHEMA = "tarebook.load/1"
REQUIRED = (
    "schema",
    "aircraft",
    "configuration",
    "flight",
    "persons_on_board",
    "crew",
    "passengers",
    "items",
    "fuel",
)
OPTIONAL = ("limits", "certification_category", "conditions", "seat_settings", "sequence")
FLIGHT_FIELDS = ("reference", "leg", "departure", "origin", "destination", "operation")
FLIGHT_OPTIONAL = ("follows",)
LONGEST_ID = 64
LONGEST_WORD = 80
MOST_LEGS = 99
EARLIEST_YEAR, LATEST_YEAR = 1950, 2150
_UUID = re.compile(r"[0-9a-fA-F]{8}(-[0-9a-fA-F]{4}){3}-[0-9a-fA-F]{12}", re.ASCII)
_RFC_3339 = re.compile(
    r"\d{4}-\d{2}-\d{2}T\d{2}:\d{2}(?::\d{2}(?:\.\d{1,6})?)?(?P<offset>Z|[+-]\d{2}:\d{2})?", re.ASCII
)


def read_outline(document: object) -> Outline:
    """Return the outline of a load document. Raises `Invalid` with every fault of these fields.

    The other fields of the document are looked at by `declared.read_load`, once the basis is known.
    """
    faults = Faults()
    found = outline_in(Fields(document, "", faults, REQUIRED, OPTIONAL))
    if found is None or faults.all():
        raise Invalid(*faults.all())
    return found


def outline_in(fields: Fields) -> Outline | None:
    """Return the outline in a document's fields, noting its faults; None when something of it is missing."""
    fields.choice("schema", (SCHEMA,))
    aircraft = fields.text("aircraft", LONGEST_ID)
    configuration = fields.text("configuration", LONGEST_ID)
    flight = _flight(fields.inner("flight", FLIGHT_FIELDS, FLIGHT_OPTIONAL))
    if aircraft is None or configuration is None or flight is None:
        return None
    return Outline(aircraft, configuration, flight)


def _flight(fields: Fields | None) -> Flight | None:
    if fields is None:
        return None
    reference = fields.text("reference", LONGEST_ID)
    leg = fields.whole("leg", 1, MOST_LEGS)
    departure = _departure(fields)
    origin = fields.text("origin", LONGEST_WORD)
    destination = fields.text("destination", LONGEST_WORD)
    operation = fields.text("operation", LONGEST_WORD)
    follows = _follows(fields)
    if reference is None or leg is None or departure is None:
        return None
    if origin is None or destination is None or operation is None:
        return None
    return Flight(reference, leg, departure, origin, destination, operation, follows)


def _follows(fields: Fields) -> str | None:
    """Return the id of the load of the leg before, as it is written: a UUID."""
    typed = fields.text("follows", LONGEST_ID)
    if typed is None:
        return None
    if _UUID.fullmatch(typed) is None:
        fields.note("follows", "id-form", "not the id of a load; write the id its answer gave")
        return None
    return typed.lower()


def _departure(fields: Fields) -> datetime | None:
    typed = fields.text("departure", LONGEST_ID)
    if typed is None:
        return None
    form = _RFC_3339.fullmatch(typed)
    if form is None:
        detail = "not a date and time; write it like 2026-12-01T08:30:00-06:00"
        fields.note("departure", "time-form", detail)
        return None
    if form["offset"] is None:
        detail = "the offset from UTC is missing; add it, such as -06:00, or Z for UTC"
        fields.note("departure", "offset-missing", detail)
        return None
    try:
        departure = datetime.fromisoformat(typed)
    except ValueError:
        fields.note("departure", "time-form", "no such date, time or offset; correct it")
        return None
    if not EARLIEST_YEAR <= departure.year <= LATEST_YEAR:
        fields.note("departure", "implausible", f"the year {departure.year} is not a flight's; correct it")
        return None
    return departure
