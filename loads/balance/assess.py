"""One load assessed: every phase, the burn between them, every limit, exact. Pure: the same inputs and
versions give the same bytes, always.
"""

from collections.abc import Callable, Mapping
from functools import cache
from typing import NamedTuple

from fleet.applicable import applicable
from fleet.basis import PHASES, Basis, Phase
from fleet.weighing import EmptyFigures
from loads.balance.aboard import Declared, Outline
from loads.balance.checks_balance import balance_checks
from loads.balance.checks_circumstances import circumstance_checks
from loads.balance.checks_flight_weight import greatest_persons_check, with_flight_weights
from loads.balance.checks_floor import floor_checks
from loads.balance.checks_known import (
    empty_weight_check,
    no_basis,
    nothing_left_check,
    off_table_check,
    persons_check,
    weight_knowledge,
)
from loads.balance.checks_path import path_checks
from loads.balance.checks_places import Held, held_by, place_checks, tank_checks
from loads.balance.checks_running import running_checks
from loads.balance.checks_seats import seat_checks
from loads.balance.checks_standard import standard_checks
from loads.balance.checks_weight import landing_fuel_check, weight_checks
from loads.balance.checks_whole import whole_aircraft_checks
from loads.balance.exact import minus, plus, quotient
from loads.balance.flight_weights import FlightWeights, flight_weights
from loads.balance.flown import (
    Flown,
    along_rails,
    fly,
    path_of,
    states_aboard,
    tanks_over_flight,
    worst_of_each,
)
from loads.balance.fuel import FuelOffTable, FuelState
from loads.balance.moves import Flight, cg_advice
from loads.balance.path_events import parts_set
from loads.balance.path_worst import Burn, burn_of
from loads.balance.prepared import Prepared, prepared
from loads.balance.rails import RailEnd, at_rail_end, between_ends, parts_lie_apart, rail_ends, worse_of
from loads.balance.report import Assessed, report, report_without_basis
from loads.balance.result import Check, Result, State, verdict_of
from loads.balance.sections import dry_at_phases, events_before
from loads.balance.sums import Sums, sums_without_fuel
from loads.balance.sumsheet import all_lines, lines_without_fuel
from loads.balance.sumsheet_events import flight_lines


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
    ready, standing, known = _standing(declared, basis, empty)
    aboard = lines_without_fuel(declared, known)
    judged = _judged(declared, aboard.without_fuel, (standing, known), ready, advised=advised)
    states, flown, burn, weights, checks = judged
    fuel = None if flown is None else flown.fuel
    after_ramp = flight_lines(declared, flown.sections, states, ready) if flown and flown.sections else ()
    lines = all_lines(aboard, declared.fuel, fuel, states, ready, flight=after_ramp)
    verdict = verdict_of(checks)
    document = report(Assessed(declared, aboard, lines, states, fuel, burn, checks, weights), ready)
    return Result(verdict, checks, tuple(states.values()), lines, document, burn)


def checks_alone(declared: Declared, basis: Basis, empty: EmptyFigures | None) -> tuple[Check, ...]:
    """Return the checks `assess` would return unadvised, without the rest of a result: for many loads of
    which nobody reads a loading computation.
    """
    ready, standing, known = _standing(declared, basis, empty)
    dry = sums_without_fuel(declared, known)
    return _judged(declared, dry, (standing, known), ready, advised=False).checks


class _Judged(NamedTuple):
    """What is found about a load."""

    states: dict[Phase, State]
    flown: Flown | None
    burn: Burn | None
    weights: FlightWeights | None
    checks: tuple[Check, ...]


def _standing(
    declared: Declared, basis: Basis, empty: EmptyFigures | None
) -> tuple[Prepared, Check, EmptyFigures | None]:
    """Return the basis made ready for a load, whether the empty weight may be used, and that if it may."""
    category = None if declared.category is None else declared.category.id
    ready = prepared(applicable(basis, declared.configuration.id, category))
    standing = empty_weight_check(empty, basis, declared.configuration.fit)
    return ready, standing, empty if standing.outcome == "pass" else None


def _judged(
    declared: Declared,
    dry: Sums | None,
    empty: tuple[Check, EmptyFigures | None],
    ready: Prepared,
    *,
    advised: bool,
) -> _Judged:
    """Return what is found about a load of these sums without fuel."""
    standing, known = empty
    flown, off_table = _flown(declared, known, ready)
    states, nothing_left = _states_of(declared, dry, flown, ready)
    burn = burn_of(path_of(declared, flown, states, ready), ready) if flown and states else None
    weights = _weights(declared, states, flown, ready)
    checks = (
        standing,
        *weight_knowledge(declared),
        *standard_checks(declared.standards),
        *circumstance_checks(declared.circumstances),
        persons_check(declared),
        *greatest_persons_check(declared, ready),
        *_checks(declared, states, burn, known, ready, weights=weights, advised=advised),
        *whole_aircraft_checks(declared, states, flown, ready),
        *off_table,
        *nothing_left,
    )
    return _Judged(states, flown, burn, weights, checks)


def _flown(
    declared: Declared, empty: EmptyFigures | None, ready: Prepared
) -> tuple[Flown | None, tuple[Check, ...]]:
    try:
        return fly(declared, empty, ready), ()
    except FuelOffTable as off:
        return None, (off_table_check(off, ready),)


