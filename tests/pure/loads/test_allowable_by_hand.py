"""The allowable take-off weight with every bound, told in full: 1,240 lb at take-off with 240 lb of fuel, of
which 120 lb are burned; landing 1,120 lb, zero fuel 1,000 lb, no taxi fuel.
"""

from dataclasses import replace
from fractions import Fraction

import pytest

from fleet.basis import Limits
from fleet.sourced import Limit
from loads.balance.aboard import StatedLimit
from loads.balance.allowable import allowable_take_off
from loads.balance.events import Event, Leaving
from loads.balance.flight_weights import FlightWeights, Moment
from tests.pure.loads.hand import PAGE, plain, result_with

F = Fraction
ROOMY = {"ramp": 2400, "take_off": 2300, "zero_fuel": 2200, "landing": 2100}


def limits_of(**weights):
    """Limits by name; a word of None: shown to be none; what is not named was not entered."""
    names = ("ramp", "take_off", "zero_fuel", "landing", "minimum_flying", "with_external_load")
    entered = {name: Limit(None if v is None else F(v), PAGE) for name, v in weights.items()}
    return Limits(**{name: entered.get(name) for name in names})


def told(*stated, sequence=(), weights=None, **limits):
    made = plain(trip=120)
    basis = made.basis()
    states = {state.phase: state for state in result_with(made).states}
    declared = made.declared(basis)
    one = replace(basis.configurations[0], limits=limits_of(**limits))
    declared = replace(declared, configuration=one, limits=stated, sequence=sequence)
    return allowable_take_off(declared, states, weights).as_document()


def event(**what):
    return Event(1, "flight", F(0), "/sequence/0", **what)


def candidates(*found):
    return [{"name": name, "weight": weight} for name, weight in found]


def test_every_bound_is_told_and_the_least_governs():
    """2100 + 120, 2200 + 240."""
    assert told(**ROOMY) == {
        "weight": "2220",
        "governed_by": "landing limit + trip fuel",
        "candidates": candidates(
            ("structural take-off", "2300"),
            ("landing limit + trip fuel", "2220"),
            ("zero-fuel limit + take-off fuel", "2440"),
            ("ramp limit - taxi fuel", "2400"),
        ),
        "not_entered": [],
    }


def test_without_any_limit_nothing_governs():
    none = told(**dict.fromkeys(ROOMY))
    assert none == {"weight": None, "governed_by": "no limit", "candidates": [], "not_entered": []}

    assert told() == {
        "weight": None,
        "governed_by": "no limit",
        "candidates": [],
        "not_entered": [
            "structural take-off",
            "landing limit + trip fuel",
            "zero-fuel limit + take-off fuel",
            "ramp limit - taxi fuel",
        ],
    }


def test_weights_are_rounded_down():
    found = told(StatedLimit("take-off", F("2219.99"), "sheet 7"), **ROOMY | {"take_off": "2299.99"})

    assert found["weight"] == "2219.9"
    assert [one["weight"] for one in found["candidates"]] == ["2299.9", "2220", "2440", "2400", "2219.9"]


def test_stated_limits_follow_in_their_order_those_at_landing_with_the_trip_fuel():
    stated = StatedLimit("landing", F(2000), "sheet 8", "field length"), StatedLimit("take-off", F(2250), "7")

    assert told(*stated, **ROOMY)["candidates"][4:] == candidates(
        ("field length, sheet 8 + trip fuel", "2120"), (stated[1].named, "2250")
    )


def test_of_equal_bounds_the_first_named_governs():
    assert told(**ROOMY | {"landing": 2180})["governed_by"] == "structural take-off"
    assert told(**ROOMY | {"landing": "2179.99"})["governed_by"] == "landing limit + trip fuel"
    assert told(StatedLimit("take-off", F(2300), "7"), take_off=2300)["governed_by"] == "structural take-off"


@pytest.mark.parametrize(
    ("sequence", "trip"),
    [
        ((event(),), "trip fuel"),
        ((event(), event(leaving=(Leaving("/items/0"),))), "trip fuel and what leaves"),
        ((event(coming=("somebody",)),), "trip fuel, less what comes aboard"),
        (
            (event(coming=("somebody",)), event(leaving=(Leaving("/items/0"),))),
            "trip fuel and what leaves, less what comes aboard",
        ),
    ],
)
def test_what_leaves_and_comes_is_named_with_the_trip_fuel(sequence, trip):
    stated = StatedLimit("landing", F(2000), "sheet 8")
    names = [one["name"] for one in told(stated, sequence=sequence, **ROOMY)["candidates"]]

    assert (names[1], names[4]) == (f"landing limit + {trip}", f"{stated.named} + {trip}")


