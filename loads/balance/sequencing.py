"""Reading the sequence of a load: what happens between engine start and landing, in order.

Each event says when, in usable fuel burned since take-off (or since engine start, while taxiing), and exactly
one kind of thing: who or what leaves, moves or comes aboard, a transfer of fuel, or positions of gear and
flaps. What an event finds aboard is what the events before it left.
"""

from collections.abc import Mapping
from dataclasses import dataclass, field
from fractions import Fraction
from typing import Literal

from fleet.basis import Basis
from fleet.conversion import in_unit
from fleet.positions import MovingPart, PartState
from fleet.quantities import DIMENSION_OF, Dimension, Quantity
from loads.balance.aboard import FuelPlan, Item, Person
from loads.balance.coming import COMING, Comers, coming_lines
from loads.balance.events import Event, EventLeg, Transfer
from loads.balance.fields import Fields
from loads.balance.fuel import Contents, drawn
from loads.balance.people import Seating
from loads.balance.rounding import VOLUME_PLACES, WEIGHT_PLACES, printed
from loads.balance.sequencing_aboard import Cabin

EVENT_FIELDS = ("after_burning",)
KINDS_OF_EVENT = ("leave", "move", "transfer", "position", COMING)
EVENT_OPTIONAL = ("since", *KINDS_OF_EVENT)
SINCE: tuple[str, str] = ("engine start", "take-off")
TRANSFER_FIELDS = ("from", "to", "quantity")
WEIGHT_OR_VOLUME = (Dimension.WEIGHT, Dimension.VOLUME)
MOST_EVENTS = 60
MOST_LINES = 200
LONGEST_ID = 64
NOTHING = Fraction(0)


@dataclass(frozen=True, slots=True)
class Loaded:
    """Who and what is aboard at engine start, and with which fuel (None: it could not be read)."""

    crew: tuple[Person, ...]
    passengers: tuple[Person, ...]
    items: tuple[Item, ...]
    fuel: FuelPlan | None
    coming: Comers = field(default_factory=dict)  # who and what comes aboard in flight


def event_fields(fields: Fields) -> tuple[Fields, ...]:
    """Return the events of a document, noting what has not their form; read once, so that nothing is noted
    twice.
    """
    return fields.objects("sequence", MOST_EVENTS, EVENT_FIELDS, EVENT_OPTIONAL)


def read_sequence(
    lines: tuple[Fields, ...], basis: Basis, seating: Seating, loaded: Loaded
) -> tuple[Event, ...]:
    """Return the events in order, noting faults; () where the load has no sequence."""
    cabin = Cabin(seating, (*loaded.crew, *loaded.passengers), loaded.items, loaded.coming)
    clock = _Clock(basis, loaded.fuel) if loaded.fuel is not None else None
    parts = {part.id: part for part in basis.positions}
    found: list[Event] = []
    settled: dict[str, tuple[PartState, Fields]] = {}
    for number, line in enumerate(lines, 1):
        event = _event(number, line, cabin, clock, parts)
        found.append(event)
        named = line.mapping("position")
        if named is not None:
            settled |= {part.id: (state, named) for part, state in event.positions}
    _demand_landing_positions(settled)
    return tuple(found)


def check_sequence_shape(fields: Fields) -> None:
    """Note what of a sequence can be seen to be wrong without a loading basis."""
    for line in event_fields(fields):
        line.quantity("after_burning", WEIGHT_OR_VOLUME, zero=True)
        line.choice("since", SINCE)
        _demand_one_kind(line)
        for kind in ("leave", "move"):
            line.objects(kind, MOST_LINES, (), ("seat", "place", "what", "weight", "to"))
        for comer in coming_lines(line):
            comer.quantity("weight", Dimension.WEIGHT, zero=False)
        transfer = line.inner("transfer", TRANSFER_FIELDS)
        if transfer is not None:
            transfer.quantity("quantity", WEIGHT_OR_VOLUME, zero=False)


def _event(
    number: int, line: Fields, cabin: Cabin, clock: "_Clock | None", parts: Mapping[str, MovingPart]
) -> Event:
    leg: EventLeg = "taxi" if line.choice("since", SINCE) == SINCE[0] else "flight"
    amount = line.quantity("after_burning", WEIGHT_OR_VOLUME, zero=True)
    burned = NOTHING if clock is None or amount is None else clock.advanced(line, leg, amount)
    _demand_one_kind(line)
    if "leave" in line and leg == "taxi":
        detail = "who or what is not aboard at take-off is no part of this load; leave it out of the load"
        line.note("leave", "leaves-before-take-off", detail)
        return Event(number, leg, burned, line.pointer)
    if COMING in line and leg == "taxi":
        detail = "who or what is aboard at take-off stands among the passengers and items; write it there"
        line.note(COMING, "comes-before-take-off", detail)
        return Event(number, leg, burned, line.pointer)
    return Event(
        number,
        leg,
        burned,
        line.pointer,
        leaving=cabin.leaving(line),
        moving=cabin.moving(line),
        transfer=_transfer(line, cabin.basis, clock),
        positions=_positions(line, leg, parts),
        coming=cabin.coming(line),
    )


def _demand_one_kind(line: Fields) -> None:
    given = [kind for kind in KINDS_OF_EVENT if kind in line]
    if len(given) != 1:
        line.note(
            given[1] if given else "leave",
            "one-of",
            f"an event is exactly one of {', '.join(KINDS_OF_EVENT)}; write one event for each",
        )


