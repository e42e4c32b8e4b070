"""The inputs of what happens in flight, as plain values for the page; no Django here.

A load in which nothing happens has none of them, only the buttons that add an event.
"""

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any

from fleet.basis import Basis, Configuration
from loads.web.arranging import ADDED, FOCUS, events_in, rows_in
from loads.web.choices import CATEGORIES, COMING_KINDS, HOW, INFANT_HOW, POSITIONS, RELEASED
from loads.web.desk_fitted import floor_row, floors_asked
from loads.web.form_events import ITEM, LINED, event_of, lines_of
from loads.web.form_fitted import FLOOR_PARTS
from loads.web.inputs import Choices, Field, Maker

SINCE: Choices = (("", "take-off"), ("engine start", "engine start"))
TITLES = {
    "leave": "somebody or something leaves",
    "move": "somebody or something moves",
    "come_aboard": "somebody or something comes aboard",
    "transfer": "fuel is transferred",
    "position": "gear or flaps change",
}
ADDS = (
    ("leave", "Somebody or something leaves"),
    ("move", "Somebody or something moves"),
    ("person", "A person comes aboard"),
    ("item", "An item comes aboard"),
    ("transfer", "Fuel is transferred"),
    ("position", "Gear or flaps change"),
)


@dataclass(frozen=True, slots=True)
class Aboard:
    """What the events of a load can be about: seats, places, tanks and parts, and the rows of items."""

    basis: Basis
    configuration: Configuration
    item_rows: int
    weights: Choices
    volumes: Choices
    restraints: bool
    released: bool


def lay_events(make: Maker, aboard: Aboard) -> dict[str, Any]:
    """This function will return the events typed, each with its inputs, and what can be added."""
    numbers = events_in(make.typed)
    who = _who(make.typed, aboard, numbers)
    basis = aboard.basis
    able = {"transfer": len(basis.tanks) > 1, "position": bool(basis.positions)}
    return {
        "open": bool(numbers) or FOCUS in make.typed,
        "count": len(numbers),
        "events": [_event(make, aboard, number, who) for number in numbers],
        "adds": [(f"{ADDED} {kind}", words) for kind, words in ADDS if able.get(kind, True)],
    }


def _event(make: Maker, aboard: Aboard, number: int, who: Choices) -> dict[str, Any]:
    event, count = event_of(number), number + 1
    kind = make.typed.get(f"{event}:kind", "")
    found: dict[str, Any] = {
        "name": event,
        "number": count,
        "kind": kind,
        "title": f"Event {count}: {TITLES.get(kind, 'no known kind')}",
        "when": [
            make.figure(f"{event}:after", f"Fuel burned by event {count}", title="After burning"),
            make.choice(
                f"{event}:unit", f"Unit of event {count}", aboard.weights + aboard.volumes, title="Unit"
            ),
            make.choice(f"{event}:since", f"Event {count} counts since", SINCE, title="Since"),
        ],
        "rows": rows_in(make.typed, number),
        "buttons": _buttons(number, kind),
    }
    if kind in ("leave", "move"):
        lines = [
            (f"{event}:line:{row}", f"in line {row + 1} of event {count}") for row in range(found["rows"])
        ]
        found["lines"] = [
            [make.choice(f"{line}:who", f"Who or what {of}", who), *_rest(make, aboard, kind, line, of)]
            for line, of in lines
        ]
    elif kind == "come_aboard":
        found["comers"] = [_comer(make, aboard, number, line) for line in comers_in(make.typed, number)]
    elif kind == "transfer":
        found["fields"] = _transfer(make, aboard, event, count)
    elif kind == "position":
        found["fields"] = _positions(make, aboard, event, count)
    return found


def _buttons(number: int, kind: str) -> list[tuple[str, str, str]]:
    """This function will return the buttons of an event: what is sent, the words, and the label."""
    found = []
    if kind == "come_aboard":
        found += [("person", "Another person"), ("item", "Another item")]
    elif kind in LINED:
        found.append(("more", "More lines"))
    if number:
        found.append(("up", "One place earlier"))
    found.append(("drop", "Take this event out"))
    return [(f"{word} {number}", words, f"{words}: event {number + 1}") for word, words in found]


