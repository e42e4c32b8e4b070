"""The whole path decided exactly against plain floats with shapely at four points, on the same load.

    .venv/bin/python -m tests.bench.path_against_shapely

Both start from the declared values of 20 items, 3 people and 4 tanks as numbers, and end with inside or
outside and the least margin along the arm. The float way adds up in floats, burns the tanks stage by stage,
and asks shapely at engine start, take-off, landing and least fuel whether the envelope covers the point and
how far the edges are along the arm: it sees nothing of what lies between. The exact way looks at every kink
and everything between. Further rows: the exact
way at the four points only, and the decision alone, once the sums are known. Best of many short
rounds, taken in turns.
"""

import sys
from collections.abc import Callable
from fractions import Fraction

from shapely import LineString, Point, Polygon

from fleet.basis import BurnStage, Phase
from loads.balance.assess import _states
from loads.balance.declared import read_load
from loads.balance.fuel import FuelState, fuel_states
from loads.balance.path import burn_path
from loads.balance.path_curve import curves_of
from loads.balance.path_margin import least_margin
from loads.balance.path_outside import Nearest
from loads.balance.prepared import prepared
from loads.balance.result import State
from loads.balance.sums import sums_without_fuel
from loads.balance.sumsheet import lines_without_fuel
from tests.bench.full_answer_cpu import best_in_turns, full_load
from tests.pure.loads.making import twin, twin_empty

WANTED = 1.0
CLOSE = 1e-6
FLIGHT: tuple[Phase, ...] = ("ramp", "take-off", "landing", "minimum at landing")
BASIS, EMPTY = twin(), twin_empty()
READY = prepared(BASIS)
DECLARED = read_load(full_load(), BASIS)
SHAPE = BASIS.envelopes[0].shape
POLYGON = Polygon([(float(x), float(y)) for x, y in BASIS.envelopes[0].points])
ABOARD = lines_without_fuel(DECLARED, EMPTY)
LINES = [
    (float(line.weight), float(line.arm))
    for line in (*ABOARD.operating, *ABOARD.payload)
    if line.weight is not None and line.arm is not None
]
TANKS = {held.tank.id: float(held.usable) for held in DECLARED.fuel.tanks}
ARMS = {tank.id: float(tank.table.points[0][1]) for tank in BASIS.tanks}
DENSITY = float(DECLARED.fuel.density)


def exact_phases() -> tuple[dict[Phase, FuelState], dict[Phase, State]]:
    """Return the fuel and the aircraft at every phase, exact."""
    dry, fuel = sums_without_fuel(DECLARED, EMPTY), fuel_states(DECLARED.fuel, READY)
    return fuel, _states(dry, fuel, READY)[0]


def exact_path(fuel: dict[Phase, FuelState], states: dict[Phase, State]) -> Fraction:
    """Return the least margin of the whole path, exact."""
    found = least_margin(curves_of(burn_path(DECLARED.fuel, fuel, states).stretches, "longitudinal"), SHAPE)
    return found.margin.floor(80) if isinstance(found, Nearest) else Fraction(-1)


def exact_points(states: dict[Phase, State]) -> Fraction:
    """Return the least margin at four points, exact."""
    sections = [SHAPE.arm_section(states[phase].weight, states[phase].moment) for phase in FLIGHT]
    return min(Fraction(-1) if section is None else section.margin for section in sections)


def float_points() -> list[tuple[float, float]]:
    """Return arm and weight at four points, added up in floats."""
    weight = sum(weight for weight, _ in LINES)
    moment = sum(weight * arm for weight, arm in LINES)
    plan = DECLARED.fuel
    take_off = burned(TANKS, BASIS.taxi_order, float(plan.taxi) / DENSITY)
    landing = burned(take_off, BASIS.burn_order, float(plan.trip) / DENSITY)
    spare = sum(landing.values()) - float(plan.minimum_at_landing) / DENSITY
    found = []
    for tanks in (TANKS, take_off, landing, burned(landing, BASIS.burn_order, spare)):
        whole = weight + sum(tanks.values()) * DENSITY
        fuel = sum(held * ARMS[tank] for tank, held in tanks.items()) * DENSITY
        found.append(((moment + fuel) / whole, whole))
    return found


def float_margin(points: list[tuple[float, float]]) -> float:
    """Return the least margin at these points, with shapely; below 0 where one is not covered."""
    nearest = float("inf")
    for arm, weight in points:
        if not POLYGON.covers(Point(arm, weight)):
            return -1.0
        low, _, high, _ = POLYGON.intersection(LineString([(0.0, weight), (1000.0, weight)])).bounds
        nearest = min(nearest, arm - low, high - arm)
    return nearest


def burned(tanks: dict[str, float], order: tuple[BurnStage, ...], volume: float) -> dict[str, float]:
    """Return what is left; tanks of a stage give the same."""
    left = dict(tanks)
    for stage in order:
        feeding = [tank for tank in stage.tanks if left[tank] > 0]
        while feeding and volume > CLOSE:
            each = min(volume / len(feeding), *(left[tank] for tank in feeding))
            for tank in feeding:
                left[tank] -= each
            volume -= each * len(feeding)
            feeding = [tank for tank in feeding if left[tank] > CLOSE]
    return left


def main() -> int:
    """Print the table; exit 1 when the exact way takes longer than wanted."""
    fuel, states = exact_phases()
    points = float_points()
    if abs(float(exact_path(fuel, states)) - float_margin(points)) > CLOSE:
        raise AssertionError
    works: dict[str, Callable[[], object]] = {
        "exact, whole path, from the declaration": lambda: exact_path(*exact_phases()),
        "exact, four points, from the declaration": lambda: exact_points(exact_phases()[1]),
        "floats with shapely, four points, the same": lambda: float_margin(float_points()),
        "exact, whole path, the decision alone": lambda: exact_path(fuel, states),
        "floats with shapely, the decision alone": lambda: float_margin(points),
    }
    took = dict(zip(works, best_in_turns(*works.values()), strict=True))
    for name, figure in took.items():
        print(f"{name:<44}{figure * 1000:7.0f} microseconds")
    path, _, floats, decided, covered = took.values()
    print(f"exact whole path / floats with shapely at four points {path / floats:6.2f}  (wanted: {WANTED:g})")
    print(f"the decision alone, the same {decided / covered:31.2f}  (wanted: {WANTED:g})")
    return 0 if path <= WANTED * floats else 1


if __name__ == "__main__":
    sys.exit(main())
