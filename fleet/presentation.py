"""Presentations of a moment beside itself: index units, and moments divided by a round number.

    index of a total = (moment - reference arm * weight) / divisor + constant
    index of a line  = (moment - reference arm * weight) / divisor

so that the lines of a computation and the constant add up to the index of its total. All exact. It is only
shown, never an input to a decision; what a manual prints in index units is turned into moments once, at
reading. Weights, arms and moments in the units of the basis.
"""

from dataclasses import dataclass
from fractions import Fraction

from fleet.sourced import Source


@dataclass(frozen=True, slots=True)
class IndexUnits:
    """The index of a manual: `divisor` is the moment one index unit stands for, above zero."""

    reference_arm: Fraction
    divisor: Fraction
    constant: Fraction
    source: Source

    def of_line(self, weight: Fraction, moment: Fraction) -> Fraction:
        """Return what a line adds to the index."""
        return (moment - self.reference_arm * weight) / self.divisor

    def of_total(self, weight: Fraction, moment: Fraction) -> Fraction:
        """Return the index of an aircraft of this weight and moment."""
        return self.of_line(weight, moment) + self.constant

    def moment(self, weight: Fraction, index: Fraction) -> Fraction:
        """Return the moment of an aircraft of this weight and index.

        It is straight in both: an edge that is straight in index is straight in moment.
        """
        return (index - self.constant) * self.divisor + self.reference_arm * weight

    def arm(self, weight: Fraction, index: Fraction) -> Fraction:
        """Return the arm of an aircraft of this weight, above zero, and index."""
        return self.moment(weight, index) / weight


@dataclass(frozen=True, slots=True)
class DividedMoment:
    """Moments printed divided, as a manual prints them: by 100, by 1000."""

    divisor: Fraction
    source: Source


@dataclass(frozen=True, slots=True)
class Presentation:
    """How moments are shown beside themselves; at least one of the two."""

    index: IndexUnits | None
    divided: DividedMoment | None
