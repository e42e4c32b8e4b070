"""What the bulk sums decide, worked by hand on the plain load of `plain_decisions`."""

from dataclasses import replace

import numpy as np
import pytest

from fleet.basis import PHASES, Zone
from loads.balance.bulk.deciding import OUTSIDE, UNDECIDED, WITHIN, decide
from loads.balance.bulk.reading import Batch
from tests.pure.loads.bulk.plain_basis import plain_basis, plainly_known
from tests.pure.loads.bulk.plain_decisions import (
    ACROSS,
    ERROR,
    FAR,
    INFINITE,
    KNOWN,
    MOMENT,
    NOTHING,
    OPEN,
    WEIGHT,
    batch_of,
    box,
    found,
    held,
)
from tests.pure.loads.making import limit


def test_the_plain_load_is_within():
    assert found() == NOTHING


@pytest.mark.parametrize("phase", PHASES)
def test_each_limit_of_weight_is_judged_at_its_phase(phase):
    weight, free = WEIGHT[phase], dict.fromkeys(PHASES, INFINITE)
    code = f"weight.{phase.replace(' ', '-')}"

    assert found(limits=free | {phase: weight - 1.0}) == (OUTSIDE, code, 1.0)
    assert found(limits=free | {phase: float(weight)}) == OPEN
    assert found(limits=free | {phase: weight + 1.0}) == NOTHING


def test_within_the_bound_on_the_error_nothing_is_decided_and_beyond_it_all_is():
    free = dict.fromkeys(PHASES, INFINITE)

    def at(room):
        return found(limits=free | {"ramp": 2680 + room})[0]

    assert (at(-1.01 * ERROR), at(-0.99 * ERROR)) == (OUTSIDE, UNDECIDED)
    assert (at(0.99 * ERROR), at(1.01 * ERROR)) == (UNDECIDED, WITHIN)


def test_loads_together_are_decided_within_the_same_bound():
    free = dict.fromkeys(PHASES, INFINITE)
    one = batch_of()
    three = Batch(*(np.repeat(getattr(one, name), 3, axis=0) for name in one.__slots__))

    for room, verdict in (1.01 * ERROR, WITHIN), (0.99 * ERROR, UNDECIDED):
        decision = decide(replace(KNOWN, limits=free | {"ramp": 2680 + room}), three)
        assert decision.verdict.tolist() == [verdict] * 3


def test_the_bound_grows_with_an_empty_weight_below_zero_as_with_one_above():
    """-2500 in sum with 480 of fuel and 185: |-2500| + 665 = 3165 lb instead of 2680."""
    free = dict.fromkeys(PHASES, INFINITE)
    below = (-2500.0, 200900.0, -595.0)
    error = ERROR * 3165 / 2680

    def at(room):
        return found(base=below, bounds=(), minimum_flying=None, limits=free | {"ramp": -2500 + 665 + room})

    assert at(-1.01 * error)[:2] == (UNDECIDED, "weight.ramp")  # more was taken out than there is
    assert at(-0.99 * error) == OPEN


def test_the_least_weight_flown_is_the_lightest_there_is():
    assert found(minimum_flying=2261.0) == (OUTSIDE, "weight.minimum-flying", 1.0)
    assert found(minimum_flying=2260.0) == OPEN
    assert found(minimum_flying=2259.0) == NOTHING
    assert found(minimum_flying=None) == NOTHING


def test_limits_stated_with_the_load_are_judged():
    assert found(batch_of(take_off=2667.0)) == (OUTSIDE, "performance.take-off", 1.0)
    assert found(batch_of(take_off=2668.0)) == OPEN
    assert found(batch_of(take_off=2669.0)) == NOTHING
    assert found(batch_of(landing=2487.5)) == (OUTSIDE, "performance.landing", 0.5)
    assert found(batch_of(landing=2488.0)) == OPEN
    assert found(batch_of(landing=2489.0)) == NOTHING


