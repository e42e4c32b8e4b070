"""What is found about some loads while their limits are gone through."""

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from loads.balance.bulk.known import Floats, Known
from loads.balance.bulk.reading import NO_LIMIT, Batch

Marks = NDArray[np.bool_]


@dataclass(frozen=True, slots=True)
class Errors:
    """Bounds on the errors of a batch: of a weight, of a volume, of a moment."""

    weight: float
    volume: float
    moment: float


@dataclass(frozen=True, slots=True)
class State:
    """The aircraft at one phase, a row a load."""

    weight: Floats
    along: Floats
    across: Floats


class Judge:
    """What is found about some loads. `refused` are those the exact reading may refuse: nothing is said."""

    def __init__(self, known: Known, batch: Batch, errors: Errors) -> None:
        self.known, self.batch, self.errors = known, batch, errors
        self.outside = np.zeros(len(batch), dtype=np.bool_)
        self.unsure = np.zeros(len(batch), dtype=np.bool_)
        self.refused = np.zeros(len(batch), dtype=np.bool_)
        self.broken: list[tuple[str, Marks, Floats]] = []

    def left(self, code: str, room: Floats, error: float) -> None:
        """Note the room that is left to a limit."""
        if room.min(initial=NO_LIMIT) > error:
            return
        fails = room < -error
        if fails.any():
            self.outside |= fails
            self.broken.append((code, fails, -room))
        self.unsure |= np.abs(room) <= error
