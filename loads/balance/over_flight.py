"""Who and what is aboard over a flight: the load as declared, and as it is after each event."""

from dataclasses import replace
from itertools import accumulate

from fleet.basis import Place, Seat
from loads.balance.aboard import Declared, Item, Person
from loads.balance.checks_places import Held, held_by
from loads.balance.events import Event


def over_flight(declared: Declared) -> tuple[Declared, ...]:
    """Return the load at engine start, then after each event of its sequence; without one, the load alone.

    `persons_on_board` stays the count at engine start.
    """
    return tuple(accumulate(declared.sequence, after, initial=declared))


def hangs_outside(declared: Declared, outside: frozenset[str]) -> bool:
    """Return whether somebody or something is in one of these places, a hook or a hoist."""
    if not outside:
        return False
    items = (one.place.id for one in declared.items if not one.removed)
    people = (one.seat.id for one in (*declared.crew, *declared.passengers))
    return not outside.isdisjoint((*items, *people))


def coming_people(declared: Declared) -> tuple[Person, ...]:
    """Return everybody who comes aboard in flight, in order."""
    return tuple(one for event in declared.sequence for one in event.coming if isinstance(one, Person))


def coming_items(declared: Declared) -> tuple[Item, ...]:
    """Return everything that comes aboard in flight, in order."""
    return tuple(one for event in declared.sequence for one in event.coming if isinstance(one, Item))


def held_over_flight(declared: Declared) -> tuple[Held, ...]:
    """Return what each seat and place holds over the flight: every map there is, each once, in order."""
    found: list[Held] = []
    for aboard in over_flight(declared):
        held = held_by(aboard)
        if held not in found:
            found.append(held)
    return tuple(found)


def after(declared: Declared, event: Event) -> Declared:
    """Return the load after an event; fuel and positions are not part of it."""
    if not event.leaving and not event.moving and not event.coming:
        return declared
    people = [one for one in event.coming if isinstance(one, Person)]
    return replace(
        declared,
        crew=(*_people(declared.crew, event), *(one for one in people if one.role == "crew")),
        passengers=(
            *_people(declared.passengers, event),
            *(one for one in people if one.role == "passenger"),
        ),
        items=(*_items(declared.items, event), *(one for one in event.coming if isinstance(one, Item))),
    )


def as_seat(spot: Seat | Place) -> Seat:
    """Return a place as a seat, for somebody who stands there."""
    if isinstance(spot, Seat):
        return spot
    arms = (spot.arm, spot.lateral_arm)
    return Seat(spot.id, spot.name, "either", *arms, spot.maximum, spot.source, conditional=spot.conditional)


def _people(people: tuple[Person, ...], event: Event) -> tuple[Person, ...]:
    gone = {one.line for one in event.leaving}
    moved = {one.line: as_seat(one.to) for one in event.moving}
    return tuple(
        replace(person, seat=moved[person.pointer]) if person.pointer in moved else person
        for person in people
        if person.pointer not in gone
    )


def _items(items: tuple[Item, ...], event: Event) -> tuple[Item, ...]:
    gone = {one.line: one.weight for one in event.leaving}
    moved = {one.line: one.to for one in event.moving}
    left = []
    for item in items:
        if item.pointer in gone:
            taken = gone[item.pointer]
            if taken is not None and item.weight is not None and taken < item.weight:
                left.append(replace(item, weight=item.weight - taken))
            continue
        to = moved.get(item.pointer)
        left.append(replace(item, place=to) if isinstance(to, Place) else item)
    return tuple(left)
