"""How far the fuel on the left may differ from the fuel on the right."""

from dataclasses import dataclass
from fractions import Fraction
from itertools import pairwise
from typing import Literal

from fleet.sourced import Source


@dataclass(frozen=True, slots=True)
class FuelBalance:
    """A greatest difference between the tanks on the left and those on the right.

    `by` says what is compared: weights in the weight unit of the basis, or volumes in its volume unit. The
    difference allowed is `maximum`, or, where the manual lets it depend on all usable fuel aboard, what
    `points` (usable fuel aboard, difference allowed) give, straight between them. `phases` are those of an
    envelope: engine start and taxi (`ramp`), flight (`take-off`), from the planned landing on (`landing`).
    """

    id: str
    name: str
    left: tuple[str, ...]
    right: tuple[str, ...]
    by: Literal["weight", "volume"]
    maximum: Fraction | None
    points: tuple[tuple[Fraction, Fraction], ...]
    phases: tuple[str, ...]
    source: Source

    def allowed(self, aboard: Fraction) -> Fraction | None:
        """Return the difference allowed with so much usable fuel aboard; None off the manual's table."""
        if self.maximum is not None:
            return self.maximum
        for (x1, y1), (x2, y2) in pairwise(self.points):
            if x1 <= aboard <= x2:
                return y1 + (y2 - y1) * (aboard - x1) / (x2 - x1)
        return None
