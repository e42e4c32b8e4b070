"""The invented aircraft behave as the demonstration needs them to, by plain addition over their documents."""

from fractions import Fraction

import pytest

from fleet.basis import Basis, Phase
from fleet.basis_reading import read_basis
from fleet.empty_weight_reading import read_empty_weight
from fleet.weighing import EmptyFigures
from tests.pure.fleet.documents import basis_document, empty_weight_document

Fuel = dict[str, Fraction]
Point = tuple[Fraction, Fraction, Fraction]  # weight, moment, lateral moment


def _even(tank: str, volume: int) -> dict[str, int]:
    """This function will return the same volume in the left and the right tank of a kind."""
    return {f"{side}-{tank}".rstrip("-"): volume for side in ("LEFT", "RIGHT")}


def test_a_natural_load_of_the_twin_is_outside_aft_at_landing_only() -> None:
    aboard = {"COCKPIT-L": 185, "ROW1-L": 180, "ROW1-R": 180, "ROW2-L": 170, "ROW2-R": 170, "AFT-HOLD": 150}
    at_take_off = {"LEFT-AUX": Fraction(40), "RIGHT-AUX": Fraction(40)} | _mains(Fraction("48.5"))

    flown = _flown("twin", "six-seat", aboard, Fraction(6), (at_take_off, _mains(Fraction(48))))

    assert flown == {"take-off": [], "landing": ["cg"], "zero fuel": []}


def test_a_full_cabin_of_the_turboprop_exceeds_its_zero_fuel_limit_only() -> None:
    aboard = {f"ROW{row}-{side}": 84 for row in (1, 2, 3, 4) for side in "LR"}
    aboard |= {"COCKPIT-L": 90, "FWD-POD": 70, "AFT-POD": 70}
    start, end = ({"LEFT": Fraction(litres), "RIGHT": Fraction(litres)} for litres in (310, 160))

    flown = _flown("turboprop", "eight-seat", aboard, Fraction("0.8"), (start, end))

    assert flown == {"take-off": [], "landing": [], "zero fuel": ["weight"]}


EVERYDAY: dict[str, tuple[str, str, dict[str, int], str, list[dict[str, int]]]] = {
    "pilot alone": ("twin", "six-seat", {"COCKPIT-L": 185}, "6", [_even("MAIN", 60), _even("MAIN", 20)]),
    "freight in the twin": (
        "twin",
        "row-2-out",
        {"COCKPIT-L": 185, "COCKPIT-R": 170, "ROW2-FLOOR": 350, "NOSE-HOLD": 100},
        "6",
        [_even("MAIN", 60) | _even("AUX", 40), _even("MAIN", 40)],
    ),
    "ferry": ("turboprop", "eight-seat", {"COCKPIT-L": 90}, "0.8", [_even("", 300), _even("", 160)]),
    "freight in the turboprop": (
        "turboprop",
        "freight",
        {"COCKPIT-L": 90, "FLOOR-1": 250, "FLOOR-2": 300, "FLOOR-3": 150},
        "0.8",
        [_even("", 420), _even("", 160)],
    ),
    "full helicopter": (
        "helicopter",
        "five-seat",
        {"FRONT-R": 86, "FRONT-L": 80, "REAR-L": 78, "REAR-M": 70, "REAR-R": 82},
        "0.79",
        [{"MAIN": 250}, {"MAIN": 120}],
    ),
    "stretcher": (
        "helicopter",
        "stretcher",
        {"FRONT-R": 86, "STRETCHER": 80, "REAR-R": 75},
        "0.79",
        [{"MAIN": 250}, {"MAIN": 80}],
    ),
    "goods in the helicopter": (
        "helicopter",
        "utility",
        {"FRONT-R": 95, "REAR-FLOOR": 150},
        "0.79",
        [{"MAIN": 250}, {"MAIN": 80}],
    ),
}


