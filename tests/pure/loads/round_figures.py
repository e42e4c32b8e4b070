"""An invented aircraft in round figures, so that every case can be reckoned again by hand.

Empty 2,000 lb at 100 in; the pilot 200 lb at 90 in; four seats at 110 in; a door at 140 in, a hold at 130 in,
a hook at 80 in; one tank of 100 US gal at 100 in; fuel at 6 lb/US gal: 360 lb at engine start, none for taxi.
"""

from dataclasses import replace
from typing import Any

from fleet.basis import Basis, BurnStage
from fleet.weighing import EmptyFigures
from loads.balance.assess import assess
from loads.balance.declared import read_load
from loads.balance.result import Result
from tests.pure.loads.making import ROOMY, F, envelope, limits, load, place, seat, tank, twin

SEATS = ("S1", "S2", "S3", "S4")
EMPTY = EmptyFigures(F(2000), F(200_000), F(0), "nose cone", "wheels", "weighing")
IN_FLIGHT = ("take-off", "landing")


def q(value: Any, unit: str = "lb") -> dict[str, Any]:
    return {"value": value, "unit": unit}


def box(forward: Any, aft: Any, low: int = 1000, high: int = 9000, **more: Any) -> Any:
    """An envelope of one arm forward and one aft."""
    return envelope((forward, low), (forward, high), (aft, high), (aft, low), **more)


def round_basis(*envelopes: Any, weights: dict[str, Any] | None = None, **changes: Any) -> Basis:
    """The aircraft; `weights` are limits of weight beside roomy ones."""
    basis = twin()
    seats = (seat("P", 90, serves="crew"), *(seat(name, 110) for name in SEATS))
    places = (place("DOOR", 140, None), place("HOLD", 130, None), place("HOOK", 80, None))
    entered = limits(**(ROOMY | (weights or {})))
    known = replace(
        basis.configurations[0],
        seats=tuple(one.id for one in seats),
        places=tuple(one.id for one in places),
        limits=entered,
    )
    stages = (BurnStage(("MAIN",)),)
    made = replace(
        basis,
        seats=seats,
        places=places,
        zones=(),
        tanks=(tank("MAIN", 100, 100),),
        burn_order=stages,
        taxi_order=stages,
        limits=entered,
        envelopes=envelopes or (box(80, 120),),
        configurations=(known,),
    )
    return replace(made, **changes)


def round_load(
    jumpers: int = 0,
    *,
    items: list[tuple[str, str, int]] | None = None,
    fuel: dict[str, Any] | None = None,
    start: dict[str, Any] | None = None,
    **more: Any,
) -> dict[str, Any]:
    """A load of the aircraft: people of 200 lb in the first seats, items as (what, place, pounds)."""
    people = [
        {"name": f"N. {name}", "seat": name, "weight": q(200), "how": "weighed"} for name in SEATS[:jumpers]
    ]
    pilot = {"name": "R. Amani", "position": "pilot in command", "seat": "P", "weight": q(200)}
    document = load(
        limits=[],
        persons_on_board=1 + jumpers,
        crew=[pilot | {"how": "weighed"}],
        passengers=people,
        items=[
            {"kind": "cargo", "what": what, "place": where, "weight": q(weight), "how": "weighed"}
            for what, where, weight in items or ()
        ],
        **more,
    )
    document["fuel"] |= {
        "at_engine_start": start or {"MAIN": q(60, "US gal")},
        "taxi": q(0),
        "trip": q(120),
        "minimum_at_landing": q(60),
        **(fuel or {}),
    }
    return document


def flown(document: dict[str, Any], basis: Basis | None = None) -> Result:
    """Read and assess a load of the aircraft."""
    basis = basis or round_basis()
    return assess(read_load(document, basis), basis, EMPTY)


def at(result: Result, phase: Any) -> tuple[Any, Any]:
    """Weight and moment at a phase."""
    state = result.state(phase)
    return state.weight, state.moment
