"""The quick decision against a slow one that shares nothing with it: no point may be judged differently."""

import random
from fractions import Fraction
from itertools import pairwise, product

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fleet.envelope import Shape
from tests.pure.fleet.outlines import NAMES, PLANES, Plane, moment_at, near_the_edge, outline, second_opinion

CASES = list(product(NAMES, PLANES))
POINTS = 10_000


@pytest.mark.parametrize(("name", "plane"), CASES)
def test_points_on_the_edge_and_one_unit_off_are_never_judged_wrongly(name: str, plane: Plane) -> None:
    points, chance = outline(name, plane), random.Random(f"{name} {plane}")
    tested = Shape(plane, points)
    wrong, inside, each = 0, 0, POINTS // len(CASES)

    for _ in range(each):
        x, weight = near_the_edge(points, chance)
        right = second_opinion(points, x, weight)
        inside += right
        wrong += tested.holds(weight, moment_at(plane, x, weight)) is not right

    assert wrong == 0
    assert each / 4 < inside < each  # the points do lie on both sides


@pytest.mark.parametrize(("name", "plane"), CASES)
def test_stretches_along_the_arm_begin_and_end_where_the_inside_does(name: str, plane: Plane) -> None:
    points, chance = outline(name, plane), random.Random(name)
    tested = Shape(plane, points)

    for _ in range(150):
        _, weight = near_the_edge(points, chance)
        scale = 1 if plane == "arm" else weight
        stretches = tested.arms_at(weight)
        edges = [end for stretch in stretches for end in stretch]
        assert edges == sorted(edges)
        gaps = [stretches[0][0] - 1, *edges, stretches[-1][1] + 1] if stretches else []
        for low, high in pairwise(gaps):
            held = (low, high) in stretches
            assert second_opinion(points, (low + high) / 2 * scale, weight) is (held or low == high)
        assert all(second_opinion(points, edge * scale, weight) for edge in edges)


@pytest.mark.parametrize(("name", "plane"), CASES)
def test_stretches_along_the_weight_begin_and_end_where_the_inside_does(name: str, plane: Plane) -> None:
    points, chance = outline(name, plane), random.Random(name)
    tested = Shape(plane, points)

    for _ in range(150):
        x, weight = near_the_edge(points, chance)
        arm = x if plane == "arm" else x / weight
        stretches = tested.weights_at(arm)
        edges = [end for stretch in stretches for end in stretch]
        assert edges == sorted(edges)
        gaps = [stretches[0][0] / 2, *edges, stretches[-1][1] + 1] if stretches else []
        for low, high in pairwise(gaps):
            middle = (low + high) / 2
            held = (low, high) in stretches
            assert second_opinion(points, _across(plane, arm, middle), middle) is (held or low == high)
        assert all(second_opinion(points, _across(plane, arm, edge), edge) for edge in edges)


@settings(max_examples=100, deadline=None)
@given(
    radii=st.lists(st.integers(2, 60), min_size=9, max_size=9),
    spots=st.lists(st.tuples(st.integers(-70, 70), st.integers(-70, 70)), min_size=20, max_size=20),
    plane=st.sampled_from(PLANES),
)
def test_any_star_shaped_outline_is_judged_alike(
    radii: list[int], spots: list[tuple[int, int]], plane: Plane
) -> None:
    rays = [(1, 0), (3, 1), (1, 2), (-1, 3), (-2, 1), (-3, -1), (-1, -2), (1, -3), (2, -1)]
    points = [(Fraction(x * r, 4), 200 + Fraction(y * r, 4)) for (x, y), r in zip(rays, radii, strict=True)]
    tested = Shape(plane, points)

    for x, y in spots:
        weight = Fraction(200 + y)
        held = tested.holds(weight, moment_at(plane, Fraction(x), weight))
        assert held is second_opinion(points, Fraction(x), weight)


def _across(plane: Plane, arm: Fraction, weight: Fraction) -> Fraction:
    return arm if plane == "arm" else arm * weight
