"""Reading who or what leaves, moves or comes aboard in an event, against who and what is then aboard, and
where.

A person is named by the seat, an item by the place and the words, in which the load declares them, wherever
they are by then. Who comes aboard has a seat of its own by then, so that names stay plain.
"""

from fractions import Fraction

from fleet.basis import Place, Seat
from fleet.conversion import in_unit
from fleet.quantities import Dimension
from loads.balance.aboard import PILOT_IN_COMMAND, Item, Person
from loads.balance.coming import COMING, Comer, Comers
from loads.balance.events import Leaving, Moving
from loads.balance.fields import Fields
from loads.balance.people import SERVED, Seating
from loads.balance.rounding import WEIGHT_PLACES, printed

LEAVE_OPTIONAL = ("seat", "place", "what", "weight")
MOVE_OPTIONAL = ("seat", "place", "what")
MOST_LINES = 200
LONGEST_ID = 64
LONGEST_WHAT = 120


class Cabin:
    """Who sits and what lies where, as the events so far left it."""

    def __init__(
        self,
        seating: Seating,
        people: tuple[Person, ...],
        items: tuple[Item, ...],
        comers: Comers | None = None,
    ) -> None:
        self.basis = seating.basis
        self.configuration = seating.configuration
        self.people = {person.seat.id: person for person in people}
        self.items = items
        self.crew = sum(person.role == "crew" for person in people)
        self.where: dict[str, str] = {person.pointer: seat for seat, person in self.people.items()}
        self.left: dict[str, Fraction | None] = {item.pointer: item.weight for item in items}
        self.gone: dict[str, str] = {}  # line of the load: the event it left in
        self.comers = dict(comers or {})  # those who have not come yet
        self.names = {name: person.pointer for person in people for name in _names(person)}
        self.known: dict[str, Seat | Place] = {**seating.known}
        self.known |= {place.id: place for place in seating.basis.places}

    def leaving(self, event: Fields) -> tuple[Leaving, ...]:
        """Return who and what leaves in an event, noting faults."""
        found: list[Leaving] = []
        for line in self._lines(event, "leave", (), LEAVE_OPTIONAL):
            who = self._named(line)
            if isinstance(who, Person):
                found += self._person_leaves(line, who, event)
            elif who is not None and any(one.line == who.pointer for one in found):
                line.note("what", "duplicate", "it stands twice in one event; put both into one line")
            elif who is not None:
                found += self._item_leaves(line, who, event)
        return tuple(found)

    def moving(self, event: Fields) -> tuple[Moving, ...]:
        """Return who and what moves in an event, noting faults; all of one event move at once."""
        found: list[tuple[Fields, Person | Item, Moving]] = []
        for line in self._lines(event, "move", ("to",), MOVE_OPTIONAL):
            who = self._named(line)
            to = self._target(line, who)
            if who is not None and to is not None:
                if any(one.line == who.pointer for _, _, one in found):
                    line.note("to", "moves-twice", "it moves twice in one event; write one event for each")
                    continue
                found.append((line, who, Moving(who.pointer, to)))
        for _, who, one in found:
            if isinstance(who, Person):
                self.where[who.pointer] = one.to.id
        for line, who, one in found:
            if isinstance(who, Person) and isinstance(one.to, Seat):
                self._demand_free(line, who, one.to)
        return tuple(one for _, _, one in found)

    def coming(self, event: Fields) -> tuple[Person | Item, ...]:
        """Return who and what comes aboard in an event, noting faults."""
        found: list[Person | Item] = []
        if event.raw(COMING) == []:
            event.note(COMING, "empty", "the list is empty; name who or what, or drop the event")
        here = [one for one in self.comers.values() if one.line.pointer.startswith(f"{event.pointer}/")]
        for comer in here:
            del self.comers[comer.line.pointer]
            if isinstance(comer.who, Item):
                self._item_comes(comer.line, comer.who)
            else:
                self._person_comes(comer.line, comer.who, comer)
            found.append(comer.where)
        return tuple(found)

    def _person_comes(self, line: Fields, person: Person, comer: Comer) -> None:
        for name in _names(person):
            held = self.names.get(name)
            if held is not None and held not in self.gone:
                detail = f"the same person is aboard then, from {held}; who comes aboard again left before"
                line.note("name", "comes-aboard-twice", detail)
            self.names[name] = person.pointer
        seat = person.seat
        belongs = self.people.get(seat.id)
        if belongs is not None and belongs.pointer not in self.gone:
            detail = f"{seat.name} is the seat of {belongs.pointer}, who is aboard then; choose another seat"
            line.note("seat", "seat-taken", detail)
        else:
            self._demand_free(line, person, seat, "seat")
        self.people[seat.id] = person
        self.where[person.pointer] = seat.id if comer.at is None else comer.at.id
        self.crew += person.role == "crew"

    def _item_comes(self, line: Fields, item: Item) -> None:
        named = (item.place.id, item.what)
        if any((one.place.id, one.what) == named for one in self.items if one.pointer not in self.gone):
            detail = "something aboard is called so there then; use other words, or let that one leave before"
            line.note("what", "comes-aboard-twice", detail)
        self.items = (*self.items, item)
        self.left[item.pointer] = item.weight

    def _not_yet(self, line: Fields, name: str, pointer: str) -> None:
        detail = f"comes aboard only later, at {pointer}; put the events in order"
        line.note(name, "not-aboard-yet", detail)

    def _lines(
        self, event: Fields, name: str, needed: tuple[str, ...], optional: tuple[str, ...]
    ) -> tuple[Fields, ...]:
        lines = event.objects(name, MOST_LINES, needed, optional)
        if event.raw(name) == []:
            event.note(name, "empty", "the list is empty; name who or what, or drop the event")
        return lines

    def _named(self, line: Fields) -> Person | Item | None:
        if ("seat" in line) == ("place" in line):
            line.note(
                "seat", "one-of", "name a person by the seat or an item by its place and what it is, not both"
            )
            return None
        return self._person(line) if "seat" in line else self._item(line)

    def _person(self, line: Fields) -> Person | None:
        for name in ("what", "weight"):
            if name in line:
                line.note(name, "unknown-field", "this belongs to an item; leave it out for a person")
        wanted = line.text("seat", LONGEST_ID)
        if wanted is None:
            return None
        if wanted not in self.configuration.seats:
            known = ", ".join(self.configuration.seats)
            detail = f"no such seat; configuration {self.configuration.id} has {known}"
            line.note("seat", "unknown-seat", detail)
            return None
        found = self.people.get(wanted)
        later = next((p for p, one in self.comers.items() if _seat_of(one) == wanted), None)
        if (found is None or found.pointer in self.gone) and later is not None:
            self._not_yet(line, "seat", later)
            return None
        if found is None:
            detail = "nobody is declared in this seat; name the seat somebody has in the load"
            line.note("seat", "nobody-there", detail)
            return None
        return None if self._is_gone(line, "seat", found.pointer) else found

    def _item(self, line: Fields) -> Item | None:
        wanted = line.text("place", LONGEST_ID)
        what = line.text("what", LONGEST_WHAT)
        if what is None and "what" not in line:
            line.note("what", "missing", "the words of the item are missing; write them as in the load")
        if wanted is None or what is None:
            return None
        if wanted not in self.configuration.places:
            known = ", ".join(self.configuration.places) or "no places"
            detail = f"no such place; configuration {self.configuration.id} has {known}"
            line.note("place", "unknown-place", detail)
            return None
        found = [item for item in self.items if (item.place.id, item.what) == (wanted, what)]
        present = [item for item in found if item.pointer not in self.gone]
        found = present or found[-1:]
        later = next((p for p, one in self.comers.items() if _words_of(one) == (wanted, what)), None)
        if not present and later is not None:
            self._not_yet(line, "what", later)
            return None
        if len(found) != 1 or found[0].removed:
            count = "nothing" if not found or len(found) == 1 else "more than one item"
            detail = f"{count} aboard is called so there; write it as in the load, each item in other words"
            line.note("what", "several-such-items" if found[1:] else "no-such-item", detail)
            return None
        return None if self._is_gone(line, "what", found[0].pointer) else found[0]

    def _is_gone(self, line: Fields, name: str, pointer: str) -> bool:
        if pointer in self.gone:
            detail = f"left at {self.gone[pointer]} already; nobody and nothing leaves twice"
            line.note(name, "already-left", detail)
        return pointer in self.gone

    def _person_leaves(self, line: Fields, person: Person, event: Fields) -> list[Leaving]:
        if person.position == PILOT_IN_COMMAND:
            line.note(
                "seat", "pilot-in-command-stays", "the pilot in command stays aboard; name another seat"
            )
            return []
        if person.role == "crew":
            if self.crew <= self.configuration.minimum_crew:
                least = self.configuration.minimum_crew
                detail = (
                    f"configuration {self.configuration.id} needs at least {least} crew; name another seat"
                )
                line.note("seat", "too-few-crew", detail)
                return []
            self.crew -= 1
        self.gone[person.pointer] = event.pointer
        del self.where[person.pointer]
        return [Leaving(person.pointer)]

    def _item_leaves(self, line: Fields, item: Item, event: Fields) -> list[Leaving]:
        held = self.left[item.pointer]
        if "weight" not in line:
            self.gone[item.pointer] = event.pointer
            return [Leaving(item.pointer)]
        typed = line.quantity("weight", Dimension.WEIGHT, zero=False)
        if typed is None:
            return []
        if item.rigging:
            detail = "what lies on a pallet or under a net leaves with it; leave the weight out"
            line.note("weight", "rigged-item", detail)
            return []
        if held is None:
            detail = "how heavy the item is was not declared; leave the weight out, and all of it leaves"
            line.note("weight", "weight-unknown", detail)
            return []
        taken = in_unit(typed, self.basis.weight_unit)
        if taken > held:
            there = f"{printed(held, WEIGHT_PLACES, 'down')} {self.basis.weight_unit.value}"
            detail = f"only {there} of it is aboard by then, and no more can leave; correct it"
            line.note("weight", "below-zero", detail)
            return []
        self.left[item.pointer] = held - taken
        if taken == held:
            self.gone[item.pointer] = event.pointer
        return [Leaving(item.pointer, taken)]

    def _target(self, line: Fields, who: Person | Item | None) -> Seat | Place | None:
        wanted = line.text("to", LONGEST_ID)
        if wanted is None:
            return None
        places = self.configuration.places
        ids = places if isinstance(who, Item) else (*self.configuration.seats, *places)
        if wanted not in ids:
            kind = "place" if isinstance(who, Item) else "seat or place"
            detail = f"no such {kind}; configuration {self.configuration.id} has {', '.join(ids) or 'none'}"
            line.note("to", "unknown-place", detail)
            return None
        to = self.known[wanted]
        if not isinstance(who, Person):
            return to
        if who.position == PILOT_IN_COMMAND:
            line.note(
                "seat", "pilot-in-command-stays", "the pilot in command stays seated; name another seat"
            )
            return None
        if isinstance(to, Seat) and to.serves not in (who.role, "either"):
            detail = f"{to.name} is for {SERVED[to.serves]} only; choose another seat or place"
            line.note("to", "seat-serves-others", detail)
            return None
        return to

    def _demand_free(self, line: Fields, person: Person, seat: Seat, name: str = "to") -> None:
        others = [who for who, spot in self.where.items() if spot == seat.id and who != person.pointer]
        if others:
            detail = f"{seat.name} is taken by {others[0]} then; choose another seat or place"
            line.note(name, "seat-taken", detail)


def _names(person: Person) -> tuple[str, ...]:
    """Return the names on a line as they are compared, an infant's too."""
    infant = person.lap_infant
    names = (person.name,) if infant is None else (person.name, infant.name)
    return tuple(" ".join(name.split()).casefold() for name in names)


def _seat_of(comer: Comer) -> str | None:
    return comer.who.seat.id if isinstance(comer.who, Person) else None


def _words_of(comer: Comer) -> tuple[str, str] | None:
    return (comer.who.place.id, comer.who.what) if isinstance(comer.who, Item) else None
