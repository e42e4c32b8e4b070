"""Lateral limits against the longitudinal CG on flights with events: no sample is worse, outside is outside.

The flights are those of `test_sequence_against_sampling`, the limits those of `test_path_across`; the judges
are `naive_sequence` and `naive_lateral`, which share no code with the engine. Transfers are sampled, too.
"""

from dataclasses import replace
from fractions import Fraction
from itertools import product

from hypothesis import assume, event, given
from hypothesis import strategies as st

from loads.balance.assess import assess
from loads.balance.events import Event, Transfer
from tests.drawing import drawn
from tests.pure.loads.making import twin_empty
from tests.pure.loads.naive_lateral import margin, place_of
from tests.pure.loads.naive_path import PHASES_OF, assert_as_sampled, drawn_down
from tests.pure.loads.naive_sequence import points_of_flight
from tests.pure.loads.oracle import inside
from tests.pure.loads.test_path_across import EVERYWHERE, lateral_limits
from tests.pure.loads.test_path_against_sampling import flights
from tests.pure.loads.test_sequence_against_sampling import DECLARED, SAMPLES, part, sequences

F = Fraction


def sampled(declared, basis, limit):
    """All samples of one limit, in every setting of gear and flaps that may hold."""
    stated = {moving.id for event in declared.sequence for moving, _ in event.positions}
    free = [moving for moving in basis.positions if moving.id not in stated]
    shifts = {sum(each, F(0)) for each in product(*([s.moment_change for s in one.states] for one in free))}
    points = list(points_of_flight(declared, basis, twin_empty(), SAMPLES))
    runs = []
    for leg, phases in PHASES_OF.items():
        if not set(phases) & set(limit.phases):
            continue
        for shift in shifts:
            run = []
            for point in points:
                if point.leg == leg and point.moment is not None:
                    place = place_of(replace(point, moment=point.moment + shift), limit.gives)
                    run.append((inside(place, limit.points), margin(place, limit.points)))
            runs.append(run)
    return runs


@drawn(40, 400)
@given(flights(), st.data())
def test_no_sample_of_a_flight_with_events_is_worse_and_outside_is_outside(flight, data):
    basis, plan = flight
    parts = (part("GEAR", 4000),) if data.draw(st.booleans()) else ()
    basis = replace(basis, envelopes=(EVERYWHERE,), positions=parts)
    declared = replace(DECLARED, fuel=plan, sequence=data.draw(sequences(basis, plan)))
    arm = assess(replace(declared, sequence=()), basis, twin_empty()).state("take-off").arm
    limit = data.draw(lateral_limits(arm, F(1, 4)))
    basis = replace(basis, lateral_by_cg=(limit,))

    result = assess(declared, basis, twin_empty())
    check = next((one for one in result.checks if one.code == "path.lateral-by-cg"), None)

    if check is None or check.outcome == "unresolved":
        return
    event(f"{check.outcome}, {sum(one.transfer is not None for one in declared.sequence)} transfers")
    assert_as_sampled(check, sampled(declared, basis, limit))


@drawn(40, 400)
@given(flights(), st.data())
def test_a_transfer_is_judged_all_the_way_and_not_at_its_ends_alone(flight, data):
    basis, plan = flight
    assume(len(plan.tanks) > 1)
    source, target, *_ = data.draw(st.permutations(plan.tanks))
    burned = plan.trip / plan.density * data.draw(st.integers(0, 4)) / 8
    held = points_held(plan, basis, burned)
    room = target.tank.capacity - target.trapped - held[target.tank.id]
    volume = min(held[source.tank.id], room)
    assume(volume > 0)
    transfer = Event(1, "flight", burned, "", transfer=Transfer(source.tank.id, target.tank.id, volume))
    basis = replace(basis, envelopes=(EVERYWHERE,))
    declared = replace(DECLARED, fuel=plan, sequence=(transfer,))
    arm = assess(declared, basis, twin_empty()).state("take-off").arm
    limit = data.draw(lateral_limits(arm, F(1, 2)))
    limit = replace(limit, phases=("take-off",))
    basis = replace(basis, lateral_by_cg=(limit,))

    check = assess(declared, basis, twin_empty()).check("path.lateral-by-cg")

    event(f"{check.outcome}, {'in the transfer' if 'transfer' in check.margin_text else 'elsewhere'}")
    assert_as_sampled(check, sampled(declared, basis, limit))


def points_held(plan, basis, burned):
    at_take_off = drawn_down(
        {fuel.tank.id: fuel.usable for fuel in plan.tanks}, basis.taxi_order, plan.taxi / plan.density
    )
    return drawn_down(at_take_off, basis.burn_order, burned)
