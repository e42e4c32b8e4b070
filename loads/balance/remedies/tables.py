"""Where the take-off trim setting, or the balance of the fuel, may turn from kept to broken as a load varies.

A setting is straight in the CG and in the weight between the points of its table, and the difference between
two sides of the fuel, and what is allowed of it, are straight between those of theirs. Times what stands
under the line, all of them are polynomials of x.
"""

from collections.abc import Iterator, Sequence
from fractions import Fraction
from itertools import pairwise, product

from fleet.fuel_balance import FuelBalance
from fleet.trim import TrimLine, TrimTable
from loads.balance.aboard import Declared
from loads.balance.checks_fuel_balance import Held
from loads.balance.checks_whole import kinks_between, kinks_of
from loads.balance.fuel import FuelOffTable, fuel_states
from loads.balance.polynomial import ONE, Poly, Root, add, multiply, roots_between, scale, value
from loads.balance.prepared import Prepared
from loads.balance.sections import sections_of
from loads.balance.touching import Ends, Varied
from loads.balance.varied_flights import Fit

ZERO = Fraction(0)


def trim_turns(take_off: Varied, ready: Prepared, ends: Ends) -> Iterator[Root]:
    """Yield where the setting of a take-off may come to an end of its table, or of what is allowed."""
    trim, chord = ready.basis.trim, ready.basis.chord
    if trim is None or (trim.against == "chord" and chord is None):
        return
    weight, over = take_off.weight[0], multiply(take_off.weight[0], take_off.over)
    figure = take_off.moment[0]  # times `over` below the line it is the CG
    if trim.against == "chord" and chord is not None:
        figure = scale(add(figure, scale(over, -chord.leading_edge)), 100 / chord.length)
    for table in trim.tables:
        for line in table.lines:
            for cg in (line.points[0][0], line.points[-1][0]):
                yield from roots_between(add(figure, scale(over, -cg)), *ends)
            if line.weight is not None:
                yield from roots_between(add(weight, (-line.weight,)), *ends)
        for figures in _settings(table, (weight, figure, over), (trim.lowest, trim.highest)):
            yield from roots_between(figures, *ends)


def _settings(
    table: TrimTable, take_off: tuple[Poly, Poly, Poly], allowed: Sequence[Fraction | None]
) -> Iterator[Poly]:
    """Yield what is nothing where a setting is one that ends what is allowed, for each straight part."""
    weight, figure, over = take_off
    lines = table.lines if table.lines[1:] else (*table.lines, *table.lines)
    for lighter, heavier in pairwise(lines):
        for low, high in product(_straight(lighter), _straight(heavier)):
            for end in allowed:
                if end is not None:
                    least = add(scale(over, low[0] - end), scale(figure, low[1]))
                    most = add(scale(over, high[0] - end), scale(figure, high[1]))
                    yield _mixed(least, most, weight, lighter, heavier)


def _straight(line: TrimLine) -> Iterator[tuple[Fraction, Fraction]]:
    """Yield the straight parts of a table: the setting is the one figure plus CG times the other."""
    for (x1, y1), (x2, y2) in pairwise(line.points):
        slope = (y2 - y1) / (x2 - x1)
        yield y1 - slope * x1, slope


def _mixed(one: Poly, other: Poly, weight: Poly, lighter: TrimLine, heavier: TrimLine) -> Poly:
    if lighter.weight is None or heavier.weight is None or lighter is heavier:
        return one
    return add(
        multiply(one, add((heavier.weight,), scale(weight, -1))),
        multiply(other, add(weight, (-lighter.weight,))),
    )


def fuel_turns(
    loads: Sequence[Declared], over: Poly, fit: Fit, ready: Prepared, ends: Ends
) -> Iterator[Root]:
    """Yield where a difference between two sides of the fuel may come to what is allowed, or to an end of
    the table that says what that is.
    """
    if not ready.basis.fuel_balance:
        return
    try:
        courses = [_course(each, ready) for each in loads]
    except FuelOffTable:
        return
    for limit in ready.basis.fuel_balance:
        weights = limit.by == "weight"
        per = [
            each.fuel.density if weights else value(over, at) for each, at in zip(loads, fit.at, strict=True)
        ]
        unit: Poly = (ONE,) if weights else over
        points = [_figures(limit, helds, loads, per) for helds in zip(*courses, strict=False)]
        for figures in points:
            yield from _at_kink(limit, figures, unit, fit, ends)
        for before, after in pairwise(points):
            yield from _at_table(limit, (before, after), (unit, per), fit, ends)


Figures = list[tuple[Fraction, Fraction]]  # left less right, and the fuel aboard, at each of three x


def _course(declared: Declared, ready: Prepared) -> list[Held]:
    if declared.sequence:
        return kinks_between(sections_of(declared, ready))
    return kinks_of(fuel_states(declared.fuel, ready))


def _figures(
    limit: FuelBalance, helds: Sequence[Held], loads: Sequence[Declared], per: Sequence[Fraction]
) -> Figures:
    found = []
    for held, declared, each in zip(helds, loads, per, strict=True):
        trapped = {fuel.tank.id: fuel.trapped for fuel in declared.fuel.tanks}
        left, right = (
            sum((held.contents[tank] + trapped.get(tank, ZERO) for tank in tanks), ZERO)
            for tanks in (limit.left, limit.right)
        )
        found.append(((left - right) * each, sum(held.contents.values(), ZERO) * each))
    return found


def _at_kink(limit: FuelBalance, figures: Figures, unit: Poly, fit: Fit, ends: Ends) -> Iterator[Root]:
    less, aboard = (fit.through(each) for each in zip(*figures, strict=True))
    allowed = [] if limit.maximum is None else [scale(unit, limit.maximum)]
    for (x1, y1), (x2, y2) in pairwise(limit.points):
        slope = (y2 - y1) / (x2 - x1)
        allowed.append(add(scale(unit, y1 - slope * x1), scale(aboard, slope)))
    for most in allowed:
        for sign in (1, -1):
            yield from roots_between(add(most, scale(less, sign)), *ends)
    for at, _ in limit.points:
        yield from roots_between(add(aboard, scale(unit, -at)), *ends)


def _at_table(
    limit: FuelBalance,
    kinks: tuple[Figures, Figures],
    units: tuple[Poly, Sequence[Fraction]],
    fit: Fit,
    ends: Ends,
) -> Iterator[Root]:
    """Yield where the difference at a point of the table, between two kinks, may come to what is allowed."""
    (before, after), (unit, per) = kinks, units
    if any(one[1] == other[1] for one, other in zip(before, after, strict=True)):
        return
    for at, allowed in limit.points:
        less = []
        for (first, full), (last, rest), each in zip(before, after, per, strict=True):
            point = at if limit.by == "weight" else at * each
            less.append(first + (full - point) / (full - rest) * (last - first))
        for sign in (1, -1):
            yield from roots_between(add(scale(unit, allowed), scale(fit.through(less), sign)), *ends)
