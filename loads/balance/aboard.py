"""What was declared for one flight, as frozen values: exact rationals in the units of the loading basis.

Weights in the basis's weight unit, volumes in its volume unit, density in weight unit per volume unit.
`pointer` is the JSON pointer of the line in the document `tarebook.load/1`.
"""

from dataclasses import dataclass
from datetime import datetime
from fractions import Fraction
from typing import Literal

from fleet.basis import Configuration, Place, Seat, Tank
from fleet.flight_rules import CertificationCategory, PerformanceKind
from fleet.stations import Condition
from loads.balance.circumstances import PLAIN, Circumstances
from loads.balance.events import Event
from loads.balance.footing import Contact, Rigging
from loads.balance.standard_use import StandardUse

How = Literal["weighed", "declared", "standard", "estimated"]
HOWS: tuple[How, ...] = ("weighed", "declared", "standard", "estimated")
Kind = Literal["baggage", "cargo", "ballast", "equipment", "consumable"]
KINDS: tuple[Kind, ...] = ("baggage", "cargo", "ballast", "equipment", "consumable")
LimitedPhase = Literal["take-off", "landing"]
PILOT_IN_COMMAND = "pilot in command"


@dataclass(frozen=True, slots=True)
class Flight:
    """Which flight it is; `departure` carries its offset from UTC. `follows` is the id of the load of the leg
    before.
    """

    reference: str
    leg: int
    departure: datetime
    origin: str
    destination: str
    operation: str
    follows: str | None = None


@dataclass(frozen=True, slots=True)
class Outline:
    """What is needed of a load before a basis is known: registration, configuration id, flight."""

    aircraft: str
    configuration: str
    flight: Flight


@dataclass(frozen=True, slots=True)
class LapInfant:
    """An infant on the lap of the person in a seat; a weight of None adds nothing (the adult's is a standard
    one).
    """

    name: str
    weight: Fraction | None
    how: How | None
    pointer: str


@dataclass(frozen=True, slots=True)
class Person:
    """Somebody in a seat. A weight of None is not known: `how` is then `standard`, and no table was
    applied.
    """

    name: str
    role: Literal["crew", "passenger"]
    position: str | None
    login: str | None
    category: str | None
    seat: Seat
    weight: Fraction | None
    how: How
    lap_infant: LapInfant | None
    pointer: str
    restraint: Fraction | None = None  # what a child's or infant's restraint weighs, where one is aboard
    added: Fraction | None = None  # of the weight, what a table adds to a declared one


@dataclass(frozen=True, slots=True)
class Item:
    """A thing in a place. `removed`: equipment of the empty weight that is not aboard; its weight is then
    negative.

    `weight` counts `rigging`, too: the pallet, net and spreader that go with it. `contact` is what touches
    the floor (None: not stated). `jettisonable`: it hangs outside and can be released in flight.
    """

    kind: Kind
    what: str
    place: Place
    weight: Fraction | None
    how: How
    removed: bool
    pointer: str
    rigging: tuple[Rigging, ...] = ()
    contact: Contact | None = None
    jettisonable: bool = False


@dataclass(frozen=True, slots=True)
class TankFuel:
    """Fuel in one tank at engine start, by volume: usable, and trapped (weight with no use, at its arm)."""

    tank: Tank
    usable: Fraction
    trapped: Fraction


@dataclass(frozen=True, slots=True)
class FuelPlan:
    """Fuel in the tanks, and what of it is meant to burn; `taxi`, `trip`, `minimum_at_landing` are
    weights.
    """

    density: Fraction
    density_source: str
    tanks: tuple[TankFuel, ...]
    taxi: Fraction
    trip: Fraction
    minimum_at_landing: Fraction


@dataclass(frozen=True, slots=True)
class StatedLimit:
    """A limit of this flight with its source, such as one line of a performance sheet; a weight above 0."""

    at: LimitedPhase
    weight: Fraction
    source: str
    kind: PerformanceKind | None = None  # what of the performance it comes from, where that is said

    @property
    def named(self) -> str:
        """Return how it is named: its source, after what it comes from where that is said."""
        return self.source if self.kind is None else f"{self.kind}, {self.source}"


@dataclass(frozen=True, slots=True)
class Declared:
    """One load as declared, read against one loading basis."""

    outline: Outline
    configuration: Configuration
    persons_on_board: int
    crew: tuple[Person, ...]
    passengers: tuple[Person, ...]
    items: tuple[Item, ...]
    fuel: FuelPlan
    limits: tuple[StatedLimit, ...]
    conditions: tuple[Condition, ...] = ()  # those declared to hold
    settings: tuple[tuple[Seat, str], ...] = ()  # seats on rails as they stand, each with its setting's name
    sequence: tuple[Event, ...] = ()
    standards: StandardUse | None = None  # what was taken from a table of standard weights
    circumstances: Circumstances = PLAIN
    category: CertificationCategory | None = None  # of certification: normal, utility, ...
