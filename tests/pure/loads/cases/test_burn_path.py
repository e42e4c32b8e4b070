"""The burn path: take-off and landing inside, the middle outside; the exact worst point between kinks; the
path that decides runs on to the least fuel at landing; a return straight after take-off is told, not judged.

Common practice; reckoned by hand on the aircraft of `round_figures`: 2200 lb and 218000 lb in without fuel,
two tanks of 30 US gal (180 lb) each, at 60 and at 140 in.
"""

from typing import Any

import pytest

from fleet.basis import Basis, BurnStage
from tests.pure.loads.making import F, envelope, tank
from tests.pure.loads.round_figures import at, box, flown, q, round_basis, round_load


def front_first(*envelopes: Any, **weights: Any) -> Basis:
    tanks = (tank("FRONT", 60, 50), tank("REAR", 140, 50))
    order = (BurnStage(("FRONT",)), BurnStage(("REAR",)))
    return round_basis(*envelopes, tanks=tanks, burn_order=order, taxi_order=order, weights=weights)


def flight(trip: Any = 300, least: Any = 60) -> dict[str, Any]:
    start = {"FRONT": q(30, "US gal"), "REAR": q(30, "US gal")}
    return round_load(start=start, fuel={"trip": q(trip), "minimum_at_landing": q(least)})


def test_take_off_and_landing_are_inside_and_the_moment_the_front_tank_runs_dry_is_outside() -> None:
    # take-off 2560 lb, 254000: 99.22 in. After 180 lb from the front: 2380 lb, 243200: 102.18 in.
    # landing after 120 lb more from the rear: 2260 lb, 226400: 100.18 in
    result = flown(flight(), front_first(box(95, 102)))

    assert at(result, "take-off") == (2560, 254_000)
    assert at(result, "landing") == (2260, 226_400)
    assert result.check("cg.take-off").outcome == result.check("cg.landing").outcome == "pass"
    worst = result.check("path.longitudinal")
    assert (worst.outcome, worst.room) == ("fail", 102 - F(243_200, 2380))
    words = "0.19 in beyond the aft limit, between take-off and landing, at 2380 lb with 180 lb of fuel"
    assert worst.margin_text == words
    assert worst.at is not None
    assert worst.at["tanks"] == {"FRONT": "0", "REAR": "30"}


@pytest.mark.parametrize(("least", "outcome"), [(60, "pass"), (59, "fail")])
def test_the_path_runs_on_to_the_least_fuel_at_landing(least: int, outcome: str) -> None:
    # Landing with 240 lb at 2440 lb. On to 60 lb, all from the rear by then: 2260 lb at 226400, so 100.18
    # in. One pound less: 2259 lb at 226260, 100.16 in.
    edge = F(226_400, 2260)
    sloping = envelope((90, 9000), (110, 9000), (110, 2200), (edge, 2200), (edge, 2300), (90, 2300))
    result = flown(flight(trip=120, least=least), front_first(sloping))
    assert result.check("path.longitudinal").outcome == outcome
    assert result.check("cg.landing").outcome == "pass"


def test_an_envelope_for_landing_alone_does_not_bind_before_the_landing() -> None:
    # 99.22 in at take-off is outside the one for landing, which begins at 100 in; at landing it is 100.18.
    air, landing = box(95, 110, phases=("take-off",)), box(100, 110, phases=("landing",))
    assert flown(flight(least=240), front_first(air, landing)).verdict == "outside"  # 240 lb are never left
    assert flown(flight(), front_first(air, landing)).check("cg.landing").outcome == "pass"


def test_a_return_straight_after_take_off_above_the_landing_weight_is_lawful_and_told() -> None:
    # 2560 lb at take-off, 2300 may land: 260 lb, or 43.4 US gal, rounded up
    result = flown(flight(), front_first(box(95, 105), landing=2300))
    assert result.verdict == "within"
    advisories = result.as_document()["advisories"]
    assert advisories == ["overweight for landing until 43.4 US gal (260 lb) are burned"]
