"""The moment of fuel in a tank, from the manual's own points.

A table gives an arm or a moment against volume or weight. Printed for a density, its arm belongs to the
VOLUME: the same litres fill the same corners of the tank whatever they weigh. So every table is turned into
one of volumes, once, and then

    straight in arm:     moment(volume, density) = density * volume * arm(volume)
    straight in moment:  moment(volume, density) = density * volume_moment(volume)

Nothing is extrapolated. An empty tank has no moment; apart from that, less than the table's first quantity
is refused, as is more than its last. What was burned has the moment before less the moment after, never
weight times an arm.
"""

from bisect import bisect_left
from collections.abc import Iterator, Sequence
from fractions import Fraction
from itertools import pairwise
from typing import Literal, NamedTuple

Measure = Literal["arm", "moment"]


class NotATable(ValueError):
    """These points make no tank table.

    `code` is stable; `row` is the point at fault, or None for the whole table.
    """

    def __init__(self, code: str, detail: str, row: int | None = None) -> None:
        super().__init__(detail)
        self.code = code
        self.row = row


class OutsideTable(ValueError):
    """A volume lies beyond the table's last point, or below its first without being nothing."""

    def __init__(self, volume: Fraction, first: Fraction, last: Fraction) -> None:
        super().__init__(
            f"{float(volume):g} lies outside the table, which runs from {float(first):g} to {float(last):g}"
        )
        self.volume = volume
        self.first = first
        self.last = last


class TankPiece(NamedTuple):
    """A part of a tank's table between two volumes, without a kink in it.

    There moment(volume, density) = density * (steady + slope * volume + bend * volume**2); the slope is an
    arm.
    """

    first: Fraction
    last: Fraction
    steady: Fraction
    slope: Fraction
    bend: Fraction


class TankCurve:
    """A tank table prepared for exact interpolation. Unchanging once made."""

    __slots__ = ("_straight_in_moment", "_values", "_volumes", "one_arm", "pieces")

    one_arm: Fraction | None  # where the tank has the same arm at every quantity down to nothing

    def __init__(
        self,
        *,
        against: Literal["volume", "weight"],
        gives: Measure,
        straight_in: Measure,
        density: Fraction | None,
        points: Sequence[tuple[Fraction, Fraction]],
    ) -> None:
        """Make the curve of (quantity, arm or moment) points in one set of units. Raises `NotATable`.

        `density`, weight over volume, is the one the table was printed for: needed when the table is
        against weight or gives moments, and meaningless otherwise.
        """
        _demand_points(points)
        printed = _printed_density(density, needed=against == "weight" or gives == "moment")
        self._volumes = tuple(
            quantity / printed if against == "weight" else quantity for quantity, _ in points
        )
        self._straight_in_moment = straight_in == "moment"
        self._values = tuple(
            self._value(volume, value, gives, printed, row)
            for row, (volume, (_, value)) in enumerate(zip(self._volumes, points, strict=True))
        )
        self.pieces = tuple(self._pieces())
        lowest = self.pieces[0]
        straight = not (self.pieces[1:] or lowest.bend or lowest.first)
        self.one_arm = lowest.slope if straight else None

    @property
    def first(self) -> Fraction:
        """Return the volume of the first point."""
        return self._volumes[0]

    @property
    def last(self) -> Fraction:
        """Return the volume of the last point."""
        return self._volumes[-1]

    def moment(self, volume: Fraction, density: Fraction) -> Fraction:
        """Return the moment of a volume of fuel at the density it was delivered with.

        Raises `OutsideTable`.
        """
        return density * self.volume_moment(volume)

    def volume_moment(self, volume: Fraction) -> Fraction:
        """Return the moment of a volume of fuel for each unit of density.

        Raises `OutsideTable`.
        """
        if volume == 0:
            return volume
        value = self._at(volume)
        return value if self._straight_in_moment else volume * value

    def arm(self, volume: Fraction) -> Fraction:
        """Return the arm of a volume of fuel, whatever its density.

        Raises `OutsideTable`; an empty tank has no arm.
        """
        if volume == 0:
            raise OutsideTable(volume, self.first, self.last)
        value = self._at(volume)
        return value / volume if self._straight_in_moment else value

    def _at(self, volume: Fraction) -> Fraction:
        volumes, values = self._volumes, self._values
        if not volumes[0] <= volume <= volumes[-1]:
            raise OutsideTable(volume, volumes[0], volumes[-1])
        right = bisect_left(volumes, volume)
        if volumes[right] == volume:
            return values[right]
        v1, v2, y1, y2 = volumes[right - 1], volumes[right], values[right - 1], values[right]
        return y1 if y1 == y2 else y1 + (y2 - y1) * (volume - v1) / (v2 - v1)

    def _pieces(self) -> Iterator[TankPiece]:
        """Yield the parts of the curve in rising order; points without a kink are passed over."""
        held: TankPiece | None = None
        for (v1, y1), (v2, y2) in pairwise(zip(self._volumes, self._values, strict=True)):
            rise = (y2 - y1) / (v2 - v1)
            at_nothing = y1 - rise * v1
            steady, slope, bend = (
                (at_nothing, rise, Fraction(0))
                if self._straight_in_moment
                else (Fraction(0), at_nothing, rise)
            )
            if held is not None and held[2:] == (steady, slope, bend):
                held = held._replace(last=v2)
            else:
                if held is not None:
                    yield held
                held = TankPiece(v1, v2, steady, slope, bend)
        if held is not None:
            yield held

    def _value(
        self, volume: Fraction, value: Fraction, gives: Measure, printed: Fraction, row: int
    ) -> Fraction:
        """Return what the curve interpolates at a point: an arm, or a moment per unit of density."""
        if gives == "arm":
            return value * volume if self._straight_in_moment else value
        if volume == 0 and value != 0:
            raise NotATable(
                "tank-table-moment-of-nothing", "an empty tank has no moment; correct the first point", row
            )
        if self._straight_in_moment:
            return value / printed
        if volume == 0:
            raise NotATable(
                "tank-table-no-arm",
                "moments at zero quantity give no arm to interpolate; begin at the first quantity above zero",
                row,
            )
        return value / printed / volume


def _demand_points(points: Sequence[tuple[Fraction, Fraction]]) -> None:
    if not points[1:]:
        raise NotATable(
            "tank-table-too-short", "a tank table needs at least two points; enter those of the manual"
        )
    if points[0][0] < 0:
        raise NotATable("tank-table-negative", "a quantity below zero does not exist; correct the point", 0)
    for row in range(1, len(points)):
        if points[row][0] <= points[row - 1][0]:
            raise NotATable(
                "tank-table-not-rising",
                "quantities must rise from point to point; correct or reorder them",
                row,
            )


def _printed_density(density: Fraction | None, *, needed: bool) -> Fraction:
    if density is None:
        if needed:
            raise NotATable(
                "tank-table-no-density",
                "a table by weight or in moments holds for one density; enter the one it was printed for",
            )
        return Fraction(1)
    if not needed:
        raise NotATable(
            "tank-table-density-unused",
            "a table of arms against volume holds for every density; leave it out",
        )
    if density <= 0:
        raise NotATable("tank-table-density", "a density lies above zero; correct it")
    return density
