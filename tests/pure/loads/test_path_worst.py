"""Which envelope holds where along a path, and its worst point of all, each told in full: worked by hand."""

from dataclasses import replace
from fractions import Fraction

import pytest

from fleet.positions import MovingPart, PartState
from loads.balance.path import Knot, Path, Stretch, Turn
from loads.balance.path_worst import (
    Burn,
    Worst,
    bounds_on,
    burn_of,
    shifted,
    stays_inside,
    worst_at_zero_fuel,
    worst_turn,
)
from loads.balance.prepared import prepared
from loads.balance.surd import Surd
from tests.pure.loads.making import SOURCE, envelope, twin

F = Fraction
FLIGHT = ("take-off", "landing")


def box(low, high, *phases, axis="longitudinal", least=50, most=100):
    """An envelope from one arm to another at every weight between two."""
    corners = ((low, least), (low, most), (high, most), (high, least))
    return envelope(*corners, phases=phases, axis=axis)


def ready_with(*envelopes, positions=()):
    return prepared(replace(twin(), envelopes=envelopes, positions=positions))


def flown(leg, top, bottom, arms, across=(0, 0), **more):
    """A stretch from one weight to another with the arms at its two ends."""
    start, end = (
        Knot(F(weight), weight * F(arm), weight * F(lateral))
        for weight, arm, lateral in zip((top, bottom), arms, across, strict=True)
    )
    return Stretch(leg, ("LEFT",), start, end, F(0), **more)


TAXI = flown("taxi", 90, 88, (15, 15), (1, 1))
TRIP = flown("flight", 88, 70, (15, 17), (1, -2))
RESERVE = flown("reserve", 70, 60, (17, 18), (-2, -3))
PATH = Path((TAXI, TRIP, RESERVE), (), F(6))


def event(where, *knots, leg="flight", swept=False, **more):
    """A jump at 80 lb; `knots` are (arm, lateral arm)."""
    made = tuple((Knot(F(80), 80 * F(arm), 80 * F(lateral)), {"LEFT": F(arm)}) for arm, lateral in knots)
    return Turn(leg, where, made, swept, F(55), **more)


def test_the_worst_point_is_told_with_the_nearest_part_of_its_envelope():
    both = box(10, 20, "ramp", "take-off", "landing"), box(-9, 4, *FLIGHT, axis="lateral")
    ready = ready_with(*both)

    burn = burn_of(PATH, ready)

    (along,), (across,) = ready.bounds("longitudinal", "ramp"), ready.bounds("lateral", "landing")
    last, first = RESERVE.end, TRIP.start
    assert burn == Burn(
        PATH,
        {
            "longitudinal": Worst(along, RESERVE, last, F(18), F(10), F(20), F(2), True),
            # 1 in right at take-off, 3 in from the right limit; 3 in left at the end, 6 in from the left.
            "lateral": Worst(across, TRIP, first, F(1), F(-9), F(4), F(3), True),
        },
    )


@pytest.mark.parametrize(
    ("phases", "at", "room"),
    [
        (("ramp",), TAXI.start, 1),  # 15 in, of 14 to 30
        (("take-off",), TRIP.start, 1),
        (("landing",), RESERVE.start, 3),  # from 70 lb on it may land
        (("ramp", "landing"), TAXI.start, 1),
        (("take-off", "landing"), TRIP.start, 1),
    ],
)
def test_an_envelope_holds_from_its_phase_on(phases, at, room):
    found = burn_of(PATH, ready_with(box(14, 30, *phases))).worst["longitudinal"]

    assert (found.knot.weight, found.room, found.aft) == (at.weight, room, False)


def test_an_envelope_for_zero_fuel_alone_does_not_hold_along_the_burn():
    assert burn_of(PATH, ready_with(box(14, 15, "zero fuel"))).worst == {}


