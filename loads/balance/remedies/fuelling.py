"""Less fuel, or the same fuel in other tanks: the least change that brings a load within.

Fuel never goes below what the load wants at landing, and where a limit at zero fuel is broken less fuel is no
remedy at all. It changes in one tank, or alike in all tanks of one stage of the burn. A ladder up to all that
is there finds an amount that holds; then every such way is searched for less, by proof (`remedies.first`).
What the time did not suffice to prove is told as the best found.
"""

from collections.abc import Callable, Iterable, Iterator, Mapping
from dataclasses import replace
from fractions import Fraction
from itertools import permutations
from math import ceil, floor, lcm
from typing import NamedTuple

from fleet.basis import Basis
from loads.balance.aboard import Declared, FuelPlan, TankFuel
from loads.balance.fuel import burn
from loads.balance.remedies.arranging import Found
from loads.balance.remedies.first import first_that_holds
from loads.balance.remedies.question import OWN_WEIGHTS, TENTH, Question, broken
from loads.balance.remedies.steps import Refuel, Step, taken
from loads.balance.remedies.varying import CannotBe, Change, Varying, table_points

ZERO = Fraction(0)
RUNGS = 8
NOT_BY_FUEL = ("seat.", "place.", "zone.", "persons.")
Group = tuple[str, ...]  # tanks that change alike
Made = Callable[[Fraction], tuple[Step, ...] | None]  # from tenths in each tank to the steps


class Way(NamedTuple):
    """One way of changing fuel: each count is `tenths` tenths in all, and counts go from `least` to `most`.
    `marks` are counts at which what a tank holds stands on a point of its table.
    """

    made: Made
    tenths: int
    least: int
    most: int
    marks: tuple[Fraction, ...]