def test_the_fuel_at_landing_is_judged_as_a_weight():
    """48 US gal are left."""
    assert found(batch_of(least=49.0)) == (OUTSIDE, "fuel.minimum-at-landing", 6.0)
    assert found(batch_of(least=48.0)) == OPEN
    assert found(batch_of(least=47.0)) == NOTHING


def test_fuel_in_a_tank_that_feeds_nothing_stays_and_is_none_to_land_with():
    """Only MAIN feeds: 58 less 30 leaves 28 to land with; 20 in AUX stay, so 2320 without fuel."""
    main = {"burn_order": ((0,),)}
    free = dict.fromkeys(PHASES, INFINITE)

    assert found(batch_of(least=29.0), **main) == (OUTSIDE, "fuel.minimum-at-landing", 6.0)
    assert found(batch_of(least=27.0), **main) == NOTHING
    zero = found(limits=free | {"zero fuel": 2319.0}, **main)
    assert zero == (OUTSIDE, "weight.zero-fuel", 1.0)


def test_tanks_that_may_not_hold_what_is_burned_are_left_to_the_exact_sum():
    """MAIN alone taxies; 58 and 20 are there for the trip."""
    assert found(batch_of(taxi=60.0, usable=[60.0, 45.0]), bounds=()) == OPEN
    assert found(batch_of(taxi=59.0, usable=[60.0, 45.0]), bounds=()) == NOTHING
    assert found(batch_of(taxi=0.5, usable=[0.5, 45.0]), bounds=()) == OPEN
    assert found(batch_of(trip=78.0, least=0.0))[0] == UNDECIDED
    assert found(batch_of(trip=77.0, least=0.0)) == NOTHING
    assert found(batch_of(usable=[0.0, 49.0], taxi=0.0, trip=38.0)) == NOTHING
    assert found(batch_of(usable=[0.0, 0.0], taxi=0.0, trip=0.0, least=-1.0)) == NOTHING


def test_a_load_that_may_be_refused_is_not_called_outside():
    assert found(batch_of(trip=90.0), minimum_flying=9000.0)[0] == UNDECIDED


def test_the_bound_on_a_volume_is_that_of_the_weight_over_the_least_density():
    def left(volume):
        known = {"bounds": (), "minimum_flying": None}
        return found(batch_of(taxi=0.0, trip=80.0 - volume, least=-1.0), **known)[0]

    assert (left(0.99 * ERROR / 6), left(1.02 * ERROR / 6)) == (UNDECIDED, WITHIN)


def test_of_an_aircraft_that_weighs_nothing_without_fuel_nothing_is_said():
    light = {"bounds": (), "minimum_flying": None}

    assert found(base=(-185.0, 0.0, 0.0), **light) == OPEN
    assert found(base=(-184.0, 0.0, 0.0), **light) == NOTHING


def test_seats_and_places_are_judged():
    assert found(batch_of(held=held(LEFT=251))) == (OUTSIDE, "seat.LEFT", 1.0)
    assert found(batch_of(held=held(LEFT=250))) == OPEN
    assert found(batch_of(held=held(LEFT=249))) == NOTHING
    assert found(batch_of(held=held(LEFT=1, SPARE=302))) == (OUTSIDE, "seat.SPARE", 2.0)
    assert found(batch_of(held=held(HOLD=103))) == (OUTSIDE, "place.HOLD", 3.0)
    assert found(batch_of(held=held(SHELF=24))) == (OUTSIDE, "place.SHELF", 4.0)


def test_a_limit_of_an_empty_spot_has_nothing_to_test():
    nothing = np.array([250.0, 0.0, 0.0, 300.0, 100.0, 20.0])

    assert found(caps=nothing) == NOTHING
    assert found(batch_of(held=held(RIGHT=0.5)), caps=nothing) == (OUTSIDE, "seat.RIGHT", 0.5)


