"""The figures of one empty-weight version, in the units of the basis it will be used with."""

from dataclasses import dataclass
from fractions import Fraction
from typing import Literal


@dataclass(frozen=True, slots=True)
class EmptyFigures:
    """Weight, moment and lateral moment of the empty aircraft.

    A recorded moment beats weight times printed arm.
    """

    weight: Fraction
    moment: Fraction
    lateral_moment: Fraction
    datum: str
    fit: str
    how: Literal["weighing", "opening entry", "calculated"]