@pytest.mark.parametrize("which", EVERYDAY)
def test_everyday_loads_are_within(which: str) -> None:
    name, fit, aboard, density, fuel = EVERYDAY[which]
    start, end = ({tank: Fraction(volume) for tank, volume in each.items()} for each in fuel)

    flown = _flown(name, fit, aboard, Fraction(density), (start, end))

    assert flown == {"take-off": [], "landing": [], "zero fuel": []}


def test_one_laden_basket_puts_the_helicopter_outside_to_one_side() -> None:
    aboard = {"FRONT-R": 110, "RIGHT-BASKET": 60, "REAR-FLOOR": 60}
    fuel = {"MAIN": Fraction(350)}, {"MAIN": Fraction(40)}

    flown = _flown("helicopter", "utility", aboard, Fraction("0.79"), fuel)

    assert flown == {"take-off": ["lateral"], "landing": ["lateral"], "zero fuel": []}


def test_the_burn_order_of_the_twin_moves_the_centre_of_gravity_aft() -> None:
    basis, empty = _read("twin")
    zero = empty.weight, empty.moment, empty.lateral_moment
    full = {"LEFT-AUX": Fraction(40), "RIGHT-AUX": Fraction(40)} | _mains(Fraction(50))

    before = _fuelled(basis, zero, full, Fraction(6))
    after = _fuelled(basis, zero, _mains(Fraction(50)), Fraction(6))

    assert basis.burn_order[0].tanks == ("LEFT-AUX", "RIGHT-AUX")
    assert after[1] / after[0] > before[1] / before[0] + 1


def _mains(gallons: Fraction) -> Fuel:
    return {"LEFT-MAIN": gallons, "RIGHT-MAIN": gallons}


def _read(name: str) -> tuple[Basis, EmptyFigures]:
    basis = read_basis(basis_document(name))
    return basis, read_empty_weight(empty_weight_document(name), basis)


def _flown(
    name: str, fit: str, aboard: dict[str, int], density: Fraction, fuel: tuple[Fuel, Fuel]
) -> dict[str, list[str]]:
    """This function will return, by phase, which kinds of limit the load breaks."""
    basis, empty = _read(name)
    configuration = next(each for each in basis.configurations if each.id == fit)
    stations = {each.id: each for each in (*basis.seats, *basis.places)}
    loaded = [(item.weight, item.arm, item.lateral_arm) for item in configuration.equipment]
    loaded += [(item.weight, item.arm, item.lateral_arm) for item in configuration.operating_items]
    loaded += [(Fraction(w), stations[at].arm, stations[at].lateral_arm) for at, w in aboard.items()]
    zero = (
        empty.weight + sum(w for w, _, _ in loaded),
        empty.moment + sum(w * arm for w, arm, _ in loaded),
        empty.lateral_moment + sum(w * lateral for w, _, lateral in loaded),
    )
    limits = configuration.limits
    return {
        "take-off": _broken(basis, "take-off", _fuelled(basis, zero, fuel[0], density), limits.take_off),
        "landing": _broken(basis, "landing", _fuelled(basis, zero, fuel[1], density), limits.landing),
        "zero fuel": _broken(basis, "zero fuel", zero, limits.zero_fuel),
    }


def _fuelled(basis: Basis, zero: Point, fuel: Fuel, density: Fraction) -> Point:
    tanks = {tank.id: tank for tank in basis.tanks}
    weight, moment, lateral = zero
    for tank, volume in fuel.items():
        weight += volume * density
        moment += tanks[tank].moment(volume, density)
        lateral += tanks[tank].lateral_moment(volume, density)
    return weight, moment, lateral


def _broken(basis: Basis, phase: Phase, point: Point, limit: object) -> list[str]:
    weight, moment, lateral = point
    value = getattr(limit, "value", None)
    broken = ["weight"] if value is not None and weight > value else []
    for envelope in basis.envelopes:
        sideways = envelope.axis == "lateral"
        if phase in envelope.phases and not envelope.shape.holds(weight, lateral if sideways else moment):
            broken.append("lateral" if sideways else "cg")
    return broken