def test_a_spot_whose_limit_was_not_entered_is_open_once_it_holds_anything():
    assert found(unknown=(2, 4)) == NOTHING
    assert found(batch_of(held=held(BACK=1)), unknown=(2, 4)) == OPEN
    assert found(batch_of(held=held(HOLD=0.5)), unknown=(2, 4)) == OPEN


def zoned(*zones):
    known = plainly_known(replace(plain_basis(), zones=zones))
    names = ("zones", "zone_caps", "zone_codes", "unknown_zones")
    return {name: getattr(known, name) for name in names}


def test_zones_are_judged_by_the_sum_of_what_they_hold():
    rear = Zone("REAR", "rear", ("RIGHT", "HOLD"), limit(120))
    both = zoned(Zone("WIDE", "wide", ("LEFT", "RIGHT"), limit(900)), rear)

    assert found(batch_of(held=held(RIGHT=71, HOLD=50)), **both) == (OUTSIDE, "zone.REAR", 1.0)
    assert found(batch_of(held=held(RIGHT=70, HOLD=50)), **both) == OPEN
    assert found(batch_of(held=held(RIGHT=69, HOLD=50)), **both) == NOTHING


def test_a_zone_that_takes_nothing_is_broken_by_anything():
    shut = zoned(Zone("REAR", "rear", ("RIGHT", "HOLD"), limit(0)))

    assert found(**shut) == NOTHING
    assert found(batch_of(held=held(HOLD=0.5)), **shut) == (OUTSIDE, "zone.REAR", 0.5)


def test_a_zone_whose_limit_was_not_entered_is_open_once_it_holds_anything():
    unknown = zoned(Zone("REAR", "rear", ("RIGHT", "HOLD"), None))

    assert found(**unknown) == NOTHING
    assert found(batch_of(held=held(HOLD=1)), **unknown) == OPEN
    assert found(batch_of(held=held(RIGHT=1)), **unknown) == OPEN


def test_of_two_loads_the_one_that_holds_anything_there_is_open():
    one, other = batch_of(), batch_of(held=held(HOLD=1))
    both = Batch(*(np.concatenate([getattr(each, name) for each in (one, other)]) for name in one.__slots__))
    zone = zoned(Zone("REAR", "rear", ("RIGHT", "HOLD"), None))

    for known in zone, {"unknown": (4,)}:
        assert decide(replace(KNOWN, **known), both).verdict.tolist() == [WITHIN, UNDECIDED]


def test_what_is_open_for_one_reason_stays_so():
    free = dict.fromkeys(PHASES, INFINITE)
    zone = zoned(Zone("REAR", "rear", ("RIGHT", "HOLD"), None))

    assert found(limits=free | {"ramp": 2680.0}, **zone) == OPEN
    assert found(limits=free | {"ramp": 2680.0}, unknown=(4,)) == OPEN


def test_of_several_limits_broken_the_first_stands():
    free = dict.fromkeys(PHASES, INFINITE)
    heavy = batch_of(held=held(LEFT=260), take_off=2700.0)

    assert found(heavy, limits=free | {"ramp": 2745.0}) == (OUTSIDE, "weight.ramp", 10.0)
    assert found(heavy) == (OUTSIDE, "performance.take-off", 43.0)
    assert found(batch_of(held=held(LEFT=260))) == (OUTSIDE, "seat.LEFT", 10.0)


def test_many_loads_are_decided_each_for_itself():
    """More than are summed at once; the first, the last of the first lot and the first of the next differ."""
    count = 4100
    one = batch_of()
    columns = {name: np.repeat(getattr(one, name), count, axis=0) for name in one.__slots__}
    columns["held"][0, 0] = 251.0
    columns["held"][4095, 4] = 103.0
    columns["held"][4096, 0] = 250.0
    columns["take_off"][4099] = 2667.0

    decision = decide(KNOWN, Batch(**columns))

    verdicts = decision.verdict.tolist()
    different = {row: verdict for row, verdict in enumerate(verdicts) if verdict != WITHIN}
    assert different == {0: OUTSIDE, 4095: OUTSIDE, 4096: UNDECIDED, 4099: OUTSIDE}
    limits = {row: code for row, code in enumerate(decision.limit) if code}
    assert limits == {0: "seat.LEFT", 4095: "place.HOLD", 4099: "performance.take-off"}
    assert {row: decision.excess[row] for row in np.flatnonzero(decision.excess)} == {0: 1, 4095: 3, 4099: 1}


