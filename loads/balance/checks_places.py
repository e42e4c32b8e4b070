"""Checks of what one seat, place, zone or tank holds. A limit of an empty seat, place or zone has nothing to
test.
"""

from collections.abc import Sequence
from fractions import Fraction

from fleet.basis import Place, Seat, Zone
from fleet.stations import Condition, maximum_under
from loads.balance.aboard import Declared
from loads.balance.exact import added
from loads.balance.margins import Figure, Fix, at_most, below, not_entered
from loads.balance.prepared import Prepared
from loads.balance.result import Check
from loads.balance.rounding import VOLUME_PLACES, WEIGHT_PLACES, printed

Conditions = Sequence[Condition]
Held = dict[str, Fraction | None]  # weight by seat or place id; None: not known


def held_by(declared: Declared) -> Held:
    """Return the weight in each seat and place that holds something.

    Equipment that was taken out counts in no place: it was never part of what the place may carry.
    """
    known: dict[str, list[Fraction]] = {}
    unknown: set[str] = set()
    for person in (*declared.crew, *declared.passengers):
        infant = person.lap_infant
        seat = person.seat.id
        _put(seat, person.weight, known, unknown)
        if infant is not None and infant.weight is not None:
            known[seat].append(infant.weight)
        if person.restraint is not None:
            known[seat].append(person.restraint)
    for item in declared.items:
        if not item.removed:
            _put(item.place.id, item.weight, known, unknown)
    return {where: None if where in unknown else added(weights) for where, weights in known.items()}


def place_checks(held: Held, ready: Prepared, conditions: Conditions = ()) -> list[Check]:
    """Return the checks of every seat, place and zone that holds something.

    `conditions` are those declared to hold: where one makes another maximum count, the check says so.
    """
    found = []
    for kind, spots in (("seat", ready.basis.seats), ("place", ready.basis.places)):
        for spot in spots:
            if spot.id in held:
                weight = held[spot.id]
                code = f"{kind}.{spot.id}"
                found.append(_spot(code, spot, weight, conditions, ready))
    for zone in ready.basis.zones:
        parts = [held[member] for member in zone.members if member in held]
        if parts:
            known = [part for part in parts if part is not None]
            weight = added(known) if len(known) == len(parts) else None
            found.append(_spot(f"zone.{zone.id}", zone, weight, conditions, ready))
    return found


def tank_checks(declared: Declared, ready: Prepared) -> list[Check]:
    """Return the check of each tank: usable and trapped fuel against its usable capacity."""
    found = []
    for fuel in declared.fuel.tanks:
        tank = fuel.tank
        volume = fuel.usable + fuel.trapped if fuel.trapped else fuel.usable
        figure = Figure(f"tank.{tank.id}", tank.name, volume, ready.volume, VOLUME_PLACES, "ramp")
        found.append(below(figure, tank.capacity, str(tank.source), _drain(ready.volume)))
    return found


def _drain(unit: str) -> Fix:
    return lambda over: f"Take out at least {printed(over, VOLUME_PLACES, 'up')} {unit}."


def _put(where: str, weight: Fraction | None, known: dict[str, list[Fraction]], unknown: set[str]) -> None:
    here = known.setdefault(where, [])
    if weight is None:
        unknown.add(where)
    else:
        here.append(weight)


def _spot(
    code: str, spot: Seat | Place | Zone, weight: Fraction | None, conditions: Conditions, ready: Prepared
) -> Check:
    unit, name, maximum = ready.weight, spot.name, spot.maximum
    if spot.conditional and conditions:
        maximum, when = maximum_under(
            maximum, spot.conditional, frozenset(condition.id for condition in conditions)
        )
        name = ", ".join((name, *(condition.name for condition in conditions if condition.id in when)))
    if weight is not None:

        def fix(over: Fraction) -> str:
            return f"Move or take off at least {printed(over, WEIGHT_PLACES, 'up')} {unit} from {spot.name}."

        return at_most(Figure(code, name, weight, unit, WEIGHT_PLACES), maximum, fix)
    if maximum is None:
        return not_entered(code, name, None, unit, None)
    source = str(maximum.source)
    if maximum.value is None:
        return Check(code, name, "pass", unit=unit, margin_text="no limit", source=source)
    return Check(
        code,
        name,
        "unresolved",
        unit=unit,
        margin_text="a weight here is not known",
        source=source,
        what_next=f"Enter the weight of what is in {spot.name}.",
    )
