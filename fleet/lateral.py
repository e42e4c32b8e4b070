r"""Lateral limits that vary with the longitudinal CG: a polygon in (longitudinal arm, lateral).

    lateral  ^   ________
     (right  |  /        \        The polygon is held as an envelope turned by a quarter: its levels are
     positive)  \__      |        longitudinal arms, moved so that they lie above zero, and what lies at a
             |     \____/         level are the stretches between its left and its right limits.
             +--------------> longitudinal arm

A point on an edge is inside, notches stay, all exact. Lateral arms in the length unit of the basis, lateral
moments in its weight unit times its length unit.
"""

from collections.abc import Sequence
from dataclasses import dataclass, field
from fractions import Fraction
from typing import Literal

from fleet.envelope import Section, Shape, Stretch
from fleet.sourced import Source

Corner = tuple[Fraction, Fraction]  # (longitudinal arm, lateral arm or moment)
Side = tuple[Fraction, Fraction, Fraction]  # P, Q, R: inside where P * lateral + Q * longitudinal + R >= 0


class Across:
    """A polygon in (longitudinal arm, lateral arm or moment), prepared for exact decisions."""

    __slots__ = ("_shape", "_shift", "levels", "sides")

    def __init__(self, corners: Sequence[Corner]) -> None:
        """Make it of its corners, in order, the first not repeated. Raises `fleet.envelope.NotAnEnvelope`."""
        self._shift = 1 - min((along for along, _ in corners), default=Fraction(0))
        self._shape = Shape("arm", [(across, along + self._shift) for along, across in corners])
        slabs = self._shape.slabs
        # The longitudinal arms of the corners, rising; between two of them lie pieces with straight sides.
        self.levels = tuple(Fraction(level, slabs.scale) - self._shift for level in slabs.levels)
        self.sides = tuple(
            tuple((self._side(*piece[:4]), self._side(*piece[4:])) for piece in pieces)
            for pieces in slabs.trapezoids
        )

    def _side(self, p: int, _: int, b: int, c: int) -> Side:
        """Return a side as a line of lateral figure and longitudinal arm, P of it 1 or -1."""
        return Fraction(p, abs(p)), Fraction(c, abs(p)), (b + c * self._shift) / Fraction(abs(p))

    def holds(self, along: Fraction, across: Fraction) -> bool:
        """Return whether a point lies inside or on an edge; exact."""
        level = along + self._shift
        return self._shape.holds(level, across * level)

    def stretches(self, along: Fraction) -> tuple[Stretch, ...]:
        """Return what is allowed across at one longitudinal arm: (left, right), rising; () if nothing."""
        return self._shape.arms_at(along + self._shift)

    def section(self, along: Fraction, across: Fraction) -> Section | None:
        """Return the stretch across at the same longitudinal arm and the margin in it; None without one."""
        level = along + self._shift
        return self._shape.arm_section(level, across * level)


@dataclass(frozen=True, slots=True)
class LateralByCg:
    """A lateral limit against the longitudinal CG, at the phases it serves.

    `gives` says whether its lateral figures are arms or moments; `configurations`, `categories` and
    `positions` are those it holds for, as with an envelope. `shape` decides.
    """

    id: str
    phases: tuple[str, ...]
    gives: Literal["arm", "moment"]
    points: tuple[Corner, ...]
    source: Source
    configurations: tuple[str, ...] = ()
    categories: tuple[str, ...] = ()
    positions: tuple[tuple[str, tuple[str, ...]], ...] = ()
    shape: Across = field(init=False, compare=False, repr=False)

    def __post_init__(self) -> None:
        object.__setattr__(self, "shape", Across(self.points))
