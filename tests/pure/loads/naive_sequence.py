"""A second way along a flight with a sequence, slow and plain, beside `naive_path`: it shares nothing with
the engine but the frozen values a load is read into.

Who and what is aboard is a list of (line, weight, arm, lateral arm), changed event by event. Between events
many points are sampled, during a transfer too, and every point once more for each setting of gear and flaps.
"""

from fractions import Fraction
from itertools import product

from tests.pure.loads.naive_path import PHASES_OF, Point, drawn_down, holds, margin, tank_moment

F = Fraction


def aboard_at_start(declared, empty):
    """What is aboard without fuel, line by line; the empty aircraft has no line."""
    lines = [("", empty.weight, empty.moment, empty.lateral_moment)]
    fixed = (*declared.configuration.equipment, *declared.configuration.operating_items)
    lines += [("", item.weight, item.weight * item.arm, item.weight * item.lateral_arm) for item in fixed]
    return lines + [_line(one) for one in (*declared.crew, *declared.passengers, *declared.items)]


def _line(one):
    """Somebody or something aboard as (line, weight, moment, lateral moment)."""
    spot = one.seat if hasattr(one, "seat") else one.place
    infant = getattr(one, "lap_infant", None)
    weight = one.weight + (infant.weight if infant and infant.weight else F(0))
    return one.pointer, weight, weight * spot.arm, weight * spot.lateral_arm


def after_event(lines, event):
    """The lines after an event."""
    gone = {one.line: one.weight for one in event.leaving}
    moved = {one.line: one.to for one in event.moving}
    left = []
    for line, weight, moment, across in lines:
        if line and line in gone:
            taken = weight if gone[line] is None else gone[line]
            part = 1 - taken / weight
            if part:
                left.append((line, weight * part, moment * part, across * part))
        elif line and line in moved:
            left.append((line, weight, weight * moved[line].arm, weight * moved[line].lateral_arm))
        else:
            left.append((line, weight, moment, across))
    return left + [_line(one) for one in event.coming]


def points_of_flight(declared, basis, empty, samples):
    """All points of a flight with a sequence: (leg, base Point, ids of parts the sequence has set)."""
    plan = declared.fuel
    contents = {fuel.tank.id: fuel.usable for fuel in plan.tanks}
    lines, shifts = aboard_at_start(declared, empty), {}
    trips = (
        ("taxi", basis.taxi_order, plan.taxi / plan.density),
        ("flight", basis.burn_order, plan.trip / plan.density),
        ("reserve", basis.burn_order, None),
    )
    for leg, stages, planned in trips:
        spare = sum(contents.values(), F(0)) - plan.minimum_at_landing / plan.density
        whole = max(F(0), spare) if planned is None else planned
        burned = F(0)
        for event in (*(one for one in declared.sequence if one.leg == leg), None):
            until = whole if event is None else event.burned
            for number in range(samples + 1):
                at = drawn_down(contents, stages, (until - burned) * number / samples)
                yield _point(leg, plan, at, lines, shifts)
            contents, burned = drawn_down(contents, stages, until - burned), until
            if event is None:
                continue
            if event.transfer is not None:
                for number in range(samples + 1):
                    part = event.transfer.volume * number / samples
                    yield _point(leg, plan, poured(contents, event.transfer, part), lines, shifts)
                contents = poured(contents, event.transfer, event.transfer.volume)
            lines = after_event(lines, event)
            shifts = shifts | {part.id: state.moment_change for part, state in event.positions}
            yield _point(leg, plan, contents, lines, shifts)


def sampled_flight(declared, basis, empty, axis, samples):
    """All samples of one axis, as `naive_path.sampled` gives them, in every setting that may hold."""
    stated = {part.id for event in declared.sequence for part, _ in event.positions}
    free = [part for part in basis.positions if part.id not in stated]
    points = list(points_of_flight(declared, basis, empty, samples))
    runs = []
    for envelope in basis.envelopes:
        if envelope.axis != axis:
            continue
        for leg, phases in PHASES_OF.items():
            if not set(phases) & set(envelope.phases):
                continue
            for shift in _shifts(free, "ground" if leg == "taxi" else "flight"):
                run = []
                for point in points:
                    moment = point.moment if axis == "longitudinal" else point.lateral_moment
                    if point.leg == leg and moment is not None:
                        moment += shift if axis == "longitudinal" else 0
                        inside = holds(point, moment, envelope.points, envelope.plane)
                        run.append((inside, margin(point.weight, moment, envelope.points, envelope.plane)))
                runs.append(run)
    return runs


def _shifts(parts, where):
    changes = [
        [state.moment_change for state in part.states if where in state.holds or state.id == part.as_weighed]
        for part in parts
    ]
    return {sum(each, F(0)) for each in product(*changes)}


def poured(contents, transfer, volume):
    return {
        tank: held - volume * (tank == transfer.source) + volume * (tank == transfer.target)
        for tank, held in contents.items()
    }


def _point(leg, plan, contents, lines, shifts):
    weight = sum((line[1] for line in lines), F(0))
    moment = sum((line[2] for line in lines), F(0)) + sum(shifts.values(), F(0))
    across = sum((line[3] for line in lines), F(0))
    for fuel in plan.tanks:
        volume = contents[fuel.tank.id] + fuel.trapped
        weight += volume * plan.density
        across += volume * plan.density * fuel.tank.lateral_arm
        of_tank = tank_moment(fuel.tank.table, volume, plan.density)
        moment = None if moment is None or of_tank is None else moment + of_tank
    return Point(leg, weight, moment, across)
