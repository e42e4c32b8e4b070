"""The loading computation, line by line, so that a person can do it again by hand. Moments are added, never
arms.
"""

from collections.abc import Mapping, Sequence
from fractions import Fraction
from typing import NamedTuple

from fleet.basis import FixedItem, Phase
from fleet.weighing import EmptyFigures
from loads.balance.aboard import Declared, FuelPlan, Item, Person
from loads.balance.exact import added, minus, plus, quotient, times
from loads.balance.footing import Rigging
from loads.balance.fuel import FuelState
from loads.balance.prepared import Prepared
from loads.balance.presented import presented
from loads.balance.result import Json, Line, State
from loads.balance.rounding import VOLUME_PLACES, WEIGHT_PLACES, printed
from loads.balance.sums import Sums, operating_sums, with_payload

FROM_RECORD = "from the record"


class Aboard(NamedTuple):
    """The lines of everything but fuel, and their sums; a sum of None is not known."""

    operating: tuple[Line, ...]
    payload: tuple[Line, ...]
    operating_weight: Sums | None
    without_fuel: Sums | None


def lines_without_fuel(declared: Declared, empty: EmptyFigures | None) -> Aboard:
    """Return the lines of the empty aircraft, its fit, the people and the items, with their sums."""
    operating = [_empty(empty)]
    operating += [_fixed("equipment", item) for item in declared.configuration.equipment]
    operating += [_fixed("operating items", item) for item in declared.configuration.operating_items]
    for person in declared.crew:
        operating += people_lines("crew", person)
    payload: list[Line] = []
    for person in declared.passengers:
        payload += people_lines("passengers", person)
    for item in declared.items:
        payload += item_lines("items", item)
    operating_weight = operating_sums(declared, empty)
    return Aboard(
        tuple(operating), tuple(payload), operating_weight, with_payload(operating_weight, declared)
    )


def all_lines(
    aboard: Aboard,
    plan: FuelPlan,
    fuel: Mapping[Phase, FuelState] | None,
    states: Mapping[Phase, State],
    ready: Prepared,
    *,
    flight: Sequence[Line] = (),
) -> tuple[Line, ...]:
    """Return every line in order: operating weight, zero fuel, ramp, take-off and landing are totals.

    `flight` are the lines after the ramp of a load with a sequence.
    """
    lines = [*aboard.operating, _operating_total(aboard.operating_weight), *aboard.payload]
    if fuel is None:
        return tuple(lines)
    zero, ramp, take_off, landing = (fuel[phase] for phase in ("zero fuel", "ramp", "take-off", "landing"))
    for held in plan.tanks:
        tank = held.tank
        stays = plus(zero.usable[tank.id], held.trapped)
        if stays:
            what = f"{tank.name}, {_volume(stays, ready)} that cannot be used"
            weight = times(stays, plan.density)
            moment = ready.fuel_moment(tank.id, stays, plan.density)
            lines.append(_plain("fuel not usable", what, weight, moment, tank.lateral_arm))
    lines.append(total_line("zero fuel", states))
    for held in plan.tanks:
        tank = held.tank
        full, stays = (plus(at.usable[tank.id], held.trapped) for at in (ramp, zero))
        burnable = minus(full, stays)
        if burnable:
            what = f"{tank.name}, {_volume(burnable, ready)}"
            weight = times(burnable, plan.density)
            before, after = (ready.fuel_moment(tank.id, each, plan.density) for each in (full, stays))
            moment = minus(before, after)
            lines.append(_plain("fuel", what, weight, moment, tank.lateral_arm))
    if flight:
        return (*lines, total_line("ramp", states), *flight)
    lines += [total_line("ramp", states), _burned("taxi", "taxi fuel", ramp, take_off)]
    lines += [total_line("take-off", states), _burned("trip", "trip fuel", take_off, landing)]
    lines.append(total_line("landing", states))
    return tuple(lines)


def as_rows(lines: tuple[Line, ...], ready: Prepared) -> list[Json]:
    """Return the lines as they stand in the result document, numbered from 1."""
    arms, moments = ready.length_places, ready.moment_places
    shown = ready.basis.presentation is not None
    rows: list[Json] = []
    for number, line in enumerate(lines, 1):
        group, what, how, weight, arm, moment, across, total, pointer = line
        row: Json = {
            "line": number,
            "group": group,
            "what": what,
            "how": how,
            "weight": None if weight is None else printed(weight, WEIGHT_PLACES),
            "arm": None if arm is None else printed(arm, arms),
            "moment": None if moment is None else printed(moment, moments),
            "lateral_moment": None if across is None else printed(across, moments),
            "total": total,
            "pointer": pointer,
        }
        if shown:
            row |= presented(weight, moment, ready, total=total or group == "empty weight")
        rows.append(row)
    return rows


