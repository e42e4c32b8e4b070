"""A lateral limit against the longitudinal CG: exact on every edge, with what is left at one arm."""

import random
from fractions import Fraction

import pytest

from fleet.envelope import NotAnEnvelope
from fleet.lateral import Across
from tests.pure.fleet.outlines import NAMES, near_the_edge, outline, second_opinion

F = Fraction


@pytest.mark.parametrize("name", NAMES)
@pytest.mark.parametrize("moved", [0, -2600])
def test_it_agrees_with_a_second_opinion_on_edges_and_beside_them(name, moved):
    chance = random.Random(7)
    corners = [(weight + moved, arm) for arm, weight in outline(name, "arm")]
    limit = Across(corners)
    for _ in range(600):
        along, across = near_the_edge(corners, chance)
        assert limit.holds(along, across) is second_opinion(corners, along, across)


def test_what_is_allowed_at_one_arm_and_the_margin_in_it():
    limit = Across([(F(-10), F(-4)), (F(-10), F(4)), (F(10), F(2)), (F(10), F(-2))])
    assert limit.stretches(F(0)) == ((F(-3), F(3)),)
    section = limit.section(F(0), F(-1))
    assert (section.margin, section.edge) == (F(2), "low")
    assert limit.levels == (F(-10), F(10))


def test_its_sides_tell_the_same_lines_in_true_arms():
    """Inside where P * lateral + Q * longitudinal + R >= 0; at 0 in the limits are -3 and 3."""
    limit = Across([(F(-10), F(-4)), (F(-10), F(4)), (F(10), F(2)), (F(10), F(-2))])
    ((left, right),) = limit.sides[0]
    assert left == (1, F(-1, 10), 3)
    assert right == (-1, F(-1, 10), 3)


@pytest.mark.parametrize("along", [F(-11), F(11), F(-(10**6))])
def test_off_the_limit_there_is_nothing(along):
    limit = Across([(F(-10), F(-4)), (F(-10), F(4)), (F(10), F(2)), (F(10), F(-2))])
    assert not limit.holds(along, F(0))
    assert limit.stretches(along) == ()
    assert limit.section(along, F(0)) is None


def test_corners_that_make_no_polygon_are_refused():
    with pytest.raises(NotAnEnvelope) as refused:
        Across([(F(0), F(0)), (F(2), F(2)), (F(2), F(0)), (F(0), F(1))])
    assert refused.value.code == "envelope-crosses-itself"
    with pytest.raises(NotAnEnvelope):
        Across([])
