"""The mixed-integer program: what HiGHS is handed, and small programs solved by hand."""

from fractions import Fraction

import highspy
import pytest

from loads.balance.remedies.program import INFINITE, Program, Solution


def knapsack() -> Program:
    """Which of 3, 5 and 8 make up at least 9, at costs of 4, 5 and 9: 3 and 8 for 13, 5 and 8 for 14."""
    made = Program()
    columns = [made.switch(cost) for cost in (4, 5, 9)]
    made.row(dict(zip(columns, (3, 5, 8), strict=True)), low=9)
    return made


def test_columns_are_numbered_and_keep_what_was_asked() -> None:
    made = Program()
    assert made.column(Fraction(1, 2), -3, Fraction(7, 4), whole=False) == 0
    assert made.column(2, 0, 9, whole=True) == 1
    assert made.switch() == 2
    assert made.switch(3) == 3
    assert made.costs == [0.5, 2.0, 0.0, 3.0]
    assert made.lows == [-3.0, 0.0, 0.0, 0.0]
    assert made.highs == [1.75, 9.0, 1.0, 1.0]
    assert made.whole == [False, True, True, True]


def test_a_row_is_scaled_so_that_its_largest_coefficient_is_one() -> None:
    made = Program()
    for _ in range(3):
        made.switch()
    made.row({0: 4, 1: 0, 2: -8}, low=2, high=16)
    made.row({1: Fraction(1, 2)}, high=3)
    made.row({2: 5}, low=-10)
    assert made.row_lows == [0.25, -INFINITE, -2.0]
    assert made.row_highs == [2.0, 6.0, INFINITE]
    assert made.starts == [0, 2, 3]
    assert made.columns == [0, 2, 1, 2]
    assert made.coefficients == [0.5, -1.0, 1.0, 1.0]


@pytest.mark.parametrize(
    ("low", "high", "impossible"),
    [(0, 0, False), (-1, 1, False), (-INFINITE, INFINITE, False), (1, 2, True), (-2, -1, True)],
)
def test_a_row_of_nothing_stays_out_unless_nothing_can_satisfy_it(
    low: float, high: float, *, impossible: bool
) -> None:
    made = Program()
    made.switch()
    made.row({0: 0}, low=low, high=high)
    made.row({}, low=low, high=high)
    assert made.row_lows == ([1.0, 1.0] if impossible else [])
    assert made.row_highs == ([INFINITE, INFINITE] if impossible else [])
    assert made.starts == ([0, 0] if impossible else [])
    assert made.coefficients == []
    solved = made.solve(10)
    assert solved == "none" if impossible else isinstance(solved, Solution)


def test_the_least_cost_is_found_and_proved() -> None:
    solved = knapsack().solve(10)
    assert isinstance(solved, Solution)
    assert [round(each, 6) for each in solved.values] == [1, 0, 1]
    assert [solved.is_on(column) for column in range(3)] == [True, False, True]
    assert solved.proven
    assert round(solved.best, 6) == 13


def test_the_fewest_and_no_more_than_are_allowed() -> None:
    made = knapsack()
    made.row({0: 1, 2: 1}, high=1)  # not both of the cheapest
    solved = made.solve(10)
    assert isinstance(solved, Solution)
    assert round(solved.best, 6) == 14
    made.row({1: 1}, high=0)
    assert made.solve(10) == "none"


def test_without_time_nothing_is_found() -> None:
    assert knapsack().solve(0) == "out of time"
    assert knapsack().solve(-1) == "out of time"
    assert isinstance(knapsack().solve(0.5), Solution)


def test_a_column_that_need_not_be_whole_is_not() -> None:
    made = Program()
    made.column(1, 0, 9, whole=False)
    made.column(1, 0, 9, whole=True)
    made.row({0: 2}, low=5)
    made.row({1: 2}, low=5)
    solved = made.solve(10)
    assert isinstance(solved, Solution)
    assert [round(each, 6) for each in solved.values] == [2.5, 3]
    assert [solved.is_on(column) for column in (0, 1)] == [False, False]


def test_the_solver_is_quiet_exact_and_the_same_each_time() -> None:
    solver = knapsack().given(7.5)
    wanted = {
        "output_flag": False,
        "threads": 1,
        "random_seed": 0,
        "time_limit": 7.5,
        "mip_rel_gap": 0.0,
        "mip_abs_gap": 1e-9,
        "mip_feasibility_tolerance": 1e-9,
        "primal_feasibility_tolerance": 1e-9,
    }
    assert {name: solver.getOptionValue(name)[1] for name in wanted} == wanted
    model = solver.getLp()
    assert (model.num_col_, model.num_row_) == (3, 1)
    assert list(model.col_cost_) == [4, 5, 9]
    assert (list(model.col_lower_), list(model.col_upper_)) == ([0, 0, 0], [1, 1, 1])
    assert (list(model.row_lower_), list(model.row_upper_)) == ([9 / 8], [INFINITE])
    assert list(model.integrality_) == [highspy.HighsVarType.kInteger] * 3
