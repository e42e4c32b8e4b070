"""What is derived from a basis once: words and digits of its units, the envelopes of each phase, moments of
fuel, and which states of moving parts matter.
"""

from dataclasses import replace

import pytest

from fleet.basis import PHASES, BurnStage, Chord, TankTable
from fleet.curtailment import Amounts, CurtailedShape, Curtailment, Inset
from fleet.positions import MovingPart, PartState
from fleet.quantities import Unit
from fleet.sourced import Source
from fleet.tanks import OutsideTable
from loads.balance import prepared as prepared_module
from loads.balance.prepared import Prepared, prepared
from tests.pure.loads.hand import by_cg
from tests.pure.loads.making import SOURCE, F, envelope, place, tank, twin

OURS = Source("OM-A", "4", "8-12")
GEAR = MovingPart(
    "gear",
    "landing gear",
    "down",
    (
        PartState("down", "down", F(0), ("ground", "flight"), SOURCE),
        PartState("up", "up", F(500), ("flight",), SOURCE),
    ),
)


def of(**changes):
    return Prepared(replace(twin(), **changes))


def test_words_and_digits_are_those_of_the_units():
    ready = of()
    assert (ready.weight, ready.length, ready.volume) == ("lb", "in", "US gal")
    assert (ready.moment, ready.density) == ("lb in", "lb/US gal")

    metric = of(weight_unit=Unit.KG, length_unit=Unit.M, volume_unit=Unit.L)
    assert (metric.weight, metric.length, metric.volume) == ("kg", "m", "l")
    assert (metric.moment, metric.density) == ("kg m", "kg/l")
    assert metric.length_places > ready.length_places
    assert metric.moment_places > ready.moment_places


def box(half, *phases, axis="longitudinal", **more):
    middle = 120 if axis == "longitudinal" else 0
    corners = (middle - half, 4000), (middle - half, 6800), (middle + half, 6800), (middle + half, 4000)
    return replace(envelope(*corners, phases=phases, axis=axis), **more)


def test_a_phase_has_the_envelopes_that_name_it_and_the_least_fuel_those_of_the_landing():
    one, two, across = (
        box(10, "ramp", "take-off"),
        box(11, "take-off", "landing"),
        box(3, "landing", axis="lateral"),
    )
    ready = of(envelopes=(one, two, across))

    found = {phase: [limit for limit, _ in ready.bounds("longitudinal", phase)] for phase in PHASES}
    assert found == {
        "ramp": [one],
        "take-off": [one, two],
        "zero fuel": [],
        "landing": [two],
        "minimum at landing": [two],
    }
    lateral = {phase: [limit for limit, _ in ready.bounds("lateral", phase)] for phase in PHASES}
    assert lateral == {phase: [] for phase in PHASES} | {"landing": [across], "minimum at landing": [across]}


def test_an_envelope_for_the_least_fuel_stands_in_place_of_that_of_the_landing():
    landing, least = box(11, "landing"), box(9, "minimum at landing")
    ready = of(envelopes=(landing, least))

    assert [limit for limit, _ in ready.bounds("longitudinal", "minimum at landing")] == [least]
    assert [limit for limit, _ in ready.bounds("longitudinal", "landing")] == [landing]


def curtailment(name, *phases, **sides):
    return Curtailment(name, "other", phases, (Amounts(None, None, **sides),), OURS)


def test_one_envelope_under_the_same_margins_is_one_bound_whatever_the_phase():
    one, two = (
        curtailment("ONE", "take-off", "landing", aft=Inset(F(2))),
        curtailment("TWO", "landing", aft=Inset(F(1))),
    )
    every = box(10, *PHASES), box(3, *PHASES, axis="lateral")
    ready = of(envelopes=every, curtailments=(one, two))

    def bound(phase, axis="longitudinal"):
        (found,) = ready.bounds(axis, phase)
        return found

    assert bound("ramp") is bound("zero fuel") is bound("minimum at landing")
    assert not isinstance(bound("ramp")[1], CurtailedShape)
    assert {bound(phase)[0] for phase in PHASES} == {every[0]}
    # 130 in less 2 in at take-off, less 3 in at landing.
    for phase, last in ("ramp", 130), ("take-off", 128), ("landing", 127):
        shape = bound(phase)[1]
        assert (shape.holds(F(5000), F(5000 * last)), shape.holds(F(5000), F(5000 * last + 1))) == (
            True,
            False,
        )
    # Nothing moves across the aircraft.
    assert bound("take-off", "lateral") is bound("ramp", "lateral")

    same = of(envelopes=every, curtailments=(one,))
    assert same.bounds("longitudinal", "take-off")[0] is same.bounds("longitudinal", "landing")[0]
    assert isinstance(same.bounds("longitudinal", "landing")[0][1], CurtailedShape)


def test_two_envelopes_of_a_phase_are_each_curtailed_in_their_order():
    both = box(10, "take-off"), box(12, "take-off")
    ready = of(envelopes=both, curtailments=(curtailment("ONE", "take-off", forward=Inset(F(1))),))

    found = ready.bounds("longitudinal", "take-off")
    assert [limit for limit, _ in found] == list(both)
    assert [shape.holds(F(5000), F(5000 * 109)) for _, shape in found] == [False, True]
    assert [shape.holds(F(5000), F(5000 * 111)) for _, shape in found] == [True, True]


