"""Invented bases, empty weights and load documents for the tests of the balance. No real aircraft is
meant.
"""

from copy import deepcopy
from dataclasses import replace
from fractions import Fraction
from typing import Any

from fleet.basis import (
    Basis,
    BurnStage,
    Chord,
    Configuration,
    Envelope,
    Limits,
    Phase,
    Place,
    Seat,
    Tank,
    TankTable,
    Zone,
)
from fleet.quantities import Unit
from fleet.sourced import Limit, Source
from fleet.weighing import EmptyFigures
from loads.balance.assess import assess
from loads.balance.declared import read_load

F = Fraction
SOURCE = Source("VP2-FM", "B", "6-4")
ALL_PHASES: tuple[Phase, ...] = ("ramp", "take-off", "landing", "zero fuel")


def limit(value: str | int | None) -> Limit:
    return Limit(None if value is None else F(value), SOURCE)


def limits(**values: str | int | None) -> Limits:
    """Limits by name; what is not named is not entered, and None is shown to be none."""
    names = ("ramp", "take_off", "zero_fuel", "landing", "minimum_flying")
    return Limits(**{name: limit(values[name]) if name in values else None for name in names})


def straight(arm: str | int, capacity: str | int) -> TankTable:
    """A table of arms against volume that is the same arm throughout."""
    return TankTable("volume", "arm", "arm", None, ((F(0), F(arm)), (F(capacity), F(arm))))


def tank(name: str, arm: str | int, capacity: str | int, lateral: str | int = 0) -> Tank:
    return Tank(name, name.lower(), F(capacity), F(lateral), straight(arm, capacity), SOURCE)


def seat(name: str, arm: str | int, lateral: str | int = 0, serves: str = "either", most: Any = 300) -> Seat:
    maximum = None if most == "absent" else limit(most)
    return Seat(name, name.replace("-", " ").lower(), serves, F(arm), F(lateral), maximum, SOURCE)  # type: ignore[arg-type] # words of tests


def place(name: str, arm: str | int, most: Any = 400, lateral: str | int = 0) -> Place:
    maximum = None if most == "absent" else limit(most)
    return Place(name, name.replace("-", " ").lower(), F(arm), F(lateral), maximum, SOURCE)


def envelope(
    *points: tuple[Any, Any],
    plane: str = "arm",
    axis: str = "longitudinal",
    phases: tuple[Phase, ...] = ALL_PHASES,
) -> Envelope:
    exact = tuple((F(x), F(y)) for x, y in points)
    return Envelope(f"{axis}-{plane}", axis, phases, plane, exact, SOURCE)  # type: ignore[arg-type] # words of tests


def twin() -> Basis:
    """A light twin in lb and in: six seats, two holds, four tanks, auxiliaries burn first, a sloping front
    edge.
    """
    seats = (
        seat("COCKPIT-L", 92, -14, "crew"),
        seat("COCKPIT-R", 92, 14),
        seat("ROW1-L", 124, -13),
        seat("ROW1-R", 124, 13),
        seat("ROW2-L", 155, -12, "passenger"),
        seat("ROW2-R", 155, 12, "passenger"),
    )
    places = (place("NOSE-HOLD", 30, 250), place("AFT-HOLD", 190, 300), place("WING-LOCKER", 145, None))
    stages = (BurnStage(("LEFT-AUX", "RIGHT-AUX")), BurnStage(("LEFT-MAIN", "RIGHT-MAIN")))
    weights = limits(ramp=6840, take_off=6800, zero_fuel=6200, landing=6500, minimum_flying=4300)
    everything = tuple(one.id for one in seats)
    full = Configuration(
        "six-seat", "six seats", everything, tuple(p.id for p in places), 1, "wheels", (), (), weights
    )
    freight = replace(full, id="freight", name="freight", seats=everything[:2], places=("AFT-HOLD",))
    return Basis(
        aircraft_type="Vesper 2",
        category="aeroplane",
        engines=2,
        passenger_seats_installed=5,
        weight_unit=Unit.LB,
        length_unit=Unit.IN,
        volume_unit=Unit.US_GAL,
        datum="nose cone",
        chord=Chord(F("109.5"), F(66), SOURCE),
        fits=("wheels",),
        seats=seats,
        places=places,
        zones=(Zone("REAR", "rear floor", ("ROW2-L", "ROW2-R", "AFT-HOLD"), limit(600)),),
        tanks=(
            tank("LEFT-MAIN", 121, 60, -70),
            tank("RIGHT-MAIN", 121, 60, 70),
            tank("LEFT-AUX", 133, 30, -90),
            tank("RIGHT-AUX", 133, 30, 90),
        ),
        burn_order=stages,
        taxi_order=(stages[1],),
        limits=weights,
        envelopes=(envelope((110, 4000), (110, 5200), (116, 6800), (128, 6800), (128, 4000)),),
        lateral_limits_entered=True,
        configurations=(full, freight),
        sample_loads=(),
    )


