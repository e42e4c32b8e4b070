"""The sums of a weighing: what the scales read, less tare, corrected line by line to the empty weight. Exact.

    net of a point  = reading - tare
    as weighed      = the nets, each at the arm of its point
    empty           = as weighed + the corrections, signed lines at their own arms

A correction takes off what was aboard and is no part of the empty weight (fuel above the unusable, tools), or
adds what is part of it and was not aboard: a removal is a negative weight at its own arm. Moments are added,
never arms. Weights, arms and moments in one set of units; aft and right positive.
"""

from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from fractions import Fraction
from typing import NamedTuple

ZERO = Fraction(0)


class NotWeighed(ValueError):
    """These readings make no empty weight. `code` is stable, `point` the number of the point at fault or
    None.
    """

    def __init__(self, code: str, detail: str, point: int | None = None) -> None:
        super().__init__(detail)
        self.code = code
        self.point = point


class Sums(NamedTuple):
    """A weight with its moments; a removal has a weight below zero."""

    weight: Fraction
    moment: Fraction
    lateral_moment: Fraction = ZERO

    @property
    def arm(self) -> Fraction:
        """Return the arm of a weight that is not zero."""
        return self.moment / self.weight

    @property
    def lateral_arm(self) -> Fraction:
        """Return the lateral arm of a weight that is not zero."""
        return self.lateral_moment / self.weight

    def plus(self, other: "Sums") -> "Sums":
        """Return both together."""
        return Sums(
            self.weight + other.weight,
            self.moment + other.moment,
            self.lateral_moment + other.lateral_moment,
        )


NOTHING = Sums(ZERO, ZERO, ZERO)


@dataclass(frozen=True, slots=True)
class WeighingPoint:
    """One scale: what it read, the tare on it (chocks, blocks, jacks), and where the aircraft stood on it."""

    name: str
    reading: Fraction
    tare: Fraction
    arm: Fraction
    lateral_arm: Fraction = ZERO

    @property
    def net(self) -> Sums:
        """Return the weight of the aircraft on this point, with its moments."""
        weight = self.reading - self.tare
        return Sums(weight, weight * self.arm, weight * self.lateral_arm)


@dataclass(frozen=True, slots=True)
class SignedLine:
    """Something added (weight above zero) or taken off (below zero) at its own arm."""

    what: str
    weight: Fraction
    arm: Fraction
    lateral_arm: Fraction = ZERO

    @property
    def sums(self) -> Sums:
        """Return its weight and moments."""
        return Sums(self.weight, self.weight * self.arm, self.weight * self.lateral_arm)


@dataclass(frozen=True, slots=True)
class Weighed:
    """The result of a worksheet: every net, what they make together, and what the corrections leave."""

    nets: tuple[Sums, ...]
    as_weighed: Sums
    empty: Sums


def weighed(points: Sequence[WeighingPoint], corrections: Iterable[SignedLine] = ()) -> Weighed:
    """Return the sums of a weighing. Raises `NotWeighed`."""
    if not points:
        raise NotWeighed("no-points", "a weighing has at least one point; enter what the scales read")
    for number, point in enumerate(points):
        if point.tare < 0:
            raise NotWeighed("tare-negative", "a tare is zero or more; enter what stood on the scale", number)
        if point.reading < point.tare:
            raise NotWeighed(
                "reading-below-tare", "the scale read less than its tare; check both figures", number
            )
    nets = tuple(point.net for point in points)
    as_weighed = together(nets)
    empty = as_weighed.plus(together(line.sums for line in corrections))
    if empty.weight <= 0:
        raise NotWeighed("nothing-left", "the corrections take off all that was weighed; check their signs")
    return Weighed(nets, as_weighed, empty)


def together(parts: Iterable[Sums]) -> Sums:
    """Return the sum of parts; of none, nothing."""
    found = NOTHING
    for part in parts:
        found = found.plus(part)
    return found