def test_an_envelope_of_a_state_holds_in_it_and_the_others_are_as_weighed():
    up = box(10, "take-off", positions=(("gear", ("up",)),))
    down = box(11, "take-off", positions=(("gear", ("down",)),))
    either = box(12, "take-off")
    ready = of(envelopes=(up, down, either), positions=(GEAR,))
    shapes = [shape for _, shape in ready.bounds("longitudinal", "take-off")]

    assert ready.shapes_at("longitudinal", "take-off", ()) == shapes[1:]
    assert ready.shapes_at("longitudinal", "take-off", (("gear", "up"),)) == [shapes[0], shapes[2]]
    assert [ready.holds_in(one, ()) for one in (up, down, either)] == [False, True, True]
    assert ready.deciding == {"gear"}
    assert of(positions=(GEAR,)).deciding == frozenset()


def test_an_external_load_decides_as_a_moving_part_does():
    with_it = box(10, "take-off", positions=(("external load", ("carried",)),))
    without = box(11, "take-off", positions=(("external load", ("none",)),))
    hook, hold = replace(place("HOOK", 120), external=True), place("HOLD", 150)
    ready = of(envelopes=(with_it, without), places=(hook, hold))
    carried = (("external load", "carried"),)

    assert (ready.external, ready.deciding, ready.outside) == (
        True,
        frozenset({"external load"}),
        frozenset({"HOOK"}),
    )
    assert [ready.holds_in(one, carried) for one in (with_it, without)] == [True, False]
    assert [ready.holds_in(one, ()) for one in (with_it, without)] == [False, True]
    assert [ready.outside_fits(one, carried) for one in (with_it, without)] == [True, False]
    assert [ready.outside_fits(one, ()) for one in (with_it, without)] == [False, True]


def test_an_external_load_decides_nothing_where_no_envelope_asks_for_it():
    hook = replace(place("HOOK", 120), external=True)
    up = box(10, "take-off", positions=(("gear", ("up",)),))
    ready = of(envelopes=(up,), places=(hook,), positions=(GEAR,))

    assert (ready.external, ready.outside) == (True, frozenset())
    assert of().external is False
    # Whatever the gear is in: only what hangs outside is asked for.
    assert ready.outside_fits(up, ()) is ready.outside_fits(up, (("external load", "carried"),)) is True


def test_lateral_limits_against_the_longitudinal_cg_are_those_of_the_phase():
    corners = (110, -2), (110, 2), (130, 3), (130, -2)
    one, two = by_cg(*corners, phases=("take-off",)), by_cg(*corners, phases=("take-off", "landing"))
    asked = replace(two, positions=(("gear", ("up",)),))
    ready = of(lateral_by_cg=(one, asked), positions=(GEAR,))

    found = {phase: ready.across(phase) for phase in PHASES}
    expected = {"take-off": (one, asked), "landing": (asked,)}
    assert found == dict.fromkeys(PHASES, ()) | expected
    assert ready.deciding == {"gear"}


def table(*points, gives="arm", against="volume", density=None):
    return TankTable(against, gives, gives, density, tuple((F(x), F(y)) for x, y in points))


def with_table(made):
    return of(tanks=(replace(tank("MAIN", 100, 60), table=made),))


@pytest.mark.parametrize(
    ("made", "volume", "moment"),
    [
        (table((0, 100), (60, 100)), F(5, 2), 1500),  # 2.5 * 6 * 100
        (table((0, 100), (60, 100)), 0, 0),
        (table((0, 100), (60, 100)), 60, 36000),
        (table((0, 90), (60, 120)), 20, 12000),  # 100 in at 20
        (table((5, 100), (60, 100)), 5, 3000),
        (table((5, 100), (60, 100)), 0, 0),
        (table((0, 100), (360, 100), against="weight", density=F(6)), 60, 36000),
        (table((0, 0), (60, 36000), gives="moment", density=F(6)), 10, 6000),
        (table((F(1, 2), F(100)), (60, 100)), F(1, 2), 300),
    ],
)
def test_the_moment_of_fuel_is_what_the_table_gives(made, volume, moment):
    ready = with_table(made)

    assert ready.fuel_moment("MAIN", F(volume), F(6)) == moment
    above, below = ready.volume_moment("MAIN", F(volume))
    assert F(above, below) == F(moment, 6)


@pytest.mark.parametrize("volume", [F(4), F(49, 10), F(601, 10), F(-1)])
def test_beyond_a_table_there_is_no_moment(volume):
    for last in 100, 110:
        with pytest.raises(OutsideTable):
            with_table(table((5, 100), (60, last))).volume_moment("MAIN", volume)


def test_an_arm_in_percent_of_the_chord():
    """From 109.5 in on 66 in long: 126 in are 16.5 in aft of its edge, a quarter."""
    ready = of()

    assert (ready.chord_percent(F(126)), ready.chord_percent(F("109.5"))) == (25, 0)
    assert of(chord=Chord(F(100), F(50), SOURCE)).chord_percent(F(90)) == -20
    assert of(chord=None).chord_percent(F(126)) is None


def test_tanks_that_feed_are_those_of_any_stage_of_the_burn():
    stages = BurnStage(("LEFT-AUX", "RIGHT-AUX")), BurnStage(("LEFT-MAIN",))
    assert of(burn_order=stages).fed == {"LEFT-AUX", "RIGHT-AUX", "LEFT-MAIN"}


def test_a_basis_is_made_ready_once_and_the_latest_are_kept(monkeypatch):
    monkeypatch.setattr(prepared_module, "MOST_KEPT", 2)
    prepared_module._KEPT.clear()
    bases = [twin() for _ in range(3)]
    one, two, three = (prepared(basis) for basis in bases)

    assert (one.basis, two.basis, three.basis) == tuple(bases)
    assert one is not two
    assert prepared(bases[2]) is three
    assert prepared(bases[1]) is two
    assert prepared(bases[0]) is not one  # the oldest was let go
    assert prepared(bases[2]) is three
    assert prepared(bases[1]) is not two
