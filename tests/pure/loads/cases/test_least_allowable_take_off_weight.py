"""The least allowable take-off weight, with what governed: every bound, each made the least in turn.

14 CFR 135.63(c)(3) and CAT.POL.MAB.105(a) ask for it (numbers remembered). Figures by hand: 1,240 lb at
take-off with 240 lb of fuel, of which 120 lb are burned; landing 1,120 lb, zero fuel 1,000 lb, no taxi fuel.
"""

from dataclasses import replace
from fractions import Fraction

import pytest

from fleet.basis import Limits
from fleet.sourced import Limit
from loads.balance.aboard import StatedLimit
from tests.pure.loads.hand import PAGE, plain, result_with

F = Fraction
ROOMY = {"ramp": 2000, "take_off": 2000, "zero_fuel": 2000, "landing": 2000, "minimum_flying": 1}


def allowable(stated=(), **limits):
    weights = {**ROOMY, **limits}

    def change(basis):
        whole = Limits(**{name: None if v is None else Limit(F(v), PAGE) for name, v in weights.items()})
        return replace(basis, configurations=(replace(basis.configurations[0], limits=whole),))

    result = result_with(plain(trip=120), change, lambda declared: replace(declared, limits=stated))
    return result.document["allowable_take_off"]


@pytest.mark.parametrize(
    ("limits", "weight", "governed"),
    [
        ({"take_off": 1500}, "1500", "structural take-off"),
        ({"landing": 1400}, "1520", "landing limit + trip fuel"),  # 1,400 + 120
        ({"zero_fuel": 1300}, "1540", "zero-fuel limit + take-off fuel"),  # 1,300 + 240
        ({"ramp": 1600}, "1600", "ramp limit - taxi fuel"),
    ],
)
def test_each_structural_bound_can_govern(limits, weight, governed):
    found = allowable(**limits)
    assert (found["weight"], found["governed_by"]) == (weight, governed)
    assert len(found["candidates"]) == 4


@pytest.mark.parametrize(
    ("at", "kind", "weight", "governed"),
    [
        ("take-off", "field length", "1450", "field length, sheet 7"),
        ("take-off", "climb", "1450", "climb, sheet 7"),
        ("take-off", "en-route", "1450", "en-route, sheet 7"),
        ("landing", "field length", "1570", "field length, sheet 7 + trip fuel"),  # 1,450 + 120
    ],
)
def test_each_performance_bound_can_govern(at, kind, weight, governed):
    found = allowable((StatedLimit(at, F(1450), "sheet 7", kind),))
    assert (found["weight"], found["governed_by"]) == (weight, governed)


def test_what_was_not_entered_is_named_beside_the_least():
    assert allowable(landing=None)["not_entered"] == ["landing limit + trip fuel"]
