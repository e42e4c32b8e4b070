"""Rationals made from two whole numbers, where hundreds of them are made for one load."""

from fractions import Fraction
from math import gcd

_bare = object.__new__


def rational(above: int, below: int) -> Fraction:
    """Return above / below as `Fraction(above, below)` does, in a third of the time.

    Raises `ZeroDivisionError` where `below` is 0. The class asks what it was given before it divides out what
    both have in common. Here that is known, so the two parts are set as the class would set them. A Python
    whose `Fraction` had other parts would raise `AttributeError` at once: the class has slots, and takes no
    others.
    """
    shared = gcd(above, below)
    if below <= 0:
        if not below:
            raise ZeroDivisionError("a rational has no 0 below")
        shared = -shared
    if shared != 1:
        above, below = above // shared, below // shared
    made = _bare(Fraction)
    # The types know only the properties of the parts, which cannot be set.
    made._numerator = above  # type: ignore[attr-defined] # noqa: SLF001 # see above
    made._denominator = below  # type: ignore[attr-defined] # noqa: SLF001 # see above
    return made
