"""What happens on a flight between engine start and landing, as frozen values read against the loading basis.

Who and what is aboard is named by the JSON pointer of its line in the load document. Volumes in the volume
unit of the basis, weights in its weight unit.
"""

from dataclasses import dataclass
from fractions import Fraction
from typing import TYPE_CHECKING, Literal

from fleet.basis import Place, Seat
from fleet.positions import MovingPart, PartState

if TYPE_CHECKING:  # a load holds its events, so what is aboard cannot be imported before them
    from loads.balance.aboard import Item, Person

EventLeg = Literal["taxi", "flight"]


@dataclass(frozen=True, slots=True)
class Leaving:
    """Somebody, or some of an item, that leaves the aircraft; a weight of None is all there is of it."""

    line: str
    weight: Fraction | None = None


@dataclass(frozen=True, slots=True)
class Moving:
    """Somebody, or an item, that goes to another seat or place."""

    line: str
    to: Seat | Place


@dataclass(frozen=True, slots=True)
class Transfer:
    """A volume of fuel that goes from one tank into another while nothing is burned."""

    source: str
    target: str
    volume: Fraction


@dataclass(frozen=True, slots=True)
class Event:
    """One event: when (the volume burned since engine start while taxiing, since take-off in flight), and one
    kind of thing that happens then.
    """

    number: int
    leg: EventLeg
    burned: Fraction
    pointer: str
    leaving: tuple[Leaving, ...] = ()
    moving: tuple[Moving, ...] = ()
    transfer: Transfer | None = None
    positions: tuple[tuple[MovingPart, PartState], ...] = ()
    coming: "tuple[Person | Item, ...]" = ()  # who and what comes aboard, where they first are
