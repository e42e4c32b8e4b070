"""The path of a flight with a sequence, and of one whose gear and flaps shift the moment.

Events are jumps: both sides of each are points of the path. During a transfer the weight stays and the moment
moves from the one side to the other; over the volume it is quadratic between two points of the tables, so its
extremes are at such points or where its slope is nothing, which is a rational volume.
"""

from collections.abc import Mapping, Sequence
from dataclasses import replace
from fractions import Fraction
from itertools import pairwise

from fleet.basis import Phase
from fleet.positions import CARRIED, EXTERNAL_LOAD, Setting, settings
from fleet.tanks import TankPiece
from loads.balance.aboard import Declared
from loads.balance.events import Event, Transfer
from loads.balance.fuel import NOTHING, Contents, FuelState
from loads.balance.over_flight import hangs_outside, over_flight
from loads.balance.path import FlownTanks, Found, Gap, Knot, Path, Stretch, Turn, knot_of
from loads.balance.prepared import Prepared
from loads.balance.result import State
from loads.balance.sections import Dry, Section, Sections, after_transfer


def sequence_path(
    declared: Declared,
    flight: Sections,
    dry: Sequence[Dry],
    states: Mapping[Phase, State],
    outside: frozenset[str] = frozenset(),
) -> Path:
    """Return the path of a load with a sequence whose phases are known; `outside` as of `parts_set`."""
    found = Found([], [])
    turns: list[Turn] = []
    ramp, staying = flight.fuel["ramp"], flight.fuel["zero fuel"].weight
    flown = [FlownTanks(declared.fuel, ramp, _loaded(each, ramp)) for each in dry]
    for section in flight.sections:
        tanks, sums = flown[section.aboard], dry[section.aboard].sums
        start = _end(section.begins, section.start, tanks, states)
        end = _end(section.ends, section.end, tanks, states)
        for knot, held in ((start, section.start), (end, section.end)):
            if knot is None:
                found.gaps.append(tanks.gap(section.leg, held))
        first = len(found.stretches)
        tanks.fly(section.leg, section.start, section.draws, (start, end), found)
        without_fuel = sums.weight + staying
        parts = parts_set(declared, section.aboard, outside)
        found.stretches[first:] = [
            each._replace(dry=without_fuel, parts=parts) for each in found.stretches[first:]
        ]
        if section.event is not None:
            later = dry[section.aboard + 1].sums.weight + staying
            both = parts, parts_set(declared, section.aboard + 1, outside)
            turns += [
                turn._replace(parts=both[turn.where.startswith("just after")])
                for turn in _turns(section, end, flown, (without_fuel, later), found.gaps)
            ]
    return Path(tuple(found.stretches), tuple(found.gaps), declared.fuel.density, tuple(turns))


def parts_set(
    declared: Declared, events: int, outside: frozenset[str] = frozenset()
) -> tuple[tuple[str, str], ...]:
    """Return the (part, state) of all parts the first so many events of a sequence have set, and whether
    something then hangs in one of the places `outside`.
    """
    held: dict[str, str] = {}
    for event in declared.sequence[:events]:
        held |= {part.id: state.id for part, state in event.positions}
    if outside and hangs_outside(over_flight(declared)[events] if events else declared, outside):
        held[EXTERNAL_LOAD] = CARRIED
    return tuple(held.items())


def with_settings(path: Path, declared: Declared, ready: Prepared) -> Path:
    """Return a path with its stretches and events in every other setting of gear and flaps that may hold
    there. What the sequence states of a part holds; a part it does not name may be in any state.
    """
    stated = {part.id for event in declared.sequence for part, _ in event.positions}
    free = [part for part in ready.basis.positions if part.id not in stated]
    told = ready.deciding
    ground, flight = settings(free, "ground", told), settings(free, "flight", told)
    more: list[Stretch] = []
    turns: list[Turn] = []
    for legs, found in ((("taxi",), ground), (("flight", "reserve"), flight)):
        for setting in found:
            more += [_set(each, setting) for each in path.stretches if each.leg in legs]
            turns += [_turn_set(each, setting) for each in path.turns if each.leg in legs]
    return replace(path, settings=tuple(more), turns=(*path.turns, *turns))


def zero_fuel_turns(
    declared: Declared, dry: Sequence[Dry], state: State, ready: Prepared
) -> tuple[Turn, ...]:
    """Return the aircraft at zero fuel as points: after each event in flight, in every setting of gear and
    flaps.
    """
    stated = {part.id for event in declared.sequence for part, _ in event.positions}
    free = [part for part in ready.basis.positions if part.id not in stated]
    base = dry[0]
    turns = []
    for number, each in enumerate(dry):
        knot = Knot(
            state.weight + each.sums.weight - base.sums.weight,
            state.moment + each.sums.moment + each.shift - base.sums.moment - base.shift,
            state.lateral_moment + each.sums.lateral_moment - base.sums.lateral_moment,
        )
        where = f"at zero fuel after event {number}" if number else "at zero fuel"
        parts = parts_set(declared, number, ready.outside)
        turn = Turn("flight", where, ((knot, {}),), False, knot.weight, parts=parts)
        found = settings(free, "flight", ready.deciding)
        turns += [turn, *(_turn_set(turn, setting) for setting in found)]
    return tuple(turns)


