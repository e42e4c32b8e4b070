"""Scales of a drawing: from a figure to a place on the paper, and round figures to mark."""

from collections.abc import Iterable
from dataclasses import dataclass
from math import ceil, floor, isfinite, log10

MOST_TICKS = 7


@dataclass(frozen=True, slots=True)
class Scale:
    """A straight scale: `low` is drawn at `start` and `high` at `end`, in SVG units."""

    low: float
    high: float
    start: float
    end: float

    @classmethod
    def around(cls, values: Iterable[float], start: float, end: float) -> "Scale":
        """This function will make a scale that shows all values with a little room at both ends."""
        held = [value for value in values if isfinite(value)]
        low, high = min(held), max(held)
        room = (high - low) * 0.06 or max(abs(high) * 0.05, 1.0)
        return cls(low - room, high + room, start, end)

    def at(self, value: float) -> float:
        """This function will return the place of a value, in SVG units."""
        return self.start + (value - self.low) / (self.high - self.low) * (self.end - self.start)


def ticks(scale: Scale, most: int = MOST_TICKS) -> list[float]:
    """This function will return at most `most` + 1 round figures: steps of 1, 2 or 5 times a power of ten."""
    rough = (scale.high - scale.low) / most
    power = 10.0 ** floor(log10(rough))
    step = next(factor * power for factor in (1, 2, 5, 10) if factor * power >= rough)
    first, last = ceil(scale.low / step), floor(scale.high / step)
    return [round(number * step, 10) for number in range(first, last + 1)]