def twin_empty() -> EmptyFigures:
    return EmptyFigures(F(4350), F("507240.5"), F(1200), "nose cone", "wheels", "weighing")


LOAD: dict[str, Any] = {
    "schema": "tarebook.load/1",
    "aircraft": "Q9-KTB",
    "configuration": "six-seat",
    "flight": {
        "reference": "KT-214",
        "leg": 1,
        "departure": "2026-12-01T08:30:00-06:00",
        "origin": "XNAL",
        "destination": "XKOR",
        "operation": "passenger-charter",
    },
    "persons_on_board": 4,
    "crew": [
        {
            "person": "r.amani",
            "name": "R. Amani",
            "position": "pilot in command",
            "seat": "COCKPIT-L",
            "weight": {"value": 181, "unit": "lb"},
            "how": "weighed",
        }
    ],
    "passengers": [
        {"name": "L. Osei", "seat": "ROW1-L", "weight": {"value": 176, "unit": "lb"}, "how": "declared"},
        {
            "name": "M. Dravo",
            "seat": "ROW1-R",
            "category": "adult",
            "weight": {"value": "71.5", "unit": "kg"},
            "how": "declared",
            "lap_infant": {"name": "I. Dravo", "weight": {"value": 9, "unit": "kg"}, "how": "declared"},
        },
    ],
    "items": [
        {
            "kind": "baggage",
            "what": "checked bags",
            "place": "AFT-HOLD",
            "weight": {"value": 120, "unit": "lb"},
            "how": "weighed",
        }
    ],
    "fuel": {
        "density": {"value": "6.0", "unit": "lb/US gal", "source": "delivery note 4471"},
        "at_engine_start": {
            "LEFT-MAIN": {"value": 50, "unit": "US gal"},
            "RIGHT-MAIN": {"value": 50, "unit": "US gal"},
            "LEFT-AUX": {"value": 15, "unit": "US gal"},
            "RIGHT-AUX": {"value": 15, "unit": "US gal"},
        },
        "not_usable": {},
        "taxi": {"value": 24, "unit": "lb"},
        "trip": {"value": 420, "unit": "lb"},
        "minimum_at_landing": {"value": 240, "unit": "lb"},
    },
    "limits": [{"at": "take-off", "weight": {"value": 6700, "unit": "lb"}, "source": "performance sheet 12"}],
}


def load(**changes: Any) -> dict[str, Any]:
    """A fresh copy of a sound load for the twin, with top fields exchanged."""
    return {**deepcopy(LOAD), **changes}


def result_of(document: Any = None, basis: Basis | None = None, empty: Any = "twin") -> Any:
    """Read and assess a load, by default the sound one, on the twin with its empty weight."""
    basis = basis or twin()
    declared = read_load(document or load(), basis)
    return assess(declared, basis, twin_empty() if empty == "twin" else empty)


def with_limits(**values: str | int | None) -> Basis:
    """The twin with other limits of weight."""
    basis = twin()
    weights = limits(**values)
    return replace(
        basis,
        limits=weights,
        configurations=tuple(replace(one, limits=weights) for one in basis.configurations),
    )


ROOMY = {"ramp": 9000, "take_off": 9000, "zero_fuel": 9000, "landing": 9000, "minimum_flying": 1000}
