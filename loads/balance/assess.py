"""One load assessed: every phase, the burn between them, every limit, exact. Pure: the same inputs and
versions give the same bytes, always.
"""

from functools import cache

from fleet.basis import PHASES, Basis, Phase
from fleet.weighing import EmptyFigures
from loads.balance.aboard import Declared, Outline
from loads.balance.checks_balance import balance_checks
from loads.balance.checks_known import (
    empty_weight_check,
    no_basis,
    nothing_left_check,
    off_table_check,
    persons_check,
    weight_knowledge,
)
from loads.balance.checks_path import path_checks
from loads.balance.checks_places import held_by, place_checks, tank_checks
from loads.balance.checks_weight import landing_fuel_check, weight_checks
from loads.balance.fuel import FuelOffTable, FuelState, fuel_states
from loads.balance.moves import cg_advice
from loads.balance.path import burn_path
from loads.balance.path_worst import Burn, burn_of
from loads.balance.prepared import Prepared, prepared
from loads.balance.report import Assessed, report, report_without_basis
from loads.balance.result import Check, Result, State, verdict_of
from loads.balance.sumsheet import Aboard, all_lines, lines_without_fuel


def assess(
    declared: Declared | Outline, basis: Basis | None, empty: EmptyFigures | None, *, advised: bool = True
) -> Result:
    """Return the result of a load against the versions in force; without one of them it is `unresolved`.

    Without being `advised`, no single move is looked for: the checks are the same, without that sentence.

    A load can be declared in full only against a basis, so without one its outline is enough. Phases that
    cannot be known (no empty weight, an unknown weight, fuel off a tank's table) are not in the result:
    unknown is not zero.
    """
    if basis is None:
        unknown = (no_basis(),)
        return Result(verdict_of(unknown), unknown, (), (), report_without_basis())
    if isinstance(declared, Outline):
        raise TypeError("with a basis the whole declaration is needed, not its outline")
    ready = prepared(basis)
    standing = empty_weight_check(empty, basis, declared.configuration.fit)
    aboard = lines_without_fuel(declared, empty if standing.outcome == "pass" else None)
    fuel, off_table = _fuel(declared, ready)
    states, nothing_left = _states(aboard, fuel, ready)
    burn = burn_of(burn_path(declared.fuel, fuel, states), ready) if fuel and states else None
    checks = (
        standing,
        *weight_knowledge(declared),
        persons_check(declared),
        *_checks(declared, states, burn, ready, advised=advised),
        *off_table,
        *nothing_left,
    )
    lines = all_lines(aboard, declared.fuel, fuel, states, ready)
    verdict = verdict_of(checks)
    document = report(Assessed(declared, aboard, lines, states, fuel, burn, checks), ready)
    return Result(verdict, checks, tuple(states.values()), lines, document, burn)


def _fuel(declared: Declared, ready: Prepared) -> tuple[dict[Phase, FuelState] | None, tuple[Check, ...]]:
    try:
        return fuel_states(declared.fuel, ready), ()
    except FuelOffTable as off:
        return None, (off_table_check(off, ready),)


def _states(
    aboard: Aboard, fuel: dict[Phase, FuelState] | None, ready: Prepared
) -> tuple[dict[Phase, State], tuple[Check, ...]]:
    """Return the aircraft at each phase in order; nothing at all where a part of it is not known."""
    dry = aboard.without_fuel
    if dry is None or fuel is None:
        return {}, ()
    found: dict[Phase, State] = {}
    staying = fuel["zero fuel"].usable_weight
    for phase in PHASES:
        held = fuel[phase]
        weight, moment = dry.weight + held.weight, dry.moment + held.moment
        if weight.numerator <= 0:
            return {}, (nothing_left_check(weight, ready),)
        across = dry.lateral_moment + held.lateral_moment
        lateral_arm = across / weight if across else across
        usable = held.usable_weight - staying if staying else held.usable_weight
        found[phase] = State(phase, weight, moment, across, moment / weight, lateral_arm, usable)
    return found, ()


def _checks(
    declared: Declared, states: dict[Phase, State], burn: Burn | None, ready: Prepared, *, advised: bool
) -> list[Check]:
    held = held_by(declared)
    found: list[Check] = []
    if states and burn is not None:
        advice = cache(lambda: cg_advice(declared, states, burn, held, ready) if advised else "")
        found += weight_checks(declared, states, ready)
        found += balance_checks(states, ready, advice)
        found += path_checks(burn, states, ready, advice)
        found.append(landing_fuel_check(declared.fuel, states["landing"], ready))
    return found + place_checks(held, ready) + tank_checks(declared, ready)