@pytest.mark.parametrize("axis", ["longitudinal", "lateral"])
@pytest.mark.parametrize("phase", PHASES)
def test_each_envelope_is_judged_at_its_phases_to_both_sides(phase, axis):
    moment = (MOMENT if axis == "longitudinal" else ACROSS)[phase]
    weight = WEIGHT[phase]
    code = f"{'cg' if axis == 'longitudinal' else 'lateral'}.{phase.replace(' ', '-')}"

    def edged(room, side):
        # An edge of 5 W + W**2 / 100 and what else there is to the moment.
        slope = (5.0, 0.01)
        e0 = moment - side * room - slope[0] * weight - slope[1] * weight**2
        edge, away = (e0, *slope), (side * FAR, 0.0, 0.0)
        low, high = (edge, away) if side > 0 else (away, edge)
        return found(**box(low, high, (phase,), axis=axis))

    for side in (1, -1):
        verdict, name, excess = edged(-1.0, side)
        assert (verdict, name, round(excess, 6)) == (OUTSIDE, code, 1.0)
        assert edged(0.0, side) == OPEN
        assert edged(1.0, side) == NOTHING


def test_beyond_all_weights_of_an_envelope_a_load_is_outside_without_end():
    low, high = (-FAR, 0.0, 0.0), (FAR, 0.0, 0.0)

    for levels in (1000.0, 2667.0), (2669.0, 4000.0):
        around = box(low, high, ("take-off",), levels=levels)
        assert found(**around) == (OUTSIDE, "cg.take-off", INFINITE)
    for levels in (1000.0, 2669.0), (2667.0, 4000.0):
        assert found(**box(low, high, ("take-off",), levels=levels)) == NOTHING


def test_at_the_weight_of_a_corner_no_edge_is_sure():
    low, high = (0.0, 0.0, 0.0), (1.0, 0.0, 0.0)  # far from any moment here

    for levels in (1000.0, 2668.0), (2668.0, 4000.0), (1000.0, 2668.0, 4000.0):
        assert found(**box(low, high, ("take-off",), levels=levels)) == OPEN
    beside = box(low, high, ("take-off",), levels=(1000.0, 2668.0 + 1.1 * ERROR, 4000.0))
    assert found(**beside)[:2] == (OUTSIDE, "cg.take-off")
    near = box(low, high, ("take-off",), levels=(1000.0, 2668.0 + 0.9 * ERROR, 4000.0))
    assert found(**near) == OPEN


@pytest.mark.parametrize(
    ("levels", "here"),
    [
        ((2400.0, 2600.0, 3000.0, 4000.0), 0),
        ((1000.0, 2400.0, 2600.0, 4000.0), 1),
        ((1000.0, 2000.0, 2400.0, 2600.0), 2),
    ],
)
def test_between_two_corners_the_edges_there_hold(levels, here):
    """Landing is at 2488: between those two the aft edge lies at 1, or everywhere but there."""
    around = box((-FAR, 0.0, 0.0), (FAR, 0.0, 0.0), ("landing",), levels=levels)
    (bounds,) = around["bounds"]
    bounds.outline.high[here] = (1.0, 0.0, 0.0)

    assert found(**around) == (OUTSIDE, "cg.landing", 244499.0)
    bounds.outline.high[:] = (1.0, 0.0, 0.0)
    bounds.outline.high[here] = (FAR, 0.0, 0.0)
    assert found(**around) == NOTHING
