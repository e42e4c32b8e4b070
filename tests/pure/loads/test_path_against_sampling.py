"""The worst point of the burn against many samples: no sample is worse, one is as bad, outside is outside.

The judge is `naive_path`, which shares no code with the engine. Tanks, tables, orders of burning and
envelopes (notched from above and below, sloping, in both planes) are drawn at random.
"""

from dataclasses import replace
from fractions import Fraction

from hypothesis import assume, event, given
from hypothesis import strategies as st

from fleet.basis import BurnStage, Envelope, Tank, TankTable
from fleet.envelope import NotAnEnvelope
from loads.balance.aboard import FuelPlan, TankFuel
from loads.balance.assess import assess
from loads.balance.declared import read_load
from loads.balance.fuel import fuel_states
from loads.balance.path import burn_path
from loads.balance.prepared import prepared
from tests.drawing import drawn
from tests.pure.loads.making import SOURCE, load, twin, twin_empty
from tests.pure.loads.naive_path import assert_as_sampled, points_along, sampled

F = Fraction
SAMPLES = 40
TWIN = twin()
DECLARED = read_load(load(limits=[], items=[]), TWIN)
DRY = assess(DECLARED, TWIN, twin_empty()).state("zero fuel")


def tenths(low, high):
    return st.integers(low * 10, high * 10).map(lambda number: F(number, 10))


@st.composite
def tables(draw, capacity):
    """A table from nothing up to a capacity: of arms or moments, straight in either."""
    straight = draw(st.sampled_from(("arm", "moment")))
    inner = sorted(draw(st.sets(st.integers(1, capacity - 1), max_size=3)))
    volumes = [0, *inner, capacity]
    arms = [F(draw(st.integers(60, 200))) for _ in volumes]
    if draw(st.booleans()):
        arms = [arms[0]] * len(arms)
    if straight == "moment" and draw(st.booleans()):
        points = tuple((F(v), F(v) * a * F("6.7")) for v, a in zip(volumes, arms, strict=True))
        return TankTable("volume", "moment", "moment", F("6.7"), points)
    return TankTable(
        "volume", "arm", straight, None, tuple((F(v), a) for v, a in zip(volumes, arms, strict=True))
    )


@st.composite
def flights(draw):
    """A basis with random tanks and order, and a plan of fuel for it."""
    count = draw(st.integers(1, 4))
    tanks = []
    for number in range(count):
        capacity = draw(st.integers(20, 90))
        name = f"T{number}"
        lateral = F(draw(st.integers(-90, 90)))
        tanks.append(Tank(name, name, F(capacity), lateral, draw(tables(capacity)), SOURCE))
    names = draw(st.permutations([tank.id for tank in tanks]))
    cut = draw(st.integers(0, count - 1))
    stages = tuple(BurnStage(tuple(part)) for part in (names[:cut], names[cut:]) if part)
    usable = {tank.id: draw(st.integers(1, int(tank.capacity) - 2)) for tank in tanks}
    trapped = {tank.id: draw(st.sampled_from((0, 0, 1))) for tank in tanks}
    density = draw(st.sampled_from((F(6), F("6.7"))))
    held = tuple(TankFuel(tank, F(usable[tank.id]), F(trapped[tank.id])) for tank in tanks)
    whole = sum(usable.values()) * density
    taxi, trip, least = (whole * draw(st.integers(low, 20)) / 60 for low in (0, 1, 0))
    plan = FuelPlan(density, "drawn", held, taxi, trip, least)
    basis = replace(TWIN, tanks=tuple(tanks), burn_order=stages, taxi_order=stages)
    return basis, plan


@st.composite
def envelopes(draw, axis, centre):
    """An envelope around where these loads are: sloping sides, notches above and below, in both planes."""
    plane = draw(st.sampled_from(("arm", "moment")))
    weights = sorted(draw(st.sets(st.integers(4700, 6600), min_size=2, max_size=4)))
    low, high = draw(st.integers(4000, 4800)), draw(st.integers(5600, 7200))
    levels = [low, *(weight for weight in weights if low < weight < high), high]
    left = [(centre - F(draw(st.integers(0, 140)), 20), F(y)) for y in levels]
    right = [(centre + F(draw(st.integers(1, 140)), 20), F(y)) for y in levels]
    points = [*left, *_notch(draw, left[-1], right[-1], -1), *reversed(right)]
    points += _notch(draw, right[0], left[0], 1)
    if plane == "moment":
        points = [(x * y, y) for x, y in points]
    phases = draw(
        st.sampled_from(
            (("ramp", "take-off", "landing"), ("take-off", "landing"), ("take-off",), ("landing",))
        )
    )
    try:
        return Envelope(f"drawn-{axis}", axis, phases, plane, tuple(points), SOURCE)
    except NotAnEnvelope:
        assume(False)
        raise


def _notch(draw, start, end, way):
    """The three corners of a notch between two ends of the top or the bottom, or nothing."""
    if not draw(st.booleans()):
        return []
    (x1, y), (x2, _) = start, end
    depth = draw(st.integers(50, 1200))
    parts = [F(draw(st.integers(1, 6)), 20), F(1, 2), F(draw(st.integers(14, 19)), 20)]
    xs = [x1 + (x2 - x1) * part for part in parts]
    return [(xs[0], y), (xs[1], y + way * depth), (xs[2], y)]


@drawn(50, 600)
@given(flights(), st.data())
def test_no_sample_is_worse_one_is_as_bad_and_outside_is_outside(flight, data):
    basis, plan = flight
    drawn = [data.draw(envelopes("longitudinal", F(117))), data.draw(envelopes("lateral", F(0)))]
    if data.draw(st.booleans()):
        other = data.draw(envelopes("longitudinal", F(117)))
        drawn.append(replace(other, id="second"))
    basis = replace(basis, envelopes=tuple(drawn))
    declared = replace(DECLARED, fuel=plan)
    dry = (DRY.weight, DRY.moment, DRY.lateral_moment)

    result = assess(declared, basis, twin_empty())

    for axis in ("longitudinal", "lateral"):
        found = [check for check in result.checks if check.code == f"path.{axis}"]
        runs = [run for run in sampled(declared, basis, dry, axis, SAMPLES) if run]
        if not found or not runs:
            assert not runs or axis == "lateral"
            continue
        assert_as_sampled(found[0], runs)
        event(f"{axis} {found[0].outcome}")


@drawn(50, 600)
@given(flights())
def test_every_sample_lies_exactly_on_the_path(flight):
    basis, plan = flight
    declared = replace(DECLARED, fuel=plan)
    result = assess(declared, basis, twin_empty())
    states = {state.phase: state for state in result.states}
    path = burn_path(plan, fuel_states(plan, prepared(basis)), states)

    for point in points_along(declared, basis, (DRY.weight, DRY.moment, DRY.lateral_moment), 7):
        on = [each for each in path.stretches if each.end.weight <= point.weight <= each.start.weight]
        assert on or states["ramp"].weight == states["minimum at landing"].weight
        for stretch in on:
            at = stretch.at(point.weight)
            assert (at.moment, at.lateral_moment) == (point.moment, point.lateral_moment)