def _rest(make: Maker, aboard: Aboard, kind: str, line: str, of: str) -> list[Field]:
    if kind == "move":
        return [make.choice(f"{line}:to", f"To which seat or place {of}", _targets(aboard))]
    return [
        make.figure(f"{line}:weight", f"How much of it {of}"),
        make.choice(f"{line}:unit", f"Unit {of}", aboard.weights),
    ]


def comers_in(typed: Mapping[str, str], number: int) -> list[int]:
    """This function will return the lines of an event that have who or what comes aboard, typed or not."""
    event = event_of(number)
    begun = lines_of(typed, event)
    return sorted(
        {*begun, *(row for row in range(rows_in(typed, number)) if f"{event}:line:{row}:is" in typed)}
    )


def _comer(make: Maker, aboard: Aboard, number: int, row: int) -> dict[str, Any]:
    prefix = f"{event_of(number)}:line:{row}"
    of = f"line {row + 1} of event {number + 1}"
    item = make.typed.get(f"{prefix}:is") == ITEM
    return {
        "name": f"{prefix}:is",
        "is": make.typed.get(f"{prefix}:is", "person"),
        "fields": _item(make, aboard, prefix, of) if item else _person(make, aboard, prefix, of),
        "more": _standing(make, aboard, prefix, of) if item else _lap(make, prefix, of),
        "more_words": "What it stands on" if item else "An infant on the lap, a restraint",
        "more_open": any(
            make.typed.get(f"{prefix}:{part}")
            for part in (*FLOOR_PARTS, "infant", "infant_weight", "infant_how", "restraint")
        ),
    }


def _person(make: Maker, aboard: Aboard, prefix: str, of: str) -> list[Field]:
    seats = [(seat.id, seat.name) for seat in aboard.basis.seats if seat.id in aboard.configuration.seats]
    return [
        make.text(f"{prefix}:name", f"Name in {of}", title="Name", maximum=120),
        make.choice(f"{prefix}:seat", f"Seat in {of}", (("", "choose"), *seats), title="Seat they come to"),
        make.choice(
            f"{prefix}:at",
            f"Where they are first in {of}",
            (("", "in the seat"), *_places(aboard)),
            title="At first",
        ),
        make.choice(f"{prefix}:position", f"Position in {of}", _no_commander(), title="Position"),
        make.figure(f"{prefix}:weight", f"Weight in {of}", title="Weight"),
        make.choice(f"{prefix}:unit", f"Unit of the weight in {of}", aboard.weights, title="Unit"),
        make.choice(f"{prefix}:how", f"How the weight in {of} was got", HOW, title="How got"),
        make.choice(f"{prefix}:category", f"Category in {of}", CATEGORIES, title="Category"),
    ]


def _no_commander() -> Choices:
    return tuple(choice for choice in POSITIONS if choice[0] != "pilot in command")


def _lap(make: Maker, prefix: str, of: str) -> list[Field]:
    return [
        make.text(f"{prefix}:infant", f"Infant on the lap in {of}", title="Infant's name", maximum=120),
        make.figure(f"{prefix}:infant_weight", f"Weight of the infant in {of}", title="Infant's weight"),
        make.choice(
            f"{prefix}:infant_how", f"How the infant's weight in {of} was got", INFANT_HOW, title="How got"
        ),
        make.figure(f"{prefix}:restraint", f"Weight of a restraint in {of}", title="Restraint's weight"),
    ]


def _item(make: Maker, aboard: Aboard, prefix: str, of: str) -> list[Field]:
    released = make.choice(
        f"{prefix}:jettisonable", f"{of.capitalize()} can be released", RELEASED, title="Can be released"
    )
    return [
        make.text(f"{prefix}:what", f"What comes aboard in {of}", title="What", maximum=120),
        make.choice(f"{prefix}:kind", f"Kind in {of}", COMING_KINDS, title="Kind"),
        make.choice(f"{prefix}:place", f"Place in {of}", (("", "choose"), *_places(aboard)), title="Place"),
        make.figure(f"{prefix}:weight", f"Weight in {of}", title="Weight"),
        make.choice(f"{prefix}:unit", f"Unit of the weight in {of}", aboard.weights, title="Unit"),
        make.choice(f"{prefix}:how", f"How the weight in {of} was got", HOW, title="How got"),
        *([released] if aboard.released else ()),
    ]


