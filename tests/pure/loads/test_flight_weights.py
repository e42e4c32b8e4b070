"""The weights of a flight on which something comes aboard or hangs outside, by hand and in full: on the
invented aircraft of `round_figures`, 2,200 lb with its pilot, 360 lb of fuel, 240 lb at landing, 60 at least.
"""

from dataclasses import replace

import pytest

from loads.balance.checks_fuel_balance import Held
from loads.balance.checks_whole import kinks_between, kinks_of
from loads.balance.declared import read_load
from loads.balance.flight_weights import FlightWeights, Moment, flight_weights
from loads.balance.fuel import fuel_states
from loads.balance.prepared import prepared
from loads.balance.sections import dry_over_flight, sections_of
from tests.pure.loads.cases.test_hoist import CRATE, FOUND
from tests.pure.loads.cases.test_loads_that_leave_or_move import event
from tests.pure.loads.cases.test_sling_load import DRUM, RELEASE, SLUNG, hook_basis, slung
from tests.pure.loads.making import F, tank
from tests.pure.loads.round_figures import EMPTY, flown, q, round_basis, round_load


def weights_of(document, basis, *, sections=True):
    """The weights as an assessment has them, with or without the course of the flight."""
    declared, ready = read_load(document, basis), prepared(basis)
    states = {state.phase: state for state in flown(document, basis).states}
    course = (sections_of(declared, ready), dry_over_flight(declared, EMPTY)) if sections else (None, None)
    return flight_weights(declared, states, course, ready)


def moment(where, weight, released=0, *, ends=False, outside=False, phase=None):
    return Moment(where, F(weight), F(released), ends, outside, phase)


def at_phase(phase, weight, released=0, *, outside=False):
    return moment(phase, weight, released, ends=True, outside=outside, phase=phase)


def test_each_section_in_flight_has_a_weight_at_its_start_and_one_at_its_end():
    """A drum of 400 lb is released at 60 lb burned, a crate of 300 lb comes aboard at 90 lb."""
    document = slung(event(60, leave=[RELEASE]), event(90, come_aboard=[CRATE]))

    assert weights_of(document, hook_basis()) == FlightWeights(
        at_phase("ramp", 2960, 400),
        at_phase("take-off", 2960, 400),
        (
            moment("take-off", 2960, 400, phase="take-off"),
            moment("just before event 1", 2900, 400, ends=True),
            moment("just after event 1", 2500),
            moment("just before event 2", 2470, ends=True),
            moment("just after event 2", 2770),
            at_phase("landing", 2740),
            moment("landing", 2740, phase="landing"),
            at_phase("minimum at landing", 2560),
        ),
        F(0),
    )


def test_what_comes_aboard_is_what_the_aircraft_without_fuel_gets_heavier_by_at_most():
    """300 lb come, 100 of them go again, and 50 come later: 300 lb more at most."""
    part = {"place": "HOLD", "what": "crate", "weight": q(100)}
    later = CRATE | {"what": "box", "weight": q(50)}
    events = event(30, come_aboard=[CRATE]), event(60, leave=[part]), event(90, come_aboard=[later])

    found = weights_of(round_load(sequence=list(events)), round_basis())

    assert found.payload == 300
    assert [(one.where, one.weight) for one in found.flight[1:6]] == [
        ("just before event 1", 2530),
        ("just after event 1", 2830),
        ("just before event 2", 2800),
        ("just after event 2", 2700),
        ("just before event 3", 2670),
    ]


def test_fuel_that_cannot_be_used_is_in_every_weight():
    fuel = {"not_usable": {"MAIN": q(1, "US gal")}}
    document = round_load(sequence=[event(60, come_aboard=[CRATE])], fuel=fuel)

    found = weights_of(document, round_basis())

    assert [one.weight for one in found.flight] == [2566, 2506, 2806, 2746, 2746, 2566]


def test_what_happens_on_the_taxi_is_no_moment_of_the_flight_but_counts_from_take_off_on():
    """12 lb are burned on the taxi; half way the drum is taken in from the hook."""
    taken_in = event(6, since="engine start", move=[{"place": "HOOK", "what": "drum", "to": "HOLD"}])
    document = slung(taken_in, event(60, come_aboard=[CRATE]))
    document["fuel"]["taxi"] = q(12)

    found = weights_of(document, hook_basis())

    assert (found.ramp, found.take_off) == (at_phase("ramp", 2960, 400), at_phase("take-off", 2948))
    assert [one.where for one in found.flight] == [
        "take-off",
        "just before event 2",
        "just after event 2",
        "landing",
        "landing",
        "minimum at landing",
    ]
    assert {one.released for one in found.flight} == {0}


