"""Weight and moments of all that is aboard without fuel, exact, in one pass.

The lines of the loading computation say the same one by one; they are made to be read, these are reckoned
with.
"""

from collections.abc import Iterable, Iterator
from fractions import Fraction
from math import lcm
from typing import NamedTuple

from fleet.rational import rational
from fleet.weighing import EmptyFigures
from loads.balance.aboard import Declared, Person
from loads.balance.exact import plus, product, total

Part = tuple[Fraction | None, Fraction, Fraction]  # a weight (None: not known), its arm and its lateral arm


class Sums(NamedTuple):
    """Weight and moments of what is aboard, exact."""

    weight: Fraction
    moment: Fraction
    lateral_moment: Fraction


def sums_without_fuel(declared: Declared, empty: EmptyFigures | None) -> Sums | None:
    """Return the sums of everything but fuel; None when a weight among them is not known."""
    return with_payload(operating_sums(declared, empty), declared)


def operating_sums(declared: Declared, empty: EmptyFigures | None) -> Sums | None:
    """Return the sums of the empty aircraft, its fit and the crew; None when one of them is not known."""
    if empty is None:
        return None
    fit = (*declared.configuration.equipment, *declared.configuration.operating_items)
    parts = [(item.weight, item.arm, item.lateral_arm) for item in fit]
    aboard = _sums([*parts, *_people(declared.crew)])
    return _together(Sums(empty.weight, empty.moment, empty.lateral_moment), aboard)


def with_payload(operating: Sums | None, declared: Declared) -> Sums | None:
    """Return these sums with passengers and items; None when one of them is not known."""
    if operating is None:
        return None
    items = [(item.weight, item.place.arm, item.place.lateral_arm) for item in declared.items]
    return _together(operating, _sums([*_people(declared.passengers), *items]))


def _people(people: Iterable[Person]) -> Iterator[Part]:
    """Yield people with what sits or lies on their seats: infants whose weight counts, and restraints."""
    for person in people:
        arms = person.seat.arm, person.seat.lateral_arm
        yield person.weight, *arms
        if person.lap_infant is not None and person.lap_infant.weight is not None:
            yield person.lap_infant.weight, *arms
        if person.restraint is not None:
            yield person.restraint, *arms


def _sums(parts: Iterable[Part]) -> Sums | None:
    """Add up in whole numbers over one denominator that grows as it must: weights and moments share it."""
    weight_sum, moment_sum, shared = 0, 0, 1
    across = []
    for weight, arm, lateral_arm in parts:
        if weight is None:
            return None
        above, below = weight.as_integer_ratio()
        over, under = arm.as_integer_ratio()
        below *= under
        if shared % below:
            greater = lcm(shared, below)
            weight_sum *= greater // shared
            moment_sum *= greater // shared
            shared = greater
        above *= shared // below
        weight_sum += above * under
        moment_sum += above * over
        if lateral_arm.numerator:
            across.append(product(weight, lateral_arm))
    return Sums(rational(weight_sum, shared), rational(moment_sum, shared), total(across))


def _together(one: Sums, other: Sums | None) -> Sums | None:
    if other is None:
        return None
    return Sums(
        plus(one.weight, other.weight),
        plus(one.moment, other.moment),
        plus(one.lateral_moment, other.lateral_moment),
    )
