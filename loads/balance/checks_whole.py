"""Checks of the whole aircraft that only some bases ask for: performance stated, fuel balance, trim."""

from collections.abc import Mapping, Sequence

from fleet.basis import Phase
from loads.balance.aboard import Declared
from loads.balance.checks_fuel_balance import Held, Leg, fuel_balance_checks
from loads.balance.checks_performance import performance_checks
from loads.balance.flown import Flown
from loads.balance.fuel import Contents, Draw, FuelState
from loads.balance.prepared import Prepared
from loads.balance.result import Check, State
from loads.balance.sections import Sections
from loads.balance.trim_setting import trim_checks

LEGS: tuple[tuple[Leg, Phase], ...] = (
    ("taxi", "take-off"),
    ("flight", "landing"),
    ("reserve", "minimum at landing"),
)


def whole_aircraft_checks(
    declared: Declared, states: Mapping[Phase, State], flown: Flown | None, ready: Prepared
) -> list[Check]:
    """Return these checks; [] for a basis that asks for none of them."""
    found = performance_checks(declared, ready.basis)
    if flown is not None and ready.basis.fuel_balance:
        held = kinks_of(flown.fuel) if flown.sections is None else kinks_between(flown.sections)
        found += fuel_balance_checks(declared.fuel, held, ready)
    if states:
        found += trim_checks(declared, states["take-off"], ready)
    return found


def kinks_of(fuel: Mapping[Phase, FuelState]) -> list[Held]:
    """Return what the tanks hold at every kink of the burn, in the order of flight, ends of legs too."""
    found = []
    before = fuel["ramp"]
    for leg, phase in LEGS:
        found.append(Held(leg, before.usable, before.phase))
        found += _within(leg, before.usable, fuel[phase].draws)
        before = fuel[phase]
        found.append(Held(leg, before.usable, phase))
    return found


def kinks_between(sections: Sections) -> list[Held]:
    """Return the same for a flight with a sequence: both ends of each section. A transfer moves fuel evenly
    from one tank to another, so its worst is at its start or its end, and both are ends of sections.
    """
    found = []
    for section in sections.sections:
        found.append(Held(section.leg, section.start, section.begins or ""))
        found += _within(section.leg, section.start, section.draws)
        found.append(Held(section.leg, section.end, section.ends or ""))
    return found


def _within(leg: Leg, start: Contents, draws: Sequence[Draw]) -> list[Held]:
    """Return what the tanks hold where one draw follows another."""
    contents, found = dict(start), []
    for draw in draws[:-1]:
        for tank in draw.feeding:
            contents[tank] -= draw.each
        found.append(Held(leg, dict(contents)))
    return found