def test_of_several_envelopes_the_least_room_counts_and_of_equals_the_one_of_take_off():
    wide, narrow = box(10, 30, "take-off"), box(14, 30, "landing")

    assert burn_of(PATH, ready_with(narrow, wide)).worst["longitudinal"].room == 3
    even = box(12, 30, "take-off"), box(14, 30, "landing")
    for order in (even, even[::-1]):
        found = burn_of(PATH, ready_with(*order)).worst["longitudinal"]
        assert (found.bound[0], found.room, found.knot) == (even[0], 3, TRIP.start)


def test_beyond_every_weight_of_an_envelope_there_is_no_room_and_that_is_worst():
    low, tight = box(0, 30, *FLIGHT, most=85), box(15, 16, *FLIGHT)
    ready = ready_with(tight, low)

    found = burn_of(PATH, ready).worst["longitudinal"]

    bound = next(each for each in ready.bounds("longitudinal", "take-off") if each[0] is low)
    assert found == Worst(bound, TRIP, TRIP.start, F(15), None, None, None, False)


def test_a_path_that_burns_nothing_has_no_worst_point():
    assert burn_of(Path((), (), F(6)), ready_with(box(10, 20, *FLIGHT))).worst == {}


def test_the_envelopes_of_a_leg_are_those_of_its_phases():
    ramp, trip, land = box(10, 20, "ramp"), box(10, 21, "take-off"), box(10, 22, "landing")
    ready = ready_with(land, ramp, trip, box(10, 23, "zero fuel"))

    assert [bound[0] for bound in bounds_on("taxi", ready)] == [ramp]
    assert [bound[0] for bound in bounds_on("flight", ready)] == [trip]
    assert [bound[0] for bound in bounds_on("reserve", ready)] == [trip, land]
    everywhere = box(10, 20, "ramp", *FLIGHT)
    assert [bound[0] for bound in bounds_on("reserve", ready_with(everywhere))] == [everywhere]


@pytest.mark.parametrize(
    ("arm", "low", "high", "room", "aft"),
    [
        (12, 10, 20, 2, False),
        (15, 10, 20, 5, False),
        (19, 10, 20, 1, True),
        (8, 10, 20, -2, False),
        (23, 10, 20, -3, True),
        (20, 10, 20, 0, True),
    ],
)
def test_a_jump_is_judged_at_its_one_weight(arm, low, high, room, aft):
    ready = ready_with(box(10, 20, *FLIGHT))
    (bound,) = ready.bounds("longitudinal", "take-off")
    turn = event("just after event 1", (arm, 3))

    found = worst_turn(bound, turn, "longitudinal")

    knot = turn.knots[0][0]
    here = Stretch("flight", (), knot, knot, F(0), ({"LEFT": F(arm)}, F(0)), F(55), "just after event 1")
    assert found == Worst(bound, here, knot, F(arm), F(low), F(high), F(room), aft)


def test_of_several_points_of_an_event_the_worst_counts_and_of_two_pieces_the_nearer():
    forked = envelope((0, 50), (0, 100), (3, 100), (3, 60), (6, 60), (6, 100), (9, 100), (9, 50))
    (bound,) = ready_with(forked).bounds("longitudinal", "take-off")

    points = worst_turn(bound, event("", (1, 0), (F(17, 2), 0), (7, 0)), "longitudinal")
    swept = worst_turn(bound, event("", (1, 0), (4, 2), (7, 4), swept=True), "longitudinal")

    assert (points.arm, points.low, points.high, points.room) == (F(17, 2), 6, 9, F(1, 2))
    # From one piece into the other: worst half way between them, 1.5 in from either.
    assert (swept.arm, swept.room, swept.knot.lateral_moment) == (F(9, 2), F(-3, 2), 80 * F(7, 3))


def test_an_event_at_a_weight_the_envelope_does_not_have_has_no_room():
    (bound,) = ready_with(box(10, 20, *FLIGHT, most=79)).bounds("longitudinal", "take-off")
    turn = event("just after event 1", (15, 3), (16, 3))

    found = worst_turn(bound, turn, "longitudinal")

    assert (found.knot, found.arm, found[4:]) == (turn.knots[0][0], F(15), (None, None, None, False))