def moment(where, weight, released=0, *, ends=False, phase=None):
    return Moment(where, F(weight), F(released), ends, False, phase)


def over_flight(*flight, payload=0, outside=0):
    ramp, take_off = moment("ramp", 1240, outside), moment("take-off", 1240, outside)
    return FlightWeights(ramp, take_off, flight, F(payload))


def test_a_load_to_which_nothing_happens_has_the_plain_bounds():
    assert told(weights=over_flight(), **ROOMY) == told(**ROOMY)


@pytest.mark.parametrize("payload", [F(1, 2), 100])
def test_what_comes_aboard_lessens_the_bound_of_the_zero_fuel_limit(payload):
    found = told(weights=over_flight(payload=payload), **ROOMY)["candidates"]

    weight = {F(1, 2): "2439.5", 100: "2340"}[payload]
    named = ("zero-fuel limit + take-off fuel, less what comes aboard", weight)
    assert found == candidates(
        ("structural take-off", "2300"),
        ("landing limit + trip fuel", "2220"),
        named,
        ("ramp limit - taxi fuel", "2400"),
    )


def test_with_a_load_outside_the_higher_maximum_counts_and_the_ordinary_one_without_it():
    """300 lb hang outside: the ordinary maxima of the ramp and of take-off are 300 lb higher in all."""
    weights = over_flight(outside=300)

    assert told(weights=weights, with_external_load=2500, **ROOMY)["candidates"] == candidates(
        ("maximum with an external load", "2500"),
        ("structural take-off + external load", "2600"),
        ("landing limit + trip fuel", "2220"),
        ("zero-fuel limit + take-off fuel", "2440"),
        ("ramp limit - taxi fuel", "2700"),
    )


def test_a_higher_maximum_needs_a_load_outside_and_a_load_outside_the_higher_maximum():
    without = told(weights=over_flight(), with_external_load=2500, **ROOMY)
    assert without == told(**ROOMY)

    not_entered = told(weights=over_flight(outside=300), **ROOMY)["candidates"]
    assert [one["name"] for one in not_entered[:2]] == ["structural take-off", "landing limit + trip fuel"]


def test_a_weight_in_flight_above_that_at_take_off_is_a_bound_of_its_own():
    """1300 lb just after an event, 60 more than at take-off: 60 less may be taken off."""
    before = told(**ROOMY)["candidates"]

    for one in moment("just after event 1", 1300), moment("just after event 1", 1300, 100):
        found = told(weights=over_flight(one), **ROOMY)["candidates"]
        assert found == [*before, *candidates(("maximum in flight, just after event 1", "2240"))]


@pytest.mark.parametrize(
    "one",
    [
        moment("just after event 1", 1240),
        moment("just after event 1", 1239),
        moment("just before event 1", 1300, ends=True),
        moment("landing", 1300, phase="landing"),
    ],
)
def test_no_other_weight_in_flight_is_one(one):
    assert told(weights=over_flight(one), **ROOMY) == told(**ROOMY)


def test_in_flight_too_the_higher_maximum_counts_with_a_load_outside_and_the_ordinary_one_without_it():
    """1300 lb, of which 100 hang outside: 2500 - 60; and 2300 - 60 + 100. Another moment, with nothing
    outside, at 1250 lb: 2300 - 10.
    """
    flight = moment("just after event 1", 1300, 100), moment("just after event 2", "1250")
    found = told(weights=over_flight(*flight), with_external_load=2500, **ROOMY)["candidates"]

    assert found[4:] == candidates(
        ("maximum in flight, just after event 1", "2440"),
        ("maximum in flight, just after event 1, + external load", "2340"),
        ("maximum in flight, just after event 2", "2290"),
    )


def test_an_ordinary_maximum_that_was_not_entered_is_named_for_each_moment():
    weights = over_flight(moment("just after event 1", 1300))

    assert told(weights=weights, landing=2000)["not_entered"] == [
        "structural take-off",
        "zero-fuel limit + take-off fuel",
        "ramp limit - taxi fuel",
        "maximum in flight, just after event 1",
    ]
