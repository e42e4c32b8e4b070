"""What the bulk sums decide of the way between two phases, by hand on the plain load of `plain_decisions`.

Each envelope here binds a leg and no phase, so a load is within or open.
"""

from dataclasses import replace

import numpy as np
import pytest

from loads.balance.bulk.deciding import UNDECIDED, WITHIN, decide
from loads.balance.bulk.known import TankSums
from loads.balance.bulk.reading import Batch
from tests.pure.loads.bulk.plain_decisions import (
    ACROSS,
    ERROR,
    FAR,
    KNOWN,
    MOMENT,
    NOTHING,
    OPEN,
    WEIGHT,
    batch_of,
    box,
    found,
)

AWAY = ((-FAR, 0.0, 0.0), (FAR, 0.0, 0.0))
TAXI, TRIP, LATE = ("ramp", "take-off"), ("take-off", "landing"), ("landing", "minimum at landing")


def roomy(leg, room, *, axis="longitudinal", **more):
    """The decision where the edge lies this far aft of the greatest moment at either end of the leg."""
    moments = MOMENT if axis == "longitudinal" else ACROSS
    high = (max(moments[phase] for phase in leg) + room, 0.0, 0.0)
    batch = more.pop("batch", None)
    return found(batch, **box(AWAY[0], high, (), legs=(leg,), axis=axis, **more))


def test_both_ends_of_a_leg_must_be_inside():
    """MAIN alone feeds on the taxi and before the least fuel, so the moment goes straight from end to end."""
    for leg in TAXI, LATE:
        assert roomy(leg, 1.0) == NOTHING
        assert roomy(leg, 0.0) == OPEN
        assert roomy(leg, -1.0) == OPEN


def test_the_end_of_a_leg_counts_as_its_beginning_does():
    """The low edge as far below the lesser moment, which is that at the end."""
    for leg in TAXI, TRIP, LATE:
        low = MOMENT[leg[1]] + 1.0
        assert found(**box((low, 0.0, 0.0), AWAY[1], (), legs=(leg,))) == OPEN
    low = MOMENT["minimum at landing"] - 1.0
    assert found(**box((low, 0.0, 0.0), AWAY[1], (), legs=(LATE,))) == NOTHING


def test_tanks_of_different_arms_may_leave_the_line_between_the_ends():
    """On the trip 180 lb are burned and 20400 of moment. Fuel at 120 alone would take 21600, at 100 alone
    18000: (21600 - 20400) * (20400 - 18000) / (180 * (120 - 100)) = 800 lb in.
    """
    assert roomy(TRIP, 800.01) == NOTHING
    assert roomy(TRIP, 799.99) == OPEN


def test_across_the_lateral_arms_of_the_tanks_count():
    """Across, AUX lies at 30 and MAIN at -40: 120 lb at 30 and 60 at -40 are 1200, of 5400 and -7200 at most:
    (5400 - 1200) * (1200 + 7200) / (180 * 70) = 2800.
    """
    assert roomy(TRIP, 2800.01, axis="lateral") == NOTHING
    assert roomy(TRIP, 2799.99, axis="lateral") == OPEN


def test_the_slopes_of_one_table_leave_the_line_as_two_arms_do():
    """MAIN of slopes from 90 to 110 on the taxi: 12 lb at 100, so (1320 - 1200) * (1200 - 1080) / (12 * 20)
    = 60.
    """
    main, aux = KNOWN.tanks
    bent = TankSums(main.volumes, main.values, True, 100.0, (90.0, 110.0), main.lateral)

    def at(room):
        high = (MOMENT["ramp"] + room, 0.0, 0.0)
        return found(tanks=(bent, aux), **box(AWAY[0], high, (), legs=(TAXI,)))

    assert (at(60.01), at(59.99)) == (NOTHING, OPEN)


def test_a_bent_margin_falls_by_the_square_of_what_is_burned():
    """228 lb from landing to the least fuel, and 0.01 * 228**2 = 519.84; on the taxi 12 lb, 1.44."""
    assert roomy(LATE, 519.85, bent=0.01) == NOTHING
    assert roomy(LATE, 519.83, bent=0.01) == OPEN
    assert roomy(TAXI, 1.45, bent=0.01) == NOTHING
    assert roomy(TAXI, 1.43, bent=0.01) == OPEN
    assert roomy(TRIP, 800 + 324.01, bent=0.01) == NOTHING
    assert roomy(TRIP, 800 + 323.99, bent=0.01) == OPEN


def test_a_leg_needs_room_for_the_errors():
    """The bound on a moment is 4 * 151 (HOLD and SHELF reach to 151) times that on a weight; on a margin to
    an edge twice that and 110 times that on a weight and 8 roundings of the parts, 440000; on a leg four
    times this.
    """
    margin = 2 * (4 * 151 * ERROR + 110 * ERROR + 8 * 2.0**-53 * 440000)

    assert roomy(TAXI, 3.99 * margin) == OPEN
    assert roomy(TAXI, 4.01 * margin) == NOTHING
    assert found(**box(AWAY[0], (MOMENT["ramp"] + 0.99 * margin, 0.0, 0.0), ("ramp",))) == OPEN
    assert found(**box(AWAY[0], (MOMENT["ramp"] + 1.01 * margin, 0.0, 0.0), ("ramp",))) == NOTHING


