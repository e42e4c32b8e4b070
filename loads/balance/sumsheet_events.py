"""The lines of the loading computation between engine start and landing, for a load with a sequence: fuel
burned from event to event, and each event, so that the totals can be added up by hand.
"""

from collections.abc import Iterator, Mapping
from fractions import Fraction

from fleet.basis import Phase
from loads.balance.aboard import Declared, Item, Person
from loads.balance.events import Event, Leaving, Moving
from loads.balance.exact import added
from loads.balance.fuel import NOTHING, Contents
from loads.balance.over_flight import over_flight
from loads.balance.prepared import Prepared
from loads.balance.result import Json, Line, State
from loads.balance.rounding import VOLUME_PLACES, WEIGHT_PLACES, printed
from loads.balance.sections import Section, Sections, after_transfer
from loads.balance.sumsheet import item_lines, people_lines, total_line

FUEL = {"taxi": "taxi fuel", "flight": "trip fuel"}


def flight_lines(
    declared: Declared, flight: Sections, states: Mapping[Phase, State], ready: Prepared
) -> tuple[Line, ...]:
    """Return the lines after the ramp: burned fuel, events, and the totals at take-off and landing."""
    loads = over_flight(declared)
    lines: list[Line] = []
    for section in flight.sections:
        if section.leg == "reserve":
            break
        if section.draws:
            lines.append(_burned(section, declared, ready))
        if section.event is not None:
            lines += _event(section.event, loads[section.aboard], section.end, ready)
        if section.ends is not None:
            lines.append(total_line(section.ends, states))
    return tuple(lines)


def event_words(event: Event, before: Declared, ready: Prepared) -> str:
    """Return what happens in an event, by seats and places, without the name of anybody."""
    if event.leaving:
        return f"leaving: {', '.join(_leaves(one, before, ready) for one in event.leaving)}"
    if event.moving:
        moves = (f"{_of(one.line, before)} to {one.to.name}" for one in event.moving)
        return f"moving: {', '.join(moves)}"
    if event.coming:
        return f"coming aboard: {', '.join(_comes(one) for one in event.coming)}"
    if event.transfer is not None:
        names = {tank.id: tank.name for tank in ready.basis.tanks}
        volume = f"{printed(event.transfer.volume, VOLUME_PLACES)} {ready.volume}"
        return f"transfer: {volume} from {names[event.transfer.source]} to {names[event.transfer.target]}"
    return ", ".join(f"{part.name} {state.name}" for part, state in event.positions)


def sequence_document(declared: Declared, ready: Prepared) -> list[Json]:
    """Return the events as they stand in the result document: when, and what happens, in words."""
    density = declared.fuel.density
    return [
        {
            "event": event.number,
            "since": "engine start" if event.leg == "taxi" else "take-off",
            "after_burning": {
                "weight": printed(event.burned * density, WEIGHT_PLACES),
                "volume": printed(event.burned, VOLUME_PLACES),
            },
            "what": event_words(event, before, ready),
        }
        for event, before in zip(declared.sequence, over_flight(declared), strict=False)
    ]


def _leaves(one: Leaving, before: Declared, ready: Prepared) -> str:
    if one.weight is None:
        return _of(one.line, before)
    return f"{printed(one.weight, WEIGHT_PLACES)} {ready.weight} of {_of(one.line, before)}"


def _of(line: str, before: Declared) -> str:
    found = _found(line, before)
    if isinstance(found, Person):
        return found.seat.name
    return f"{found.kind} in {found.place.name}"


def _comes(one: Person | Item) -> str:
    if isinstance(one, Person):
        return one.seat.name
    outside = " that can be released" if one.jettisonable else ""
    return f"{one.kind} in {one.place.name}{outside}"


def _found(line: str, before: Declared) -> Person | Item:
    aboard: tuple[Person | Item, ...] = (*before.crew, *before.passengers, *before.items)
    return next(one for one in aboard if one.pointer == line)


