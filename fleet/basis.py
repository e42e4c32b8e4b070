"""The loading basis of one aircraft as frozen values: exact rationals in the basis's own units.

Signs: arms aft of the datum are positive; lateral arms right of the centreline, looking forward, are
positive. `fleet.basis_reading` makes these from the document `tarebook.loading-basis/1`; nothing here reads
or writes.
"""

from dataclasses import dataclass, field
from fractions import Fraction
from typing import Literal

from fleet.curtailment import Curtailment
from fleet.envelope import Shape
from fleet.flight_rules import CertificationCategory, Modification, PerformanceRule
from fleet.fuel_balance import FuelBalance
from fleet.lateral import LateralByCg
from fleet.positions import MovingPart
from fleet.presentation import Presentation
from fleet.quantities import Unit
from fleet.sourced import Limit, Source
from fleet.stations import Condition, Conditional, Cumulative, Floor, Rail
from fleet.tanks import TankCurve
from fleet.trim import Trim

Axis = Literal["longitudinal", "lateral"]
Plane = Literal["arm", "moment"]
Phase = Literal["ramp", "take-off", "zero fuel", "landing", "minimum at landing"]
PHASES: tuple[Phase, ...] = ("ramp", "take-off", "zero fuel", "landing", "minimum at landing")


@dataclass(frozen=True, slots=True)
class Seat:
    """Where a person sits. Arms in the length unit of the basis.

    Whom a seat suits is stated where it matters: `row` it stands in, at an exit, with a restraint for an
    infant or child (None: not stated), for an attendant. On a `rail` its arm is a range, with `arm` in it.
    """

    id: str
    name: str
    serves: Literal["crew", "passenger", "either"]
    arm: Fraction
    lateral_arm: Fraction
    maximum: Limit | None
    source: Source
    row: str | None = None
    exit_row: bool = False
    infant_restraint: bool | None = None
    attendant: bool = False
    conditional: tuple[Conditional, ...] = ()
    rail: Rail | None = None


@dataclass(frozen=True, slots=True)
class Place:
    """Where an item lies (a compartment), or where it hangs outside (`external`: a hook, a hoist). Arms in
    the length unit of the basis.
    """

    id: str
    name: str
    arm: Fraction
    lateral_arm: Fraction
    maximum: Limit | None
    source: Source
    conditional: tuple[Conditional, ...] = ()
    floor: Floor | None = None
    external: bool = False


@dataclass(frozen=True, slots=True)
class Zone:
    """A set of seats and places whose sum is limited."""

    id: str
    name: str
    members: tuple[str, ...]
    maximum: Limit | None
    conditional: tuple[Conditional, ...] = ()


@dataclass(frozen=True, slots=True)
class TankTable:
    """The manual's own points: quantity against arm or moment.

    `points` are (quantity, arm or moment) with quantities rising strictly. Quantities are in the volume
    unit of the basis when `against` is volume, in its weight unit when it is weight; arms in its length
    unit, moments in its weight unit times its length unit. `density` (weight unit per volume unit) is the
    density a table by weight, or a table that gives moments against volume, was printed for; the arm
    belongs to the volume.
    """

    against: Literal["volume", "weight"]
    gives: Literal["arm", "moment"]
    straight_in: Literal["arm", "moment"]
    density: Fraction | None
    points: tuple[tuple[Fraction, Fraction], ...]
    curve: TankCurve = field(init=False, compare=False, repr=False)

    def __post_init__(self) -> None:
        curve = TankCurve(
            against=self.against,
            gives=self.gives,
            straight_in=self.straight_in,
            density=self.density,
            points=self.points,
        )
        object.__setattr__(self, "curve", curve)


@dataclass(frozen=True, slots=True)
class Tank:
    """A fuel tank; `capacity` is usable fuel in the volume unit of the basis."""

    id: str
    name: str
    capacity: Fraction
    lateral_arm: Fraction
    table: TankTable
    source: Source

    def moment(self, volume: Fraction, density: Fraction) -> Fraction:
        """Return the moment of a volume of fuel at the delivered density (weight unit per volume unit of
        the basis).

        Raises `fleet.tanks.OutsideTable` where the table says nothing.
        """
        return self.table.curve.moment(volume, density)

    def lateral_moment(self, volume: Fraction, density: Fraction) -> Fraction:
        """Return the lateral moment of a volume of fuel; right positive."""
        return volume * density * self.lateral_arm


@dataclass(frozen=True, slots=True)
class BurnStage:
    """Tanks that feed at the same time, equally by volume.

    One that runs dry leaves the rest feeding equally.
    """

    tanks: tuple[str, ...]


