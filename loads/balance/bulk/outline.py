"""An envelope as rows of numbers for bulk sums: its edges between the weights of its corners.

The moment of an edge at the weight W is e0 + e1 * W + e2 * W**2, whichever plane it is straight in.
"""

from dataclasses import dataclass
from fractions import Fraction
from itertools import chain

import numpy as np
from numpy.typing import NDArray

from fleet.polygon import Slabs

Floats = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class Outline:
    """An envelope with one piece at every weight. `levels` are the weights of its corners, rising; between
    two of them hold `low` and `high`, rows of (e0, e1, e2).

    `at_levels` has, for the levels between the first and the last, the weight, the greatest moment of a low
    edge and the least of a high edge there, of both sides. `bent` is how far, times the square of a stretch
    of weight, a margin between its ends can fall below the lesser of them. `steep` bounds what an edge moves
    with weight, and `size` the parts an edge is summed of.
    """

    levels: Floats
    low: Floats
    high: Floats
    at_levels: tuple[tuple[float, float, float], ...]
    bent: float
    steep: float
    size: float


def outline_of(slabs: Slabs) -> Outline | None:
    """Return the outline of an envelope, None where it has several pieces side by side at some weight."""
    if any(len(trapezoids) != 1 for trapezoids in slabs.trapezoids):
        return None
    levels = [Fraction(level, slabs.scale) for level in slabs.levels]
    low, high = [], []
    for ((p, a, b, c, p2, a2, b2, c2),) in slabs.trapezoids:
        low.append((Fraction(-a, p), Fraction(-b, p), Fraction(-c, p)))
        high.append((Fraction(-a2, p2), Fraction(-b2, p2), Fraction(-c2, p2)))
    at_levels = []
    for place, level in enumerate(levels[1:-1]):
        lows, highs = (
            [e0 + (e1 + e2 * level) * level for e0, e1, e2 in edges[place : place + 2]]
            for edges in (low, high)
        )
        at_levels.append((float(level), float(max(lows)), float(min(highs))))
    # A margin bends downwards between its ends where a low edge bends upwards less, a high one more.
    bent = max(Fraction(0), *(-e2 for _, _, e2 in low), *(e2 for _, _, e2 in high)) / 4
    top = levels[-1]
    return Outline(
        np.array([float(level) for level in levels]),
        np.array([[float(each) for each in edge] for edge in low]),
        np.array([[float(each) for each in edge] for edge in high]),
        tuple(at_levels),
        float(bent),
        float(max(abs(e1) + 2 * abs(e2) * top for _, e1, e2 in chain(low, high))),
        float(max(abs(e0) + (abs(e1) + abs(e2) * top) * top for e0, e1, e2 in chain(low, high))),
    )
