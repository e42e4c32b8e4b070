"""Printing of exact numbers, and the only place where anything is rounded. A printed value is never an input.

Directions: room left rounds down; an excess, and what must be taken off, rounds up; a pass never prints
beyond its limit; a failure shows as many digits as it takes to be seen as one.
"""

from fractions import Fraction
from typing import Literal

from fleet.quantities import Unit

Direction = Literal["nearest", "down", "up"]

MOST_PLACES = 15  # beyond this a failure is shown by rounding its actual up

# Digits after the point, so that a sum done by hand from the printed lines agrees in its last digit but one.
WEIGHT_PLACES = 1
VOLUME_PLACES = 1
CHORD_PLACES = 1
LENGTH_PLACES: dict[Unit, int] = {Unit.IN: 2, Unit.MM: 1, Unit.CM: 2, Unit.M: 4, Unit.FT: 3}
MOMENT_PLACES: dict[Unit, int] = {Unit.IN: 1, Unit.MM: 0, Unit.CM: 1, Unit.M: 3, Unit.FT: 2}

_TENS: tuple[int, ...] = tuple(int(10**power) for power in range(MOST_PLACES + 1))


def printed(value: Fraction, places: int, direction: Direction = "nearest") -> str:
    """Write a rational with at most `places` decimals, without trailing zeros or a minus zero.

    `down` is towards minus infinity, `up` towards plus infinity, `nearest` sends halves away from zero.
    """
    above, below = value.as_integer_ratio()
    if below == 1:
        return str(above)
    return _text(_units(above, below, places, direction), places)


def against_maximum(actual: Fraction, limit: Fraction, places: int) -> tuple[str, str, int]:
    """Print an actual beside its upper limit so that the text tells the same as the numbers.

    Returns the two texts and the number of decimals they needed. The limit is never printed above its value.
    """
    above, below = actual.as_integer_ratio()
    most, per = limit.as_integer_ratio()
    bound = _units(most, per, places, "down")
    if above * per <= most * below:
        shown = min(_units(above, below, places, "nearest"), bound)
        return _text(shown, places), _text(bound, places), places
    for digits in range(places, MOST_PLACES + 1):
        shown = _units(above, below, digits, "nearest")
        if shown * per > most * _TENS[digits]:
            return _text(shown, digits), _text(_units(most, per, digits, "down"), digits), digits
    return printed(actual, MOST_PLACES, "up"), printed(limit, MOST_PLACES, "down"), MOST_PLACES


def against_minimum(actual: Fraction, limit: Fraction, places: int) -> tuple[str, str, int]:
    """Do the same for a lower limit, which is never printed below its value."""
    shown, bound, digits = against_maximum(-actual, -limit, places)
    return _negated(shown), _negated(bound), digits


def between(actual: Fraction, low: Fraction, high: Fraction, places: int) -> tuple[str, str, str, int]:
    """Print an actual with the two ends of the stretch it must lie in, so that the text tells the same as the
    numbers.

    Returns actual, low and high, and the number of decimals they needed. The stretch never prints wider than
    it is.
    """
    above, below = actual.as_integer_ratio()
    first, of = low.as_integer_ratio()
    last, per = high.as_integer_ratio()
    inside = first * below <= above * of and above * per <= last * below
    for digits in range(places, MOST_PLACES + 1):
        shown = _units(above, below, digits, "nearest")
        least = _units(first, of, digits, "up")
        most = _units(last, per, digits, "down")
        if least > most:
            continue
        if inside:
            shown = min(max(shown, least), most)
        elif least <= shown <= most:
            continue
        return _text(shown, digits), _text(least, digits), _text(most, digits), digits
    outward: Direction = "nearest" if inside else "up" if actual > high else "down"
    ends = printed(low, MOST_PLACES), printed(high, MOST_PLACES)
    return printed(actual, MOST_PLACES, outward), *ends, MOST_PLACES


def room(margin: Fraction, places: int) -> str:
    """Print a margin of 0 or more rounded down, and one below 0 as an excess, rounded up, unsigned."""
    return unsigned(printed(margin, places, "down"))


def unsigned(margin: str) -> str:
    """Return a margin that was printed rounded down as `room` tells it: an excess has no sign."""
    return margin.removeprefix("-")


def _units(above: int, below: int, places: int, direction: Direction) -> int:
    """Count the units of the last decimal in above / below."""
    above *= _TENS[places]
    if below == 1:
        return above
    if direction == "down":
        return above // below
    if direction == "up":
        return -(-above // below)
    return (2 * above + below) // (2 * below) if above >= 0 else -((below - 2 * above) // (2 * below))


def _text(units: int, places: int) -> str:
    if units < 0:
        return f"-{_text(-units, places)}"
    ten = _TENS[places]
    whole, part = divmod(units, ten)
    # With a one before it a part keeps its leading zeros.
    return f"{whole}.{str(ten + part)[1:].rstrip('0')}" if part else str(whole)


def _negated(text: str) -> str:
    if text == "0":
        return text
    return text[1:] if text.startswith("-") else f"-{text}"
