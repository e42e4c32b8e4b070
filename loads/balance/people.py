"""Reading crew and passengers: who sits where, how heavy, and how that is known."""

from dataclasses import dataclass, field
from fractions import Fraction
from typing import Literal, cast

from fleet.basis import Basis, Configuration, Seat
from fleet.conversion import in_unit
from fleet.quantities import Dimension, Unit
from loads.balance.aboard import HOWS, PILOT_IN_COMMAND, How, LapInfant, Person
from loads.balance.fields import Fields
from loads.balance.plausible import LAP_INFANT_KG, Band, person_band, within_band

CREW_FIELDS = ("name", "position", "seat", "how")
CREW_OPTIONAL = ("person", "category", "weight")
PASSENGER_FIELDS = ("name", "seat", "how")
PASSENGER_OPTIONAL = ("category", "weight", "lap_infant", "restraint")
INFANT_FIELDS = ("name",)
INFANT_OPTIONAL = ("weight", "how")
INFANT_HOWS: tuple[How, ...] = ("weighed", "declared", "estimated")
LONGEST_NAME = 120
LONGEST_ID = 64
MOST_CREW = 60
MOST_PASSENGERS = 900
SERVED = {"crew": "crew", "passenger": "passengers"}  # in the plural, as a sentence has them

Role = Literal["crew", "passenger"]


@dataclass
class Seating:
    """What is taken so far: seats, names and logins, each with the pointer of the line that took it.

    `settings` are the seats on rails whose setting is stated, as they stand.
    """

    basis: Basis
    configuration: Configuration
    settings: tuple[tuple[Seat, str], ...] = ()
    seats: dict[str, str] = field(default_factory=dict)
    names: dict[str, str] = field(default_factory=dict)
    logins: dict[str, str] = field(default_factory=dict)
    known: dict[str, Seat] = field(init=False)

    def __post_init__(self) -> None:
        self.known = {seat.id: seat for seat in self.basis.seats}
        self.known |= {seat.id: seat for seat, _ in self.settings}


def read_crew(document: Fields, seating: Seating) -> tuple[Person, ...]:
    """Return the crew, noting faults: exactly one pilot in command, and no fewer than the configuration
    needs.
    """
    lines = document.objects("crew", MOST_CREW, CREW_FIELDS, CREW_OPTIONAL)
    people = tuple(read_person(line, "crew", seating) for line in lines)
    listed = document.raw("crew")
    if isinstance(listed, list | tuple) and len(listed) <= MOST_CREW:
        commanders = sum(line.raw("position") == PILOT_IN_COMMAND for line in lines)
        if commanders != 1:
            detail = f"{commanders} lines say '{PILOT_IN_COMMAND}'; exactly one crew member has that position"
            document.note("crew", "pilot-in-command-count", detail)
        needed = seating.configuration.minimum_crew
        if len(lines) < needed:
            detail = f"{len(lines)} crew; configuration {seating.configuration.id} needs at least {needed}"
            document.note("crew", "too-few-crew", detail)
    return tuple(person for person in people if person is not None)


def read_passengers(document: Fields, seating: Seating) -> tuple[Person, ...]:
    """Return the passengers, noting faults."""
    lines = document.objects("passengers", MOST_PASSENGERS, PASSENGER_FIELDS, PASSENGER_OPTIONAL)
    people = (read_person(line, "passenger", seating) for line in lines)
    return tuple(person for person in people if person is not None)


def read_person(line: Fields, role: Role, seating: Seating) -> Person | None:
    """Return the person of a line, noting faults; None where too much of it is missing."""
    name = _name(line, seating)
    position = line.text("position", LONGEST_NAME) if role == "crew" else None
    login = _login(line, seating) if role == "crew" else None
    category = line.text("category", LONGEST_ID)
    seat = _seat(line, role, seating)
    how = cast("How | None", line.choice("how", HOWS))
    weight = _weight(line, how, person_band(category), seating.basis.weight_unit)
    if how == "standard" and role == "passenger" and "category" not in line:
        line.note("category", "missing", "a standard weight needs a category; state adult, child or infant")
    infant = _lap_infant(line, how, seating) if role == "passenger" else None
    restraint = line.quantity("restraint", Dimension.WEIGHT, zero=False)
    if name is None or seat is None or how is None:
        return None
    strapped = None if restraint is None else in_unit(restraint, seating.basis.weight_unit)
    return Person(name, role, position, login, category, seat, weight, how, infant, line.pointer, strapped)


