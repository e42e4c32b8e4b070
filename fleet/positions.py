"""Parts that move and shift the moment: landing gear, flaps. Each state of one is a change of moment against
the state in which the aircraft was weighed.

    moment with a setting = moment + sum of the changes of the states its parts are in

Nothing gets heavier by it, and nothing shifts across the aircraft. Moments in the weight unit times the
length unit of the basis; aft positive.
"""

from collections.abc import Container, Iterable
from dataclasses import dataclass
from fractions import Fraction
from itertools import product
from math import prod
from typing import Literal, NamedTuple

from fleet.sourced import Source

Where = Literal["ground", "flight"]
# What hangs outside (a hook, a hoist) decides which envelope holds just as a moving part does. No part can
# have this id: ids have no blanks.
EXTERNAL_LOAD = "external load"
CARRIED, NOT_CARRIED = "carried", "none"
MOST_SETTINGS = 64  # of all parts together, so that the path of one load stays a short computation


@dataclass(frozen=True, slots=True)
class PartState:
    """One state of a part: its change of moment, and whether it may hold on the ground, in flight or both."""

    id: str
    name: str
    moment_change: Fraction
    holds: tuple[Where, ...]
    source: Source


@dataclass(frozen=True, slots=True)
class MovingPart:
    """A part with its states; in the state `as_weighed` it changes nothing, and the aircraft stands in it."""

    id: str
    name: str
    as_weighed: str
    states: tuple[PartState, ...]

    def state(self, wanted: str) -> PartState:
        """Return a state by its id; raises `KeyError` for one it does not have."""
        for state in self.states:
            if state.id == wanted:
                return state
        raise KeyError(wanted)


class Setting(NamedTuple):
    """Several parts, each in one state: in words, and what they change the moment by together."""

    words: str
    moment: Fraction
    parts: tuple[tuple[str, str], ...] = ()  # (part, state) of those that decide which envelope holds


def settings(parts: Iterable[MovingPart], where: Where, told: Container[str] = ()) -> tuple[Setting, ...]:
    """Return the settings that may hold on the ground or in flight and change the moment, one for each
    change of moment; () when there is none. Of the parts in `told` each state counts as another setting.
    """
    found: dict[tuple[Fraction, tuple[tuple[str, str], ...]], str] = {}
    choices = [
        [(part, state) for state in part.states if where in state.holds or state.id == part.as_weighed]
        for part in parts
    ]
    for combined in product(*choices):
        moment = sum((state.moment_change for _, state in combined), Fraction(0))
        moved = [f"{part.name} {state.name}" for part, state in combined if state.id != part.as_weighed]
        deciding = tuple((part.id, state.id) for part, state in combined if part.id in told)
        if not moment and all(state.id == part.as_weighed for part, state in combined if part.id in told):
            continue
        if (moment, deciding) not in found:
            found[moment, deciding] = ", ".join(moved)
    return tuple(Setting(words, moment, deciding) for (moment, deciding), words in found.items())


def count_of_settings(parts: Iterable[MovingPart]) -> int:
    """Return in how many ways the states of all parts go together."""
    return prod(len(part.states) for part in parts)
