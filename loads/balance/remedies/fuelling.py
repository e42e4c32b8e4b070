"""Less fuel, or the same fuel in other tanks: the least change that was found to bring a load within.

Fuel never goes below what the load wants at landing, and where a limit at zero fuel is broken less fuel is no
remedy at all. How a change of fuel runs through the burn is not linear (tanks feed in turn, tables bend), so
amounts are tried: the least that any weight asks for, then a ladder up to all there is, then halving between
the last amount that did not hold and the first that did. Less fuel that takes off no more than the greatest
excess of weight is proved the smallest; anything else is the best found.
"""

from collections.abc import Callable, Iterator, Mapping
from fractions import Fraction
from itertools import permutations
from math import ceil, floor, lcm

from fleet.basis import Basis
from fleet.tanks import OutsideTable
from loads.balance.aboard import Declared, FuelPlan
from loads.balance.fuel import burn
from loads.balance.remedies.arranging import Found
from loads.balance.remedies.question import OWN_WEIGHTS, TENTH, Question, broken
from loads.balance.remedies.steps import Refuel, Step, taken
from loads.balance.result import Result

ZERO = Fraction(0)
RUNGS = 8
NOT_BY_FUEL = ("seat.", "place.", "zone.", "persons.")
Group = tuple[str, ...]  # tanks that change alike
Made = Callable[[int], tuple[Step, ...] | None]  # from tenths in each tank to the steps


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
    best: tuple[int, Found] | None = None
    for group in _groups(question.declared, question.ready.basis):
        bound = most if best is None else min(most, best[0] - 1)
        step = len(group)  # a tenth in each tank of it
        found = _ladder(question, _drawn_from(plan, group), ceil(Fraction(least, step)), bound // step)
        if found is not None:
            count, steps, result = found
            amount = count * step
            best = amount, Found(steps, result, amount == least)
            if amount == least:
                break
    return None if best is None else best[1]


def fuel_elsewhere(question: Question) -> Found | None:
    """Return the least fuel to carry in other tanks instead; how much is aboard stays the same."""
    if not question.declared.fuel.minimum_at_landing or question.breaks(*OWN_WEIGHTS, *NOT_BY_FUEL):
        return None
    plan = question.declared.fuel
    best: tuple[int, Found] | None = None
    for start, end in permutations(_groups(question.declared, question.ready.basis), 2):
        if set(start) & set(end):
            continue
        made = _carried_over(plan, start, end)
        step = lcm(len(start), len(end))
        bound = _most_carried(plan, start, end)
        bound = bound if best is None else min(bound, best[0] - 1)
        found = _ladder(question, made, 1, bound // step)
        if found is not None:
            amount = found[0] * step
            best = amount, Found(found[1], found[2], amount == 1)
    return None if best is None else best[1]


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


def _ladder(
    question: Question, made: Made, least: int, most: int
) -> tuple[int, tuple[Step, ...], Result] | None:
    """Return the least count found that holds, with its steps: of tenths in each tank that changes."""
    if least > most:
        return None
    below = least - 1
    rungs = sorted({least, *(least + (most - least) * rung // RUNGS for rung in range(1, RUNGS + 1))})
    for rung in rungs:
        held = _tried(question, made, rung)
        if held is None:
            below = rung
            continue
        while rung - below > 1:
            middle = (rung + below) // 2
            nearer = _tried(question, made, middle)
            if nearer is None:
                below = middle
            else:
                rung, held = middle, nearer  # noqa: PLW2901  # the first rung that holds is where halving begins
        return rung, *held
    return None


def _tried(question: Question, made: Made, tenths: int) -> tuple[tuple[Step, ...], Result] | None:
    steps = made(tenths)
    if steps is None or not question.left():
        return None
    declared = taken(question.declared, steps)
    if not _burns(declared.fuel, question.ready.basis):
        return None
    try:
        result = question.assessed(declared)
    except OutsideTable:  # a transfer on the flight would then find a tank too full
        return None
    return (steps, result) if result.verdict == "within" else None


def _burns(plan: FuelPlan, basis: Basis) -> bool:
    """Return whether the tanks that feed still hold what is to be burned."""
    contents: Mapping[str, Fraction] = {held.tank.id: held.usable for held in plan.tanks}
    contents, short = burn(contents, basis.taxi_order, plan.taxi / plan.density)
    return not short and not burn(contents, basis.burn_order, plan.trip / plan.density)[1]


def _drawn_from(plan: FuelPlan, group: Group) -> Made:
    tanks = [held for held in plan.tanks if held.tank.id in group]

    def made(tenths: int) -> tuple[Step, ...] | None:
        each = tenths * TENTH
        if not tanks or any(held.usable < each for held in tanks):
            return None
        return tuple(Refuel(held.tank, -each) for held in tanks)

    return made


def _carried_over(plan: FuelPlan, start: Group, end: Group) -> Made:
    giving = [held for held in plan.tanks if held.tank.id in start]
    taking = [held for held in plan.tanks if held.tank.id in end]

    def made(tenths: int) -> tuple[Step, ...] | None:
        amount = tenths * TENTH * lcm(len(giving), len(taking))
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
