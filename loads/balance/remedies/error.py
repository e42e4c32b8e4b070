"""Room for error: how much heavier things could be than stated before the first limit breaks.

No probabilities: everything of a kind is as much heavier at once.
"""

from collections.abc import Callable, Iterator
from dataclasses import replace
from fractions import Fraction
from math import floor

from loads.balance.aboard import Declared, Person
from loads.balance.checks_places import Held, held_by
from loads.balance.remedies.question import TENTH, Question
from loads.balance.remedies.reaching import MOST_TENTHS, Reach, bound_of, reached
from loads.balance.remedies.varying import Change
from loads.balance.result import Json
from loads.balance.rounding import WEIGHT_PLACES, printed

PER_MILLE = 1000
MOST_PER_MILLE = 500  # half as much again: beyond that the figure says nothing about an error
MOST_EACH = 1000  # tenths
ZERO = Fraction(0)
DENSITY_PLACES = 4


def room_for_error(question: Question) -> list[Json]:
    """Return how wrong people, compartments and the fuel density may be, each with what breaks first."""
    held = held_by(question.declared)
    return [*_people(question), *_compartments(question, held), *_density(question)]


def _people(question: Question) -> Iterator[Json]:
    """Yield by how much all people who were not weighed may be heavier: as a share, and each of them."""
    declared = question.declared
    guessed = [
        one
        for one in (*declared.crew, *declared.passengers)
        if one.how in ("declared", "standard", "estimated") and one.weight is not None
    ]
    if not guessed:
        return

    def shared(count: Fraction) -> Declared:
        return _heavier(declared, lambda weight: weight + weight * count / PER_MILLE)

    def each(count: Fraction) -> Declared:
        return _heavier(declared, lambda weight: weight + count * TENTH)

    _, heavier = question.weight_range()
    most = MOST_TENTHS if heavier is None else floor(heavier / len(guessed) / TENTH)
    whole = sum((one.weight or ZERO for one in guessed), ZERO)
    share = MOST_PER_MILLE if heavier is None else min(MOST_PER_MILLE, floor(heavier / whole * PER_MILLE))
    one = reached(question, Change(each), min(most, MOST_EACH))
    found = reached(question, Change(shared), share)
    if not (one.sought and found.sought):
        return
    yield {
        "kind": "people",
        "id": "",
        "name": f"everybody who was not weighed ({len(guessed)})",
        "percent": _percent(found),
        "each": printed(one.count * TENTH, WEIGHT_PLACES),
        "unit": question.ready.weight,
        "stopped_by": found.stopped_by,
    }


def _compartments(question: Question, held: Held) -> Iterator[Json]:
    declared = question.declared
    for place in question.ready.basis.places:
        weight = held.get(place.id)
        if not weight:
            continue

        def changed(count: Fraction, place: str = place.id) -> Declared:
            items = [
                replace(one, weight=one.weight + one.weight * count / PER_MILLE)
                if one.place.id == place and not one.removed and one.weight is not None
                else one
                for one in declared.items
            ]
            return replace(declared, items=tuple(items))

        room = None
        if place.maximum is not None and place.maximum.value is not None:
            room = place.maximum.value - weight
        bound = min(MOST_PER_MILLE, floor(bound_of(question, room) * TENTH / weight * PER_MILLE))
        found = reached(question, Change(changed), bound)
        if not found.sought:
            return
        more = weight * found.count / PER_MILLE
        yield {
            "kind": "place",
            "id": place.id,
            "name": f"what is in {place.name}",
            "percent": _percent(found),
            "each": printed(more, WEIGHT_PLACES, "down"),
            "unit": question.ready.weight,
            "stopped_by": found.stopped_by,
        }


def _density(question: Question) -> Iterator[Json]:
    declared = question.declared
    plan = declared.fuel

    def changed(count: Fraction) -> Declared:
        heavier = plan.density + plan.density * count / PER_MILLE
        return replace(declared, fuel=replace(plan, density=heavier))

    change = Change(changed, over=(Fraction(1), Fraction(1, PER_MILLE)), refuels=True)
    found = reached(question, change, MOST_PER_MILLE)
    if not found.sought:
        return
    yield {
        "kind": "fuel-density",
        "id": "",
        "name": "the density of the fuel",
        "percent": _percent(found),
        "each": printed(plan.density * found.count / PER_MILLE, DENSITY_PLACES, "down"),
        "unit": question.ready.density,
        "stopped_by": found.stopped_by,
    }


def _heavier(declared: Declared, by: Callable[[Fraction], Fraction]) -> Declared:
    """Return the load with everybody heavier whose weight was not weighed."""

    def changed(one: Person) -> Person:
        if one.how == "weighed" or one.weight is None:
            return one
        return replace(one, weight=by(one.weight))

    return replace(
        declared,
        crew=tuple(changed(one) for one in declared.crew),
        passengers=tuple(changed(one) for one in declared.passengers),
    )


def _percent(found: Reach) -> str:
    return printed(Fraction(found.count, PER_MILLE // 100), 1)
