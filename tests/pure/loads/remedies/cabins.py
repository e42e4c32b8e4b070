"""Invented cabins for the tests of the remedies: small ones that can be enumerated, and one of nineteen
seats. No real aircraft is meant.
"""

import random
import time
from collections.abc import Iterable, Sequence
from dataclasses import replace
from fractions import Fraction
from typing import Any

from fleet.basis import Basis, BurnStage, Configuration, Seat, Zone
from fleet.weighing import EmptyFigures
from loads.balance.aboard import Declared
from loads.balance.assess import assess
from loads.balance.declared import read_load
from loads.balance.prepared import prepared
from loads.balance.remedies.question import Question
from tests.pure.loads.making import F, envelope, limit, limits, load, place, seat, tank, twin

Point = tuple[Any, Any]
NINETEEN_EDGES: tuple[Point, ...] = ((195, 8000), (195, 11000), (201, 14000), (212, 14000), (212, 8000))
CREW = {"COCKPIT-L": 180, "COCKPIT-R": 175}


def cabin(
    seats: Sequence[Seat],
    *,
    holds: Sequence[tuple[str, Any, Any]],
    tanks: Sequence[tuple[str, Any, Any, Any]],
    edges: Iterable[Point],
    weights: dict[str, Any],
    zones: Sequence[Zone] = (),
    lateral: Iterable[Point] = (),
    plane: str = "arm",
) -> Basis:
    """A basis of these seats, holds (id, arm, most), tanks (id, arm, capacity, lateral arm) and edges."""
    places = tuple(place(name, arm, most) for name, arm, most in holds)
    envelopes = [envelope(*edges, plane=plane)]
    if across := tuple(lateral):
        envelopes.append(envelope(*across, axis="lateral"))
    most = limits(**weights)
    everything = Configuration(
        "all",
        "all seats",
        tuple(each.id for each in seats),
        tuple(each.id for each in places),
        1,
        "wheels",
        (),
        (),
        most,
    )
    fuel = tuple(tank(*each) for each in tanks)
    order = (BurnStage(tuple(each.id for each in fuel)),)
    return replace(
        twin(),
        seats=tuple(seats),
        places=places,
        zones=tuple(zones),
        tanks=fuel,
        burn_order=order,
        taxi_order=order,
        limits=most,
        envelopes=tuple(envelopes),
        configurations=(everything,),
    )


def nineteen() -> Basis:
    """Two pilots, nineteen passengers in rows of two and one, two holds, two tanks."""
    seats = [seat("COCKPIT-L", 92, -14, "crew"), seat("COCKPIT-R", 92, 14, "crew")]
    rows = [(number, 130 + 28 * number) for number in range(1, 7)]
    for number, arm in rows:
        seats += [
            replace(seat(f"ROW{number}-{side}", arm, across, "passenger"), row=str(number))
            for side, across in (("A", -18), ("B", 4), ("C", 22))
        ]
    seats.append(replace(seat("ROW7-A", 326, -18, "passenger"), row="7"))
    rear = Zone("REAR", "rear floor", ("ROW6-A", "ROW6-B", "ROW6-C", "ROW7-A", "AFT-HOLD"), limit(1350))
    return cabin(
        seats,
        holds=(("NOSE-HOLD", 50, 400), ("AFT-HOLD", 355, 600)),
        tanks=(("LEFT", 205, 180, -90), ("RIGHT", 205, 180, 90)),
        edges=NINETEEN_EDGES,
        weights={
            "ramp": 13600,
            "take_off": 13500,
            "zero_fuel": 12500,
            "landing": 13200,
            "minimum_flying": 8000,
        },
        zones=(rear,),
    )


def empty_of(weight: Any, arm: Any) -> EmptyFigures:
    return EmptyFigures(F(weight), F(weight) * F(arm), F(0), "nose cone", "wheels", "weighing")


def seated(
    passengers: dict[str, Any],
    holds: dict[str, Any],
    *,
    gallons: Any = 100,
    crew: dict[str, Any] | None = None,
    trip: Any = 400,
    minimum: Any = 200,
    configuration: str = "all",
    tanks: Sequence[str] = ("LEFT", "RIGHT"),
) -> dict[str, Any]:
    """A load document: weights in lb by seat, by place, and gallons in each tank."""
    flown = CREW if crew is None else crew
    pilots = [
        {
            "name": f"Crew {name}",
            "position": "pilot in command" if not number else "copilot",
            "seat": name,
            "weight": {"value": weight, "unit": "lb"},
            "how": "weighed",
        }
        for number, (name, weight) in enumerate(flown.items())
    ]
    people = [
        {
            "name": f"Person {name}",
            "seat": name,
            "weight": {"value": _decimal(weight), "unit": "lb"},
            "how": "declared",
        }
        for name, weight in passengers.items()
    ]
    items = [
        {
            "kind": "baggage",
            "what": "bags",
            "place": name,
            "weight": {"value": _decimal(weight), "unit": "lb"},
            "how": "weighed",
        }
        for name, weight in holds.items()
    ]
    found = load(
        configuration=configuration,
        persons_on_board=len(pilots) + len(people),
        crew=pilots,
        passengers=people,
        items=items,
    )
    found["limits"] = []
    found["fuel"] = {
        "density": {"value": "6.5", "unit": "lb/US gal", "source": "delivery note 12"},
        "at_engine_start": {name: {"value": gallons, "unit": "US gal"} for name in tanks},
        "taxi": {"value": 40, "unit": "lb"},
        "trip": {"value": trip, "unit": "lb"},
        "minimum_at_landing": {"value": minimum, "unit": "lb"},
    }
    return found


def full_cabin(seed: int = 0, *, count: int = 19, aft: Any = 500) -> dict[str, Any]:
    """A load of the nineteen-seat cabin, weights drawn; the heaviest sit at the back."""
    drawn = random.Random(seed)
    basis = nineteen()
    seats = [each.id for each in basis.seats if each.serves == "passenger"][-count:]
    weights = sorted(drawn.randint(1100, 2400) for _ in seats)
    return seated({name: F(w, 10) for name, w in zip(seats, weights, strict=True)}, {"AFT-HOLD": aft})


def asked(document: dict[str, Any], basis: Basis, empty: EmptyFigures, seconds: float = 60) -> Question:
    """The question about a load, judged by the whole assessment."""
    declared = read_load(document, basis)

    def judge(changed: Declared) -> Any:
        return assess(changed, basis, empty, advised=False)

    return Question(
        declared, judge(declared), prepared(basis), judge, time.monotonic, time.monotonic() + seconds
    )


def total(values: Iterable[Fraction]) -> Fraction:
    return sum(values, Fraction(0))


def _decimal(weight: Any) -> str:
    """A weight in whole tenths as it would be typed."""
    return f"{float(weight):.1f}"
