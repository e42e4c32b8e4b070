"""Trim tables: straight between points and weights, nothing beyond them, halves of a step away from zero."""

from fractions import Fraction

import pytest

from fleet.sourced import Source
from fleet.trim import OffTrimTable, Trim, TrimLine, TrimTable

F = Fraction
PAGE = Source("FM", "A", "1")


def line(*points, weight=None):
    return TrimLine(weight, tuple((F(x), F(y)) for x, y in points), PAGE)


def test_points_are_met_and_between_them_it_is_straight():
    table = TrimTable(None, (line((0, 1), (10, 3), (20, 4)),))
    assert [table.setting(F(cg), F(1)) for cg in (0, 5, 10, 15, 20)] == [1, 2, 3, F(7, 2), 4]


@pytest.mark.parametrize("cg", [F(-1, 10**9), 20 + F(1, 10**9)])
def test_beyond_the_last_point_there_is_nothing(cg):
    with pytest.raises(OffTrimTable) as off:
        TrimTable(None, (line((0, 1), (20, 4)),)).setting(cg, F(1))
    assert (off.value.of, off.value.first, off.value.last) == ("CG", 0, 20)


def test_between_two_weights_it_is_straight_and_at_one_it_is_its_own():
    table = TrimTable(None, (line((0, 0), (10, 0), weight=F(100)), line((0, 8), (10, 8), weight=F(200))))
    assert [table.setting(F(5), F(weight)) for weight in (100, 125, 200)] == [0, 2, 8]
    with pytest.raises(OffTrimTable) as off:
        table.setting(F(5), F(201))
    assert (off.value.of, off.value.last) == ("weight", 200)


def test_at_the_very_weight_of_a_line_the_other_lines_do_not_matter():
    table = TrimTable(None, (line((0, 1), (10, 1), weight=F(100)), line((4, 8), (6, 8), weight=F(200))))
    assert table.setting(F(9), F(100)) == 1
    assert table.setting(F(5), F(200)) == 8
    with pytest.raises(OffTrimTable):
        table.setting(F(9), F(101))


@pytest.mark.parametrize(
    ("setting", "step", "shown"),
    [
        ("0.25", "0.5", "0.5"),
        ("-0.25", "0.5", "-0.5"),
        ("0.2499", "0.5", "0"),
        ("2.5", "1", "3"),
        ("7", "0.1", "7"),
    ],
)
def test_the_nearest_step_halves_away_from_zero(setting, step, shown):
    trim = Trim("arm", "units", F(step), None, None, None, ())
    assert trim.stepped(F(setting)) == F(shown)