def test_of_equals_an_event_is_named_rather_than_the_burn_beside_it():
    jump = event("just before event 1", (18, -3))

    found = burn_of(replace(PATH, turns=(jump,)), ready_with(box(10, 20, *FLIGHT))).worst["longitudinal"]

    assert (found.stretch.setting, found.room) == ("just before event 1", 2)


@pytest.mark.parametrize(
    ("leg", "phase", "judged"),
    [
        ("taxi", "ramp", True),
        ("taxi", "take-off", False),
        ("flight", "take-off", True),
        ("flight", "landing", False),
        ("reserve", "landing", True),
        ("reserve", "ramp", False),
    ],
)
def test_an_event_is_judged_by_the_envelopes_of_its_leg(leg, phase, judged):
    path = Path((), (), F(6), (event("jump", (25, 5), leg=leg),))

    for axis, limits in (("longitudinal", (10, 20)), ("lateral", (-1, 1))):
        found = burn_of(path, ready_with(box(*limits, phase, axis=axis))).worst
        assert (axis in found) is judged


def test_moments_are_added_to_every_point_of_a_path():
    path = replace(
        PATH,
        turns=(event("jump", (15, 0), (16, 1)),),
        settings=(TRIP._replace(setting="gear up"),),
        zero_fuel=(event("at zero fuel", (14, 2)),),
    )

    moved = shifted(path, F(80), F(-160))

    def by(knot):
        return (knot.weight, knot.moment - 80, knot.lateral_moment + 160)

    every = (*moved.stretches, *moved.settings)
    assert [by(each.start) for each in every] == [each.start[:3] for each in (TAXI, TRIP, RESERVE, TRIP)]
    assert [by(each.end) for each in every] == [each.end[:3] for each in (TAXI, TRIP, RESERVE, TRIP)]
    assert moved.turns == (event("jump", (16, -2), (17, -1))._replace(knots=moved.turns[0].knots),)
    assert [(knot.moment / 80, held) for knot, held in moved.turns[0].knots] == [
        (16, {"LEFT": 15}),
        (17, {"LEFT": 16}),
    ]
    (zero,) = moved.zero_fuel
    assert [(knot.moment / 80, knot.lateral_moment / 80) for knot, _ in zero.knots] == [(15, 0)]
    assert (moved.gaps, moved.density, moved.settings[0].setting) == ((), F(6), "gear up")


@pytest.mark.parametrize(
    ("along", "across", "inside"),
    [
        (0, 0, True),
        (120, 0, True),  # 18 in at 60 lb, 20 in with 120 lb in more
        (121, 0, False),
        (-440, 0, True),  # 15 in at 88 lb
        (-441, 0, False),
        (0, 440, False),
        (0, 264, True),  # 1 in at 88 lb, 4 in with 264 lb in more
        (0, 265, False),
        (0, -361, False),
        (0, -360, True),  # 3 in left at 60 lb
    ],
)
def test_a_path_moved_by_some_moment_stays_inside_or_does_not(along, across, inside):
    ready = ready_with(box(10, 20, *FLIGHT), box(-9, 4, *FLIGHT, axis="lateral"))

    assert stays_inside(PATH, ready, F(along), F(across)) is inside


def test_a_path_beyond_an_envelope_does_not_stay_inside_nor_does_an_event_or_zero_fuel():
    ready = ready_with(box(10, 20, *FLIGHT, "zero fuel"))

    assert not stays_inside(PATH, ready_with(box(0, 30, *FLIGHT, most=85)), F(0), F(0))
    on, out = event("jump", (20, 0)), event("jump", (21, 0))
    assert stays_inside(replace(PATH, turns=(on,)), ready, F(0), F(0))
    assert not stays_inside(replace(PATH, turns=(out,)), ready, F(0), F(0))
    assert stays_inside(replace(PATH, zero_fuel=(on, on)), ready, F(0), F(0))
    assert not stays_inside(replace(PATH, zero_fuel=(on, out)), ready, F(0), F(0))
    beyond = out._replace(knots=((Knot(F(120), F(1800), F(0)), {}),))
    assert not stays_inside(replace(PATH, turns=(beyond,)), ready, F(0), F(0))


