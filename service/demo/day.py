"""The invented day: sixteen flights as load documents, and the change that mends one of them.

Weights of people are invented and differ, as people do; nothing here is a real flight, person or place.
"""

from collections.abc import Mapping, Sequence
from copy import deepcopy
from dataclasses import dataclass, field
from datetime import date
from typing import Any

OFFSET = "-06:00"
NAMES = (
    "A. Tresk", "B. Halmont", "C. Imber", "D. Sorrow", "E. Vantry", "F. Quill", "G. Marlowe", "H. Osk",
    "I. Penhale", "K. Dravo", "L. Osei", "M. Tarn", "N. Wick", "P. Ashdown", "Q. Ferris", "R. Lomax",
    "S. Undry", "T. Bexel", "U. Carrow", "V. Nayland", "W. Yarrow", "X. Zorin", "Y. Abbot", "Z. Kell",
)  # fmt: skip


@dataclass(frozen=True, slots=True)
class Machine:
    """What all loads of one aircraft share: units, the captain's seat, tanks and the delivered fuel."""

    registration: str
    weight_unit: str
    volume_unit: str
    pilot_seat: str
    density: Mapping[str, str]


TWIN = Machine(
    "Q9-LVN",
    "lb",
    "US gal",
    "COCKPIT-L",
    {"value": "6.02", "unit": "lb/US gal", "source": "delivery note 2207"},
)
TWIN_UNWEIGHED = Machine("Q9-LVO", "lb", "US gal", "COCKPIT-L", TWIN.density)
TURBOPROP = Machine(
    "Q9-KTB", "kg", "l", "COCKPIT-L", {"value": "0.803", "unit": "kg/l", "source": "delivery note 4471"}
)
HELICOPTER = Machine("Q9-HEK", "kg", "l", "FRONT-R", TURBOPROP.density)
COMMUTER = Machine("Q9-WXC", "kg", "l", "COCKPIT-L", TURBOPROP.density)
MACHINES = (TWIN, TWIN_UNWEIGHED, TURBOPROP, HELICOPTER, COMMUTER)
HOOK = "HOOK"  # what hangs on it can be released
TAXIING = ""  # in place of what was burned since take-off: at engine start


@dataclass(frozen=True, slots=True)
class Trip:
    """One flight in brief: who sits where and how heavy, what lies where, what the tanks hold."""

    reference: str
    machine: Machine
    configuration: str
    time: str
    origin: str
    destination: str
    operation: str
    pilot: tuple[str, str, str]  # login, name, weight
    seats: Mapping[str, str]  # passengers: seat -> weight
    items: Sequence[tuple[str, str, str, str]]  # place, kind, what, weight
    tanks: Mapping[str, str]
    taxi: str
    trip: str
    minimum: str
    limits: Sequence[tuple[str, str, str]] = field(default=())  # phase, weight, source
    second: tuple[str, str] | None = None  # name and weight of a second pilot, in the right cockpit seat
    events: Sequence[tuple[str, str, Sequence[Mapping[str, str]]]] = field(default=())  # burned, kind, who


AMANI = ("r.amani", "R. Amani")
CORVANE = ("j.corvane", "J. Corvane")
DULWEN = ("s.dulwen", "S. Dulwen")


def _jumpers(*rows: str) -> list[dict[str, str]]:
    return [{"seat": f"JUMP{row}"} for row in rows]


def _to_the_door(*rows: str) -> list[dict[str, str]]:
    return [{"seat": f"JUMP{row}", "to": "DOOR"} for row in rows]