def test_the_parts_an_edge_is_summed_of_count_by_their_roundings():
    """8 roundings of parts of 10**10 are some 20 times what the other errors come to."""
    margin = 2 * (4 * 151 * ERROR + 110 * ERROR + 8 * 2.0**-53 * 1e10)

    def at(room):
        return found(**box(AWAY[0], (MOMENT["ramp"] + room, 0.0, 0.0), ("ramp",), size=1e10))

    assert (at(0.99 * margin), at(1.01 * margin)) == (OPEN, NOTHING)


def test_a_taxi_that_burns_nothing_has_no_leg():
    def taxied(volume):
        known = box((FAR, 0.0, 0.0), (2 * FAR, 0.0, 0.0), (), legs=(TAXI,))
        return found(batch_of(taxi=volume), **known)

    assert taxied(0.0) == NOTHING
    assert taxied(0.5) == OPEN


def test_a_trip_that_burns_nothing_has_one_all_the_same():
    known = box((FAR, 0.0, 0.0), (2 * FAR, 0.0, 0.0), (), legs=(TRIP,))

    assert found(batch_of(trip=0.0), **known) == OPEN


def cornered(level, low, high, leg=LATE):
    return found(**box(*AWAY, (), legs=(leg,), inner=((level, low, high),)))


def test_at_the_weight_of_a_corner_crossed_the_straight_line_must_be_inside_too():
    """At 2300, 40 lb above the least fuel, the moment is 221700 + 4000."""
    there = 225700.0

    assert cornered(2300.0, there - 1, there + 1) == NOTHING
    assert cornered(2300.0, there + 1, there + 9) == OPEN
    assert cornered(2300.0, there - 9, there - 1) == OPEN
    assert cornered(2300.0, there, there + 9) == OPEN


def test_a_corner_that_is_not_crossed_does_not_count():
    for level in 2259.9, 2488.1:
        assert cornered(level, FAR, FAR) == NOTHING
    for level in 2260.0, 2260.0 - 0.9 * ERROR, 2488.0, 2488.0 + 0.9 * ERROR:
        assert cornered(level, FAR, FAR) == OPEN


def test_a_corner_at_an_end_is_judged_by_the_moment_there():
    for phase in LATE:
        moment = MOMENT[phase]
        assert cornered(float(WEIGHT[phase]), moment - 1.0, moment + 1.0) == NOTHING
        assert cornered(float(WEIGHT[phase]), moment - 9.0, moment - 1.0) == OPEN


def test_of_several_corners_the_least_room_counts():
    inside, outside = (2300.0, 225000.0, 226000.0), (2400.0, 0.0, 1.0)

    for inner in (inside, outside), (outside, inside):
        assert found(**box(*AWAY, (), legs=(LATE,), inner=inner)) == OPEN
    assert found(**box(*AWAY, (), legs=(LATE,), inner=(inside, (2100.0, 0.0, 1.0)))) == NOTHING


def test_a_corner_counts_for_the_loads_that_cross_it():
    """Of two loads, with 10 and with 30 US gal at the least, the second is at 2380 lb then."""
    one, other = batch_of(), batch_of(least=30.0)
    both = Batch(*(np.concatenate([getattr(each, name) for each in (one, other)]) for name in one.__slots__))

    for level, verdicts in (2300.0, [UNDECIDED, WITHIN]), (2400.0, [UNDECIDED, UNDECIDED]):
        known = box(*AWAY, (), legs=(LATE,), inner=((level, FAR, FAR),))
        assert decide(replace(KNOWN, **known), both).verdict.tolist() == verdicts


def test_on_the_trip_a_corner_needs_room_for_what_leaves_the_line():
    """At 2578, half way, the line is at (264900 + 244500) / 2 = 254700; 800 lb in may be between."""
    assert cornered(2578.0, 0.0, 254700 + 800.01, leg=TRIP) == NOTHING
    assert cornered(2578.0, 0.0, 254700 + 799.99, leg=TRIP) == OPEN


def test_an_end_so_near_a_corner_that_its_edge_is_not_sure_leaves_the_load_open():
    for weight in (2680.0, 2668.0):
        known = box(*AWAY, (), legs=(TAXI,), levels=(1000.0, weight, 4000.0))
        assert found(**known) == OPEN


@pytest.mark.parametrize("batch", [None, batch_of(trip=10.0), batch_of(taxi=0.0)])
def test_several_legs_are_judged_each(batch):
    """The plain envelope of the basis holds every one of them."""
    assert found(batch)[0] == WITHIN
    shut = box((FAR, 0.0, 0.0), (2 * FAR, 0.0, 0.0), (), legs=(TAXI, TRIP, LATE))
    assert found(batch, **shut)[0] == UNDECIDED
