"""The figures of one empty-weight version, in the units of the basis it will be used with."""

from dataclasses import dataclass
from fractions import Fraction
from typing import Literal

from fleet.sourced import Source


@dataclass(frozen=True, slots=True)
class Restated:
    """From which datum the figures were given, with the moment there, and how far aft of the other it lies:
    moment here = moment there + weight * offset.
    """

    datum: str
    moment: Fraction
    offset: Fraction
    source: Source


@dataclass(frozen=True, slots=True)
class EmptyFigures:
    """Weight, moment and lateral moment of the empty aircraft.

    A recorded moment beats weight times printed arm. `restated` tells the working where the paper counts from
    another datum.
    """

    weight: Fraction
    moment: Fraction
    lateral_moment: Fraction
    datum: str
    fit: str
    how: Literal["weighing", "opening entry", "calculated"]
    restated: Restated | None = None
