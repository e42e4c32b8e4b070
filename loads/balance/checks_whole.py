"""Checks of the whole aircraft that only some bases ask for: performance stated, fuel balance, trim."""

from collections.abc import Mapping

from fleet.basis import Phase
from loads.balance.aboard import Declared
from loads.balance.checks_fuel_balance import Held, Leg, fuel_balance_checks
from loads.balance.checks_performance import performance_checks
from loads.balance.fuel import FuelState
from loads.balance.prepared import Prepared
from loads.balance.result import Check, State
from loads.balance.trim_setting import trim_checks

LEGS: tuple[tuple[Leg, Phase], ...] = (
    ("taxi", "take-off"),
    ("flight", "landing"),
    ("reserve", "minimum at landing"),
)


def whole_aircraft_checks(
    declared: Declared, states: Mapping[Phase, State], fuel: Mapping[Phase, FuelState] | None, ready: Prepared
) -> list[Check]:
    """Return these checks; [] for a basis that asks for none of them."""
    found = performance_checks(declared, ready.basis)
    if fuel and ready.basis.fuel_balance:
        found += fuel_balance_checks(declared.fuel, kinks_of(fuel), ready)
    if states:
        found += trim_checks(states["take-off"], ready)
    return found


def kinks_of(fuel: Mapping[Phase, FuelState]) -> list[Held]:
    """Return what the tanks hold at every kink of the burn, in the order of flight, ends of legs too."""
    found = []
    before = fuel["ramp"]
    for leg, phase in LEGS:
        found.append(Held(leg, before.usable, before.phase))
        contents = dict(before.usable)
        for draw in fuel[phase].draws[:-1]:
            for tank in draw.feeding:
                contents[tank] -= draw.each
            found.append(Held(leg, dict(contents)))
        before = fuel[phase]
        found.append(Held(leg, before.usable, phase))
    return found
