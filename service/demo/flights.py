"""Flies the invented day through the API: submitted by the scheduling system, signed by the pilots."""

from dataclasses import dataclass
from datetime import UTC, date, datetime
from typing import Any

from service.demo.client import Answer, Client
from service.demo.day import FLIGHTS, MENDED, MENDED_BECAUSE, Trip, document_of, mended


@dataclass(frozen=True, slots=True)
class Flown:
    """What became of one flight: its first answer, and the last one."""

    trip: Trip
    first: dict[str, Any]
    last: dict[str, Any]


def fly(scheduler: Client, pilots: dict[str, Client], password: str, day: date) -> list[Flown]:
    """This function will submit the twelve loads and take each as far as it goes; safe to repeat with the
    same keys.
    """
    return [_fly(trip, scheduler, pilots[trip.pilot[0]], password, day) for trip in FLIGHTS]


def _fly(trip: Trip, scheduler: Client, pilot: Client, password: str, day: date) -> Flown:
    key = f"invented-{day}-{trip.reference}"
    document = document_of(trip, day)
    first = scheduler.post("/loads", document, key=key)
    now = first
    if trip.reference == MENDED:
        revision = mended(document) | {"reason": MENDED_BECAUSE}
        now = scheduler.post(
            f"/loads/{first.body['id']}/revisions", revision, key=f"{key}-mended", etag=first.etag
        )
    if now.body["verdict"] == "within":
        now = _sign(now, pilot, password, key)
        if trip.reference != MENDED:
            at = {"at": datetime.now(UTC).isoformat(timespec="seconds")}
            now = _once_done(now, pilot, "departure", at, key)
    return Flown(trip, first.body, scheduler.get(f"/loads/{now.body['id']}").body)


def _sign(now: Answer, pilot: Client, password: str, key: str) -> Answer:
    for meaning in ("prepared", "accepted"):
        signature = {"meaning": meaning, "digest": now.body["digest"], "password": password}
        now = pilot.post(
            f"/loads/{now.body['id']}/signatures", signature, key=f"{key}-{meaning}", etag=now.etag
        )
    return now


def _once_done(now: Answer, pilot: Client, step: str, document: dict[str, Any], key: str) -> Answer:
    """This function will take a step whose document holds the time, unless an earlier try took it already."""
    current = pilot.get(f"/loads/{now.body['id']}")
    if current.body["state"] == "departed":
        return current
    return pilot.post(f"/loads/{now.body['id']}/{step}", document, key=f"{key}-{step}", etag=now.etag)