# They bunch at the door three by three, and leave together.
GROUPS = (("4-L", "4-R", "3-L"), ("3-R", "2-L", "2-R"), ("1-L", "1-R"))
JUMPS = [
    event
    for group, burned in zip(GROUPS, ("62", "64", "66"), strict=True)
    for event in ((burned, "move", _to_the_door(*group)), (burned, "leave", _jumpers(*group)))
]
ROWS = ("1-L", "1-R", "2-L", "2-R", "3-L", "3-R", "4-L", "4-R", "5-L", "5-R", "6-L", "6-R", "7-L", "7-R")
WEIGHTS = ("84", "71", "90", "66", "78", "93", "69", "81", "74", "88", "62", "79", "85", "70")
BEHIND = ("3-L", "4-L", "4-R", "5-L", "5-R", "6-L", "6-R", "7-L", "7-R", "8-L", "8-R")

FLIGHTS: tuple[Trip, ...] = (
    Trip(
        "KT-201", TURBOPROP, "eight-seat", "06:10", "XNAL", "XKOR", "passenger-charter", (*AMANI, "82"),
        {"ROW2-L": "88", "ROW2-R": "71", "ROW3-L": "94", "ROW4-R": "66"},
        (("FWD-POD", "baggage", "checked bags", "54"), ("AFT-HOLD", "baggage", "hand bags", "19")),
        {"LEFT": "300", "RIGHT": "300"}, "15", "210", "140",
        (("take-off", "3900", "performance sheet 12"),),
    ),
    Trip(
        "LV-101", TWIN, "six-seat", "06:40", "XNAL", "XPRY", "passenger-charter", (*CORVANE, "181"),
        {"ROW1-L": "176", "ROW1-R": "148", "ROW2-L": "160"},
        (("NOSE-HOLD", "baggage", "checked bags", "74"), ("AFT-HOLD", "baggage", "camera cases", "35")),
        {"LEFT-AUX": "20", "RIGHT-AUX": "20", "LEFT-MAIN": "50", "RIGHT-MAIN": "50"}, "18", "330", "240",
    ),
    Trip(
        "HK-301", HELICOPTER, "five-seat", "07:30", "XNAL", "XKOR", "aerial-work", (*DULWEN, "79"),
        {"FRONT-L": "84", "REAR-L": "77"},
        (("AFT-HOLD", "equipment", "survey set", "24"),),
        {"MAIN": "210"}, "4", "96", "40",
    ),
    Trip(
        "KT-203", TURBOPROP, "eight-seat", "08:30", "XKOR", "XNAL", "passenger-charter", (*AMANI, "82"),
        {"ROW1-L": "80", "ROW2-R": "62", "ROW3-L": "91", "ROW4-R": "74"},
        (("FWD-POD", "baggage", "checked bags", "61"),),
        {"LEFT": "280", "RIGHT": "280"}, "12", "205", "140",
    ),
    Trip(
        "LV-103", TWIN, "six-seat", "09:15", "XPRY", "XNAL", "passenger-charter", (*CORVANE, "181"),
        {"ROW1-L": "172", "ROW1-R": "195", "ROW2-L": "188", "ROW2-R": "166"},
        (("AFT-HOLD", "baggage", "checked bags", "164"), ("NOSE-HOLD", "baggage", "a tool case", "22")),
        {"LEFT-AUX": "38", "RIGHT-AUX": "38", "LEFT-MAIN": "48", "RIGHT-MAIN": "48"}, "18", "500", "240",
    ),
    Trip(
        "HK-303", HELICOPTER, "utility", "10:00", "XKOR", "XMOR", "aerial-work", (*DULWEN, "79"),
        {},
        (("REAR-FLOOR", "cargo", "fence posts", "160"), ("LEFT-BASKET", "cargo", "wire", "34"),
         ("RIGHT-BASKET", "cargo", "wire", "34")),
        {"MAIN": "200"}, "4", "80", "40",
    ),
    Trip(
        "KT-205", TURBOPROP, "freight", "11:20", "XNAL", "XTOL", "cargo-charter", (*AMANI, "82"),
        {},
        (("FLOOR-1", "cargo", "pump parts, 3 crates", "198"), ("FLOOR-3", "cargo", "seed bags", "210"),
         ("FWD-POD", "cargo", "mail", "40")),
        {"LEFT": "320", "RIGHT": "320"}, "15", "240", "140",
    ),
    Trip(
        "LV-105", TWIN_UNWEIGHED, "six-seat", "12:00", "XNAL", "XPRY", "air-taxi", (*CORVANE, "181"),
        {"ROW1-L": "165", "ROW1-R": "139"},
        (("NOSE-HOLD", "baggage", "checked bags", "48"),),
        {"LEFT-AUX": "0", "RIGHT-AUX": "0", "LEFT-MAIN": "60", "RIGHT-MAIN": "60"}, "18", "300", "240",
    ),
    Trip(
        "KT-207", TURBOPROP, "eight-seat", "13:30", "XTOL", "XKOR", "passenger-charter", (*AMANI, "82"),
        {"ROW1-L": "96", "ROW1-R": "88", "ROW2-L": "91", "ROW2-R": "84", "ROW3-L": "79", "ROW3-R": "92",
         "ROW4-L": "68", "ROW4-R": "73"},
        (("FWD-POD", "baggage", "checked bags", "96"), ("AFT-POD", "baggage", "checked bags", "84")),
        {"LEFT": "250", "RIGHT": "250"}, "12", "180", "140",
    ),
    Trip(
        "HK-305", HELICOPTER, "stretcher", "14:45", "XMOR", "XNAL", "air-taxi", (*DULWEN, "79"),
        {"STRETCHER": "73", "REAR-R": "68"},
        (("AFT-HOLD", "equipment", "medical bags", "18"),),
        {"MAIN": "220"}, "4", "88", "40",
    ),
    Trip(
        "LV-107", TWIN, "row-2-out", "15:30", "XNAL", "XTOL", "cargo-charter", (*CORVANE, "181"),
        {"ROW1-L": "154"},
        (("ROW2-FLOOR", "cargo", "switch gear", "260"), ("NOSE-HOLD", "cargo", "small parcels", "110")),
        {"LEFT-AUX": "15", "RIGHT-AUX": "15", "LEFT-MAIN": "60", "RIGHT-MAIN": "60"}, "18", "360", "240",
    ),
    Trip(
        "KT-209", TURBOPROP, "eight-seat", "17:00", "XKOR", "XNAL", "passenger-charter", (*AMANI, "82"),
        {"ROW2-L": "90", "ROW3-L": "77", "ROW3-R": "69"},
        (("FWD-POD", "baggage", "checked bags", "47"), ("AFT-POD", "baggage", "skis", "28")),
        {"LEFT": "260", "RIGHT": "260"}, "12", "200", "140",
    ),
    Trip(
        "WX-401", COMMUTER, "nineteen-seat", "17:20", "XNAL", "XTOL", "passenger-charter", (*CORVANE, "82"),
        {f"ROW{seat}": weight for seat, weight in zip(ROWS, WEIGHTS, strict=True)},
        (("NOSE-HOLD", "baggage", "checked bags", "64"), ("AFT-HOLD", "baggage", "checked bags", "118")),
        {"LEFT": "480", "RIGHT": "480"}, "22", "390", "240",
        (("take-off", "6500", "performance sheet 31"),), ("G. Ravell", "76"),
        ((TAXIING, "position", ({"FLAPS": "10"},)), ("6", "position", ({"GEAR": "UP"},)),
         ("9", "position", ({"FLAPS": "0"},)), ("385", "position", ({"GEAR": "DOWN"},))),
    ),
    Trip(
        "HK-307", HELICOPTER, "sling", "16:10", "XNAL", "XNAL", "aerial-work", (*DULWEN, "79"),
        {},
        ((HOOK, "cargo", "trough and posts", "310"),),
        {"MAIN": "130"}, "4", "42", "30",
        events=(("18", "leave", ({"place": HOOK, "what": "trough and posts"},)),),
    ),
    Trip(
        "KT-211", TURBOPROP, "jump", "18:20", "XNAL", "XNAL", "aerial-work", (*AMANI, "82"),
        {f"JUMP{seat}": weight for seat, weight in zip(ROWS, WEIGHTS[:8], strict=False)},
        (),
        {"LEFT": "170", "RIGHT": "170"}, "10", "95", "80",
        events=JUMPS,
    ),
    Trip(
        "WX-403", COMMUTER, "nineteen-seat", "19:40", "XTOL", "XNAL", "passenger-charter", (*CORVANE, "82"),
        {f"ROW{seat}": weight for seat, weight in zip(BEHIND, WEIGHTS, strict=False)},
        (("AFT-HOLD", "baggage", "checked bags", "182"),),
        {"LEFT": "300", "RIGHT": "300"}, "22", "180", "160",
        second=("G. Ravell", "76"),
    ),
)  # fmt: skip

