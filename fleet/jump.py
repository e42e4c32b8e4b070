"""How far a newly entered empty weight is from the one it follows, against the operator's threshold."""

from dataclasses import dataclass
from decimal import Decimal
from fractions import Fraction

from fleet.basis import Basis
from fleet.sourced import Limit
from fleet.weighing import EmptyFigures

HUNDRED = Fraction(100)


@dataclass(frozen=True, slots=True)
class Jump:
    """The weight before and after, in the basis's unit, and the most that needs no cause (None: unknown)."""

    before: Fraction
    after: Fraction
    most: Fraction | None

    @property
    def difference(self) -> Fraction:
        """After less before."""
        return self.after - self.before

    @property
    def needs_cause(self) -> bool:
        """Whether it is beyond the threshold; on it is not beyond. A threshold that cannot be told is passed
        by any change.
        """
        return bool(self.difference) if self.most is None else abs(self.difference) > self.most


def jump_of(before: EmptyFigures, after: EmptyFigures, percent: Decimal, basis: Basis) -> Jump:
    """Return the jump between two empty weights against a percentage of the landing weight limit, or where
    that is none or not entered, of the take-off limit.
    """
    limit = _value(basis.limits.landing) or _value(basis.limits.take_off)
    most = None if limit is None else limit * Fraction(percent) / HUNDRED
    return Jump(before.weight, after.weight, most)


def _value(limit: Limit | None) -> Fraction | None:
    return None if limit is None else limit.value
