"""Whom a seat suits. People move only to seats that are known to suit them: not stated is not suited.

Common practice, after the rules on exits and on restraints (14 CFR 121.585 and 135.128 as remembered; the
operator's own rules on seating may be stricter): no child or infant at an exit, a child or infant only where
there is a restraint for it, a lap infant only with its adult, nobody but crew on an attendant's seat. Whoever
or whatever a sequence of events names stays where it is.
"""

from fleet.basis import Seat
from loads.balance.aboard import Declared, Person
from loads.balance.over_flight import coming_people

YOUNG = frozenset({"child", "infant"})


def suits(seat: Seat, person: Person) -> bool:
    """Return whether a passenger may be asked to take a seat.

    A seat at an exit wants somebody of a stated category, since somebody of none may be a child.
    """
    if seat.serves == "crew" or seat.attendant:
        return False
    young = person.lap_infant is not None or _is_young(person)
    if young:
        return seat.infant_restraint is True and not seat.exit_row
    return person.category is not None if seat.exit_row else True


def free_seats(declared: Declared, seats: tuple[Seat, ...]) -> tuple[Seat, ...]:
    """Return the seats of the configuration, as they stand, that neither crew nor anybody who comes aboard
    has.
    """
    settings = {seat.id: seat for seat, _ in declared.settings}
    crew = {person.seat.id for person in declared.crew}
    crew |= {person.seat.id for person in coming_people(declared)}  # kept for who comes aboard in flight
    present = set(declared.configuration.seats)
    return tuple(settings.get(seat.id, seat) for seat in seats if seat.id in present and seat.id not in crew)


def fixed_lines(declared: Declared) -> frozenset[str]:
    """Return the lines of the document that an event of the flight names."""
    leaving = [part.line for event in declared.sequence for part in event.leaving]
    moving = [part.line for event in declared.sequence for part in event.moving]
    return frozenset((*leaving, *moving))


def _is_young(person: Person) -> bool:
    return person.category is not None and person.category.strip().casefold() in YOUNG
