"""On the line: a point on an edge is inside, in either plane and on either axis; the next digit decides.

Common practice; invented figures, by hand: 1,240 lb at 100 in, so 124,000 lb in.
"""

from dataclasses import replace
from fractions import Fraction

import pytest

from fleet.basis import Envelope
from fleet.sourced import Limit
from tests.pure.loads.hand import PAGE, by_cg, plain, result_with

F = Fraction
PHASES = ("ramp", "take-off", "landing")
LEAST = F(1, 10**12)


def envelope(*points, plane="arm", axis="longitudinal"):
    return Envelope("E", axis, PHASES, plane, tuple((F(x), F(y)) for x, y in points), PAGE)


def cg(one):
    return result_with(plain(), lambda basis: replace(basis, envelopes=(one,))).check("cg.take-off")


@pytest.mark.parametrize(("beyond", "outcome"), [(F(0), "pass"), (LEAST, "fail")])
def test_an_aft_edge_of_arm(beyond, outcome):
    check = cg(envelope((90, 500), (90, 3000), (100 - beyond, 3000), (100 - beyond, 500)))
    assert (check.outcome, check.room) == (outcome, -beyond)
    if beyond:  # a failure shows as many digits as it takes to be seen as one
        assert check.actual != check.limit


@pytest.mark.parametrize(("beyond", "outcome"), [(F(0), "pass"), (LEAST, "fail")])
def test_an_aft_edge_of_moment(beyond, outcome):
    edge = 124000 - beyond
    check = cg(envelope((90000, 500), (90000, 3000), (edge, 3000), (edge, 500), plane="moment"))
    assert (check.outcome, check.room) == (outcome, -beyond / 1240)


@pytest.mark.parametrize(("beyond", "outcome"), [(F(0), "pass"), (LEAST, "fail")])
def test_a_sloping_edge_that_passes_through_the_point(beyond, outcome):
    """From 110 in at 1,000 lb to 98 in at 1,288 lb: at 1,240 lb 110 - 12 * 240 / 288 = 100 in."""
    check = cg(envelope((90, 1000), (90, 1288), (98 - beyond, 1288), (110 - beyond, 1000)))
    assert (check.outcome, check.room) == (outcome, -beyond)


@pytest.mark.parametrize(("beyond", "outcome"), [(F(0), "pass"), (LEAST, "fail")])
def test_a_weight_limit(beyond, outcome):
    def change(basis):
        limits = replace(basis.limits, take_off=Limit(1240 - beyond, PAGE))
        return replace(basis, configurations=(replace(basis.configurations[0], limits=limits),))

    check = result_with(plain(), change).check("weight.take-off")
    assert (check.outcome, check.room) == (outcome, -beyond)


@pytest.mark.parametrize(("beyond", "outcome"), [(F(0), "pass"), (LEAST, "fail")])
@pytest.mark.parametrize("gives", ["arm", "moment"])
def test_a_lateral_edge_against_the_longitudinal_cg(gives, beyond, outcome):
    """A sloping edge through (100 in, 2 in), or (100 in, 2,480 lb in), which is where the load lies."""
    edge = (F(2) if gives == "arm" else F(2480)) - beyond
    rise = edge / 10
    limit = by_cg((90, -9999), (90, edge - rise), (110, edge + rise), (110, -9999), gives=gives)
    made = plain(lateral_moment=2480)
    check = result_with(made, lambda basis: replace(basis, lateral_by_cg=(limit,))).check(
        "lateral-by-cg.take-off"
    )
    assert (check.outcome, check.room) == (outcome, -beyond)