def _burned(section: Section, declared: Declared, ready: Prepared) -> Line:
    density = declared.fuel.density
    weight = (added(section.end.values()) - added(section.start.values())) * density
    start, end = (_moments(held, declared, ready) for held in (section.start, section.end))
    what = FUEL[section.leg]
    if section.event is not None:
        what = f"{what} until event {section.event.number}"
    elif section.aboard and declared.sequence[section.aboard - 1].leg == section.leg:
        what = f"{what} after event {section.aboard}"
    group = "taxi" if section.leg == "taxi" else "trip"
    moment = end[0] - start[0]
    return Line(group, what, "declared", weight, moment / weight, moment, end[1] - start[1])


def _moments(contents: Contents, declared: Declared, ready: Prepared) -> tuple[Fraction, Fraction]:
    """Return the moments of the fuel along and across."""
    along, across = [], []
    density = declared.fuel.density
    for held in declared.fuel.tanks:
        volume = contents[held.tank.id] + held.trapped
        along.append(ready.fuel_moment(held.tank.id, volume, density))
        across.append(held.tank.lateral_moment(volume, density))
    return added(along), added(across)


def _event(event: Event, before: Declared, contents: Contents, ready: Prepared) -> Iterator[Line]:
    """Yield the lines of an event: what goes off or comes with its weight, what moves with its change of
    moment.
    """
    for gone in event.leaving:
        yield from _leaving(event, gone, before)
    for one in event.coming:
        lines = people_lines("sequence", one) if isinstance(one, Person) else item_lines("sequence", one)
        for line in lines:
            yield line._replace(what=f"event {event.number}, comes aboard: {line.what}")
    for moved in event.moving:
        yield _moving(event, moved, before)
    if event.transfer is not None:
        start = _moments(contents, before, ready)
        end = _moments(after_transfer(contents, event), before, ready)
        change = (end[0] - start[0], end[1] - start[1])
        yield _shift(event, event_words(event, before, ready), change, None)
    for part, state in event.positions:
        was = part.as_weighed
        for earlier in before.sequence[: event.number - 1]:
            was = next((held.id for one, held in earlier.positions if one.id == part.id), was)
        change = (state.moment_change - part.state(was).moment_change, NOTHING)
        yield _shift(event, f"{part.name} {state.name}", change, None)


def _leaving(event: Event, gone: Leaving, before: Declared) -> Iterator[Line]:
    found = _found(gone.line, before)
    if isinstance(found, Person):
        for line in people_lines("sequence", found):
            yield _negative(line._replace(what=f"event {event.number}, leaves: {line.what}"))
        return
    weight = found.weight if gone.weight is None else gone.weight
    place, what = found.place, f"event {event.number}, leaves: {found.place.name}, {found.kind}"
    along = None if weight is None else weight * place.arm
    across = None if weight is None else weight * place.lateral_arm
    yield _negative(Line("sequence", what, found.how, weight, place.arm, along, across, False, found.pointer))


def _negative(line: Line) -> Line:
    if line.weight is None or line.moment is None or line.lateral_moment is None:
        return line
    return line._replace(weight=-line.weight, moment=-line.moment, lateral_moment=-line.lateral_moment)


def _moving(event: Event, moved: Moving, before: Declared) -> Line:
    found = _found(moved.line, before)
    start = found.seat if isinstance(found, Person) else found.place
    weight = _weight(found)
    change = None
    if weight is not None:
        along, across = moved.to.arm - start.arm, moved.to.lateral_arm - start.lateral_arm
        change = (weight * along, weight * across)
    return _shift(event, f"moves from {start.name} to {moved.to.name}", change, found.pointer)


def _weight(found: Person | Item) -> Fraction | None:
    """Return what moves with a person (infant and restraint too), or of an item."""
    if isinstance(found, Item) or found.weight is None:
        return found.weight
    infant = found.lap_infant
    parts = (found.weight, infant.weight if infant else None, found.restraint)
    return added(part for part in parts if part is not None)


def _shift(event: Event, what: str, change: tuple[Fraction, Fraction] | None, pointer: str | None) -> Line:
    """Return a line that changes moments and no weight."""
    along, across = (None, None) if change is None else change
    text = f"event {event.number}, {what}"
    return Line("sequence", text, None, NOTHING, None, along, across, False, pointer)
