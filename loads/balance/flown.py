"""One load flown: the fuel along its flight, its path, and who and what is aboard over it."""

from collections.abc import Mapping, Sequence
from dataclasses import replace
from fractions import Fraction
from typing import Literal, NamedTuple

from fleet.basis import Phase
from fleet.weighing import EmptyFigures
from loads.balance.aboard import Declared, Person
from loads.balance.checks_places import tank_checks
from loads.balance.events import Event
from loads.balance.fuel import NOTHING, FuelOffTable, FuelState, fuel_states
from loads.balance.over_flight import over_flight
from loads.balance.path import Path, burn_path
from loads.balance.path_events import parts_set, sequence_path, with_settings, zero_fuel_turns
from loads.balance.prepared import Prepared
from loads.balance.result import Check, State
from loads.balance.sections import Dry, Sections, after_transfer, dry_over_flight, sections_of
from loads.balance.sums import Sums

ORDER = {"fail": 0, "unresolved": 1, "pass": 2, "advisory": 3}


class Flown(NamedTuple):
    """The fuel at each phase; for a load with a sequence its sections, and the aircraft without fuel after
    each event (None: something of it is not known).
    """

    fuel: Mapping[Phase, FuelState]
    sections: Sections | None = None
    dry: tuple[Dry, ...] | None = None


def fly(declared: Declared, empty: EmptyFigures | None, ready: Prepared) -> Flown:
    """Return the fuel of a load along its flight. Raises `fuel.FuelOffTable`."""
    if not declared.sequence:
        return Flown(fuel_states(declared.fuel, ready))
    sections = sections_of(declared, ready)
    return Flown(sections.fuel, sections, dry_over_flight(declared, empty))


def path_of(declared: Declared, flown: Flown, states: Mapping[Phase, State], ready: Prepared) -> Path:
    """Return the path of a load whose phases are known, in every setting of gear and flaps."""
    if flown.sections is not None and flown.dry is not None:
        path = sequence_path(declared, flown.sections, flown.dry, states, ready.outside)
    else:
        path = burn_path(declared.fuel, flown.fuel, states)
        if parts := parts_set(declared, 0, ready.outside):
            path = replace(path, stretches=tuple(each._replace(parts=parts) for each in path.stretches))
    if ready.basis.positions:
        path = with_settings(path, declared, ready)
    if ready.basis.positions or declared.sequence:
        dry = flown.dry or (Dry(Sums(NOTHING, NOTHING, NOTHING), NOTHING),)
        turns = zero_fuel_turns(declared, dry, states["zero fuel"], ready)
        path = replace(path, zero_fuel=turns if turns[1:] else ())
    return path


def at_ends_of_rails(declared: Declared, end: Literal["forward", "aft"]) -> Declared:
    """Return the load with every seat whose setting is open at one end of its rail."""
    return along_rails(declared, NOTHING if end == "forward" else Fraction(1))


def along_rails(declared: Declared, share: Fraction) -> Declared:
    """Return the load with every seat whose setting is open at a share of its rail: 0 forward, 1 aft."""

    def moved(person: Person) -> Person:
        rail = person.seat.rail
        if rail is None:
            return person
        arm = rail.forward + share * (rail.aft - rail.forward)
        return replace(person, seat=replace(person.seat, arm=arm))

    def came(event: Event) -> Event:
        coming = (moved(one) if isinstance(one, Person) else one for one in event.coming)
        return replace(event, coming=tuple(coming)) if event.coming else event

    return replace(
        declared,
        crew=tuple(moved(person) for person in declared.crew),
        passengers=tuple(moved(person) for person in declared.passengers),
        sequence=tuple(came(event) for event in declared.sequence),
    )


def states_aboard(declared: Declared) -> list[tuple[str, Declared]]:
    """Return the load as it is aboard over the flight, each different state once, with the words for when."""
    found: list[tuple[str, Declared]] = []
    for number, aboard in enumerate(over_flight(declared)):
        if not found or aboard is not found[-1][1]:
            found.append((f"after event {number}" if number else "", aboard))
    return found


def tanks_over_flight(declared: Declared, ready: Prepared) -> list[Check]:
    """Return the check of each tank: at engine start, and after every transfer in flight."""
    runs = [("", tank_checks(declared, ready))]
    try:
        sections = sections_of(declared, ready).sections
    except FuelOffTable:
        sections = ()
    for section in sections:
        if section.event is not None and section.event.transfer is not None:
            contents = after_transfer(section.end, section.event)
            tanks = tuple(replace(held, usable=contents[held.tank.id]) for held in declared.fuel.tanks)
            then = replace(declared, fuel=replace(declared.fuel, tanks=tanks))
            checks = [check._replace(phase=None) for check in tank_checks(then, ready)]
            runs.append((f"after event {section.event.number}", checks))
    return worst_of_each(runs)


def worst_of_each(runs: Sequence[tuple[str, Sequence[Check]]]) -> list[Check]:
    """Return the worst check of each code, in the order in which the codes come; of equals the first."""
    found: dict[str, tuple[str, Check]] = {}
    for when, checks in runs:
        for check in checks:
            held = found.get(check.code)
            if held is None or _rank(check) < _rank(held[1]):
                found[check.code] = when, check
    return [
        check._replace(margin_text=", ".join(filter(None, (check.margin_text, when))))
        for when, check in found.values()
    ]


def _rank(check: Check) -> tuple[int, bool, Fraction]:
    """Return how bad a check is, the worst least; one that fails without a figure is the worst."""
    known = check.room is not None if check.outcome == "fail" else check.room is None
    return ORDER[check.outcome], known, check.room or Fraction(0)
