"""Ramp and take-off: taxi fuel comes out of named tanks, weighs at the ramp and not at take-off.

Common practice; reckoned by hand on the aircraft of `round_figures`: 2200 lb and 218000 lb in without fuel.
"""

from typing import Any

import pytest

from fleet.basis import Basis, BurnStage
from records.refusal import Invalid
from tests.pure.loads.making import F, tank
from tests.pure.loads.round_figures import at, box, flown, q, round_basis, round_load

TAXI = {"taxi": q(60), "trip": q(120)}
START = {"FRONT": q(30, "US gal"), "REAR": q(30, "US gal")}


def taxiing_on(name: str, *envelopes: Any, **weights: Any) -> Basis:
    """Two tanks, at 60 and at 140 in; flight burns the front one first, taxiing the one named."""
    tanks = (tank("FRONT", 60, 50), tank("REAR", 140, 50))
    order = (BurnStage(("FRONT",)), BurnStage(("REAR",)))
    taxi = (BurnStage((name,)),)
    return round_basis(*envelopes, tanks=tanks, burn_order=order, taxi_order=taxi, weights=weights)


@pytest.mark.parametrize(("name", "moment"), [("FRONT", 250_400), ("REAR", 245_600)])
def test_taxi_fuel_comes_out_of_the_tanks_that_feed_taxiing(name: str, moment: int) -> None:
    # 2560 lb and 254000 at the ramp; 60 lb at 60 in, or at 140 in, less at take-off
    result = flown(round_load(start=START, fuel=TAXI), taxiing_on(name))
    assert at(result, "ramp") == (2560, 254_000)
    assert at(result, "take-off") == (2500, moment)


def test_each_has_its_own_limit_and_taxi_fuel_may_be_what_lies_between() -> None:
    result = flown(round_load(start=START, fuel=TAXI), taxiing_on("REAR", ramp=2560, take_off=2500))
    assert result.check("weight.ramp").margin_text == "on the limit"
    assert result.check("weight.take-off").margin_text == "on the limit"
    assert result.verdict == "within"


def test_taxiing_is_judged_by_the_envelopes_of_the_ramp_alone() -> None:
    # 99.22 in at the ramp, 98.24 in at take-off (245600 / 2500)
    air = box(95, 110, phases=("take-off", "landing"))
    assert flown(round_load(start=START, fuel=TAXI), taxiing_on("REAR", air)).verdict == "within"
    ramp = box("98.25", 110, phases=("ramp",))
    worst = flown(round_load(start=START, fuel=TAXI), taxiing_on("REAR", air, ramp)).check(
        "path.longitudinal"
    )
    assert (worst.outcome, worst.phase) == ("fail", "take-off")
    assert worst.room == F(245_600, 2500) - F("98.25")


def test_more_taxi_fuel_than_the_tanks_that_feed_it_hold_is_refused() -> None:
    with pytest.raises(Invalid) as refused:
        flown(round_load(start=START, fuel={"taxi": q(181)}), taxiing_on("REAR"))
    assert [(one.pointer, one.code) for one in refused.value.faults] == [("/fuel/taxi", "burn-exceeds-fuel")]


def test_who_moves_while_taxiing_weighs_where_they_are_at_take_off() -> None:
    walks = [{"since": "engine start", "after_burning": q(30), "move": [{"seat": "S1", "to": "HOLD"}]}]
    result = flown(round_load(1, start=START, fuel=TAXI, sequence=walks), taxiing_on("REAR"))
    # 200 lb from 110 to 130 in
    assert at(result, "ramp") == (2760, 276_000)
    assert at(result, "take-off") == (2700, 276_000 - 8400 + 4000)