def less_fuel(question: Question) -> Found | None:
    """Return the least fuel to leave out; None without fuel to spare above what is wanted at landing."""
    plan, stops = question.declared.fuel, broken(question.result)
    if not plan.minimum_at_landing or question.breaks(*NOT_BY_FUEL):
        return None
    if any(check.phase == "zero fuel" for check in stops):
        return None
    spare = question.result.state("landing").fuel - plan.minimum_at_landing
    most = floor(spare / plan.density / TENTH)
    _, excess = question.weight_range()
    least = max(ceil(-excess / plan.density / TENTH) if excess is not None else 0, 1)
    ways = []
    for group in _groups(question.declared, question.ready.basis):
        tanks = [held for held in plan.tanks if held.tank.id in group]
        step = len(group)  # a tenth in each tank of it
        made, marks = _drawn_from(tanks), [mark for held in tanks for mark in table_points(held, -TENTH)]
        held_all = min((held.usable for held in tanks), default=ZERO)
        each = min(most // step, floor(held_all / TENTH))
        ways.append(Way(made, step, ceil(Fraction(least, step)), each, tuple(marks)))
    return _smallest(question, ways)


def fuel_elsewhere(question: Question) -> Found | None:
    """Return the least fuel to carry in other tanks instead; how much is aboard stays the same."""
    if not question.declared.fuel.minimum_at_landing or question.breaks(*OWN_WEIGHTS, *NOT_BY_FUEL):
        return None
    plan = question.declared.fuel
    ways = []
    for start, end in permutations(_groups(question.declared, question.ready.basis), 2):
        if not set(start) & set(end):
            tenths = lcm(len(start), len(end))
            giving = [held for held in plan.tanks if held.tank.id in start]
            taking = [held for held in plan.tanks if held.tank.id in end]
            less, more = (Fraction(tenths, len(tanks)) * TENTH for tanks in (giving, taking))
            marks = [mark for held in giving for mark in table_points(held, -less)]
            marks += [mark for held in taking for mark in table_points(held, more)]
            most = _most_carried(plan, start, end) // tenths
            ways.append(Way(_carried_over(giving, taking, tenths), tenths, 1, most, tuple(marks)))
    return _smallest(question, ways)


def _smallest(question: Question, ways: Iterable[Way]) -> Found | None:
    """Return the least change of all ways: first one that holds, then by proof whatever is less."""
    best: tuple[int, Found] | None = None
    tried = [(way, Varying(question, _change(question, way))) for way in ways]
    for way, varying in tried:
        most = way.most if best is None else min(way.most, (best[0] - 1) // way.tenths)
        count = _ladder(varying, way.least, most)
        best = _found(way, varying, count) or best
    for way, varying in tried:
        most = way.most if best is None else min(way.most, (best[0] - 1) // way.tenths)
        held = first_that_holds(varying, way.least, most)
        best = (None if held is None else _found(way, varying, held[0])) or best
    if best is None:
        return None
    return replace(best[1], proven=question.left() > 0)


def _found(way: Way, varying: Varying, count: int | None) -> tuple[int, Found] | None:
    result = None if count is None else varying.result(Fraction(count))
    steps = None if count is None else way.made(Fraction(count))
    if count is None or steps is None or result is None or result.verdict != "within":
        return None
    return count * way.tenths, Found(steps, result, proven=False)


def _change(question: Question, way: Way) -> Change:
    basis = question.ready.basis

    def changed(count: Fraction) -> Declared:
        steps = way.made(count)
        declared = None if steps is None else taken(question.declared, steps)
        if declared is None or not _burns(declared.fuel, basis):
            raise CannotBe
        return declared

    return Change(changed, refuels=True, marks=way.marks)


def _groups(declared: Declared, basis: Basis) -> Iterator[Group]:
    """Yield the tanks that may change together: those of one stage of the burn, then each by itself."""
    seen: set[Group] = set()
    for stage in (*basis.burn_order, *basis.taxi_order):
        group = tuple(sorted(stage.tanks))
        if group not in seen:
            seen.add(group)
            yield group
    for held in declared.fuel.tanks:
        if (held.tank.id,) not in seen:
            yield (held.tank.id,)


def _ladder(varying: Varying, least: int, most: int) -> int | None:
    """Return a count that holds: the first rung of a ladder that does, and from there down by halving."""
    if least > most:
        return None
    below = least - 1
    rungs = sorted({least, *(least + (most - least) * rung // RUNGS for rung in range(1, RUNGS + 1))})
    for rung in rungs:
        if not _holds(varying, rung):
            below = rung
            continue
        high = rung
        while high - below > 1:
            middle = (high + below) // 2
            if _holds(varying, middle):
                high = middle
            else:
                below = middle
        return high
    return None


def _holds(varying: Varying, count: int) -> bool:
    if not varying.question.left():
        return False
    result = varying.result(Fraction(count))
    return result is not None and result.verdict == "within"


def _burns(plan: FuelPlan, basis: Basis) -> bool:
    """Return whether the tanks that feed still hold what is to be burned."""
    contents: Mapping[str, Fraction] = {held.tank.id: held.usable for held in plan.tanks}
    contents, short = burn(contents, basis.taxi_order, plan.taxi / plan.density)
    return not short and not burn(contents, basis.burn_order, plan.trip / plan.density)[1]


def _drawn_from(tanks: list[TankFuel]) -> Made:
    def made(tenths: Fraction) -> tuple[Step, ...] | None:
        each = tenths * TENTH
        if not tanks or any(held.usable < each for held in tanks):
            return None
        return tuple(Refuel(held.tank, -each) for held in tanks)

    return made


def _carried_over(giving: list[TankFuel], taking: list[TankFuel], each: int) -> Made:
    def made(count: Fraction) -> tuple[Step, ...] | None:
        amount = count * each * TENTH
        less, more = amount / len(giving), amount / len(taking)
        if any(held.usable < less for held in giving):
            return None
        if any(held.usable + held.trapped + more > held.tank.capacity for held in taking):
            return None
        return (
            *(Refuel(held.tank, -less) for held in giving),
            *(Refuel(held.tank, more) for held in taking),
        )

    return made


def _most_carried(plan: FuelPlan, start: Group, end: Group) -> int:
    """Return the most that can change tanks, in tenths."""
    giving = min((held.usable for held in plan.tanks if held.tank.id in start), default=ZERO) * len(start)
    room = min(
        (held.tank.capacity - held.usable - held.trapped for held in plan.tanks if held.tank.id in end),
        default=ZERO,
    ) * len(end)
    return floor(min(giving, room) / TENTH)
