"""Changes between weighings: signed lines, their running sum, and when they may no longer be passed over.

What may be neglected, and what demands a new empty weight, are rules with dates and sources; they are handed
in. Small changes add up: the sum since the last weighing is what is compared, and "exceeds" means more, not
as much. All exact; weights, arms and moments in one set of units.
"""

from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from fractions import Fraction
from typing import NamedTuple

from fleet.worksheet import NOTHING, SignedLine, Sums


class Step(NamedTuple):
    """One change and where it leaves the aircraft: the sum of all changes so far, and the empty figures."""

    line: SignedLine
    changed: Sums
    empty: Sums

    @property
    def shift(self) -> Fraction:
        """Return how far the centre of gravity moved since the weighing, aft positive."""
        return self.empty.arm - self.before.arm

    @property
    def before(self) -> Sums:
        """Return the empty figures of the weighing."""
        return Sums(
            self.empty.weight - self.changed.weight,
            self.empty.moment - self.changed.moment,
            self.empty.lateral_moment - self.changed.lateral_moment,
        )


def running(empty: Sums, lines: Iterable[SignedLine]) -> tuple[Step, ...]:
    """Return each change in order with the running sum since the weighing.

    Raises `ValueError` where more is taken off than the aircraft weighs.
    """
    steps = []
    changed = NOTHING
    for line in lines:
        changed = changed.plus(line.sums)
        now = empty.plus(changed)
        if now.weight <= 0:
            raise ValueError(f"{line.what}: more is taken off than the aircraft weighs")
        steps.append(Step(line, changed, now))
    return tuple(steps)


@dataclass(frozen=True, slots=True)
class Bracket:
    """What is negligible below an empty weight (`with_it`: or as heavy as it); None: however heavy."""

    below: Fraction | None
    with_it: bool
    negligible: Fraction

    def covers(self, weight: Fraction) -> bool:
        """Return whether an empty weight falls in this bracket or a lighter one."""
        return self.below is None or weight < self.below or (self.with_it and weight == self.below)


def negligible_weight(brackets: Sequence[Bracket], empty_weight: Fraction) -> Fraction:
    """Return what change of weight a rule calls negligible. Raises `LookupError` where it says nothing."""
    for bracket in brackets:
        if bracket.covers(empty_weight):
            return bracket.negligible
    raise LookupError("no bracket of the rule covers this empty weight")


def part_of(percent: Fraction, whole: Fraction) -> Fraction:
    """Return a percentage of a weight or of a chord, as rules state thresholds."""
    return percent * whole / 100


def must_revise(
    weight: Fraction, shift: Fraction, *, most_weight: Fraction, most_shift: Fraction | None
) -> bool:
    """Return whether a cumulative change exceeds a threshold, of weight or (None: not asked) of the shift of
    the centre of gravity; either way up or down. As much as the threshold is not more.
    """
    return abs(weight) > most_weight or (most_shift is not None and abs(shift) > most_shift)
