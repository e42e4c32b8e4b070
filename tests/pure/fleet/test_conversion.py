"""Conversion against `pint` for every pair of units, and against published figures."""

from decimal import Decimal
from fractions import Fraction
from itertools import product

import pint
import pytest

from fleet.conversion import (
    FACTOR,
    UnitsDoNotMix,
    converted,
    density_unit,
    in_unit,
    length_under,
    moment_unit,
    volume_of_weight,
    weight_of_volume,
)
from fleet.quantities import DIMENSION_OF, Quantity, Unit
from tests.pure.fleet.documents import example

_PINT_WORDS = {"kg": "kilogram", "lb": "pound", "in": "inch", "ft": "foot", "l": "liter", "m": "meter"}
_PINT_WORDS |= {
    "mm": "millimeter",
    "cm": "centimeter",
    "US gal": "US_liquid_gallon",
    "imp gal": "imperial_gallon",
}
_PINT_WORDS |= {f"{length}2": f"{_PINT_WORDS[length]} ** 2" for length in ("mm", "cm", "m", "in", "ft")}
OUTSIDE = pint.UnitRegistry(non_int_type=Fraction)  # its definitions as exact rationals
PAIRS = [(a, b) for a, b in product(Unit, Unit) if DIMENSION_OF[a] is DIMENSION_OF[b]]


@pytest.mark.parametrize(("given", "wanted"), PAIRS, ids=lambda unit: unit.value)
def test_every_pair_of_units_agrees_with_pint(given: Unit, wanted: Unit) -> None:
    theirs = OUTSIDE.Quantity(Fraction(7), _words(given)).to(_words(wanted)).magnitude

    assert converted(Fraction(7), given, wanted) == theirs


@pytest.mark.parametrize(("given", "wanted"), PAIRS, ids=lambda unit: unit.value)
def test_there_and_back_is_exactly_the_same_number(given: Unit, wanted: Unit) -> None:
    value = Fraction("123.456")

    assert converted(converted(value, given, wanted), wanted, given) == value


def test_the_factors_are_the_published_ones_exactly() -> None:
    printed = example("UNITS")["expected"]  # exact by definition

    assert converted(Fraction(1), Unit.LB, Unit.KG) == Fraction(printed["kg per lb"])
    assert converted(Fraction(1), Unit.IN, Unit.MM) == Fraction(printed["mm per in"])
    assert converted(Fraction(1), Unit.US_GAL, Unit.L) == Fraction(printed["l per US gal"])
    assert converted(Fraction(1), Unit.IMP_GAL, Unit.L) == Fraction(printed["l per imp gal"])
    assert converted(Fraction(1), Unit.LB_IN, Unit.KG_MM) == Fraction(printed["kg.mm per lb.in"])
    cubic_inch = converted(Fraction(1), Unit.IN, Unit.MM) ** 3
    assert FACTOR[Unit.US_GAL] * 1_000_000 == Fraction(printed["US gal in cubic inches"]) * cubic_inch


def test_gallons_become_the_litres_the_handbook_prints() -> None:
    published = example("PHAK-10-7-UNITS")  # read; its misprint for 40 gal is corrected in the file

    for gallons, litres in published["expected"].items():
        ours = in_unit(Quantity(Decimal(gallons), Unit.US_GAL), Unit.L)

        assert abs(ours - Fraction(litres)) <= Fraction(published["tolerance"])


def test_standard_densities_become_the_computed_pounds_per_gallon() -> None:
    published = example("NCC-DENSITY")  # inputs read, results computed

    for fuel, density in published["inputs"]["kg_per_l"].items():
        ours = in_unit(Quantity(Decimal(density), Unit.KG_PER_L), Unit.LB_PER_US_GAL)

        assert abs(ours - Fraction(published["expected"][f"{fuel} lb/USgal"])) <= Fraction(
            published["tolerance"]
        )


