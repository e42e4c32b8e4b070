"""Reads the plain documents of the room: an aircraft to be entered, an approval to be given."""

from collections.abc import Mapping
from dataclasses import dataclass
from datetime import datetime
from typing import Any, Literal

from fleet.document_schema import shape_faults
from records.refusal import Fault, Invalid

# Instants between these can be told in any zone and kept in any calendar; nothing was weighed before.
EARLIEST_YEAR, LATEST_YEAR = 1900, 2900


@dataclass(frozen=True, slots=True)
class NewAircraft:
    """What is entered of an aircraft; `passenger_seats` are those installed."""

    registration: str
    type: str
    serial_number: str
    category: Literal["aeroplane", "helicopter"]
    engines: int
    passenger_seats: int


@dataclass(frozen=True, slots=True)
class Approving:
    """What an approval or an ending says: from when (None: as the version says itself, or from now), and
    why.
    """

    true_from: datetime | None
    reason: str


def read_aircraft(document: object) -> tuple[NewAircraft, str]:
    """This function will return the aircraft in a document and the reason given; raises Invalid with all
    faults.
    """
    entry = _sound("aircraft-1", document)
    reason = entry.pop("reason", "")
    return NewAircraft(**entry), reason


def read_approval(document: object) -> Approving:
    """This function will return the approval in a document; raises Invalid with all faults."""
    entry = _sound("approval-1", document)
    given = entry.get("true_from")
    true_from = None if given is None else plausible(datetime.fromisoformat(given), "/true_from")
    return Approving(true_from, entry.get("reason", ""))


def read_ending(document: object) -> Approving:
    """This function will return from when something ends, and why; raises Invalid with all faults."""
    entry = _sound("ending-1", document)
    given = entry.get("true_from")
    true_from = None if given is None else plausible(datetime.fromisoformat(given), "/true_from")
    return Approving(true_from, entry["reason"])


def plausible(instant: datetime, pointer: str) -> datetime:
    """This function will return the instant, or raise Invalid at `pointer` when its year is a slip of the
    pen.
    """
    if not EARLIEST_YEAR <= instant.year <= LATEST_YEAR:
        raise Invalid(Fault(pointer, "instant-implausible", "the year cannot be meant; correct it"))
    return instant


def _sound(schema: str, document: object) -> dict[str, Any]:
    faults = shape_faults(schema, document)
    if faults or not isinstance(document, Mapping):
        raise Invalid(*faults)
    return dict(document)
