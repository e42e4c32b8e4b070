"""Reading who and what comes aboard in flight: hoisted up, or picked up on the hook.

Each stands on a line of its own in the event it comes aboard with, written like a passenger or an item of the
load. A person with a `position` is crew; `at` is the place outside or inside where somebody is at first, the
seat being where they belong. Whether the seat is free by then is asked when the sequence is read.
"""

from collections.abc import Mapping
from dataclasses import replace
from typing import NamedTuple

from fleet.basis import Basis, Place
from loads.balance.aboard import PILOT_IN_COMMAND, Item, Person
from loads.balance.fields import Fields
from loads.balance.items import ITEM_FIELDS, ITEM_OPTIONAL, LONGEST_ID, read_item
from loads.balance.over_flight import as_seat
from loads.balance.people import (
    LONGEST_NAME,
    PASSENGER_FIELDS,
    PASSENGER_OPTIONAL,
    Role,
    Seating,
    read_person,
)

COMING = "come_aboard"
PERSON_OPTIONAL = (*PASSENGER_OPTIONAL, "position", "at")
THING_OPTIONAL = tuple(name for name in ITEM_OPTIONAL if name != "removed")
ANY_FIELD = tuple(dict.fromkeys((*PASSENGER_FIELDS, *PERSON_OPTIONAL, *ITEM_FIELDS, *THING_OPTIONAL)))
MOST_LINES = 200


class Comer(NamedTuple):
    """Who or what comes aboard: as declared, and the place outside the seat where a person is first."""

    line: Fields
    who: Person | Item
    at: Place | None = None

    @property
    def where(self) -> Person | Item:
        """Return the same where it first is."""
        if self.at is None or isinstance(self.who, Item):
            return self.who
        return replace(self.who, seat=as_seat(self.at))


Comers = Mapping[str, Comer]  # by the pointer of the line
People = tuple[tuple[Person, ...], tuple[Person, ...]]  # crew and passengers


def coming_lines(event: Fields) -> tuple[Fields, ...]:
    """Return the lines of an event with who and what comes aboard, each held against its own fields."""
    found = []
    for line in event.objects(COMING, MOST_LINES, (), ANY_FIELD):
        if ("seat" in line) == ("place" in line):
            detail = "a person comes to a `seat` and an item to a `place`; name one of the two"
            line.note("seat", "one-of", detail)
            continue
        person = "seat" in line
        needed, optional = (PASSENGER_FIELDS, PERSON_OPTIONAL) if person else (ITEM_FIELDS, THING_OPTIONAL)
        found.append(line.read_as(needed, optional))
    return tuple(found)


def read_coming(events: tuple[Fields, ...], seating: Seating) -> dict[str, Comer]:
    """Return who and what comes aboard in all events, noting faults of their lines."""
    found: dict[str, Comer] = {}
    for event in events:
        for line in coming_lines(event):
            comer = _person(line, seating) if "seat" in line else _item(line, seating)
            if comer is not None:
                found[line.pointer] = comer
    return found


def with_comers(people: People, comers: Comers) -> People:
    """Return crew and passengers with those who come aboard behind them."""
    later = [one.who for one in comers.values() if isinstance(one.who, Person)]
    crew, passengers = people
    return (
        (*crew, *(one for one in later if one.role == "crew")),
        (*passengers, *(one for one in later if one.role == "passenger")),
    )


def parted(people: People, comers: Comers) -> tuple[People, dict[str, Comer]]:
    """Return the people at engine start, and the comers, with what a table of standard weights made of
    them.
    """
    known = {person.pointer: person for each in people for person in each if person.pointer in comers}
    crew, passengers = (tuple(one for one in each if one.pointer not in comers) for each in people)
    later = {pointer: one._replace(who=known.get(pointer, one.who)) for pointer, one in comers.items()}
    return (crew, passengers), later


def _person(line: Fields, seating: Seating) -> Comer | None:
    role: Role = "crew" if "position" in line else "passenger"
    if role == "crew":
        for name in ("lap_infant", "restraint"):
            if name in line:
                line.note(name, "unknown-field", "this belongs to a passenger; leave it out for crew")
        if line.text("position", LONGEST_NAME) == PILOT_IN_COMMAND:
            detail = "the pilot in command is aboard from the start; correct the position"
            line.note("position", "pilot-in-command-stays", detail)
    alone = Seating(seating.basis, seating.configuration, seating.settings)
    person = read_person(line, role, alone)
    at = _at(line, seating)
    return None if person is None else Comer(line, person, at)


def _at(line: Fields, seating: Seating) -> Place | None:
    wanted = line.text("at", LONGEST_ID)
    if wanted is None:
        return None
    places = seating.configuration.places
    if wanted not in places:
        known = ", ".join(places) or "no places"
        detail = f"no such place; configuration {seating.configuration.id} has {known}"
        line.note("at", "unknown-place", detail)
        return None
    if wanted in dict(seating.basis.closed):
        detail = f"it is closed by {dict(seating.basis.closed)[wanted]}; choose another place"
        line.note("at", "place-closed", detail)
        return None
    return next(place for place in seating.basis.places if place.id == wanted)


def _item(line: Fields, seating: Seating) -> Comer | None:
    basis: Basis = seating.basis
    known = {place.id: place for place in basis.places}
    item = read_item(line, known, seating.configuration, basis)
    return None if item is None else Comer(line, item)