def _empty(empty: EmptyFigures | None) -> Line:
    if empty is None:
        return Line("empty weight", "empty weight, none in force", None, None, None, None, None)
    # The recorded moment stands, whatever arm was printed beside it.
    arm = quotient(empty.moment, empty.weight)
    what = f"empty weight ({empty.how})"
    if empty.restated is not None:
        what += f", restated from '{empty.restated.datum}'"
    return Line("empty weight", what, FROM_RECORD, empty.weight, arm, empty.moment, empty.lateral_moment)


def _fixed(group: str, item: FixedItem) -> Line:
    return _placed(Line(group, item.what, FROM_RECORD, item.weight, item.arm, None, None), item.lateral_arm)


def people_lines(group: str, person: Person) -> list[Line]:
    """Return the lines of somebody in a seat: the person, an infant on the lap, a restraint."""
    seat = person.seat
    what = f"{seat.name}, {person.position or person.category or 'passenger'}"
    weight = person.weight
    if weight is not None and person.added is not None:
        weight -= person.added
    line = Line(group, what, person.how, weight, seat.arm, None, None, False, person.pointer)
    lines = [_placed(line, seat.lateral_arm)]
    if person.added is not None:
        what = f"{seat.name}, added to the declared weight"
        line = Line(group, what, "standard", person.added, seat.arm, None, None, False, None)
        lines.append(_placed(line, seat.lateral_arm))
    infant = person.lap_infant
    if infant is not None and infant.weight is not None:
        what = f"{seat.name}, lap infant"
        line = Line(group, what, infant.how, infant.weight, seat.arm, None, None, False, infant.pointer)
        lines.append(_placed(line, seat.lateral_arm))
    if person.restraint is not None:
        what, pointer = f"{seat.name}, restraint", f"{person.pointer}/restraint"
        line = Line(group, what, "declared", person.restraint, seat.arm, None, None, False, pointer)
        lines.append(_placed(line, seat.lateral_arm))
    return lines


def item_lines(group: str, item: Item) -> list[Line]:
    """Return the line of an item, and after it those of the pallet, net or spreader that go with it."""
    place, weight = item.place, item.weight
    rigged = [_rigging(group, item, part) for part in item.rigging] if item.rigging else []
    if weight is not None and rigged:
        weight -= added(part.weight for part in item.rigging)
    # What it is called is typed freely and may name somebody: it is joined where it is shown, by its pointer.
    what = f"{place.name}, {item.kind}{', removed' if item.removed else ''}"
    if item.jettisonable:
        what = f"{what}, jettisonable"
    along = across = None
    if weight is not None:
        along, lateral_arm = times(weight, place.arm), place.lateral_arm
        across = times(weight, lateral_arm) if lateral_arm.numerator else lateral_arm
    line = Line(group, what, item.how, weight, place.arm, along, across, False, item.pointer)
    return [line, *rigged] if rigged else [line]


def _rigging(group: str, item: Item, part: Rigging) -> Line:
    place, what = item.place, f"{item.place.name}, {part.part} of {item.kind}"
    line = Line(group, what, "declared", part.weight, place.arm, None, None, False, part.pointer)
    return _placed(line, place.lateral_arm)


def _placed(line: Line, lateral_arm: Fraction) -> Line:
    """Return the line with its moments; a weight that is not known has none."""
    group, what, how, weight, arm, _, _, total, pointer = line
    if weight is None or arm is None:
        return line
    lateral = times(weight, lateral_arm) if lateral_arm else lateral_arm
    return Line(group, what, how, weight, arm, times(weight, arm), lateral, total, pointer)


def _plain(group: str, what: str, weight: Fraction, moment: Fraction, lateral_arm: Fraction) -> Line:
    return Line(group, what, "declared", weight, quotient(moment, weight), moment, times(weight, lateral_arm))


def _burned(group: str, what: str, before: FuelState, after: FuelState) -> Line:
    weight = minus(after.weight, before.weight)
    moment = minus(after.moment, before.moment)
    arm = quotient(moment, weight) if weight else None
    across = minus(after.lateral_moment, before.lateral_moment)
    return Line(group, what, "declared", weight, arm, moment, across)


def _operating_total(sums: Sums | None) -> Line:
    name = "operating weight"
    if sums is None:
        return Line(name, name, None, None, None, None, None, True)
    arm = sums.moment / sums.weight if sums.weight > 0 else None
    return Line(name, name, None, sums.weight, arm, sums.moment, sums.lateral_moment, True)


def total_line(phase: Phase, states: Mapping[Phase, State]) -> Line:
    """Return the total at a phase; without an empty weight, or with an unknown line, it is not known."""
    state = states.get(phase)
    if state is None:
        return Line(phase, phase, None, None, None, None, None, True)
    return Line(phase, phase, None, state.weight, state.arm, state.moment, state.lateral_moment, True)


def _volume(volume: Fraction, ready: Prepared) -> str:
    return f"{printed(volume, VOLUME_PLACES)} {ready.volume}"
