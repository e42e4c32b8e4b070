"""An outline cut into trapezoids: each side one curve over weight, in either plane, by hand and at random."""

import random
from fractions import Fraction

import pytest

from fleet.polygon import slabs_of
from tests.pure.fleet.outlines import NAMES, PLANES, outline, second_opinion

F = Fraction


def value(side, weight, moment):
    p, a, b, c = side
    return p * moment + a + b * weight + c * weight * weight


def test_by_hand_a_sloping_edge_over_arms_has_no_part_without_the_weight():
    """From 100 in at 2,000 lb to 110 in at 4,000: arm = 90 + weight / 200, so moment = 90 W + W * W / 200.

    As whole numbers, times 2,000: 2000 * moment - 180000 * W - 10 * W * W.
    """
    corners = [(F(100), F(2000)), (F(110), F(4000)), (F(120), F(4000)), (F(120), F(2000))]

    slabs = slabs_of("arm", corners)

    assert (slabs.scale, slabs.levels) == (1, (2000, 4000))
    ((piece,),) = slabs.trapezoids
    left, right = piece[:4], piece[4:]
    assert left == (2000, 0, -180_000, -10)
    assert right[0] < 0
    assert right[1] == 0
    assert value(left, 3000, 3000 * 105) == 0
    assert value(left, 3000, 3000 * 106) > 0
    assert value(right, 3000, 3000 * 120) == 0
    assert value(right, 3000, 3000 * 121) < 0


def test_by_hand_the_same_edge_over_moments_has_no_square():
    """Moments 200,000 at 2,000 lb and 440,000 at 4,000: moment = 120 * W - 40,000."""
    corners = [(F(200_000), F(2000)), (F(440_000), F(4000)), (F(480_000), F(4000)), (F(240_000), F(2000))]

    ((piece,),) = slabs_of("moment", corners).trapezoids

    p, a, b, c = piece[:4]
    assert (F(a, p), F(b, p), c) == (40_000, -120, 0)


@pytest.mark.parametrize("plane", PLANES)
@pytest.mark.parametrize("name", NAMES)
def test_a_point_is_between_the_sides_of_a_piece_when_a_second_opinion_finds_it_inside(name, plane):
    points = outline(name, plane)
    slabs = slabs_of(plane, points)
    chance = random.Random(f"{name} {plane}")
    levels = [F(level, slabs.scale) for level in slabs.levels]
    inside = 0
    for _ in range(400):
        weight = F(chance.randint(int(levels[0]) * 10 + 1, int(levels[-1]) * 10 - 1), 10)
        if weight in levels:
            continue
        number = max(place for place, level in enumerate(levels) if level < weight)
        xs = [x for x, _ in points]
        x = min(xs) + (max(xs) - min(xs)) * F(chance.randint(0, 1000), 1000)
        moment = x * weight if plane == "arm" else x
        held = any(
            value(piece[:4], weight, moment) >= 0 and value(piece[4:], weight, moment) >= 0
            for piece in slabs.trapezoids[number]
        )
        assert held is second_opinion(points, x, weight)
        inside += held
    assert inside > 30
