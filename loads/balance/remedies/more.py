"""How much more can go where before the first limit breaks: places, rows with a free seat, tanks."""

from collections.abc import Iterator
from dataclasses import replace
from fractions import Fraction
from math import floor

from fleet.basis import Place, Seat, Tank
from loads.balance.aboard import Declared, Item, Person
from loads.balance.checks_places import Held, held_by
from loads.balance.remedies.question import TENTH, Question
from loads.balance.remedies.reaching import Reach, bound_of, reached
from loads.balance.remedies.steps import Refuel, taken
from loads.balance.remedies.suiting import free_seats
from loads.balance.remedies.varying import Change, table_points
from loads.balance.result import Json
from loads.balance.rounding import VOLUME_PLACES, WEIGHT_PLACES, printed

ZERO = Fraction(0)


def how_much_more(question: Question) -> list[Json]:
    """Return what can be added, line by line, each with the limit that stops it."""
    held = held_by(question.declared)
    return [*_in_places(question, held), *_in_seats(question, held), *_in_tanks(question)]


def _in_places(question: Question, held: Held) -> Iterator[Json]:
    declared = question.declared
    for place in question.ready.basis.places:
        if place.id not in declared.configuration.places or place.maximum is None:
            continue
        room = None if place.maximum.value is None else place.maximum.value - (held.get(place.id) or ZERO)

        def changed(count: Fraction, place: Place = place) -> Declared:
            line = Item("cargo", "more", place, count * TENTH, "weighed", removed=False, pointer="")
            return replace(declared, items=(*declared.items, line))

        found = reached(question, Change(changed), bound_of(question, room))
        if not found.sought:
            return
        yield _more(question, "place", place.id, place.name, found)


def _in_seats(question: Question, held: Held) -> Iterator[Json]:
    """Yield a line a row with a free seat, or a free seat where rows are not stated: one more passenger, as
    heavy as any free seat of it takes.
    """
    declared = question.declared
    least: dict[str, Reach] = {}
    for seat in free_seats(declared, question.ready.basis.seats):
        if seat.id in held or seat.serves == "crew" or seat.attendant or seat.maximum is None:
            continue

        def changed(count: Fraction, seat: Seat = seat) -> Declared:
            person = Person("", "passenger", None, None, "adult", seat, count * TENTH, "declared", None, "")
            return replace(
                declared,
                passengers=(*declared.passengers, person),
                persons_on_board=declared.persons_on_board + 1,
            )

        found = reached(question, Change(changed), bound_of(question, seat.maximum.value))
        if not found.sought:
            return  # of a row whose other seat was not asked the least is not known
        row = f"row {seat.row}" if seat.row is not None else seat.name
        if row not in least or found.count < least[row].count:
            least[row] = found
    for row, found in least.items():
        yield _more(question, "seat", row, f"one more passenger, {row}", found)


def _in_tanks(question: Question) -> Iterator[Json]:
    declared, ready = question.declared, question.ready
    _, heavier = question.weight_range()
    for held in declared.fuel.tanks:
        room = held.tank.capacity - held.usable - held.trapped
        by_weight = room if heavier is None else min(room, heavier / declared.fuel.density)

        def changed(count: Fraction, tank: Tank = held.tank) -> Declared:
            return taken(declared, [Refuel(tank, count * TENTH)])

        marks = table_points(held, TENTH)
        found = reached(question, Change(changed, refuels=True, marks=marks), floor(by_weight / TENTH))
        if not found.sought:
            return
        amount = printed(found.count * TENTH, VOLUME_PLACES)
        yield {
            "kind": "tank",
            "id": held.tank.id,
            "name": held.tank.name,
            "amount": amount,
            "unit": ready.volume,
            "stopped_by": found.stopped_by,
        }


def _more(question: Question, kind: str, code: str, name: str, found: Reach) -> Json:
    return {
        "kind": kind,
        "id": code,
        "name": name,
        "amount": printed(found.count * TENTH, WEIGHT_PLACES),
        "unit": question.ready.weight,
        "stopped_by": found.stopped_by,
    }