def _name(line: Fields, seating: Seating) -> str | None:
    name = line.text("name", LONGEST_NAME)
    if name is not None:
        taken = seating.names.setdefault(" ".join(name.split()).casefold(), line.pointer)
        if taken != line.pointer:
            detail = f"the same name stands at {taken}; one person has one seat, two of one name need a mark"
            line.note("name", "person-twice", detail)
    return name


def _login(line: Fields, seating: Seating) -> str | None:
    login = line.text("person", LONGEST_ID)
    if login is not None:
        taken = seating.logins.setdefault(login, line.pointer)
        if taken != line.pointer:
            line.note("person", "person-twice", f"the same person stands at {taken}; one person has one seat")
    return login


def _seat(line: Fields, role: Role, seating: Seating) -> Seat | None:
    wanted = line.text("seat", LONGEST_ID)
    if wanted is None:
        return None
    seat = seating.known.get(wanted)
    if seat is None:
        known = ", ".join(seating.configuration.seats)
        line.note(
            "seat", "unknown-seat", f"no such seat; configuration {seating.configuration.id} has {known}"
        )
        return None
    if wanted not in seating.configuration.seats:
        line.note("seat", *_not_to_be_used(seat, seating))
        return None
    if seat.serves not in (role, "either"):
        line.note(
            "seat",
            "seat-serves-others",
            f"{seat.name} is for {SERVED[seat.serves]} only; choose another seat",
        )
        return None
    taken = seating.seats.setdefault(wanted, line.pointer)
    if taken != line.pointer:
        line.note("seat", "seat-taken", f"{seat.name} is taken by {taken}; choose another seat")
        return None
    return seat


def _not_to_be_used(seat: Seat, seating: Seating) -> tuple[str, str]:
    """Return code and detail of a seat that a restriction blocks, or the configuration does not have."""
    restriction = dict(seating.basis.closed).get(seat.id)
    if restriction is not None:
        return "seat-blocked", f"{seat.name} is blocked by {restriction}; choose another seat"
    known = ", ".join(seating.configuration.seats)
    detail = f"not in configuration {seating.configuration.id}, which has {known}; choose one of these"
    return "seat-not-in-configuration", detail


def _weight(line: Fields, how: How | None, band: Band, unit: Unit) -> Fraction | None:
    """Return a person's weight; a standard one is not typed, any other must be."""
    quantity = line.weight_got(how)
    if quantity is None:
        return None
    if not within_band(quantity, band, Unit.KG):
        low, high = (str(end) for end in band)
        detail = (
            f"not a likely weight of a person (taken are {low} to {high} kg); check the number and its unit"
        )
        line.note("weight", "implausible", detail)
        return None
    return in_unit(quantity, unit)


def _lap_infant(line: Fields, adult_how: How | None, seating: Seating) -> LapInfant | None:
    """Return the infant on a lap: inside a standard adult's weight, else with a weight of its own."""
    infant = line.inner("lap_infant", INFANT_FIELDS, INFANT_OPTIONAL)
    if infant is None:
        return None
    name = _name(infant, seating)
    how = cast("How | None", infant.choice("how", INFANT_HOWS))
    weight: Fraction | None = None
    if adult_how == "standard":
        for field_name in ("weight", "how"):
            if field_name in infant:
                detail = "a standard adult's weight includes an infant on the lap; leave this out"
                infant.note(field_name, "weight-with-standard", detail)
    elif adult_how is not None:
        if "how" not in infant:
            infant.note("how", "missing", f"say how the weight is known: {', '.join(INFANT_HOWS)}")
        weight = _weight(infant, how or "declared", LAP_INFANT_KG, seating.basis.weight_unit)
    return None if name is None else LapInfant(name, weight, how, infant.pointer)
