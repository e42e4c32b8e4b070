"""Units and quantities, kept as typed. Exact factors only; conversion to rationals happens once, at entry.

Factors (exact by definition): 0.45359237 kg/lb and 0.0254 m/in (international yard and pound agreement, 1959);
3.785411784 l/US gal (231 cubic inches); 4.54609 l/imp gal.
"""

from dataclasses import dataclass
from decimal import Decimal
from enum import Enum


class Dimension(Enum):
    """What a unit measures."""

    WEIGHT = "weight"
    LENGTH = "length"
    VOLUME = "volume"
    DENSITY = "density"
    MOMENT = "moment"


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
    LB_PER_US_GAL = "lb/US gal"
    LB_PER_IMP_GAL = "lb/imp gal"
    LB_IN = "lb in"
    KG_MM = "kg mm"
    KG_CM = "kg cm"
    KG_M = "kg m"


@dataclass(frozen=True, slots=True)
class Quantity:
    """A number as typed and its unit."""

    value: Decimal
    unit: Unit