def test_zero_fuel_over_the_flight_is_worst_where_it_has_the_least_room():
    path = replace(PATH, zero_fuel=(event("at zero fuel", (13, 0)), event("after event 1", (18, 0))))
    tight, wide = box(12, 20, "zero fuel"), box(2, 40, "zero fuel")
    ready = ready_with(wide, tight)

    (found,) = worst_at_zero_fuel(path, "longitudinal", ready)

    assert (found.bound[0], found.stretch.setting, found.room) == (tight, "at zero fuel", 1)
    assert worst_at_zero_fuel(PATH, "longitudinal", ready) == []
    assert worst_at_zero_fuel(path, "lateral", ready) == []
    beyond = ready_with(tight, box(0, 99, "zero fuel", most=60))
    assert worst_at_zero_fuel(path, "longitudinal", beyond)[0].room is None


def gear(state, words):
    return PartState(state, words, F(0), ("ground", "flight"), SOURCE)


GEAR = MovingPart("GEAR", "gear", "DOWN", (gear("DOWN", "down"), gear("UP", "up")))


def test_an_envelope_of_a_gear_position_holds_where_the_gear_is_in_it():
    down, up = ("GEAR", "DOWN"), ("GEAR", "UP")
    only_up = replace(box(10, 20, *FLIGHT), positions=(("GEAR", ("UP",)),))
    only_up = replace(only_up, id="up")
    ready = ready_with(only_up, positions=(GEAR,))

    def worst(path):
        return burn_of(path, ready).worst.get("longitudinal")

    assert worst(PATH) is None
    assert worst(replace(PATH, settings=(TRIP._replace(parts=(up,)),))).room == 3
    assert worst(replace(PATH, settings=(TRIP._replace(parts=(down,)),))) is None
    jump = event("jump", (15, 0), parts=(up,))
    assert worst(replace(PATH, turns=(jump,))).room == 5
    assert worst(replace(PATH, turns=(jump._replace(parts=(down,)),))) is None
    assert [bound[0] for bound in bounds_on("flight", ready)] == [only_up]


def test_settings_count_across_the_aircraft_only_where_they_decide_which_envelope_holds():
    lateral = box(-9, 4, *FLIGHT, axis="lateral")
    path = replace(PATH, settings=(flown("flight", 88, 70, (15, 15), (4, 4)),))
    of_up = replace(lateral, id="up", positions=(("GEAR", ("UP",)),))

    assert burn_of(path, ready_with(lateral)).worst["lateral"].room == 3
    assert burn_of(path, ready_with(lateral, of_up, positions=(GEAR,))).worst["lateral"].room == 0


def test_an_irrational_worst_point_is_told_by_a_point_of_the_path_beside_it():
    # The forward edge is 20 - W/10, the arm 480/W + c: nearest at sqrt(4800) lb, by c - 20 + 2 sqrt(48) in.
    leaning = envelope((15, 50), (10, 100), (40, 100), (40, 50), phases=FLIGHT)
    dip = Surd(F(0), F(40), F(3))

    def told(c):
        start, end = (Knot(F(w), 480 + c * F(w), F(0)) for w in (88, 60))
        stretch = Stretch("flight", ("LEFT",), start, end, F(0))
        return burn_of(Path((stretch,), (), F(6)), ready_with(leaning)).worst["longitudinal"]

    inside, outside = told(F(8)), told(F(6))

    for found, margin in ((inside, Surd(F(-12), F(8), F(3))), (outside, Surd(F(-14), F(8), F(3)))):
        weight = found.knot.weight
        assert weight == dip.floor(80)
        assert found.room == margin.floor(80)
        assert found.arm == found.knot.moment / weight
        assert (found.low, found.high, found.aft) == (20 - weight / 10, F(40), False)
    assert outside.arm < outside.low
