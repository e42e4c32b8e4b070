"""A mixed-integer program handed to HiGHS, and what came back. Floats only propose: the exact assessment
decides.

HiGHS (https://highs.dev) is asked for the least cost with no gap, on one thread, with a time limit.
"""

from collections.abc import Mapping
from dataclasses import dataclass, field
from fractions import Fraction
from typing import Literal, NamedTuple

import highspy
import numpy as np

Number = Fraction | float | int
INFINITE = float("inf")
GAP = 1e-9
TOLERANCE = 1e-9


class Solution(NamedTuple):
    """Values by column; `proven`: nothing is less. `best` is the cost, `seconds` what HiGHS itself took."""

    values: tuple[float, ...]
    proven: bool
    best: float

    def is_on(self, column: int) -> bool:
        """Return whether a column of 0 or 1 is 1."""
        return round(self.values[column]) == 1


Outcome = Solution | Literal["none", "out of time"]


@dataclass
class Program:
    """Columns with their costs and bounds, rows with their coefficients: least cost is wanted."""

    costs: list[float] = field(default_factory=list)
    lows: list[float] = field(default_factory=list)
    highs: list[float] = field(default_factory=list)
    whole: list[bool] = field(default_factory=list)
    row_lows: list[float] = field(default_factory=list)
    row_highs: list[float] = field(default_factory=list)
    starts: list[int] = field(default_factory=list)
    columns: list[int] = field(default_factory=list)
    coefficients: list[float] = field(default_factory=list)

    def column(self, cost: Number, low: Number, high: Number, *, whole: bool) -> int:
        """Add a column and return its number."""
        self.costs.append(float(cost))
        self.lows.append(float(low))
        self.highs.append(float(high))
        self.whole.append(whole)
        return len(self.costs) - 1

    def switch(self, cost: Number = 0) -> int:
        """Add a column that is 0 or 1 and return its number."""
        return self.column(cost, 0, 1, whole=True)

    def row(self, parts: Mapping[int, Number], low: Number = -INFINITE, high: Number = INFINITE) -> None:
        """Add a row: the sum of columns times coefficients lies from low to high."""
        largest = max((abs(float(each)) for each in parts.values()), default=0.0)
        if not largest:
            if low > 0 or high < 0:
                self.row_lows.append(1.0)  # nothing can do it: a row that says so
                self.row_highs.append(INFINITE)
                self.starts.append(len(self.columns))
            return
        self.row_lows.append(float(low) / largest)
        self.row_highs.append(float(high) / largest)
        self.starts.append(len(self.columns))
        for column, each in parts.items():
            if each:
                self.columns.append(column)
                self.coefficients.append(float(each) / largest)

    def solve(self, seconds: float) -> Outcome:
        """Return the least cost found within this many seconds, or that there is none, or that none was
        found.
        """
        if seconds <= 0:
            return "out of time"
        solver = self.given(seconds)
        solver.run()
        status, info = solver.getModelStatus(), solver.getInfo()
        if status == highspy.HighsModelStatus.kInfeasible:
            return "none"
        if info.primal_solution_status != highspy.SolutionStatus.kSolutionStatusFeasible:
            return "out of time"
        values = tuple(solver.getSolution().col_value)
        return Solution(values, status == highspy.HighsModelStatus.kOptimal, info.objective_function_value)

    def given(self, seconds: float) -> highspy.Highs:
        """Return a solver that was given this program."""
        solver = highspy.Highs()  # type: ignore[no-untyped-call]  # highspy types its results, not its maker
        for name, value in (
            ("output_flag", False),
            ("threads", 1),
            ("random_seed", 0),
            ("time_limit", seconds),
            ("mip_rel_gap", 0.0),
            ("mip_abs_gap", GAP),
            ("mip_feasibility_tolerance", TOLERANCE),
            ("primal_feasibility_tolerance", TOLERANCE),
        ):
            solver.setOptionValue(name, value)
        solver.passModel(self._model())
        return solver

    def _model(self) -> highspy.HighsLp:
        model = highspy.HighsLp()
        model.num_col_, model.num_row_ = len(self.costs), len(self.row_lows)
        model.col_cost_ = np.array(self.costs)
        model.col_lower_, model.col_upper_ = np.array(self.lows), np.array(self.highs)
        model.row_lower_, model.row_upper_ = np.array(self.row_lows), np.array(self.row_highs)
        model.a_matrix_.format_ = highspy.MatrixFormat.kRowwise
        model.a_matrix_.start_ = np.array([*self.starts, len(self.columns)])
        model.a_matrix_.index_ = np.array(self.columns)
        model.a_matrix_.value_ = np.array(self.coefficients)
        kinds = highspy.HighsVarType
        model.integrality_ = [kinds.kInteger if each else kinds.kContinuous for each in self.whole]
        return model
