"""Units and quantities, kept as typed; reading them from a document, strictly.

A quantity on the wire is `{"value": 181.5, "unit": "lb"}`; the value is a JSON number or a decimal string.
Exponents, NaN, more than 15 digits, blanks, a decimal comma, a missing or unknown unit and a unit of
another dimension are refused here, before anything computes. Factors and conversion are in
`fleet.conversion`.
"""

import re
from collections.abc import Mapping
from dataclasses import dataclass
from decimal import Decimal
from enum import Enum

from records.refusal import Fault, Invalid
from records.strict_json import pointer_step

MOST_DIGITS = 15
_PLAIN_DECIMAL = re.compile(r"-?(?:0|[1-9][0-9]*)(?:\.[0-9]+)?", re.ASCII)


class Dimension(Enum):
    """What a unit measures."""

    WEIGHT = "weight"
    LENGTH = "length"
    VOLUME = "volume"
    DENSITY = "density"
    MOMENT = "moment"
    AREA_LOAD = "weight on an area"
    LINE_LOAD = "weight along a length"


class Unit(Enum):
    """A unit as written on the wire. Imperial and US gallons are never written plain `gal`."""

    KG = "kg"
    LB = "lb"
    MM = "mm"
    CM = "cm"
    M = "m"
    IN = "in"
    FT = "ft"
    L = "l"
    US_GAL = "US gal"
    IMP_GAL = "imp gal"
    KG_PER_L = "kg/l"
    KG_PER_US_GAL = "kg/US gal"
    KG_PER_IMP_GAL = "kg/imp gal"
    LB_PER_L = "lb/l"
    LB_PER_US_GAL = "lb/US gal"
    LB_PER_IMP_GAL = "lb/imp gal"
    KG_MM = "kg mm"
    KG_CM = "kg cm"
    KG_M = "kg m"
    KG_IN = "kg in"
    KG_FT = "kg ft"
    LB_MM = "lb mm"
    LB_CM = "lb cm"
    LB_M = "lb m"
    LB_IN = "lb in"
    LB_FT = "lb ft"
    KG_PER_MM2 = "kg/mm2"
    KG_PER_CM2 = "kg/cm2"
    KG_PER_M2 = "kg/m2"
    KG_PER_IN2 = "kg/in2"
    KG_PER_FT2 = "kg/ft2"
    LB_PER_MM2 = "lb/mm2"
    LB_PER_CM2 = "lb/cm2"
    LB_PER_M2 = "lb/m2"
    LB_PER_IN2 = "lb/in2"
    LB_PER_FT2 = "lb/ft2"
    KG_PER_MM = "kg/mm"
    KG_PER_CM = "kg/cm"
    KG_PER_M = "kg/m"
    KG_PER_IN = "kg/in"
    KG_PER_FT = "kg/ft"
    LB_PER_MM = "lb/mm"
    LB_PER_CM = "lb/cm"
    LB_PER_M = "lb/m"
    LB_PER_IN = "lb/in"
    LB_PER_FT = "lb/ft"


WEIGHTS = (Unit.KG, Unit.LB)
LENGTHS = (Unit.MM, Unit.CM, Unit.M, Unit.IN, Unit.FT)
VOLUMES = (Unit.L, Unit.US_GAL, Unit.IMP_GAL)
# Every weight unit over every volume unit, and times every length unit: the wire form is built from the
# parts.
DENSITY_OF = {(w, v): Unit(f"{w.value}/{v.value}") for w in WEIGHTS for v in VOLUMES}
MOMENT_OF = {(w, a): Unit(f"{w.value} {a.value}") for w in WEIGHTS for a in LENGTHS}
# What a floor bears: a weight over a length squared, and over a length.
AREA_LOAD_OF = {(w, a): Unit(f"{w.value}/{a.value}2") for w in WEIGHTS for a in LENGTHS}
LINE_LOAD_OF = {(w, a): Unit(f"{w.value}/{a.value}") for w in WEIGHTS for a in LENGTHS}

