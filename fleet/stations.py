"""What a manual says of where things are, beyond one maximum a seat or place: maxima that hold under a
condition, running sums, what a floor bears, and seats that stand on rails.

Frozen values in the basis's own units: weights in its weight unit, arms and lengths in its length unit, what
a floor bears in weight unit over length unit (squared).
"""

from dataclasses import dataclass
from fractions import Fraction
from typing import Literal

from fleet.quantities import Unit
from fleet.sourced import Limit, Source

Way = Literal["along", "across"]  # the aircraft's own length, or its width


@dataclass(frozen=True, slots=True)
class Condition:
    """Something that can be fitted or not, and changes a maximum: a net, a door taken off, a kind of
    tie-down.
    """

    id: str
    name: str
    source: Source


@dataclass(frozen=True, slots=True)
class Conditional:
    """A maximum that holds instead of the plain one while all conditions in `when` hold."""

    when: frozenset[str]
    maximum: Limit


def maximum_under(
    plain: Limit | None, conditional: tuple[Conditional, ...], holding: frozenset[str]
) -> tuple[Limit | None, frozenset[str]]:
    """Return the maximum that counts while some conditions hold, and the conditions that made it count.

    A maximum for more conditions replaces one for fewer of the same, the plain one first of all; of what then
    remains the least counts. Without a condition that matters it is the plain one.
    """
    met = [each for each in conditional if each.when <= holding]
    left = [each for each in met if not any(each.when < other.when for other in met)]
    if not left:
        return plain, frozenset()
    least = min(left, key=lambda each: (each.maximum.value is None, each.maximum.value or Fraction(0)))
    return least.maximum, least.when


@dataclass(frozen=True, slots=True)
class CumulativeStep:
    """One station of a running sum: what it adds, and the most the sum may be there (None: not entered)."""

    name: str
    members: tuple[str, ...]
    maximum: Limit | None


@dataclass(frozen=True, slots=True)
class Cumulative:
    """Stations in order from one end of the aircraft, with a maximum for the running sum at each."""

    id: str
    name: str
    start: Literal["nose", "tail"]
    steps: tuple[CumulativeStep, ...]


@dataclass(frozen=True, slots=True)
class FloorLimit:
    """What a floor bears, in the basis's units; `unit` is the one it was entered in. None: shown to be no
    limit.
    """

    value: Fraction | None
    unit: Unit | None
    source: Source


@dataclass(frozen=True, slots=True)
class Floor:
    """The floor of a place: what it bears on an area and along its length, and which way that runs.

    `free_up_to` is the weight up to which an item needs no footprint, `free_kinds` the kinds that never need
    one. `length` is how far the place runs that way, where it is stated.
    """

    runs: Way
    per_area: FloorLimit | None
    per_length: FloorLimit | None
    free_up_to: Fraction | None = None
    free_kinds: tuple[str, ...] = ()
    length: Fraction | None = None


@dataclass(frozen=True, slots=True)
class Setting:
    """One position a seat can be fixed at on its rail."""

    name: str
    arm: Fraction


@dataclass(frozen=True, slots=True)
class Rail:
    """How far a seat can stand forward and aft, and the settings that have a name."""

    forward: Fraction
    aft: Fraction
    settings: tuple[Setting, ...]
    source: Source
