"""Notches: real envelopes are concave in places, and a notch is never filled in.

Common practice (a convex hull would allow what the manual does not). Invented figures, by hand: 1,240 lb.
"""

from dataclasses import replace
from fractions import Fraction

import pytest

from fleet.basis import Envelope
from tests.pure.loads.hand import PAGE, by_cg, plain, result_with

F = Fraction
PHASES = ("ramp", "take-off", "landing")
# 90 to 110 in up to 1,300 lb, but between 99 and 101 in only to 1,200 lb.
NOTCHED = ((90, 500), (90, 1300), (99, 1300), (99, 1200), (101, 1200), (101, 1300), (110, 1300), (110, 500))
ACROSS = ((90, -3), (90, 3), (99, 3), (99, 1), (101, 1), (101, 3), (110, 3), (110, -3))


def cg_at(arm, points=NOTCHED, plane="arm"):
    exact = tuple((F(x) if plane == "arm" else F(x) * F(y), F(y)) for x, y in points)
    one = Envelope("N", "longitudinal", PHASES, plane, exact, PAGE)
    # The tanks are empty, so all 1,240 lb are at this arm.
    made = plain(left=0, right=0, weight=1240, arm=arm)
    return result_with(made, lambda basis: replace(basis, envelopes=(one,))).check("cg.take-off")


@pytest.mark.parametrize("plane", ["arm", "moment"])
@pytest.mark.parametrize(
    ("arm", "outcome"), [(95, "pass"), (99, "pass"), ("99.001", "fail"), (100, "fail"), (101, "pass")]
)
def test_inside_the_notch_is_outside_the_envelope_its_edges_are_inside(arm, outcome, plane):
    assert cg_at(arm, plane=plane).outcome == outcome


def test_the_margin_in_a_notch_is_to_its_nearer_side_and_down_out_of_it():
    """At 99.4 in 0.4 in forward and 1.6 in aft to the sides, and 40 lb down to 1,200 lb."""
    check = cg_at("99.4")
    assert (check.room, check.edge, check.margin_weight) == (F("-0.4"), "aft", "-40")


def test_beside_a_notch_the_room_ends_at_it():
    assert cg_at("98.5").limit == "99"


@pytest.mark.parametrize(("lateral", "outcome"), [(1, "pass"), ("1.001", "fail"), (-3, "pass"), (2, "fail")])
def test_a_notch_of_a_lateral_limit(lateral, outcome):
    made = plain(left=0, right=0, weight=1240, lateral_moment=1240 * F(lateral))
    check = result_with(made, lambda basis: replace(basis, lateral_by_cg=(by_cg(*ACROSS),))).check(
        "lateral-by-cg.take-off"
    )
    assert check.outcome == outcome


def test_on_the_side_of_a_lateral_notch_the_wider_part_holds():
    """At 99 in both the wide part (3 in) and the narrow one (1 in) end: their union holds 3 in."""
    made = plain(left=0, right=0, weight=1240, arm=99, lateral_moment=1240 * F(3))
    check = result_with(made, lambda basis: replace(basis, lateral_by_cg=(by_cg(*ACROSS),))).check(
        "lateral-by-cg.take-off"
    )
    assert (check.outcome, check.room) == ("pass", 0)
