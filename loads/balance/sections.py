"""The course of a flight with a sequence: its sections, and what stands between them.

    engine start |-- section --| event |-- section --| take-off |-- section --| event ...

Within a section fuel is burned in the manual's order and nothing else happens. At an event nothing is burned.
What happens at the very fuel of the take-off or the landing happens before it: a phase is what follows all
events up to it. At zero fuel everything that is aboard at take-off is aboard, since nothing leaves before,
where it was at engine start; `path_events.zero_fuel_turns` has it after each event.
"""

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from fractions import Fraction
from typing import Literal, NamedTuple

from fleet.basis import PHASES, BurnStage, Phase
from fleet.positions import MovingPart, PartState
from fleet.tanks import OutsideTable
from fleet.weighing import EmptyFigures
from loads.balance.aboard import Declared, FuelPlan
from loads.balance.events import Event
from loads.balance.exact import added
from loads.balance.fuel import (
    NOTHING,
    Contents,
    Draw,
    Filled,
    FuelOffTable,
    FuelState,
    drawn,
    states_of,
)
from loads.balance.over_flight import over_flight
from loads.balance.prepared import Prepared
from loads.balance.sums import Sums, sums_without_fuel

Leg = Literal["taxi", "flight", "reserve"]


class Section(NamedTuple):
    """A part of the flight in which nothing but burning happens.

    `aboard` tells how many events lie before it: the place of its load in `over_flight`. `event` is what
    happens at its end, None where a phase is reached instead.
    """

    leg: Leg
    aboard: int
    start: Contents
    draws: tuple[Draw, ...]
    end: Contents
    begins: Phase | None
    ends: Phase | None
    event: Event | None


@dataclass(frozen=True, slots=True)
class Sections:
    """The sections in the order of flight, and the fuel at each phase."""

    sections: tuple[Section, ...]
    fuel: Mapping[Phase, FuelState]


class Dry(NamedTuple):
    """The aircraft without fuel after so many events: sums without positions, and what positions add."""

    sums: Sums
    shift: Fraction


def sections_of(declared: Declared, ready: Prepared) -> Sections:
    """Return the course of a load with a sequence. Raises `fuel.FuelOffTable`."""
    plan, basis, density = declared.fuel, ready.basis, declared.fuel.density
    walk = _Walk(declared, {fuel.tank.id: fuel.usable for fuel in plan.tanks})
    ramp = walk.contents
    walk.leg("taxi", basis.taxi_order, plan.taxi / density, "ramp", "take-off")
    take_off = walk.contents
    walk.leg("flight", basis.burn_order, plan.trip / density, "take-off", "landing")
    landing = walk.contents
    spare = added(landing.values()) - plan.minimum_at_landing / density
    walk.leg("reserve", basis.burn_order, max(spare, NOTHING), "landing", "minimum at landing")
    empty = {tank: NOTHING if tank in ready.fed else held for tank, held in take_off.items()}
    filled: Filled = (
        ("ramp", ramp, ()),
        ("take-off", take_off, ()),
        ("zero fuel", empty, ()),
        ("landing", landing, ()),
        ("minimum at landing", walk.contents, ()),
    )
    found = Sections(tuple(walk.sections), states_of(plan, filled, ready))
    _demand_tables(found.sections, plan, ready)
    return found


def _demand_tables(sections: Sequence[Section], plan: FuelPlan, ready: Prepared) -> None:
    """Raise `fuel.FuelOffTable` where a tank holds at an event, before or after a transfer, what its table
    does not cover: the phases around it need not tell.
    """
    for section in sections:
        event = section.event
        if event is None:
            continue
        for contents in (section.end, after_transfer(section.end, event)):
            for held in plan.tanks:
                volume = contents[held.tank.id] + held.trapped
                try:
                    ready.volume_moment(held.tank.id, volume)
                except OutsideTable as outside:
                    ends = (outside.first, outside.last)
                    raise FuelOffTable(held.tank.id, event.number, volume, *ends) from None


def dry_over_flight(declared: Declared, empty: EmptyFigures | None) -> tuple[Dry, ...] | None:
    """Return the aircraft without fuel at engine start and after each event; None where a weight is not
    known.
    """
    found = []
    held: dict[str, tuple[MovingPart, PartState]] = {}
    for number, aboard in enumerate(over_flight(declared)):
        if number:
            held |= {part.id: (part, state) for part, state in declared.sequence[number - 1].positions}
        sums = sums_without_fuel(aboard, empty)
        if sums is None:
            return None
        shift = added(state.moment_change for _, state in held.values())
        found.append(Dry(sums, shift))
    return tuple(found)


def events_before(declared: Declared, phase: Phase) -> int:
    """Return how many events of a load lie before a phase; zero fuel is as at engine start."""
    if phase in ("ramp", "zero fuel"):
        return 0
    if phase == "take-off":
        return sum(event.leg == "taxi" for event in declared.sequence)
    return len(declared.sequence)


class _Walk:
    """The walk along the legs, section by section."""

    def __init__(self, declared: Declared, contents: Contents) -> None:
        self.events = declared.sequence
        self.contents = contents
        self.passed = 0
        self.sections: list[Section] = []

    def leg(
        self, leg: Leg, order: tuple[BurnStage, ...], volume: Fraction, begins: Phase, ends: Phase
    ) -> None:
        """Add the sections of one leg, in which a volume is burned."""
        burned = NOTHING
        first: Phase | None = begins
        for event in self.events:
            if event.leg == leg:
                self._section(leg, order, event.burned - burned, first, event)
                self.passed += 1
                burned, first = event.burned, None
        self._section(leg, order, volume - burned, first, ends)

    def _section(
        self,
        leg: Leg,
        order: tuple[BurnStage, ...],
        volume: Fraction,
        begins: Phase | None,
        to: Event | Phase,
    ) -> None:
        start = self.contents
        left, _, draws = drawn(start, order, volume)
        event = to if isinstance(to, Event) else None
        ends = None if isinstance(to, Event) else to
        self.sections.append(Section(leg, self.passed, start, draws, left, begins, ends, event))
        self.contents = left if event is None else after_transfer(left, event)


def after_transfer(contents: Contents, event: Event) -> Contents:
    """Return what the tanks hold after the transfer of an event, if there is one."""
    moved = event.transfer
    if moved is None:
        return contents
    left = dict(contents)
    left[moved.source] -= moved.volume
    left[moved.target] += moved.volume
    return left


def dry_at_phases(declared: Declared, dry: Sequence[Dry]) -> dict[Phase, Sums]:
    """Return the aircraft without fuel at each phase, positions and all."""
    found: dict[Phase, Sums] = {}
    for phase in PHASES:
        sums, shift = dry[events_before(declared, phase)]
        found[phase] = sums._replace(moment=sums.moment + shift)
    return found