def test_somebody_outside_leaves_nothing_to_be_released():
    """While somebody hangs on the hook beside the drum, and again once both are in or gone."""
    hung = event(30, come_aboard=[FOUND | {"at": "HOOK"}])
    inside = event(60, move=[{"seat": "S2", "to": "S2"}])

    found = weights_of(slung(hung, inside), hook_basis())

    assert [(one.where, one.released, one.outside) for one in found.flight[:6]] == [
        ("take-off", 400, False),
        ("just before event 1", 400, False),
        ("just after event 1", 0, True),
        ("just before event 2", 0, True),
        ("just after event 2", 400, False),
        ("landing", 400, False),
    ]


@pytest.mark.parametrize(("item", "released"), [(SLUNG, 400), (DRUM, None)])
def test_without_a_sequence_the_phases_are_the_moments(item, released):
    """Only what can be released counts: of a load without it there are no such weights."""
    found = weights_of(slung(item=item), hook_basis(), sections=False)

    if released is None:
        assert found is None
    else:
        assert found == FlightWeights(
            at_phase("ramp", 2960, released),
            at_phase("take-off", 2960, released),
            (
                at_phase("take-off", 2960, released),
                at_phase("landing", 2840, released),
                at_phase("minimum at landing", 2660, released),
            ),
            F(0),
        )


def test_of_a_load_on_which_nothing_comes_or_hangs_there_are_none():
    assert weights_of(round_load(), round_basis()) is None
    assert weights_of(round_load(1, sequence=[event(60, leave=[{"seat": "S1"}])]), round_basis()) is None


def two_tanks():
    """LEFT feeds first, then RIGHT; RIGHT alone on the taxi."""
    basis = round_basis(tanks=(tank("LEFT", 100, 50, -40), tank("RIGHT", 100, 50, 40)))
    stages = tuple(replace(basis.burn_order[0], tanks=(name,)) for name in ("LEFT", "RIGHT"))
    return replace(basis, burn_order=stages, taxi_order=stages[1:])


def held(leg, left, right, name=""):
    return Held(leg, {"LEFT": F(left), "RIGHT": F(right)}, name)


def test_without_a_sequence_tanks_are_told_at_the_phases_and_in_between():
    """The taxi burns 1 of RIGHT, the flight 20, 4 of which LEFT has; the least at landing is 10."""
    start = {"LEFT": q(4, "US gal"), "RIGHT": q(40, "US gal")}
    declared = read_load(round_load(start=start, fuel={"taxi": q(6)}), two_tanks())

    assert kinks_of(fuel_states(declared.fuel, prepared(two_tanks()))) == [
        held("taxi", 4, 40, "ramp"),
        held("taxi", 4, 39, "take-off"),
        held("flight", 4, 39, "take-off"),
        held("flight", 0, 39),
        held("flight", 0, 23, "landing"),
        held("reserve", 0, 23, "landing"),
        held("reserve", 0, 10, "minimum at landing"),
    ]


def test_tanks_are_told_at_both_ends_of_each_section_and_where_one_tank_feeds_after_another():
    """60 lb, 10 US gal, from LEFT, 4 of which are all there is; then 2 go over from RIGHT."""
    basis = two_tanks()
    start = {"LEFT": q(4, "US gal"), "RIGHT": q(40, "US gal")}
    pumped = event(60, transfer={"from": "RIGHT", "to": "LEFT", "quantity": q(2, "US gal")})
    document = round_load(start=start, sequence=[pumped], fuel={"taxi": q(6)})

    # The taxi burns 1 of RIGHT, the flight 20, the least at landing is 10.
    assert kinks_between(sections_of(read_load(document, basis), prepared(basis))) == [
        held("taxi", 4, 40, "ramp"),
        held("taxi", 4, 39, "take-off"),
        held("flight", 4, 39, "take-off"),
        held("flight", 0, 39),
        held("flight", 0, 33),
        held("flight", 2, 31),
        held("flight", 0, 31),
        held("flight", 0, 23, "landing"),
        held("reserve", 0, 23, "landing"),
        held("reserve", 0, 10, "minimum at landing"),
    ]
