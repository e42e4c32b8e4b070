"""Exact conversion between units, as rationals; done once, at entry.

Factors are exact by definition: 0.45359237 kg/lb and 25.4 mm/in (international yard and pound agreement,
1959); 12 in/ft; 3.785411784 l/US gal (231 cubic inches); 4.54609 l/imp gal (UK Weights and Measures Act
1985).
"""

from fractions import Fraction

from fleet.quantities import (
    AREA_LOAD_OF,
    DENSITY_OF,
    DIMENSION_OF,
    LINE_LOAD_OF,
    MOMENT_OF,
    Dimension,
    Quantity,
    Unit,
)

# In kilograms, millimetres and litres; densities, moments and what a floor bears follow from their parts.
_PLAIN: dict[Unit, Fraction] = {
    Unit.KG: Fraction(1),
    Unit.LB: Fraction("0.45359237"),
    Unit.MM: Fraction(1),
    Unit.CM: Fraction(10),
    Unit.M: Fraction(1000),
    Unit.IN: Fraction("25.4"),
    Unit.FT: Fraction("304.8"),
    Unit.L: Fraction(1),
    Unit.US_GAL: Fraction("3.785411784"),
    Unit.IMP_GAL: Fraction("4.54609"),
}
FACTOR: dict[Unit, Fraction] = (
    _PLAIN
    | {unit: _PLAIN[weight] / _PLAIN[volume] for (weight, volume), unit in DENSITY_OF.items()}
    | {unit: _PLAIN[weight] * _PLAIN[length] for (weight, length), unit in MOMENT_OF.items()}
    | {unit: _PLAIN[weight] / _PLAIN[length] ** 2 for (weight, length), unit in AREA_LOAD_OF.items()}
    | {unit: _PLAIN[weight] / _PLAIN[length] for (weight, length), unit in LINE_LOAD_OF.items()}
)
_PARTS_OF_AREA_LOAD = {unit: parts for parts, unit in AREA_LOAD_OF.items()}
_PARTS_OF_LINE_LOAD = {unit: parts for parts, unit in LINE_LOAD_OF.items()}
_PARTS_OF_DENSITY = {unit: parts for parts, unit in DENSITY_OF.items()}
_RATIO: dict[tuple[Unit, Unit], Fraction] = {
    (given, wanted): FACTOR[given] / FACTOR[wanted]
    for given in Unit
    for wanted in Unit
    if DIMENSION_OF[given] is DIMENSION_OF[wanted]
}


class UnitsDoNotMix(ValueError):
    """A quantity was asked for in a unit that measures something else: a fault of the program, never of a
    document.
    """


def in_unit(quantity: Quantity, unit: Unit) -> Fraction:
    """Return the quantity as an exact rational number of `unit`. Raises `UnitsDoNotMix` across dimensions."""
    if quantity.unit is unit:
        return Fraction(quantity.value)
    return converted(Fraction(quantity.value), quantity.unit, unit)


def converted(value: Fraction, given: Unit, wanted: Unit) -> Fraction:
    """Return `value`, a number of `given`, as an exact number of `wanted`.

    Raises `UnitsDoNotMix` across dimensions.
    """
    try:
        return value * _RATIO[given, wanted]
    except KeyError:
        raise UnitsDoNotMix(f"{given.value} cannot be expressed in {wanted.value}") from None


def moment_unit(weight: Unit, length: Unit) -> Unit:
    """Return the unit of a weight times an arm, such as `lb in`."""
    return MOMENT_OF[weight, length]


def density_unit(weight: Unit, volume: Unit) -> Unit:
    """Return the unit of a weight over a volume, such as `lb/US gal`."""
    return DENSITY_OF[weight, volume]


def length_under(unit: Unit) -> Unit:
    """Return the length of a unit of what a floor bears: `ft` of `lb/ft2`, and of `lb/ft`.

    Raises `UnitsDoNotMix` for any other unit.
    """
    parts = _PARTS_OF_AREA_LOAD.get(unit) or _PARTS_OF_LINE_LOAD.get(unit)
    if parts is None:
        raise UnitsDoNotMix(f"{unit.value} is no unit of what a floor bears")
    return parts[1]


def weight_of_volume(volume: Quantity, density: Quantity, unit: Unit) -> Fraction:
    """Return the weight, in `unit`, of a volume of fuel at a density.

    Both in any units of their dimension.
    """
    _demand(volume, Dimension.VOLUME)
    _demand(density, Dimension.DENSITY)
    weight_part, volume_part = _PARTS_OF_DENSITY[density.unit]
    return converted(in_unit(volume, volume_part) * Fraction(density.value), weight_part, unit)


def volume_of_weight(weight: Quantity, density: Quantity, unit: Unit) -> Fraction:
    """Return the volume, in `unit`, that a weight of fuel fills at a density above zero."""
    _demand(weight, Dimension.WEIGHT)
    _demand(density, Dimension.DENSITY)
    weight_part, volume_part = _PARTS_OF_DENSITY[density.unit]
    return converted(in_unit(weight, weight_part) / Fraction(density.value), volume_part, unit)


def _demand(quantity: Quantity, dimension: Dimension) -> None:
    if DIMENSION_OF[quantity.unit] is not dimension:
        raise UnitsDoNotMix(f"{quantity.unit.value} is no unit of {dimension.value}")
