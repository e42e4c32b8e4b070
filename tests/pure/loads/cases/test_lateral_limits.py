"""Lateral limits: constant, varying with weight, varying with the longitudinal CG; as arms and as moments.

Common practice (helicopter flight manuals give the lateral CG against the longitudinal one). The figures are
invented and worked by hand beside each case; right of the centreline is positive.
"""

from dataclasses import replace
from fractions import Fraction

import pytest

from fleet.basis import Envelope
from tests.pure.loads.hand import PAGE, by_cg, one_after_the_other, plain, result_with

F = Fraction
ALL = ("ramp", "take-off", "landing")
# Forward of 100 in 4 in to either side are allowed, at 110 in only 2 in: straight between.
TAPERED = ((90, -4), (100, -4), (110, -2), (110, 2), (100, 4), (90, 4))


def across(*points, plane="arm"):
    exact = tuple((F(x), F(y)) for x, y in points)
    return Envelope("LAT", "lateral", ALL, plane, exact, PAGE)


def with_envelope(one):
    return lambda basis: replace(basis, envelopes=(*basis.envelopes, one))


def with_limit(one):
    return lambda basis: replace(basis, lateral_by_cg=(one,))


def test_a_constant_limit_of_arms():
    """1,240 lb with 2,480 lb in to the right: 2 in, and 3 in are allowed."""
    box = across((-3, 500), (3, 500), (3, 3000), (-3, 3000))
    check = result_with(plain(lateral_moment=2480), with_envelope(box)).check("lateral.take-off")
    assert (check.outcome, check.actual, check.limit, check.margin, check.edge) == (
        "pass",
        "2",
        "3",
        "1",
        "right",
    )


def test_a_constant_limit_of_moments():
    """2,480 lb in are allowed and 2,480 there: on the line, so inside; one more is outside."""
    box = across((-2480, 500), (2480, 500), (2480, 3000), (-2480, 3000), plane="moment")
    assert result_with(plain(lateral_moment=2480), with_envelope(box)).check("lateral.take-off").room == 0
    over = result_with(plain(lateral_moment=2481), with_envelope(box)).check("lateral.take-off")
    assert (over.outcome, over.margin_text[:8]) == ("fail", "0.001 in")


def test_a_limit_that_varies_with_weight():
    """4 in at 1,000 lb, 2 in at 2,000 lb; at 1,240 lb 4 - 2 * 0.24 = 3.52 in."""
    tapered = across((-4, 1000), (4, 1000), (2, 2000), (-2, 2000))
    check = result_with(plain(lateral_moment=-1240), with_envelope(tapered)).check("lateral.take-off")
    assert (check.low, check.limit, check.actual, check.margin, check.edge) == (
        "-3.52",
        "3.52",
        "-1",
        "2.52",
        "left",
    )


def test_a_limit_that_varies_with_the_longitudinal_cg():
    """240 lb at 131 in: (1,240 * 100 + 240 * 131) / 1,480 = 105.027 in, where 4 - 2 * 0.5027 = 2.9946 in.

    1,480 lb in to the right are 1 in.
    """
    made = plain(lateral_moment=1480, lines=[(240, 131, 0)])
    check = result_with(made, with_limit(by_cg(*TAPERED))).check("lateral-by-cg.take-off")
    along = F(1240 * 100 + 240 * 131, 1480)
    assert check.room == 4 - (along - 100) / 5 - 1
    assert (check.actual, check.limit, check.low, check.unit, check.edge) == (
        "1",
        "2.99",
        "-2.99",
        "in",
        "right",
    )
    assert check.margin_text == "1.99 in from the right limit"
    assert check.source == "HAND rev A p. 6-9"


def test_the_same_as_moments_is_judged_in_moments():
    """At 100 in 4,000 lb in are allowed, and 4,001 are there."""
    limit = by_cg((90, -4000), (110, -4000), (110, 4000), (90, 4000), gives="moment")
    assert result_with(plain(lateral_moment=4000), with_limit(limit)).verdict != "outside"
    check = result_with(plain(lateral_moment=4001), with_limit(limit)).check("lateral-by-cg.take-off")
    assert (check.outcome, check.unit, check.margin_text) == (
        "fail",
        "lb in",
        "1 lb in beyond the right limit",
    )


@pytest.mark.parametrize(("lateral_arm", "inside"), [("2", True), ("2.000001", False), ("-2", True)])
def test_a_point_on_a_corner_or_an_edge_is_inside(lateral_arm, inside):
    """The load at 110 in, where 2 in are allowed to either side."""
    made = plain(left=0, right=0, arm=110, lateral_moment=1000 * F(lateral_arm))
    check = result_with(made, with_limit(by_cg(*TAPERED))).check("lateral-by-cg.take-off")
    assert (check.outcome == "pass") is inside


def test_off_the_whole_limit_there_is_none_to_keep():
    check = result_with(plain(arm=120), with_limit(by_cg(*TAPERED))).check("lateral-by-cg.take-off")
    assert (check.outcome, check.room) == ("fail", None)
    assert check.margin_text.startswith("no lateral limit is given for a longitudinal CG of")


def test_take_off_and_landing_inside_the_middle_outside():
    """20 US gal (120 lb) a side; the left tank feeds first. With it empty 120 lb stand 40 in to the right of
    1,120 lb: 4.286 in, and 4 in are allowed. At take-off both are full, at landing both are empty.
    """
    made = plain(trip=240)

    result = result_with(made, lambda basis: with_limit(by_cg(*TAPERED))(one_after_the_other(basis)))

    for phase in ("ramp", "take-off", "landing"):
        assert result.check(f"lateral-by-cg.{phase}").outcome == "pass"
    worst = result.check("path.lateral-by-cg")
    assert (worst.outcome, worst.edge, worst.room) == ("fail", "right", 4 - F(4800, 1120))
    assert worst.at["point"] == "between take-off and landing"
    assert worst.at["weight"] == "1120"
    assert [one["axis"] for one in result.document["path"]["worst"]][-1] == "lateral by CG"


def test_without_a_limit_for_landing_the_load_is_unresolved():
    limit = by_cg(*TAPERED, phases=("ramp", "take-off"))
    check = result_with(plain(), with_limit(limit)).check("lateral.landing")
    assert check.outcome == "unresolved"


def test_an_aircraft_whose_limits_are_not_entered_is_unresolved():
    check = result_with(plain(), lambda basis: replace(basis, lateral_limits_entered=False)).check(
        "lateral.take-off"
    )
    assert check.outcome == "unresolved"


def test_limits_of_another_configuration_are_no_proof_that_there_are_none():
    limit = replace(by_cg(*TAPERED), configurations=("two",))
    check = result_with(plain(), with_limit(limit)).check("lateral.take-off")
    assert check.outcome == "unresolved"
