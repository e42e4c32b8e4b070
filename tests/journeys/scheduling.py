"""A month of flights as a scheduling system plans them; what is rejected it mends as it is told."""

import os
import random
import re
from copy import deepcopy
from dataclasses import dataclass
from datetime import date, datetime, time, timedelta, timezone
from decimal import Decimal
from typing import Any

from service.client import Load

OFFSET = timezone(timedelta(hours=-6))
FIRST_DAY = date(2026, 12, 2)
# Every other day. The long form is the whole month, sixty flights.
DAYS, FLIGHTS_A_DAY = (12, 5) if os.environ.get("TAREBOOK_LONG_FORMS") == "1" else (6, 4)
SEATS = ("ROW1-L", "ROW1-R", "ROW2-L", "ROW2-R")
PLACES = {"aft hold": "AFT-HOLD", "nose hold": "NOSE-HOLD"}
MOVE = re.compile(r"Move at least ([\d.]+) lb of baggage from ([\w ]+) to ([\w ]+):")


@dataclass(frozen=True)
class Flight:
    """One planned flight; its `key` is the scheduling system's own number of it."""

    key: str
    departure: datetime
    document: dict[str, Any]


def month(aircraft: tuple[str, ...], pilot: str, seed: int) -> list[list[Flight]]:
    """This function will plan the month, a list of flights a day; the same seed gives the same month."""
    chance = random.Random(seed)
    days = [FIRST_DAY + timedelta(days=2 * number) for number in range(DAYS)]
    return [
        [_flight(day, turn, aircraft[turn % len(aircraft)], pilot, chance) for turn in range(FLIGHTS_A_DAY)]
        for day in days
    ]


def _flight(day: date, turn: int, aircraft: str, pilot: str, chance: random.Random) -> Flight:
    departure = datetime.combine(day, time(6 + 3 * turn), OFFSET)
    reference = f"LV-{101 + turn}"
    seats = chance.sample(SEATS, chance.randint(2, 4))
    document = {
        "schema": "tarebook.load/1",
        "aircraft": aircraft,
        "configuration": "six-seat",
        "flight": {
            "reference": reference,
            "leg": 1,
            "departure": departure.isoformat(),
            "origin": "XPRY",
            "destination": "XNAL",
            "operation": "passenger-charter",
        },
        "persons_on_board": 1 + len(seats),
        "crew": [
            {
                "person": pilot,
                "name": "R. Amani",
                "position": "pilot in command",
                "seat": "COCKPIT-L",
                "weight": _lb(181),
                "how": "weighed",
            }
        ],
        "passengers": [
            {
                "name": f"Guest {seat}",
                "seat": seat,
                "weight": _lb(chance.randint(130, 215)),
                "how": "declared",
            }
            for seat in seats
        ],
        "items": [
            {
                "kind": "baggage",
                "what": "checked bags",
                "place": "AFT-HOLD",
                "weight": _lb(chance.randint(60, 200)),
                "how": "weighed",
            }
        ],
        "fuel": {
            "density": {"value": Decimal("6.02"), "unit": "lb/US gal", "source": "delivery note 2207"},
            "at_engine_start": {
                tank: {"value": gallons, "unit": "US gal"}
                for tank, gallons in (
                    ("LEFT-AUX", 38),
                    ("RIGHT-AUX", 38),
                    ("LEFT-MAIN", 48),
                    ("RIGHT-MAIN", 48),
                )
            },
            "not_usable": {},
            "taxi": _lb(18),
            "trip": _lb(500),
            "minimum_at_landing": _lb(240),
        },
        "limits": [],
    }
    return Flight(f"{day}-{reference}", departure, document)


def mended_as_told(load: Load, declared: dict[str, Any]) -> tuple[dict[str, Any], str]:
    """This function will do what the first failed check that names a step says, and return the new load
    document and the advice it followed; raises AssertionError where no check says what to do.
    """
    document = deepcopy(declared)
    for check in load.failed:
        if move := MOVE.match(check.what_next):
            weight, start, end = move.groups()
            _move(document["items"], Decimal(weight), PLACES[start], PLACES[end])
            return document, check.what_next
    raise AssertionError([(check.code, check.what_next) for check in load.failed])


def _move(items: list[dict[str, Any]], weight: Decimal, start: str, end: str) -> None:
    lying = next(item for item in items if item["place"] == start)
    left = Decimal(str(lying["weight"]["value"])) - weight
    items.append(lying | {"place": end, "weight": _lb(weight)})
    if left > 0:
        lying["weight"] = _lb(left)
    else:
        items.remove(lying)


def _lb(value: int | Decimal) -> dict[str, Any]:
    return {"value": value, "unit": "lb"}