def test_the_fuel_of_a_six_tank_twin_weighs_what_its_manual_prints() -> None:
    published = example("C12-FUEL")  # read; one misprint is declared in the file
    inputs, printed = published["inputs"], published["expected"]
    density = Quantity(Decimal(inputs["lb_per_gal"]), Unit.LB_PER_US_GAL)

    ours = {
        row["tank"]: weight_of_volume(Quantity(Decimal(row["gal"]), Unit.US_GAL), density, Unit.LB)
        for row in inputs["per_side"]
    }

    assert ours["wing"] == Fraction(printed["wing_lb"])
    assert ours["nacelle"] == Fraction(printed["nacelle_lb"])
    assert ours["auxiliary"] == Fraction(printed["aux_lb"])
    assert sum(ours.values()) * inputs["sides"] == Fraction(printed["total_lb"])
    assert sum(row["gal"] for row in inputs["per_side"]) * inputs["sides"] == printed["total_gal"]


def test_the_fuel_of_a_four_tank_twin_weighs_what_its_manual_prints() -> None:
    published = example("U21-FUEL")  # read
    inputs, printed = published["inputs"], published["expected"]
    density = Quantity(Decimal(inputs["lb_per_gal"]), Unit.LB_PER_US_GAL)

    nacelle, wing = (
        weight_of_volume(Quantity(Decimal(inputs[f"{tank}_gal"]), Unit.US_GAL), density, Unit.LB)
        for tank in ("nacelle", "wing")
    )

    assert nacelle == Fraction(printed["nacelle_lb"])
    assert wing == Fraction(printed["wing_lb"])
    assert (nacelle + wing) * inputs["sides"] == Fraction(printed["total_lb"])


def test_a_volume_and_the_weight_it_has_are_each_other_s_inverse_across_units() -> None:
    density = Quantity(Decimal("6.7"), Unit.LB_PER_US_GAL)
    litres = Quantity(Decimal("454.2"), Unit.L)

    kilograms = weight_of_volume(litres, density, Unit.KG)

    assert kilograms == Fraction("454.2") / Fraction("3.785411784") * Fraction("6.7") * Fraction("0.45359237")
    pounds = Quantity(Decimal(670), Unit.LB)
    assert volume_of_weight(pounds, density, Unit.US_GAL) == 100


@pytest.mark.parametrize("wanted", [Unit.MM, Unit.L, Unit.KG_MM, Unit.KG_PER_L])
def test_units_of_different_dimensions_never_mix(wanted: Unit) -> None:
    with pytest.raises(UnitsDoNotMix):
        in_unit(Quantity(Decimal(1), Unit.KG), wanted)


def test_weights_and_volumes_are_not_taken_for_each_other() -> None:
    density = Quantity(Decimal("0.8"), Unit.KG_PER_L)

    with pytest.raises(UnitsDoNotMix):
        weight_of_volume(Quantity(Decimal(1), Unit.KG), density, Unit.KG)
    with pytest.raises(UnitsDoNotMix):
        volume_of_weight(Quantity(Decimal(1), Unit.KG), Quantity(Decimal(1), Unit.L), Unit.L)


def test_moment_and_density_units_follow_from_their_parts() -> None:
    assert moment_unit(Unit.LB, Unit.IN) is Unit.LB_IN
    assert density_unit(Unit.KG, Unit.L) is Unit.KG_PER_L


def test_what_a_floor_bears_is_a_weight_over_a_length_or_over_its_square() -> None:
    # By hand: 1 lb/ft2 is 0.45359237 kg over 0.3048 m squared, 1 lb/ft that over 0.3048 m.
    assert converted(Fraction(1), Unit.LB_PER_FT2, Unit.KG_PER_M2) == Fraction("0.45359237") / (
        Fraction("0.3048") ** 2
    )
    assert converted(Fraction(144), Unit.LB_PER_FT2, Unit.LB_PER_IN2) == 1
    assert converted(Fraction(12), Unit.LB_PER_FT, Unit.LB_PER_IN) == 1
    assert converted(Fraction(1), Unit.KG_PER_CM2, Unit.KG_PER_M2) == 10_000
    assert length_under(Unit.LB_PER_FT2) is length_under(Unit.LB_PER_FT) is Unit.FT
    with pytest.raises(UnitsDoNotMix):
        length_under(Unit.LB_FT)


def _words(unit: Unit) -> str:
    for between, word in (("/", " / "), (" ", " * ")):
        first, _, second = unit.value.partition(between)
        if second and unit.value not in _PINT_WORDS:
            return f"{_PINT_WORDS[first]}{word}{_PINT_WORDS[second]}"
    return _PINT_WORDS[unit.value]
