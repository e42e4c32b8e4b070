"""How far a free choice of seats can move the moment from where it is assumed: a margin, worked out.

The moment is assumed as if everybody sat at the centroid of the cabin (or of a section of it). People choose
windows first, then aisles, then what remains, either from the front or from the rear; after each of them the
moment of the seats taken is compared with the assumed one, and the greatest differences forward and aft are
what an operator keeps inside the certified envelope. Of a cabin counted in sections each has its own greatest
difference, and they add up. The method is the one FAA AC 120-27 describes (remembered, not copied). All
exact; weights in one unit, arms in one unit, aft of the datum positive.
"""

from collections.abc import Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass
from fractions import Fraction
from typing import Literal, NamedTuple

Choice = Literal["window", "aisle", "remaining"]
Order = Literal["from the front", "from the rear"]
CHOICES: tuple[Choice, ...] = ("window", "aisle", "remaining")
ORDERS: tuple[Order, ...] = ("from the front", "from the rear")
ZERO = Fraction(0)


@dataclass(frozen=True, slots=True)
class CabinRow:
    """A row of seats: its arm, how many seats of each kind, and the section it is counted in."""

    name: str
    arm: Fraction
    window: int
    aisle: int
    remaining: int
    section: str = ""

    @property
    def seats(self) -> int:
        """Return how many seats it has."""
        return self.window + self.aisle + self.remaining

    def of(self, choice: Choice) -> int:
        """Return how many of its seats are of one kind."""
        return {"window": self.window, "aisle": self.aisle, "remaining": self.remaining}[choice]


class Taken(NamedTuple):
    """One line of the working: the passenger who takes a seat, and the moments with everybody so far.

    `difference` is the moment of the seats taken less the assumed one: below zero forward.
    """

    number: int
    row: str
    choice: Choice
    arm: Fraction
    moment: Fraction
    assumed: Fraction
    difference: Fraction


@dataclass(frozen=True, slots=True)
class Filling:
    """A section filled in one order, line by line, with the assumed arm of everybody in it."""

    section: str
    order: Order
    assumed_arm: Fraction
    lines: tuple[Taken, ...]

    @property
    def forward(self) -> Taken | None:
        """Return the line with the greatest difference forward, of equals the first; None without any."""
        worst = min(self.lines, key=lambda line: line.difference)
        return worst if worst.difference < 0 else None

    @property
    def aft(self) -> Taken | None:
        """Return the line with the greatest difference aft, of equals the first; None without any."""
        worst = max(self.lines, key=lambda line: line.difference)
        return worst if worst.difference > 0 else None


@dataclass(frozen=True, slots=True)
class SeatingVariation:
    """The margin as two moments of 0 or more, and the working behind them."""

    weight: Fraction
    forward: Fraction
    aft: Fraction
    fillings: tuple[Filling, ...]


def seating_variation(
    rows: Sequence[CabinRow], weight: Fraction, assumed: Mapping[str, Fraction] | None = None
) -> SeatingVariation:
    """Return the margin of a cabin whose passengers weigh `weight` each.

    `assumed` is the arm a section is assumed at, its centroid by seats where it is not named. Raises
    `ValueError` for a section without a seat.
    """
    given = assumed or {}
    fillings = []
    for section in dict.fromkeys(row.section for row in rows):
        own = [row for row in rows if row.section == section]
        arm = given.get(section, centroid(own))
        fillings += [_filled(own, weight, section, order, arm) for order in ORDERS]
    forward, aft = ZERO, ZERO
    for section in dict.fromkeys(filling.section for filling in fillings):
        both = [filling for filling in fillings if filling.section == section]
        forward += max(-line.difference if (line := each.forward) else ZERO for each in both)
        aft += max(line.difference if (line := each.aft) else ZERO for each in both)
    return SeatingVariation(weight, forward, aft, tuple(fillings))


def centroid(rows: Iterable[CabinRow]) -> Fraction:
    """Return the mean arm of the seats. Raises `ValueError` when there is none."""
    held = list(rows)
    seats = sum(row.seats for row in held)
    if not seats:
        raise ValueError("a section without a seat has no centroid")
    return sum((row.seats * row.arm for row in held), ZERO) / seats


def _filled(
    rows: Sequence[CabinRow], weight: Fraction, section: str, order: Order, assumed_arm: Fraction
) -> Filling:
    lines = []
    moment = ZERO
    for number, (row, choice) in enumerate(_seats(rows, order), 1):
        moment += weight * row.arm
        assumed = number * weight * assumed_arm
        lines.append(Taken(number, row.name, choice, row.arm, moment, assumed, moment - assumed))
    return Filling(section, order, assumed_arm, tuple(lines))


def _seats(rows: Sequence[CabinRow], order: Order) -> Iterator[tuple[CabinRow, Choice]]:
    """Yield the seats in the order in which they are taken."""
    rising = sorted(rows, key=lambda row: row.arm, reverse=order == "from the rear")
    for choice in CHOICES:
        for row in rising:
            for _ in range(row.of(choice)):
                yield row, choice
