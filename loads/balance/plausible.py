"""Bands outside which a figure is taken for a slip of the pen (a pound for a kilogram, a comma too far
right).

Common practice, no rule behind them: wide enough for every real person and fuel, narrow enough to catch a
factor of ten. Kept in kilograms and litres; both ends belong to the band.
"""

from fractions import Fraction

from fleet.conversion import in_unit
from fleet.quantities import Quantity, Unit

Band = tuple[Fraction, Fraction]

ADULT_KG: Band = (Fraction(20), Fraction(250))
CHILD_KG: Band = (Fraction(2), Fraction(120))
LAP_INFANT_KG: Band = (Fraction(1), Fraction(25))
FUEL_KG_PER_L: Band = (Fraction("0.60"), Fraction("0.95"))
CHILD_CATEGORIES = ("child", "infant")


def person_band(category: str | None) -> Band:
    """Return the band of a person's weight, in kg; wider at the low end for a child or an infant in its own
    seat.
    """
    return CHILD_KG if category in CHILD_CATEGORIES else ADULT_KG


def within_band(quantity: Quantity, band: Band, unit: Unit) -> bool:
    """Return whether a quantity lies in a band that is kept in `unit`."""
    low, high = band
    return low <= in_unit(quantity, unit) <= high