def _transfer(line: Fields, basis: Basis, clock: "_Clock | None") -> Transfer | None:
    fields = line.inner("transfer", TRANSFER_FIELDS)
    if fields is None:
        return None
    known = {tank.id: tank for tank in basis.tanks}
    source, target = (fields.text(name, LONGEST_ID) for name in ("from", "to"))
    for name, tank in (("from", source), ("to", target)):
        if tank is not None and tank not in known:
            fields.note(name, "unknown-tank", f"no such tank; the basis has {', '.join(known)}")
    amount = fields.quantity("quantity", WEIGHT_OR_VOLUME, zero=False)
    if source not in known or target not in known or amount is None:
        return None
    if source == target:
        fields.note("to", "transfer-to-itself", "fuel goes from one tank to another; name another tank")
        return None
    return None if clock is None else clock.transferred(fields, source, target, amount)


def _positions(
    line: Fields, leg: EventLeg, parts: Mapping[str, MovingPart]
) -> tuple[tuple[MovingPart, PartState], ...]:
    fields = line.named("position", tuple(parts), "unknown-position", "moving part", all_needed=False)
    if fields is None:
        return ()
    if line.raw("position") == {}:
        line.note("position", "empty", "no part is named; name one with its state, or drop the event")
    where: Literal["ground", "flight"] = "ground" if leg == "taxi" else "flight"
    found = []
    for part in parts.values():
        wanted = fields.choice(part.id, tuple(state.id for state in part.states))
        if wanted is None:
            continue
        state = part.state(wanted)
        if where not in state.holds:
            detail = f"{part.name} {state.name} does not hold {_at(where)}; name another state"
            fields.note(part.id, "position-not-held", detail)
        found.append((part, state))
    return tuple(found)


def _at(where: str) -> str:
    return "on the ground" if where == "ground" else "in flight"


def _demand_landing_positions(settled: Mapping[str, tuple[PartState, Fields]]) -> None:
    """Note a part left in a state that does not hold on the ground: the aircraft lands with it."""
    for part, (state, named) in settled.items():
        if "ground" not in state.holds:
            detail = "the aircraft would land in this state; add the event that ends it before the landing"
            named.note(part, "position-at-landing", detail)


class _Clock:
    """How far the flight is, in fuel burned, and what is then in the tanks."""

    def __init__(self, basis: Basis, plan: FuelPlan) -> None:
        self.basis = basis
        self.plan = plan
        self.leg: EventLeg = "taxi"
        self.burned = NOTHING
        self.contents: Contents = {fuel.tank.id: fuel.usable for fuel in plan.tanks}
        self.trapped = {fuel.tank.id: fuel.trapped for fuel in plan.tanks}

    def volume(self, amount: Quantity) -> Fraction:
        """Return an amount of fuel as a volume, exactly."""
        if DIMENSION_OF[amount.unit] is Dimension.VOLUME:
            return in_unit(amount, self.basis.volume_unit)
        return in_unit(amount, self.basis.weight_unit) / self.plan.density

    def advanced(self, line: Fields, leg: EventLeg, amount: Quantity) -> Fraction:
        """Burn until the moment of an event, noting one that lies behind or beyond; return the moment."""
        burned = self.volume(amount)
        if self.leg == "flight" and leg == "taxi":
            line.note("since", "out-of-order", "the event before is after take-off; put the events in order")
            return burned
        if self.leg == "taxi" and leg == "flight":
            self._burn_to(self.plan.taxi / self.plan.density)
            self.leg, self.burned = "flight", NOTHING
        if burned < self.burned:
            detail = "the event before is at more fuel burned; put the events in order"
            line.note("after_burning", "out-of-order", detail)
            return burned
        planned = (self.plan.taxi if leg == "taxi" else self.plan.trip) / self.plan.density
        if burned > planned:
            self._beyond(line, leg, burned, planned)
            return burned
        self._burn_to(burned)
        return burned

    def transferred(self, fields: Fields, source: str, target: str, amount: Quantity) -> Transfer | None:
        """Put fuel from one tank into another, noting more than is there or than goes in."""
        volume, unit = self.volume(amount), self.basis.volume_unit.value
        held = self.contents[source]
        if volume > held:
            there = f"{printed(held, VOLUME_PLACES, 'down')} {unit}"
            detail = f"only {there} can be used from it at that moment; correct the quantity"
            fields.note("quantity", "transfer-exceeds-fuel", detail)
            return None
        capacity = next(tank.capacity for tank in self.basis.tanks if tank.id == target)
        free = capacity - self.contents[target] - self.trapped[target]
        if volume > free:
            takes = f"{printed(max(free, NOTHING), VOLUME_PLACES, 'down')} {unit}"
            detail = f"it takes only {takes} more at that moment; correct the quantity"
            fields.note("quantity", "transfer-over-capacity", detail)
            return None
        self.contents = {
            **self.contents,
            source: held - volume,
            target: self.contents[target] + volume,
        }
        return Transfer(source, target, volume)

    def _burn_to(self, burned: Fraction) -> None:
        order = self.basis.taxi_order if self.leg == "taxi" else self.basis.burn_order
        self.contents, _, _ = drawn(self.contents, order, burned - self.burned)
        self.burned = burned

    def _beyond(self, line: Fields, leg: EventLeg, burned: Fraction, planned: Fraction) -> None:
        left = sum(self.contents.values(), NOTHING) + self.burned
        weight = f"{printed(planned * self.plan.density, WEIGHT_PLACES, 'down')} "
        weight += self.basis.weight_unit.value
        if burned > left:
            detail = "more fuel than is on board would be burned by then; correct it"
            line.note("after_burning", "burn-exceeds-fuel", detail)
        elif leg == "taxi":
            detail = f"taxiing burns {weight}; later events count since take-off"
            line.note("after_burning", "event-after-take-off", detail)
        else:
            detail = f"the landing is after {weight}; what happens later belongs to no flight of this load"
            line.note("after_burning", "event-after-landing", detail)