def _loaded(dry: Dry, fuel: FuelState) -> Knot:
    """Return the aircraft as it would be at the ramp with what is aboard after some events."""
    sums = dry.sums
    return Knot(
        sums.weight + fuel.weight,
        sums.moment + dry.shift + fuel.moment,
        sums.lateral_moment + fuel.lateral_moment,
    )


def _end(
    phase: Phase | None, contents: Contents, tanks: FlownTanks, states: Mapping[Phase, State]
) -> Knot | None:
    return tanks.knot(contents) if phase is None else knot_of(states[phase])


def _turns(
    section: Section,
    before: Knot | None,
    flown: Sequence[FlownTanks],
    dry: tuple[Fraction, Fraction],
    gaps: list[Gap],
) -> list[Turn]:
    """Return both sides of an event, and what lies between them in a transfer."""
    event = section.event
    if event is None:
        return []
    tanks, contents = flown[section.aboard + 1], after_transfer(section.end, event)
    after = tanks.knot(contents)
    found = []
    if before is not None:
        where = f"just before event {event.number}"
        found.append(Turn(section.leg, where, ((before._replace(phase=None), section.end),), False, dry[0]))
    if after is not None:
        found.append(
            Turn(section.leg, f"just after event {event.number}", ((after, contents),), False, dry[1])
        )
    if event.transfer is not None:
        swept = _swept(section, event, event.transfer, tanks, gaps)
        if swept:
            where = f"during the transfer of event {event.number}"
            found.append(Turn(section.leg, where, swept, True, dry[0]))
    return found


def _swept(
    section: Section, event: Event, moved: Transfer, tanks: FlownTanks, gaps: list[Gap]
) -> tuple[tuple[Knot, Contents], ...]:
    """Return the knots of a transfer: its ends, the points of both tables, and every extreme in between; and
    halfway between two of these, so that each part is known as the quadratic it is.
    """
    leg, contents = section.leg, section.end
    source, target = tanks.held[moved.source], tanks.held[moved.target]
    out, into = contents[moved.source] + source.trapped, contents[moved.target] + target.trapped
    pieces = source.tank.table.curve.pieces, target.tank.table.curve.pieces
    marks = {NOTHING, moved.volume}
    for low in (piece.first for piece in pieces[0]):
        marks.add(out - low)
    for piece in pieces[1]:
        marks.update((piece.first - into, piece.last - into))
    levels = (_level(one, other, out, into) for one in pieces[0] for other in pieces[1])
    marks.update(level for level in levels if level is not None)
    rising = sorted(mark for mark in marks if NOTHING <= mark <= moved.volume)
    knots = []
    for volume in sorted((*rising, *((low + high) / 2 for low, high in pairwise(rising)))):
        held = after_transfer(contents, replace(event, transfer=replace(moved, volume=volume)))
        knot = tanks.knot(held)
        if knot is None:
            gaps.append(tanks.gap(leg, held))
        else:
            knots.append((knot, held))
    for tank, least, most in ((source, out - moved.volume, out), (target, into, into + moved.volume)):
        first = tank.tank.table.curve.first
        if least < first and most > NOTHING and first:
            gaps.append(Gap(leg, tank.tank.id, first))
    return tuple(knots)


def _level(one: TankPiece, other: TankPiece, out: Fraction, into: Fraction) -> Fraction | None:
    """Return the volume at which the moment neither rises nor falls, in these parts of the two tables."""
    bends = 2 * (one.bend + other.bend)
    if not bends:
        return None
    return (one.slope + 2 * one.bend * out - other.slope - 2 * other.bend * into) / bends


def _set(stretch: Stretch, setting: Setting) -> Stretch:
    start, end = (
        knot._replace(moment=knot.moment + setting.moment, phase=None)
        for knot in (stretch.start, stretch.end)
    )
    parts = (*stretch.parts, *setting.parts)
    return stretch._replace(start=start, end=end, setting=setting.words, parts=parts)


def _turn_set(turn: Turn, setting: Setting) -> Turn:
    knots = tuple((knot._replace(moment=knot.moment + setting.moment), held) for knot, held in turn.knots)
    parts, where = (*turn.parts, *setting.parts), f"{turn.where}, with {setting.words}"
    return turn._replace(knots=knots, setting=setting.words, where=where, parts=parts)