def _weights(
    declared: Declared, states: Mapping[Phase, State], flown: Flown | None, ready: Prepared
) -> FlightWeights | None:
    if flown is None or not states or not (declared.sequence or ready.external):
        return None
    return flight_weights(declared, states, (flown.sections, flown.dry), ready)


def _states_of(
    declared: Declared, dry: Sums | None, flown: Flown | None, ready: Prepared
) -> tuple[dict[Phase, State], tuple[Check, ...]]:
    if flown is None or (declared.sequence and flown.dry is None):
        return {}, ()  # also where somebody of unknown weight comes aboard: the landing is not known then
    dry_at = dry_at_phases(declared, flown.dry) if flown.dry is not None else None
    states, nothing_left = _states(dry, flown.fuel, ready, dry_at)
    if (declared.sequence and ready.deciding) or ready.outside:
        parts = {
            phase: parts_set(declared, events_before(declared, phase), ready.outside) for phase in states
        }
        states = {phase: state._replace(parts=parts[phase]) for phase, state in states.items()}
    return states, nothing_left


def _states(
    dry: Sums | None,
    fuel: Mapping[Phase, FuelState] | None,
    ready: Prepared,
    dry_at: Mapping[Phase, Sums] | None = None,
) -> tuple[dict[Phase, State], tuple[Check, ...]]:
    """Return the aircraft at each phase in order; nothing at all where a part of it is not known.

    `dry_at` is the aircraft without fuel at each phase where a sequence changes it.
    """
    if dry is None or fuel is None:
        return {}, ()
    found: dict[Phase, State] = {}
    staying = fuel["zero fuel"].usable_weight
    for phase in PHASES:
        held = fuel[phase]
        if dry_at is not None:
            dry = dry_at[phase]
        weight, moment = plus(dry.weight, held.weight), plus(dry.moment, held.moment)
        if weight.numerator <= 0:
            return {}, (nothing_left_check(weight, ready),)
        across = plus(dry.lateral_moment, held.lateral_moment)
        lateral_arm = quotient(across, weight) if across else across
        usable = minus(held.usable_weight, staying) if staying else held.usable_weight
        found[phase] = State(phase, weight, moment, across, quotient(moment, weight), lateral_arm, usable)
    return found, ()


def _checks(
    declared: Declared,
    states: dict[Phase, State],
    burn: Burn | None,
    empty: EmptyFigures | None,
    ready: Prepared,
    *,
    weights: FlightWeights | None,
    advised: bool,
) -> list[Check]:
    held = held_by(declared)
    found: list[Check] = []
    if states and burn is not None:
        ends = [
            (end, _at_rail_end(declared, (states, burn), end, empty, ready)) for end in rail_ends(declared)
        ]
        flights = [flight for _, flight in ends] or [(states, burn)]
        advice = cache(lambda: cg_advice(declared, flights, held, ready) if advised else "")
        found += weight_checks(declared, states, ready)
        if weights is not None:
            found = with_flight_weights(found, declared, weights, states, ready)
        told = _centre_checks((states, burn), ready, advice)
        if ends:
            at_ends = [(end, _centre_checks(flight, ready, advice)) for end, flight in ends]
            inside = between_ends([end for end, _ in ends], flights, ready)
            there = [(end, _at_rail_end(declared, (states, burn), end, empty, ready)) for end in inside]
            between = [(end, _centre_checks(flight, ready, advice)) for end, flight in there]
            told = worse_of(told, at_ends, between, apart=parts_lie_apart(flights, ready))
        found += told
        found.append(landing_fuel_check(declared.fuel, states["landing"], ready))
    if declared.sequence:
        runs = [(when, _aboard_checks(each, held_by(each), ready)) for when, each in states_aboard(declared)]
        return found + worst_of_each(runs) + tanks_over_flight(declared, ready)
    return found + _aboard_checks(declared, held, ready) + tank_checks(declared, ready)


def _aboard_checks(declared: Declared, held: Held, ready: Prepared) -> list[Check]:
    """Return the checks of what is aboard, seat by seat and place by place."""
    found = place_checks(held, ready, declared.conditions) + running_checks(held, ready)
    return found + floor_checks(declared, ready) + seat_checks(declared, ready)


def _at_rail_end(
    declared: Declared, flight: Flight, end: RailEnd, empty: EmptyFigures | None, ready: Prepared
) -> Flight:
    """Return the phases and the path with all open seats at one end; people may leave such a seat."""
    if not declared.sequence:
        return at_rail_end(flight[0], flight[1], end, ready)
    moved = along_rails(declared, end.share)
    flown = fly(moved, empty, ready)
    states, _ = _states_of(moved, sums_without_fuel(moved, empty), flown, ready)
    return states, burn_of(path_of(moved, flown, states, ready), ready)


def _centre_checks(flight: Flight, ready: Prepared, advice: Callable[[], str]) -> list[Check]:
    """Return the checks of the centre of gravity, at each phase and along the burn."""
    states, burn = flight
    return balance_checks(states, ready, advice) + path_checks(burn, states, ready, advice)
