"""Checks of total weights: ramp, take-off, zero fuel, landing, least fuel at landing, minimum flying weight,
stated limits.
"""

from collections.abc import Mapping
from fractions import Fraction

from fleet.basis import Limits, Phase
from fleet.sourced import Limit
from loads.balance.aboard import Declared, FuelPlan
from loads.balance.margins import Figure, Fix, above, at_least, at_most, below
from loads.balance.prepared import Prepared
from loads.balance.result import Check, State
from loads.balance.rounding import VOLUME_PLACES, WEIGHT_PLACES, printed

IN_FLIGHT: tuple[Phase, ...] = ("take-off", "landing", "minimum at landing")
TITLES: dict[Phase, str] = {
    "ramp": "ramp weight",
    "take-off": "take-off weight",
    "zero fuel": "zero-fuel weight",
    "landing": "landing weight",
    "minimum at landing": "landing weight with the least fuel",
}


def weight_checks(declared: Declared, states: Mapping[Phase, State], ready: Prepared) -> list[Check]:
    """Return one check for every limit of weight, and one for every limit stated with the load."""
    limits = declared.configuration.limits
    fixes = _fixes(declared.fuel, states, ready)
    unit = ready.weight
    found = [
        at_most(
            Figure(_code(phase), title, states[phase].weight, unit, WEIGHT_PLACES, phase),
            _limit(limits, phase),
            fixes[phase],
        )
        for phase, title in TITLES.items()
    ]
    found.append(_minimum_flying(limits, states, ready))
    for number, stated in enumerate(declared.limits, 1):
        at = stated.at
        code, title = f"performance.{at}.{number}", f"{at} weight, {stated.named}"
        figure = Figure(code, title, states[at].weight, unit, WEIGHT_PLACES, at)
        found.append(below(figure, stated.weight, stated.source, fixes[at]))
    return found


def landing_fuel_check(plan: FuelPlan, landing: State, ready: Prepared) -> Check:
    """Return the check that the planned landing fuel is no less than the minimum the load states."""
    figure = Figure(
        "fuel.minimum-at-landing",
        "usable fuel at landing",
        landing.fuel,
        ready.weight,
        WEIGHT_PLACES,
        "landing",
    )

    def fix(short: Fraction) -> str:
        more = f"{_up(short, ready)} ({fuel_up(short, plan, ready)})"
        return f"Add at least {more} of fuel, or plan less trip fuel."

    return above(figure, plan.minimum_at_landing, "stated with the load", fix)


def fuel_up(weight: Fraction, plan: FuelPlan, ready: Prepared) -> str:
    """Return a weight of fuel as a volume at the declared density, rounded up, with its unit."""
    return f"{printed(weight / plan.density, VOLUME_PLACES, 'up')} {ready.volume}"


def _minimum_flying(limits: Limits, states: Mapping[Phase, State], ready: Prepared) -> Check:
    """Return the check of the lightest moment of the flight against the minimum flying weight."""
    lightest = min((states[phase] for phase in IN_FLIGHT), key=lambda state: state.weight)
    code, title = "weight.minimum-flying", "minimum flying weight"
    figure = Figure(code, title, lightest.weight, ready.weight, WEIGHT_PLACES, lightest.phase)

    def fix(short: Fraction) -> str:
        return f"Add at least {_up(short, ready)} as ballast, load or fuel kept to landing."

    return at_least(figure, limits.minimum_flying, fix)


def _code(phase: Phase) -> str:
    return f"weight.{phase.replace(' ', '-')}"


def _limit(limits: Limits, phase: Phase) -> Limit | None:
    match phase:
        case "ramp":
            return limits.ramp
        case "take-off":
            return limits.take_off
        case "zero fuel":
            return limits.zero_fuel
        case "landing" | "minimum at landing":
            return limits.landing


def _fixes(plan: FuelPlan, states: Mapping[Phase, State], ready: Prepared) -> dict[Phase, Fix]:
    """Return, per phase, the sentence for an excess; less fuel is named only where the minimum at landing
    allows it.
    """
    spare = states["landing"].fuel - plan.minimum_at_landing

    def with_fuel(excess: Fraction) -> str:
        taken = f"Take off at least {_up(excess, ready)} of people or items"
        if excess <= spare:
            return f"{taken}, or carry {fuel_up(excess, plan, ready)} less fuel."
        if spare > 0:
            could = f"{printed(spare, WEIGHT_PLACES, 'down')} {ready.weight}"
            return f"{taken}; fuel alone cannot do it, only {could} is above the minimum at landing."
        return f"{taken}; no fuel is above the minimum at landing."

    def without_fuel(excess: Fraction) -> str:
        return f"Take off at least {_up(excess, ready)} of people or items; less fuel does not help here."

    return {
        "ramp": with_fuel,
        "take-off": with_fuel,
        "landing": with_fuel,
        "zero fuel": without_fuel,
        "minimum at landing": without_fuel,
    }


def _up(weight: Fraction, ready: Prepared) -> str:
    return f"{printed(weight, WEIGHT_PLACES, 'up')} {ready.weight}"