@dataclass(frozen=True, slots=True)
class Envelope:
    """A closed polygon in (arm or moment, weight); vertices in order, the first not repeated, notches kept.

    `plane` says in which plane the edges are straight. `shape` decides: `shape.holds(weight, moment)`,
    exactly, and `shape.arm_section`, `shape.weight_section` for the two margins. `configurations` and
    `categories` (of certification) are those it holds for, () for all; `positions` the states of moving parts
    it holds in, such as the gear up: part by part, one not named may be in any; an external load, carried or
    none, counts as one. Making one raises
    `fleet.envelope.NotAnEnvelope`.
    """

    id: str
    axis: Axis
    phases: tuple[Phase, ...]
    plane: Plane
    points: tuple[tuple[Fraction, Fraction], ...]  # (arm or moment, weight)
    source: Source
    configurations: tuple[str, ...] = ()
    categories: tuple[str, ...] = ()
    positions: tuple[tuple[str, tuple[str, ...]], ...] = ()
    shape: Shape = field(init=False, compare=False, repr=False)

    def __post_init__(self) -> None:
        object.__setattr__(self, "shape", Shape(self.plane, self.points))


@dataclass(frozen=True, slots=True)
class FixedItem:
    """An equipment or operating item a configuration adds (or, with negative weight, removes)."""

    what: str
    weight: Fraction
    arm: Fraction
    lateral_arm: Fraction


@dataclass(frozen=True, slots=True)
class Limits:
    """The weight limits, in the weight unit of the basis; None means not entered.

    `with_external_load` is the maximum weight in all while a jettisonable external load is carried.
    """

    ramp: Limit | None
    take_off: Limit | None
    zero_fuel: Limit | None
    landing: Limit | None
    minimum_flying: Limit | None
    with_external_load: Limit | None = None


@dataclass(frozen=True, slots=True)
class Configuration:
    """A named fit: which seats and places exist, what it adds, how many crew it needs, never their weight."""

    id: str
    name: str
    seats: tuple[str, ...]
    places: tuple[str, ...]
    minimum_crew: int
    fit: str  # the base fit it is flown on: which empty weight it needs
    equipment: tuple[FixedItem, ...]
    operating_items: tuple[FixedItem, ...]
    limits: Limits  # already the tighter of the basis's (or a fitted modification's) and its own
    modifications: tuple[str, ...] = ()  # the approved modifications it has fitted
    performance: tuple[PerformanceRule, ...] = ()  # its own rules, in place of the basis's


@dataclass(frozen=True, slots=True)
class Chord:
    """The mean aerodynamic chord: arm of its leading edge and its length, in the length unit of the basis."""

    leading_edge: Fraction
    length: Fraction
    source: Source


@dataclass(frozen=True, slots=True)
class OtherDatum:
    """A datum that other papers of the aircraft count arms from. `offset` is how far aft of the basis's own
    it lies, in the length unit of the basis: arm from the basis's datum = arm from this one + offset.
    """

    name: str
    offset: Fraction
    source: Source


@dataclass(frozen=True, slots=True)
class SampleLoad:
    """A sample load of the manual; it must come out as printed before the basis can be approved."""

    name: str
    weights: tuple[FixedItem, ...]
    moments: tuple[Fraction | None, ...]  # a printed moment beats weight times arm, item by item
    phase: Phase
    total_weight: Fraction
    total_moment: Fraction
    tolerance_moment: Fraction
    within: bool
    source: Source


@dataclass(frozen=True, slots=True)
class Basis:
    """One revision of the approved loading data of one aircraft."""

    aircraft_type: str
    category: Literal["aeroplane", "helicopter"]
    engines: int
    passenger_seats_installed: int
    weight_unit: Unit
    length_unit: Unit
    volume_unit: Unit
    datum: str
    chord: Chord | None  # None: the source shows there is none
    fits: tuple[str, ...]
    seats: tuple[Seat, ...]
    places: tuple[Place, ...]
    zones: tuple[Zone, ...]
    tanks: tuple[Tank, ...]
    burn_order: tuple[BurnStage, ...]
    taxi_order: tuple[BurnStage, ...]
    limits: Limits
    envelopes: tuple[Envelope, ...]
    lateral_limits_entered: bool  # False: neither a lateral envelope nor a page that shows there is none
    configurations: tuple[Configuration, ...]
    sample_loads: tuple[SampleLoad, ...]
    positions: tuple[MovingPart, ...] = ()  # gear, flaps: what moves and shifts the moment
    conditions: tuple[Condition, ...] = ()
    cumulative: tuple[Cumulative, ...] = ()
    certification_categories: tuple[CertificationCategory, ...] = ()
    modifications: tuple[Modification, ...] = ()
    performance: tuple[PerformanceRule, ...] = ()
    lateral_by_cg: tuple[LateralByCg, ...] = ()
    fuel_balance: tuple[FuelBalance, ...] = ()
    trim: Trim | None = None
    curtailments: tuple[Curtailment, ...] = ()  # the operator's own margins inside the envelopes
    presentation: Presentation | None = None  # how moments are shown, never an input to a decision
    other_datums: tuple[OtherDatum, ...] = ()
    closed: tuple[tuple[str, str], ...] = ()  # seats and places not to be used, each with the restriction
