"""An aircraft made from nothing but lines and tanks, so that outside figures can be put through the whole
assessment.
"""

from collections.abc import Sequence
from dataclasses import dataclass, field
from datetime import UTC, datetime
from fractions import Fraction

from fleet.basis import Basis, BurnStage, Chord, Configuration, Envelope, Limits, Place, Tank, TankTable
from fleet.quantities import Unit
from fleet.sourced import Limit, Source
from fleet.weighing import EmptyFigures
from loads.balance.aboard import Declared, Flight, FuelPlan, Item, Outline, TankFuel
from loads.balance.assess import assess
from loads.balance.result import Result

SOURCE = Source("reference", "", "1")
NO_LIMIT = Limit(None, SOURCE)
Exact = Fraction | int | str
ANYWHERE = ((-(10**6), 1), (10**6, 1), (10**6, 10**7), (-(10**6), 10**7))


@dataclass
class FuelTank:
    """A tank with its points (volume, arm), what it holds, and how far to the right it lies."""

    held: Exact
    points: Sequence[tuple[Exact, Exact]]
    lateral: Exact = 0


@dataclass
class PlainAircraft:
    """Empty weight and moments, lines of (weight, arm, lateral arm), tanks, one envelope for the loaded
    aircraft.

    The trip is burned down to what must be left at landing, so that the least fuel is that at landing.
    """

    weight: Exact
    moment: Exact
    lateral_moment: Exact = 0
    lines: list[tuple[Exact, Exact, Exact]] = field(default_factory=list)
    tanks: list[FuelTank] = field(default_factory=list)
    density: Exact = 6
    trip: Exact = 0
    envelope: Sequence[tuple[Exact, Exact]] = ANYWHERE
    most: Exact | None = None
    chord: tuple[Exact, Exact] | None = None

    def result(self) -> Result:
        """Assess it."""
        basis = self.basis()
        return assess(self.declared(basis), basis, self.empty())

    def empty(self) -> EmptyFigures:
        moments = Fraction(self.moment), Fraction(self.lateral_moment)
        return EmptyFigures(Fraction(self.weight), *moments, "datum", "wheels", "weighing")

    def basis(self) -> Basis:
        most = None if self.most is None else Fraction(self.most)
        weights = Limits(*(Limit(limit, SOURCE) for limit in (most, most, most, most, None)))
        places = tuple(
            Place(
                f"P{number}", f"place {number}", Fraction(arm), Fraction(lateral), Limit(None, SOURCE), SOURCE
            )
            for number, (_, arm, lateral) in enumerate(self.lines)
        )
        tanks = tuple(_tank(number, tank) for number, tank in enumerate(self.tanks))
        order = (BurnStage(tuple(tank.id for tank in tanks)),)
        around = tuple((Fraction(x), Fraction(y)) for x, y in self.envelope)
        phases = ("ramp", "take-off", "landing")
        return Basis(
            aircraft_type="plain",
            category="aeroplane",
            engines=1,
            passenger_seats_installed=0,
            weight_unit=Unit.LB,
            length_unit=Unit.IN,
            volume_unit=Unit.US_GAL,
            datum="datum",
            chord=self.chord and Chord(Fraction(self.chord[0]), Fraction(self.chord[1]), SOURCE),
            fits=("wheels",),
            seats=(),
            places=places,
            zones=(),
            tanks=tanks,
            burn_order=order,
            taxi_order=order,
            limits=weights,
            envelopes=(Envelope("all", "longitudinal", phases, "arm", around, SOURCE),),  # type: ignore[arg-type] # all five phases
            lateral_limits_entered=True,
            configurations=(
                Configuration("one", "one", (), tuple(p.id for p in places), 0, "wheels", (), (), weights),
            ),
            sample_loads=(),
        )

    def declared(self, basis: Basis) -> Declared:
        flight = Flight("REF-1", 1, datetime(2026, 12, 1, tzinfo=UTC), "XNAL", "XKOR", "reference")
        items = tuple(
            Item(
                "cargo",
                "line",
                place,
                Fraction(line[0]),
                "weighed",
                Fraction(line[0]) < 0,
                f"/items/{number}",
            )
            for number, (place, line) in enumerate(zip(basis.places, self.lines, strict=True))
        )
        held = tuple(
            TankFuel(tank, Fraction(mine.held), Fraction(0))
            for tank, mine in zip(basis.tanks, self.tanks, strict=True)
        )
        density, trip = Fraction(self.density), Fraction(self.trip)
        left = sum((fuel.usable for fuel in held), Fraction(0)) * density - trip
        plan = FuelPlan(density, "reference", held, Fraction(0), trip, left)
        outline = Outline("REF", "one", flight)
        return Declared(outline, basis.configurations[0], 0, (), (), items, plan, ())


def _tank(number: int, tank: FuelTank) -> Tank:
    points = tuple((Fraction(volume), Fraction(arm)) for volume, arm in tank.points)
    table = TankTable("volume", "arm", "arm", None, points)
    return Tank(f"T{number}", f"tank {number}", points[-1][0], Fraction(tank.lateral), table, SOURCE)
