"""A small basis of round figures for the bulk sums, worked by hand where it is used."""

from dataclasses import replace
from fractions import Fraction

from fleet.basis import Basis, BurnStage, Configuration, FixedItem, Tank, TankTable, Zone
from fleet.weighing import EmptyFigures
from loads.balance.bulk.known import Known, known_of
from tests.pure.loads.making import SOURCE, envelope, limit, limits, place, seat, tank, twin

F = Fraction
EMPTY = EmptyFigures(F(2000), F(200000), F(-600), "nose cone", "wheels", "weighing")
WEIGHTS = {"ramp": 3000, "take_off": 2900, "zero_fuel": None, "landing": 2800, "minimum_flying": 2010}


def table(*points: tuple[int, int], straight_in: str = "arm") -> TankTable:
    """A table of arms against volume, or of moments printed for 6 lb/US gal."""
    density = F(6) if straight_in == "moment" else None
    exact = tuple((F(volume), F(value)) for volume, value in points)
    return TankTable("volume", straight_in, straight_in, density, exact)  # type: ignore[arg-type] # words of tests


def plain_basis() -> Basis:
    """Three seats, one hold, a main tank at 100 and an auxiliary at 120 that burns first."""
    seats = (
        seat("LEFT", 80, -12, "crew", most=250),
        seat("RIGHT", 82, 12, most=None),
        seat("BACK", 120, 1, "passenger", most="absent"),
        seat("SPARE", 121, 2),
    )
    places = (place("HOLD", 150, 100, 3), place("SHELF", 151, 20, 4))
    weights = limits(**WEIGHTS)  # type: ignore[arg-type] # words of tests
    one = Configuration(
        id="one",
        name="one",
        seats=("LEFT", "RIGHT", "BACK"),
        places=("HOLD",),
        minimum_crew=1,
        fit="wheels",
        equipment=(FixedItem("rack", F(10), F(100), F(2)),),
        operating_items=(FixedItem("kit", F(5), F(-20), F(-3)),),
        limits=weights,
    )
    return replace(
        twin(),
        seats=seats,
        places=places,
        zones=(
            Zone("FREE", "free", ("LEFT",), limit(None)),
            Zone("REAR", "rear", ("RIGHT", "HOLD"), limit(300)),
            Zone("OPEN", "open", ("LEFT", "HOLD"), None),
        ),
        tanks=(tank("MAIN", 100, 100, -40), tank("AUX", 120, 50, 30)),
        burn_order=(BurnStage(("AUX",)), BurnStage(("MAIN",))),
        taxi_order=(BurnStage(("MAIN",)),),
        limits=weights,
        envelopes=(envelope((90, 1500), (90, 3500), (110, 3500), (110, 1500)),),
        configurations=(one,),
    )


def with_tanks(*tables: TankTable) -> Basis:
    """The basis with tanks of these tables, each as large as its table, that feed one after the other."""
    tanks = tuple(
        Tank(f"T{number}", f"tank {number}", each.curve.last, F(0), each, SOURCE)
        for number, each in enumerate(tables)
    )
    order = tuple(BurnStage((each.id,)) for each in tanks)
    return replace(plain_basis(), tanks=tanks, burn_order=order, taxi_order=order)


def with_limits(**values: str | int | None) -> Basis:
    """The basis with other limits of weight; what is not named is not entered."""
    basis = plain_basis()
    one = replace(basis.configurations[0], limits=limits(**values))
    return replace(basis, configurations=(one,))


def plainly_known(basis: Basis | None = None, empty: EmptyFigures = EMPTY) -> Known:
    """What the bulk sums know of the basis."""
    known = known_of(basis or plain_basis(), "one", empty)
    assert known is not None
    return known