# The one that is mended: its bags move from the aft hold to the nose hold.
MENDED = "LV-103"
MENDED_BECAUSE = "bags moved from the aft hold to the nose hold: aft of the limit at landing"


def _sequence(trip: Trip) -> dict[str, Any]:
    unit = trip.machine.weight_unit
    events = [
        {
            "after_burning": {"value": burned or "0", "unit": unit},
            kind: dict(who[0]) if kind == "position" else [*map(dict, who)],
        }
        | ({} if burned else {"since": "engine start"})
        for burned, kind, who in trip.events
    ]
    return {"sequence": events} if events else {}


def document_of(trip: Trip, day: date) -> dict[str, Any]:
    """This function will return the load document `tarebook.load/1` of one flight on `day`."""
    machine = trip.machine
    login, name, weight = trip.pilot
    first = [one.reference for one in FLIGHTS].index(trip.reference)

    def weighed(value: str) -> dict[str, str]:
        return {"value": value, "unit": machine.weight_unit}

    def aboard(who: str, position: str, seat: str, heavy: str) -> dict[str, Any]:
        return {"name": who, "position": position, "seat": seat, "weight": weighed(heavy), "how": "weighed"}

    crew = [{"person": login} | aboard(name, "pilot in command", machine.pilot_seat, weight)]
    if trip.second:
        crew.append(aboard(trip.second[0], "second pilot", "COCKPIT-R", trip.second[1]))
    items = [
        {"kind": kind, "what": what, "place": place, "weight": weighed(value), "how": "weighed"}
        | ({"jettisonable": True} if place == HOOK else {})
        for place, kind, what, value in trip.items
    ]
    return {
        "schema": "tarebook.load/1",
        "aircraft": machine.registration,
        "configuration": trip.configuration,
        "flight": {
            "reference": trip.reference,
            "leg": 1,
            "departure": f"{day.isoformat()}T{trip.time}:00{OFFSET}",
            "origin": trip.origin,
            "destination": trip.destination,
            "operation": trip.operation,
        },
        "persons_on_board": len(crew) + len(trip.seats),
        "crew": crew,
        "passengers": [
            {
                "name": NAMES[(3 * first + number) % len(NAMES)],
                "seat": seat,
                "weight": weighed(value),
                "how": "declared",
            }
            for number, (seat, value) in enumerate(trip.seats.items())
        ],
        "items": items,
        "fuel": {
            "density": dict(machine.density),
            "at_engine_start": {
                tank: {"value": value, "unit": machine.volume_unit} for tank, value in trip.tanks.items()
            },
            "not_usable": {},
            "taxi": weighed(trip.taxi),
            "trip": weighed(trip.trip),
            "minimum_at_landing": weighed(trip.minimum),
        },
        "limits": [
            {"at": at, "weight": weighed(value), "source": source} for at, value, source in trip.limits
        ],
    } | _sequence(trip)


def mended(document: Mapping[str, Any]) -> dict[str, Any]:
    """This function will return the mended load: what lay in the aft hold lies in the nose hold."""
    changed = deepcopy(dict(document))
    for item in changed["items"]:
        if item["place"] == "AFT-HOLD":
            item["place"] = "NOSE-HOLD"
    return changed
