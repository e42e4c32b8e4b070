"""10,000 whole loads on an edge and one unit off it, in both planes, through the whole assessment: none
judged wrong.

Each load is built so that its sum at take-off lands exactly where it is wanted: one item of the needed
weight, and the empty weight's moment chosen to match. The judge is `oracle`, which shares no code with the
engine.
"""

import random
from dataclasses import replace
from fractions import Fraction

import pytest

from fleet.basis import Envelope
from loads.balance.assess import assess
from loads.balance.declared import read_load
from tests.pure.loads.making import SOURCE, load, twin, twin_empty
from tests.pure.loads.oracle import load_inside

F = Fraction

LOADS = 10_000
UNITS = (F(1), F(1, 1000), F(1, 10**9))
ARM_SHAPES = (
    ((110, 4000), (110, 5200), (116, 6800), (128, 6800), (128, 4000)),
    (
        (F("110.3"), 4000),
        (F("111.7"), 5500),
        (F("117.9"), 6801),
        (120, F("6400.5")),
        (F("124.1"), 6777),
        (127, 4100),
    ),
    (
        (108, 3900),
        (112, 4700),
        (F("109.5"), 5600),
        (115, 6900),
        (F("126.4"), 6900),
        (F("121.2"), 5300),
        (129, 3950),
    ),
)


def shapes():
    """The three envelopes as drawn in arm, and the same vertices with edges straight in moment."""
    for points in ARM_SHAPES:
        exact = tuple((F(x), F(y)) for x, y in points)
        yield "arm", exact
        yield "moment", tuple((x * y, y) for x, y in exact)


def edge_points(plane, polygon, seed, count):
    """Sums (weight, moment) on edges and vertices, and one unit off in arm or moment, or in weight."""
    chance = random.Random(seed)
    edges = list(zip(polygon, (*polygon[1:], polygon[0]), strict=True))
    for number in range(count):
        (x1, y1), (x2, y2) = chance.choice(edges)
        part = F(chance.choice((0, 1, chance.randint(0, 97))), chance.choice((97, 1)))
        part = min(part, F(1))
        x, y = x1 + (x2 - x1) * part, y1 + (y2 - y1) * part
        unit = chance.choice(UNITS) * chance.choice((1, -1))
        if number % 3 == 1:
            x += unit
        elif number % 3 == 2:
            y += unit
        yield y, x * y if plane == "arm" else x


@pytest.mark.parametrize(("plane", "polygon"), list(shapes()))
@pytest.mark.parametrize("axis", ["longitudinal", "lateral"])
def test_no_load_on_an_edge_or_one_unit_off_it_is_judged_wrong(plane, polygon, axis):
    share = LOADS // 12 + 1
    free = (F(-(10**9)), F(1)), (F(10**9), F(1)), (F(10**9), F(10**6)), (F(-(10**9)), F(10**6))
    judged = Envelope("judged", axis, ("take-off",), plane, polygon, SOURCE)
    other = Envelope("free", "longitudinal", ("take-off", "landing"), "arm", free, SOURCE)
    basis = replace(twin(), envelopes=(judged, other))
    declared = read_load(load(limits=[]), basis)
    plain = assess(declared, basis, twin_empty()).state("take-off")
    code = "cg.take-off" if axis == "longitudinal" else "lateral.take-off"
    wrong, inside, outside = [], 0, 0

    for weight, moment in edge_points(plane, polygon, f"{plane}{axis}", share):
        empty = replace(twin_empty(), weight=twin_empty().weight + weight - plain.weight)
        if axis == "longitudinal":
            empty = replace(empty, moment=empty.moment + moment - plain.moment)
        else:
            empty = replace(empty, lateral_moment=empty.lateral_moment + moment - plain.lateral_moment)
        result = assess(declared, basis, empty)
        check = result.check(code)
        wanted = load_inside(weight, moment, polygon, plane)
        state = result.state("take-off")
        assert (state.weight, state.moment if axis == "longitudinal" else state.lateral_moment) == (
            weight,
            moment,
        )
        inside, outside = inside + wanted, outside + (not wanted)
        if (check.outcome == "pass") != wanted or (check.room is not None and (check.room >= 0) != wanted):
            wrong.append((weight, moment, check))

    assert wrong == []
    assert inside > share / 4
    assert outside > share / 4
