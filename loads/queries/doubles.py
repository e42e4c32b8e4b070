"""What looks doubled: one aircraft, or one person, on two standing loads at about the same time.

A load document states no arrival, so two loads count as overlapping when their planned departures lie less
than an hour apart. It is a warning and refuses nothing: a spare aircraft, a short hop or two people of one
name are lawful. It is looked for whenever a load is answered, so it goes when its cause goes.
"""

from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from datetime import timedelta
from typing import Any, Final
from uuid import UUID

from loads.queries.current import Current, current_of, loads_present, within
from loads.queries.declaration import declared_now
from records import prepared

APART: Final = timedelta(hours=1)
STANDING: Final = ("open", "prepared", "loaded", "accepted")
# As many of one hour are looked at; a day's list shows the rest.
MOST_LOOKED_AT: Final = 50
_NEAR: Final = (
    "SELECT FROM loads_present "
    "WHERE operator_id = %s AND departure > %s AND departure < %s AND load_id <> %s LIMIT 1"
)


@dataclass(frozen=True, slots=True)
class Double:
    """One warning: a stable code, a sentence without the name of a person, the other load (None where who
    asks may not see it), and the part of this load it is about, as a JSON pointer.
    """

    code: str
    detail: str
    load: UUID | None
    pointer: str


def doubles_of(current: Current, *, reach: frozenset[str] | None) -> tuple[Double, ...]:
    """This function will return what of a standing load stands on another one too; () for an ended load.

    `reach` has the registrations somebody is limited to, None: to none. Of loads beyond it only is told that
    there is one.
    """
    if current.state not in STANDING:
        return ()
    others = _beside(current)
    if not others:
        return ()
    own = tuple(_people(declared_now(current)))
    found: list[Double] = []
    for other in others:
        seen = within(reach, other.load)
        which = f"another load: {_words(other)}" if seen else "another load, which this token may not see"
        number = other.load.id if seen else None
        if other.load.aircraft_id == current.load.aircraft_id:
            detail = f"The same aircraft stands on {which}."
            found.append(Double("same-aircraft", detail, number, "/aircraft"))
        there = frozenset().union(*(marks for _, marks, _ in _people(declared_now(other))))
        found += [
            Double("same-person", f"{who} is on {which}.", number, pointer)
            for pointer, marks, who in own
            if marks & there
        ]
    return tuple(dict.fromkeys(found))  # how many loads there are beyond the reach is not told either


def _beside(current: Current) -> list[Current]:
    load = current.load
    # Mostly nothing departs near it. A look at one index tells; the whole question costs many times that.
    span = (load.departure - APART, load.departure + APART)
    if not prepared.rows(_NEAR, [load.operator_id, *span, load.id]):
        return []
    rows = (
        loads_present()
        .filter(
            operator_id=load.operator_id,
            departure__gt=span[0],
            departure__lt=span[1],
            state__in=STANDING,
        )
        .exclude(load_id=load.id)
        .order_by("departure", "load_id")
    )
    return [current_of(one) for one in rows[:MOST_LOOKED_AT]]


def _people(declared: Mapping[str, Any]) -> Iterator[tuple[str, frozenset[str], str]]:
    """Yield (pointer, marks, who) of everybody aboard: a login marks a person surely, a name as people do."""
    for place, line in enumerate(declared.get("crew", ())):
        login = {f"login {line['person'].lower()}"} if line.get("person") else set()
        yield f"/crew/{place}", frozenset({_name(line), *login}), "One of the crew, by login or name,"
    aboard = [(f"/passengers/{place}", line) for place, line in enumerate(declared.get("passengers", ()))]
    for event, happens in enumerate(declared.get("sequence", ())):
        for place, line in enumerate(happens.get("come_aboard", ())):
            if "seat" in line:
                aboard.append((f"/sequence/{event}/come_aboard/{place}", line))
    for pointer, line in aboard:
        infant = line.get("lap_infant")
        yield pointer, frozenset({_name(line)}), "A passenger of the same name"
        if infant:
            yield f"{pointer}/lap_infant", frozenset({_name(infant)}), "A lap infant of the same name"


def _name(line: Mapping[str, Any]) -> str:
    return f"name {' '.join(line['name'].split()).casefold()}"


def _words(other: Current) -> str:
    load = other.load
    leg = f" leg {load.leg}" if load.leg > 1 else ""
    flight = f"{load.aircraft.registration} {load.reference}{leg}, {load.origin} to {load.destination}"
    return f"{flight}, departs {load.departure_text}, {other.state}"
