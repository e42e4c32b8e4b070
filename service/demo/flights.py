"""Flies the invented day through the API: submitted by the scheduling system, signed by the pilots."""

from dataclasses import dataclass
from datetime import UTC, date, datetime

from service.client import Load, Tarebook
from service.demo.day import FLIGHTS, MENDED, MENDED_BECAUSE, Trip, document_of, mended


@dataclass(frozen=True, slots=True)
class Flown:
    """What became of one flight: its first answer, and the last one."""

    trip: Trip
    first: Load
    last: Load


def fly(scheduler: Tarebook, pilots: dict[str, Tarebook], password: str, day: date) -> list[Flown]:
    """This function will submit the sixteen loads and take each as far as it goes; safe to repeat with the
    same keys.
    """
    return [_fly(trip, scheduler, pilots[trip.pilot[0]], password, day) for trip in FLIGHTS]


def _fly(trip: Trip, scheduler: Tarebook, pilot: Tarebook, password: str, day: date) -> Flown:
    key = f"invented-{day}-{trip.reference}"
    document = document_of(trip, day)
    first = scheduler.submit(document, key=key)
    now = first
    if trip.reference == MENDED:
        now = scheduler.revise(first, mended(document), MENDED_BECAUSE, key=f"{key}-mended")
    if now.verdict == "within":
        now = pilot.sign(now, "prepared", password, key=f"{key}-prepared")
        now = pilot.sign(now, "accepted", password, key=f"{key}-accepted")
        if trip.reference != MENDED:
            now = _departed(now, pilot, f"{key}-departure")
    return Flown(trip, first, scheduler.load(now.id))


def _departed(now: Load, pilot: Tarebook, key: str) -> Load:
    """This function will report the departure, which holds the time, unless an earlier try did already."""
    current = pilot.load(now.id)
    if current.state == "departed":
        return current
    return pilot.depart(now, datetime.now(UTC), key=key)
