"""Whether floats can tell that a polynomial of two figures is nothing nowhere in a rectangle: most are far
from it, and need no exact look.

The polynomial is written as a sum of parts none of which is below 0 in the rectangle (Bernstein's): where all
their factors are of one sign, so is the sum. Factors that are small against what they were made of do not
count as far: floats are a million times finer than that.
"""

from fractions import Fraction

Ends = tuple[Fraction, Fraction]
SURE = 1e-9


def far_from_nothing(margin: list[list[float]], ends: Ends, reach: tuple[Fraction, Fraction]) -> bool:
    """Return whether floats can tell that a margin is nothing nowhere in a rectangle of x and t: all parts of
    the sum that it is there (Bernstein's, both ways) are of one sign and none of them is small.
    """
    rows = [_shares(part, float(ends[0]), float(ends[1])) for part in margin]
    longest = max(len(row) for row in rows)
    rows = [_raised(row, longest) for row in rows]
    low, high = float(reach[0]), float(reach[1])
    size = max(max(map(abs, row)) * max(abs(low), abs(high), 1.0) ** at for at, row in enumerate(rows))
    parts = [each for column in zip(*rows, strict=True) for each in _shares(list(column), low, high)]
    sure = SURE * size
    return all(each > sure for each in parts) or all(each < -sure for each in parts)


def _shares(part: list[float], low: float, high: float) -> list[float]:
    """Return Bernstein's coefficients of a polynomial of a degree up to three between two ends."""
    degree = len(part) - 1
    moved = list(part)
    for begin in range(degree):
        for at in range(degree - 1, begin - 1, -1):
            moved[at] += low * moved[at + 1]
    width = high - low
    share = [each * width**at for at, each in enumerate(moved)]
    return _summed(share)


def _summed(share: list[float]) -> list[float]:
    match len(share):
        case 1:
            return share
        case 2:
            return [share[0], share[0] + share[1]]
        case 3:
            return [share[0], share[0] + share[1] / 2, share[0] + share[1] + share[2]]
    a, b, c, d = share
    return [a, a + b / 3, a + 2 * b / 3 + c / 3, a + b + c + d]


def _raised(row: list[float], length: int) -> list[float]:
    """Return the same polynomial with as many coefficients as another has."""
    while len(row) < length:
        degree = len(row)
        row = [
            row[0],
            *(row[at - 1] * at / degree + row[at] * (1 - at / degree) for at in range(1, degree)),
            row[-1],
        ]
    return row
