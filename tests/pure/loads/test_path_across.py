"""The worst point against lateral limits that vary with the longitudinal CG: no sample is ever worse.

The judge is `naive_lateral`, which shares no code with the engine. Tanks, tables and orders of burning are
those drawn in `test_path_against_sampling`; the limits are drawn here: sloping, notched, with steps, as arms
and as moments.
"""

from dataclasses import replace
from fractions import Fraction

from hypothesis import assume, event, given
from hypothesis import strategies as st

from fleet.envelope import NotAnEnvelope
from fleet.lateral import LateralByCg
from loads.balance.assess import assess
from loads.balance.fuel import fuel_states
from loads.balance.path import burn_path
from loads.balance.path_across import courses_of, stays_across, worst_across
from loads.balance.prepared import prepared
from tests.drawing import drawn
from tests.pure.loads.making import SOURCE, envelope, twin_empty
from tests.pure.loads.naive_lateral import sampled_lateral
from tests.pure.loads.naive_path import assert_as_sampled
from tests.pure.loads.test_path_against_sampling import DECLARED, DRY, flights

F = Fraction
SAMPLES = 40
EVERYWHERE = envelope((-500, 1), (-500, 20000), (900, 20000), (900, 1))


@st.composite
def lateral_limits(draw, centre, spread):
    """A limit around where these loads are: corners at a few longitudinal arms, perhaps with a notch."""
    gives = draw(st.sampled_from(("arm", "moment")))
    scale = (F(1) if gives == "arm" else F(5500)) * draw(st.sampled_from((1, 6)))
    count = draw(st.integers(2, 4))
    # Few arms, close to the load's own: so the burn crosses corners, and a tank may lie on one.
    arms = sorted(draw(st.sets(st.integers(-60, 60), min_size=count, max_size=count)))
    levels = [centre + F(arm, 20) * spread for arm in arms]
    left = [(x, -F(draw(st.integers(0, 60)), 20) * scale) for x in levels]
    right = [(x, F(draw(st.integers(1, 60)), 20) * scale) for x in levels]
    corners = [*left, *reversed(right)]
    if draw(st.booleans()):  # a notch from the right, down to below the middle
        x1, x2 = levels[0], levels[1]
        (_, y1), (_, y2) = right[0], right[1]
        depth = -F(draw(st.integers(-10, 20)), 20) * scale
        notch = [(x2 - (x2 - x1) / 4, y2), ((x1 + x2) / 2, depth), (x1 + (x2 - x1) / 4, y1)]
        corners = [*left, *reversed(right[1:]), *notch, right[0]]
    phases = draw(st.sampled_from((("ramp", "take-off", "landing"), ("take-off",), ("landing",))))
    try:
        return LateralByCg("drawn", phases, gives, tuple(corners), SOURCE)
    except NotAnEnvelope:
        assume(False)
        raise


@drawn(60, 600)
@given(flights(), st.data())
def test_no_sample_is_worse_one_is_as_bad_and_outside_is_outside(flight, data):
    basis, plan = flight
    basis = replace(basis, envelopes=(EVERYWHERE,), lateral_limits_entered=True)
    declared = replace(DECLARED, fuel=plan)
    take_off = assess(declared, basis, twin_empty()).state("take-off")
    shift = data.draw(st.sampled_from((F(0), F(1, 2), F(3))))
    limit = data.draw(lateral_limits(take_off.arm + shift, data.draw(st.sampled_from((F(1, 10), F(1))))))
    basis = replace(basis, lateral_by_cg=(limit,))

    check = next(
        (one for one in assess(declared, basis, twin_empty()).checks if one.code == "path.lateral-by-cg"),
        None,
    )

    if check is None:
        assert limit.phases == ("landing",)  # nothing flies on after the landing that was planned
        return
    event(check.outcome)
    runs = sampled_lateral(declared, basis, (DRY.weight, DRY.moment, DRY.lateral_moment), SAMPLES)
    assert_as_sampled(check, runs)


@drawn(40, 300)
@given(flights(), st.data())
def test_a_move_is_tried_by_the_same_decision(flight, data):
    """`stays_across`, by which a suggested move is tried, agrees with the worst point."""
    basis, plan = flight
    basis = replace(basis, envelopes=(EVERYWHERE,))
    declared = replace(DECLARED, fuel=plan)
    states = {one.phase: one for one in assess(declared, basis, twin_empty()).states}
    path = burn_path(plan, fuel_states(plan, prepared(basis)), states)
    limit = data.draw(lateral_limits(states["take-off"].arm, F(1, 5)))
    courses = courses_of(path, ("taxi", "flight", "reserve"))

    worst = worst_across(courses, limit)

    assert (worst.room is not None and worst.room >= 0) is stays_across(courses, limit)