def _standing(make: Maker, aboard: Aboard, prefix: str, of: str) -> list[Field]:
    """This function will return what the item stands on, where a floor asks for it or it was typed."""
    typed = any(make.typed.get(f"{prefix}:{part}") for part in FLOOR_PARTS)
    if not typed and not floors_asked(aboard.basis, aboard.configuration):
        return []
    return floor_row(make, prefix, f"in {of}", aboard.basis.length_unit.value)


def _transfer(make: Maker, aboard: Aboard, event: str, count: int) -> list[Field]:
    tanks: Choices = (("", "choose"), *((tank.id, tank.name) for tank in aboard.basis.tanks))
    return [
        make.choice(f"{event}:from", f"From which tank in event {count}", tanks, title="From"),
        make.choice(f"{event}:to", f"Into which tank in event {count}", tanks, title="Into"),
        make.figure(f"{event}:quantity", f"Fuel transferred in event {count}", title="How much"),
        make.choice(
            f"{event}:quantity_unit",
            f"Unit of the fuel transferred in event {count}",
            aboard.volumes + aboard.weights,
            title="Unit",
        ),
    ]


def _positions(make: Maker, aboard: Aboard, event: str, count: int) -> list[Field]:
    start = f"{event}:part:"
    parts: dict[str, tuple[str, Choices]] = {
        part.id: (part.name, tuple((state.id, state.name) for state in part.states))
        for part in aboard.basis.positions
    }
    for name, value in make.typed.items():
        if name.startswith(start) and value:
            parts.setdefault(name.removeprefix(start), (name.removeprefix(start), ()))
    return [
        make.choice(
            f"{start}{part}",
            f"{name.capitalize()} in event {count}",
            (("", "stays as it is"), *states),
            title=name.capitalize(),
        )
        for part, (name, states) in parts.items()
    ]


def _places(aboard: Aboard) -> Choices:
    fitted = aboard.configuration.places
    return tuple((place.id, place.name) for place in aboard.basis.places if place.id in fitted)


def _targets(aboard: Aboard) -> Choices:
    seats = [(seat.id, seat.name) for seat in aboard.basis.seats if seat.id in aboard.configuration.seats]
    return (("", "choose"), *seats, *_places(aboard))


def _who(typed: Mapping[str, str], aboard: Aboard, numbers: list[int]) -> Choices:
    """This function will return who and what an event can be about, by name where one was typed."""
    places = dict(_places(aboard))
    comers = [f"{event_of(number)}:line:{row}" for number in numbers for row in comers_in(typed, number)]
    later = {
        typed[f"{line}:seat"]: typed.get(f"{line}:name", "") for line in comers if typed.get(f"{line}:seat")
    }
    found: list[tuple[str, str]] = []
    for seat in aboard.basis.seats:
        if seat.id in aboard.configuration.seats:
            name = typed.get(f"seat:{seat.id}:name", "").strip() or later.get(seat.id, "").strip()
            found.append((f"seat:{seat.id}", f"{seat.name}: {name}" if name else f"{seat.name}, nobody"))
    for row in range(aboard.item_rows):
        what, place = (typed.get(f"item:{row}:{part}", "").strip() for part in ("what", "place"))
        words = f": {what}, {places.get(place, place)}" if what else ", empty"
        found.append((f"item:{row}", f"item {row + 1}{words}"))
    for line in comers:
        what, place = (typed.get(f"{line}:{part}", "").strip() for part in ("what", "place"))
        if what:
            found.append((f"words:{place}:{what}", f"{what}, {places.get(place, place)}, comes aboard"))
    return (("", "choose"), *found)
