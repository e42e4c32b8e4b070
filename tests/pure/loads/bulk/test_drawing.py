"""What tanks hold after a volume was taken out, by hand: a column a load."""

import numpy as np
import pytest

from loads.balance.bulk.drawing import drawn, moments, tanks_in, total
from loads.balance.bulk.known import TankSums

CASES = {
    "one tank, then a pair, then one": (
        ((0,), (1, 2), (3,)),
        (10, 4, 20, 8),
        {
            -5: [10, 4, 20, 8],
            0: [10, 4, 20, 8],
            3: [7, 4, 20, 8],
            16: [0, 1, 17, 8],  # 6 of the pair, 3 each
            18: [0, 0, 16, 8],
            25: [0, 0, 9, 8],  # 15 of the pair: 4, all there is, and 11
            34: [0, 0, 0, 8],
            37: [0, 0, 0, 5],
            99: [0, 0, 0, 0],
        },
    ),
    "a pair whose second runs dry first": (
        ((0, 1), (2,)),
        (20, 4, 9),
        {0: [20, 4, 9], 6: [17, 1, 9], 15: [9, 0, 9], 24: [0, 0, 9], 25: [0, 0, 8]},
    ),
    "three at once, then one": (
        ((0, 1, 2), (3,)),
        (6, 3, 30, 8),
        {
            -1: [6, 3, 30, 8],
            0: [6, 3, 30, 8],
            6: [4, 1, 28, 8],
            9: [3, 0, 27, 8],
            12: [1.5, 0, 25.5, 8],  # 3 each, then 1.5 of two
            15: [0, 0, 24, 8],
            20: [0, 0, 19, 8],  # 6 and 3, all there is, and 11
            39: [0, 0, 0, 8],
            42: [0, 0, 0, 5],
            60: [0, 0, 0, 0],
        },
    ),
    "a tank no stage names keeps all": (((1,),), (5, 7), {3: [5, 4], 20: [5, 0]}),
    "no stage takes anything": ((), (5, 7), {3: [5, 7]}),
}


@pytest.mark.parametrize("name", CASES)
def test_a_volume_is_taken_out_stage_by_stage(name):
    order, held, rows = CASES[name]
    contents = [np.full(len(rows), float(each)) for each in held]

    left = drawn(contents, order, np.array([float(volume) for volume in rows]))

    assert np.array(left).T.tolist() == list(rows.values())
    assert [tank.tolist() for tank in contents] == [[each] * len(rows) for each in held]  # as they were


def test_loads_of_one_batch_run_dry_in_their_own_order():
    """12 out of 6, 3, 30 and out of 30, 6, 3, and out of 2, 2, 2, which have 6."""
    contents = [np.array(each) for each in ([6.0, 30.0, 2.0], [3.0, 6.0, 2.0], [30.0, 3.0, 2.0])]

    left = drawn(contents, ((0, 1, 2),), np.array([12.0, 12.0, 12.0]))

    assert np.array(left).T.tolist() == [[1.5, 0, 25.5], [25.5, 1.5, 0], [0, 0, 0]]


def test_the_tanks_of_an_order_are_told_once_in_rising_order():
    assert tanks_in(((2, 0), (1,), (2,))) == [0, 1, 2]
    assert tanks_in(()) == []


def test_the_total_is_of_all_tanks():
    one, two, three = np.array([1.0, 2.0]), np.array([10.0, 20.0]), np.array([100.0, 200.0])

    assert total([one]).tolist() == [1.0, 2.0]
    assert total([one, two, three]).tolist() == [111.0, 222.0]
    assert one.tolist() == [1.0, 2.0]


def sums(values, *, of_arms, steady=None, lateral=0.0):
    return TankSums(np.array([0.0, 10.0, 30.0]), np.array(values), of_arms, steady, (0.0, 0.0), lateral)


def test_moments_of_fuel_are_read_from_each_table_in_its_own_way():
    """5 and 20 in each. At one arm, 50: 250 and 1000. Arms 105 and 120: 525 and 2400. Moments: 500 and 2500.
    Across, at -2 and 3: -10 + 15 and -40 + 60.
    """
    steady = sums([9.0, 9.0, 9.0], of_arms=True, steady=50.0)
    arms = sums([100.0, 110.0, 130.0], of_arms=True, lateral=-2.0)
    told = sums([0.0, 1000.0, 4000.0], of_arms=False, lateral=3.0)
    volumes = [np.array([5.0, 20.0])] * 3

    along, across = moments((steady, arms, told), volumes)

    assert along.tolist() == [250 + 525 + 500, 1000 + 2400 + 2500]
    assert across.tolist() == [5.0, 20.0]
    assert [each.tolist() for each in moments((steady,), volumes[:1])] == [[250.0, 1000.0], [0.0, 0.0]]


def test_each_tank_needs_its_volume():
    with pytest.raises(ValueError, match="shorter"):
        moments((sums([0.0, 0.0, 0.0], of_arms=True),) * 2, [np.array([1.0])])