UNITS_OF: dict[Dimension, tuple[Unit, ...]] = {
    Dimension.WEIGHT: WEIGHTS,
    Dimension.LENGTH: LENGTHS,
    Dimension.VOLUME: VOLUMES,
    Dimension.DENSITY: tuple(DENSITY_OF.values()),
    Dimension.MOMENT: tuple(MOMENT_OF.values()),
    Dimension.AREA_LOAD: tuple(AREA_LOAD_OF.values()),
    Dimension.LINE_LOAD: tuple(LINE_LOAD_OF.values()),
}
DIMENSION_OF: dict[Unit, Dimension] = {unit: d for d, units in UNITS_OF.items() for unit in units}
_FIELDS = frozenset({"value", "unit"})
_PLAINLY = "write a plain decimal number: digits, one point, a minus; no exponent, blank or comma"
_BY_SIGN: dict[object, Unit] = {unit.value: unit for unit in Unit}


@dataclass(frozen=True, slots=True)
class Quantity:
    """A number as typed and its unit."""

    value: Decimal
    unit: Unit


def read_quantity(
    value: object,
    pointer: str,
    dimension: Dimension | tuple[Dimension, ...],
    *,
    also: frozenset[str] = frozenset(),
) -> Quantity:
    """Return the quantity in a JSON value `{value, unit}` of the given dimension, or of one of several.

    `also` names further fields the object may carry (a density's `source`). Raises `Invalid` with one fault
    that names the field by pointer.
    """
    found = quantity_or_fault(value, pointer, dimension, also=also)
    if isinstance(found, Fault):
        raise Invalid(found)
    return found


def quantity_or_fault(
    value: object,
    pointer: str,
    dimension: Dimension | tuple[Dimension, ...],
    *,
    also: frozenset[str] = frozenset(),
) -> Quantity | Fault:
    """Return what `read_quantity` returns, or the fault it would raise, for callers that collect faults."""
    if not isinstance(value, Mapping):
        return Fault(
            pointer, "quantity-form", 'a quantity is an object {"value": ..., "unit": ...}; write it so'
        )
    strange = value.keys() - _FIELDS - also
    if strange:
        field = pointer_step(str(min(strange)))
        return Fault(f"{pointer}{field}", "unknown-field", "not a field of a quantity; remove it")
    if "value" not in value:
        return Fault(f"{pointer}/value", "missing", "the number is missing; give it, or omit the quantity")
    unit = _unit_or_fault(value.get("unit"), f"{pointer}/unit", dimension)
    if isinstance(unit, Fault):
        return unit
    number = number_or_fault(value["value"], f"{pointer}/value")
    return number if isinstance(number, Fault) else Quantity(number, unit)


def number_or_fault(value: object, pointer: str) -> Decimal | Fault:
    """Return a JSON number or decimal string as a Decimal, digits as typed, or the fault that refuses it."""
    if isinstance(value, str):
        if not _PLAIN_DECIMAL.fullmatch(value):
            return Fault(pointer, "number-form", _PLAINLY)
        digits = len(value) - value.count("-") - value.count(".")
        number = Decimal(value) if digits <= MOST_DIGITS else None
    elif isinstance(value, bool) or not isinstance(value, int | Decimal):
        return Fault(pointer, "number-form", "not a number; write a JSON number or a decimal string")
    elif isinstance(value, int):
        number = Decimal(value) if abs(value) < 10**MOST_DIGITS else None
    else:
        _, shown, exponent = value.as_tuple()
        if not isinstance(exponent, int) or exponent > 0:
            return Fault(pointer, "number-form", _PLAINLY)
        number = value if max(len(shown), 1 - exponent) <= MOST_DIGITS else None
    if number is None:
        return Fault(pointer, "number-digits", f"more than {MOST_DIGITS} digits; round it as the source does")
    return number


def _unit_or_fault(sign: object, pointer: str, dimension: Dimension | tuple[Dimension, ...]) -> Unit | Fault:
    wanted = dimension if isinstance(dimension, tuple) else (dimension,)
    if sign is None:
        return Fault(pointer, "unit-missing", f"the unit is missing, and none is inferred; {_choice(wanted)}")
    unit = _BY_SIGN.get(sign) if isinstance(sign, str) else None
    if unit is None:
        return Fault(pointer, "unit-unknown", f"not a known unit; {_choice(wanted)}")
    if DIMENSION_OF[unit] not in wanted:
        words = " or ".join(each.value for each in wanted)
        return Fault(pointer, "unit-dimension", f"{unit.value} is no unit of {words}; {_choice(wanted)}")
    return unit


def _choice(wanted: tuple[Dimension, ...]) -> str:
    return "use one of " + ", ".join(unit.value for each in wanted for unit in UNITS_OF[each])
