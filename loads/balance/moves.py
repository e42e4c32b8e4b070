"""The simplest way back inside for a centre of gravity: one item moved, or one person reseated, nothing taken
off.

A move of weight w from arm a to arm b changes the moment at every phase by w * (b - a) and leaves the weights
alone. So the moves that help are those whose change of moment lies in the interval every phase asks for; the
one that shifts the least weight is named, after it was tried at every phase, along the whole burn and against
every limit of seat, place and zone it touches.
"""

from collections.abc import Iterator, Mapping, Sequence
from fractions import Fraction
from math import ceil
from typing import NamedTuple

from fleet.basis import Phase, Place, Seat
from loads.balance.aboard import Declared
from loads.balance.checks_lateral import stays_within_lateral
from loads.balance.checks_places import Held
from loads.balance.path_worst import Burn, stays_inside
from loads.balance.prepared import Prepared
from loads.balance.result import State
from loads.balance.rounding import WEIGHT_PLACES, printed

TENTH = Fraction(1, 10**WEIGHT_PLACES)


class Move(NamedTuple):
    """A weight that goes from one seat or place to another; `whole`: a person, who cannot be parted."""

    what: str
    weight: Fraction
    start: Seat | Place
    end: Seat | Place
    whole: bool


Flight = tuple[Mapping[Phase, State], Burn]  # the phases and the burn between them


def cg_advice(declared: Declared, flights: Sequence[Flight], held: Held, ready: Prepared) -> str:
    """Return what brings the CG within all along the flight, in words and figures; verified before it is
    named.

    Several flights are one whose moment is not known better: what is named holds for each of them.
    """
    wanted = _moment_wanted(flights, ready)
    if wanted is None:
        return "Bring the weight within the envelope first, then assess again."
    low, high = wanted
    if low > high:
        return "No shift at this weight mends every phase at once; take something off, or change the fuel."
    if low <= 0 <= high:
        return "Move weight across the aircraft, away from the heavy side, then assess again."
    change = low if low > 0 else high
    side = "aft" if change > 0 else "forward"
    figure = f"{printed(abs(change), ready.moment_places, 'up')} {ready.moment}"
    if declared.sequence:
        return f"Change the moment by at least {figure}, {side}; no single move is tried with a sequence."
    working = (
        move
        for move in _possible(declared, ready)
        if (weight := _enough(move, low, high)) is not None
        and all(_holds(move, weight, *flight, held=held, ready=ready) for flight in flights)
    )
    best = min(working, key=lambda move: _enough(move, low, high) or move.weight, default=None)
    if best is None:
        return f"Change the moment by at least {figure}, {side}; no single move does it alone."
    weight = _enough(best, low, high) or best.weight
    amount = f"{printed(weight, WEIGHT_PLACES, 'up')} {ready.weight}"
    verb = f"Reseat {best.what}" if best.whole else f"Move at least {amount} of {best.what}"
    return f"{verb} from {best.start.name} to {best.end.name}: a moment of at least {figure}, {side}."


def _moment_wanted(flights: Sequence[Flight], ready: Prepared) -> tuple[Fraction, Fraction] | None:
    """Return the least and the greatest change of moment that put every flight inside."""
    each = [_of_one(states, burn, ready) for states, burn in flights]
    found = [ends for ends in each if ends is not None]
    if len(found) < len(each) or not found:
        return None
    return max(low for low, _ in found), min(high for _, high in found)


def _of_one(states: Mapping[Phase, State], burn: Burn, ready: Prepared) -> tuple[Fraction, Fraction] | None:
    """Return the least and the greatest change of moment that put every judged phase and the worst point of
    the path inside, weights unchanged. The rest of the path is only tried with a move.
    """
    lows, highs = [], []
    worst = burn.worst.get("longitudinal")
    if worst is not None:
        if worst.low is None or worst.high is None:
            return None
        lows.append(worst.low * worst.knot.weight - worst.knot.moment)
        highs.append(worst.high * worst.knot.weight - worst.knot.moment)
    for state in states.values():
        for shape in ready.shapes_at("longitudinal", state.phase, state.parts):
            along = shape.arm_section(state.weight, state.moment)
            if along is None:
                return None
            lows.append(along.low * state.weight - state.moment)
            highs.append(along.high * state.weight - state.moment)
    return (max(lows), min(highs)) if lows else None


def _enough(move: Move, low: Fraction, high: Fraction) -> Fraction | None:
    """Return the least weight of a move, in whole last digits, that changes the moment by what is asked."""
    way = move.end.arm - move.start.arm
    change = low if low > 0 else high
    if way == 0 or (way > 0) != (change > 0) or change / way > move.weight:
        return None
    weight = move.weight if move.whole else min(ceil(change / way / TENTH) * TENTH, move.weight)
    return weight if low <= weight * way <= high else None


def _possible(declared: Declared, ready: Prepared) -> Iterator[Move]:
    places = [
        place
        for place in ready.basis.places
        if place.id in declared.configuration.places and not place.external
    ]
    set_on_rails = {seat.id: seat for seat, _ in declared.settings}
    seats = [
        set_on_rails.get(seat.id, seat)
        for seat in ready.basis.seats
        if seat.id in declared.configuration.seats
    ]
    taken = {person.seat.id for person in (*declared.crew, *declared.passengers)}
    for item in declared.items:
        if item.weight is not None and not item.removed and not item.place.external:
            for place in places:
                yield Move(item.kind, item.weight, item.place, place, False)
    for person in declared.passengers:
        # Where a seat stands on its rail is not known: no moment to it or from it is.
        if person.weight is not None and person.lap_infant is None and person.seat.rail is None:
            for seat in seats:
                if seat.id not in taken and seat.serves in ("passenger", "either") and seat.rail is None:
                    weight = person.weight + (person.restraint or 0)
                    yield Move("the passenger", weight, person.seat, seat, True)


def _holds(
    move: Move, weight: Fraction, states: Mapping[Phase, State], burn: Burn, *, held: Held, ready: Prepared
) -> bool:
    """Return whether a move was tried and found good: both axes all along, seat, place and zones."""
    along = weight * (move.end.arm - move.start.arm)
    across = weight * (move.end.lateral_arm - move.start.lateral_arm)
    for state in states.values():
        for shape in ready.shapes_at("longitudinal", state.phase, state.parts):
            if not shape.holds(state.weight, state.moment + along):
                return False
        for shape in ready.shapes_at("lateral", state.phase, state.parts):
            if not shape.holds(state.weight, state.lateral_moment + across):
                return False
    maximum = move.end.maximum
    after = (held.get(move.end.id) or Fraction(0)) + weight
    if maximum is None or (maximum.value is not None and after > maximum.value):
        return False
    zones = all(
        zone.maximum is not None
        and (zone.maximum.value is None or _in_zone(zone.members, held) + weight <= zone.maximum.value)
        for zone in ready.basis.zones
        if move.end.id in zone.members and move.start.id not in zone.members
    )
    if not zones or not stays_inside(burn.path, ready, along, across):
        return False
    return not ready.basis.lateral_by_cg or stays_within_lateral(states, burn.path, ready, (along, across))


def _in_zone(members: tuple[str, ...], held: Held) -> Fraction:
    return sum((held.get(member) or Fraction(0) for member in members), Fraction(0))
