"""An envelope as rows of numbers, worked by hand. Between two levels a side over arms is M = (a + b W) W, one
over moments M = a + b W.
"""

from fractions import Fraction

import numpy as np

from fleet.envelope import Shape
from loads.balance.bulk.outline import Outline, outline_of

F = Fraction


def outline(plane, *points):
    return outline_of(Shape(plane, [(F(x), F(weight)) for x, weight in points]).slabs)


def told(found: Outline):
    return {
        "levels": found.levels.tolist(),
        "low": found.low.tolist(),
        "high": found.high.tolist(),
        "at levels": found.at_levels,
        "bent": found.bent,
        "steep": found.steep,
        "size": found.size,
    }


def test_a_low_edge_over_arms_that_slopes_aft_bends_upwards():
    """Above 200 the arm is 10 + (W - 200) / 20 = W / 20, so M = W**2 / 20; a low edge that bends upwards more
    than a straight line only widens the margin between its ends, so nothing is bent.
    """
    found = outline("arm", (10, 100), (10, 200), (20, 400), (40, 400), (40, 100))

    assert told(found) == {
        "levels": [100.0, 200.0, 400.0],
        "low": [[0.0, 10.0, 0.0], [0.0, 0.0, 0.05]],
        "high": [[0.0, 40.0, 0.0], [0.0, 40.0, 0.0]],
        "at levels": ((200.0, 2000.0, 8000.0),),
        "bent": 0.0,
        "steep": 40.0,
        "size": 16000.0,
    }


def test_edges_over_moments_are_straight():
    """Low: 1000 + 5 (W - 100) = 500 + 5 W, then 1500 + 35 (W - 200) = 35 W - 5500. High: 3000 + 15 W, then
    30 W. The low edge above is the steepest, and at 300 the one of the greatest parts: 5500 + 35 * 300.
    """
    points = (1000, 100), (1500, 200), (5000, 300), (9000, 300), (6000, 200), (4500, 100)
    found = outline("moment", *points)

    assert told(found) == {
        "levels": [100.0, 200.0, 300.0],
        "low": [[500.0, 5.0, 0.0], [-5500.0, 35.0, 0.0]],
        "high": [[3000.0, 15.0, 0.0], [0.0, 30.0, 0.0]],
        "at levels": ((200.0, 1500.0, 6000.0),),
        "bent": 0.0,
        "steep": 35.0,
        "size": 16000.0,
    }


def test_at_the_weight_of_a_notch_the_narrower_side_counts():
    """Low: arm 10 to 200, then 14 to 300, then 14 - (W - 300) / 50 = 20 - W / 50. High: arm 40 to 200, then
    40 + (W - 200) / 25 = 32 + W / 25 to 300, then 41.

    At 200 the low sides are at 2000 and 2800, at 300 the high ones at 13200 and 12300. Of what is bent, 1/50
    and 1/25, a quarter of the greater counts. At 400 the high side moves by 32 + 2 * 400 / 25 = 64 a unit of
    weight, and its parts are (32 + 16) * 400 = 19200.
    """
    left = (10, 100), (10, 200), (14, 200), (14, 300), (12, 400)
    right = (41, 400), (41, 300), (44, 300), (40, 200), (40, 100)
    found = outline("arm", *left, *right)

    assert told(found) == {
        "levels": [100.0, 200.0, 300.0, 400.0],
        "low": [[0.0, 10.0, 0.0], [0.0, 14.0, 0.0], [0.0, 20.0, -0.02]],
        "high": [[0.0, 40.0, 0.0], [0.0, 32.0, 0.04], [0.0, 41.0, 0.0]],
        "at levels": ((200.0, 2800.0, 8000.0), (300.0, 4200.0, 12300.0)),
        "bent": 0.01,
        "steep": 64.0,
        "size": 19200.0,
    }


def test_a_low_edge_that_slopes_forward_is_bent_and_its_negative_parts_count_in_full():
    """Arm -50 - (W - 100) / 5 = -30 - W / 5: it moves by 30 + 2 * 200 / 5 = 110 at most, its parts are
    (30 + 200 / 5) * 200 = 14000, and a quarter of 1/5 is bent.
    """
    found = outline("arm", (-50, 100), (-70, 200), (10, 200), (10, 100))

    assert told(found) == {
        "levels": [100.0, 200.0],
        "low": [[0.0, -30.0, -0.2]],
        "high": [[0.0, 10.0, 0.0]],
        "at levels": (),
        "bent": 0.05,
        "steep": 110.0,
        "size": 14000.0,
    }


def test_between_edges_that_come_together_a_margin_is_never_below_the_lesser_of_its_ends():
    """Low: arm W / 10; high: 40 - (W - 100) / 10. Both bend towards the inside."""
    found = outline("arm", (10, 100), (20, 200), (30, 200), (40, 100))

    assert (found.low.tolist(), found.high.tolist()) == ([[0.0, 0.0, 0.1]], [[0.0, 50.0, -0.1]])
    assert found.bent == 0.0


def test_weights_of_corners_may_be_fractions():
    found = outline("arm", (1, "100.5"), (1, "200.25"), (3, "200.25"), (3, "100.5"))

    assert found.levels.tolist() == [100.5, 200.25]
    assert (found.low.dtype, found.high.dtype) == (np.float64, np.float64)
    assert (found.steep, found.size) == (3.0, 600.75)


def test_an_envelope_with_two_pieces_side_by_side_has_no_outline():
    both = (10, 100), (10, 300), (20, 300), (20, 200), (30, 200), (30, 300), (40, 300), (40, 100)

    assert outline("arm", *both) is None
