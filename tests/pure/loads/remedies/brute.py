"""The same questions answered by trying everything, each try by the whole assessment: a second implementation
that knows nothing of programs, spans or intervals. For small cabins only.
"""

import random
from collections.abc import Iterator, Sequence
from dataclasses import replace
from fractions import Fraction
from itertools import combinations, permutations, product
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fleet.basis import Basis, Envelope, Place, Seat, Zone
from fleet.sourced import Limit
from fleet.weighing import EmptyFigures
from loads.balance.aboard import Declared, Item
from loads.balance.assess import assess
from loads.balance.checks_places import held_by
from loads.balance.declared import read_load
from loads.balance.remedies.question import TENTH, Question
from tests.pure.loads.making import SOURCE, F, limit, seat
from tests.pure.loads.remedies.cabins import cabin, empty_of, seated

Floats = NDArray[Any]
ARMS = ("arm", "lateral_arm")
SLACK = 1e-6
ROOMY = {"ramp": 1200, "take_off": 1190, "zero_fuel": 1180, "landing": 1185, "minimum_flying": 300}


def small(number: int) -> tuple[dict[str, Any], Basis, EmptyFigures]:
    """A drawn load of a drawn small cabin: up to five seats and three holds, items small enough to try every
    tenth of them; envelopes that slope, with a notch or without, in either plane.
    """
    drawn = random.Random(number)
    count = drawn.randint(3, 5)
    seats = [seat("COCKPIT-L", 20, -5, "crew")]
    for place in range(1, count):
        arm, across = drawn.randint(22, 60), drawn.choice((-6, 0, 6))
        most = drawn.choice((300, 300, 300, 170))
        seats.append(seat(f"S{place}", arm, across, drawn.choice(("passenger", "either")), most))
    holds = [("H1", drawn.randint(2, 10), drawn.choice((8, 12, None)))]
    holds += [("H2", drawn.randint(60, 90), drawn.choice((8, 12, None))), ("H3", drawn.randint(30, 50), 10)]
    holds = holds[: drawn.randint(2, 3)]
    middle = F(drawn.randint(300, 400), 10)
    edges = _edges(drawn, middle)
    plane = "arm"
    if drawn.random() < 0.4:
        plane, edges = "moment", [(F(x) * F(y), y) for x, y in edges]
    lateral = [(-2, 300), (-2, 1300), (2, 1300), (2, 300)] if drawn.random() < 0.4 else []
    zones = [Zone("Z", "rear", (seats[-1].id, holds[-1][0]), limit(drawn.randint(150, 190)))]
    basis = cabin(
        seats,
        holds=holds,
        tanks=(("LEFT", 36, 20, -30), ("RIGHT", 34, 20, 30)),
        edges=edges,
        weights=ROOMY,
        zones=zones if drawn.random() < 0.5 else (),
        lateral=lateral,
        plane=plane,
    )
    people = {each.id: F(drawn.randint(1000, 1900), 10) for each in seats[1:] if drawn.random() < 0.75}
    bags = {each[0]: F(drawn.randint(4, 30), 10) for each in holds if drawn.random() < 0.8}
    document = seated(people, bags, gallons=drawn.choice((4, 8)), crew={"COCKPIT-L": 170}, trip=12, minimum=8)
    document["fuel"]["taxi"] = {"value": 2, "unit": "lb"}
    return _nudged(drawn, document, basis, middle)


def _nudged(
    drawn: random.Random, document: dict[str, Any], basis: Basis, middle: Fraction
) -> tuple[dict[str, Any], Basis, EmptyFigures]:
    """The load a little beyond a limit: its empty moment, or the limit of its weight, is set to that."""
    empty = empty_of(400, middle)
    declared = read_load(document, basis)

    def stops(moment: Fraction) -> bool:
        there = replace(empty, moment=empty.moment + moment)
        checks = assess(declared, basis, there, advised=False).checks
        return any(each.outcome == "fail" and each.code.startswith(("cg", "path")) for each in checks)

    way = drawn.choice((-1, 1))
    inside, outside = 0, 6000
    start = next((F(tried) for tried in range(-4000, 4001, 250) if not stops(F(tried))), None)
    if start is None:
        return document, basis, empty
    while outside - inside > 1:
        between = (inside + outside) // 2
        inside, outside = (inside, between) if stops(start + way * between) else (between, outside)
    beyond = drawn.choice((-1, 1, 1, 1)) * drawn.randint(1, drawn.choice((60, 300, 3000)))
    empty = replace(empty, moment=empty.moment + start + way * (inside + beyond))
    if drawn.random() < 0.4:
        take_off = assess(declared, basis, empty, advised=False).state("take-off").weight
        most = Limit(take_off - F(drawn.randint(1, 35), 10), SOURCE)
        weights = replace(basis.limits, take_off=most)
        basis = replace(
            basis,
            limits=weights,
            configurations=tuple(replace(one, limits=weights) for one in basis.configurations),
        )
    return document, basis, empty


def _edges(drawn: random.Random, middle: Fraction) -> list[tuple[Any, Any]]:
    wide = F(drawn.randint(10, 30), 10)
    forward, aft = middle - wide, middle + wide
    kind = drawn.choice(("box", "slope", "slope", "notch"))
    if kind == "box":
        return [(forward, 300), (forward, 1300), (aft, 1300), (aft, 300)]
    if kind == "slope":
        return [(forward, 300), (forward, 700), (forward + wide, 1300), (aft, 1300), (aft, 300)]
    notch = drawn.randint(760, 880)
    return [
        (forward, 300),
        (forward, 1300),
        (aft, 1300),
        (aft, notch + 30),
        (middle + wide / 3, notch),
        (aft, notch - 40),
        (aft, 300),
    ]


def holds_with(question: Question, declared: Declared) -> bool:
    """Whether a changed load is within, by the whole assessment."""
    return question.judge(declared).verdict == "within"


def fewest_moved(question: Question) -> tuple[int, Fraction] | None:
    """The least (people moved, weight moved) of all ways to sit that hold."""
    people = question.declared.passengers
    crew = {one.seat.id for one in question.declared.crew}
    seats: list[Seat] = [
        each for each in question.ready.basis.seats if each.serves != "crew" and each.id not in crew
    ]
    best: tuple[int, Fraction] | None = None
    for chosen in permutations(seats, len(people)):
        moved = [
            one.weight or F(0) for one, there in zip(people, chosen, strict=True) if one.seat.id != there.id
        ]
        cost = len(moved), sum(moved, F(0))
        if best is not None and cost >= best:
            continue
        changed = tuple(replace(one, seat=there) for one, there in zip(people, chosen, strict=True))
        if holds_with(question, replace(question.declared, passengers=changed)):
            best = cost
    return best


def least_off(question: Question) -> Fraction | None:
    """The least weight of items that has to stay behind, in whole tenths."""
    items = question.declared.items
    tenths = [int((item.weight or F(0)) / TENTH) for item in items]
    for total in range(1, sum(tenths) + 1):
        ways = np.array(list(_sums(tenths, total)))
        for off in ways[_may_hold(question, [item.place for item in items], -ways)]:
            left = tuple(
                replace(item, weight=item.weight - int(each) * TENTH)
                for item, each in zip(items, off, strict=True)
                if item.weight is not None and item.weight > int(each) * TENTH
            )
            if holds_with(question, replace(question.declared, items=left)):
                return total * TENTH
    return None


def least_on(question: Question, most: int) -> Fraction | None:
    """The least ballast up to `most` tenths, in whole tenths, that holds in the places there are."""
    places = list(question.ready.basis.places)
    for total in range(1, most + 1):
        ways = np.array(list(_sums([total] * len(places), total)))
        for on in ways[_may_hold(question, places, ways)]:
            lines = tuple(
                Item("ballast", "b", place, int(each) * TENTH, "weighed", removed=False, pointer="")
                for place, each in zip(places, on, strict=True)
                if each
            )
            declared = question.declared
            if holds_with(question, replace(declared, items=(*declared.items, *lines))):
                return total * TENTH
    return None


def fewest_items(question: Question) -> tuple[int, Fraction] | None:
    """The least (lines moved, weight moved); each line that moves goes to one place, in whole tenths."""
    places = list(question.ready.basis.places)
    items = question.declared.items
    for count in range(1, len(items) + 1):
        best: Fraction | None = None
        for chosen in combinations(range(len(items)), count):
            others = [[each for each in places if each.id != items[one].place.id] for one in chosen]
            tops = [range(1, int((items[one].weight or F(0)) / TENTH) + 1) for one in chosen]
            for ends in product(*others):
                amounts = np.array(list(product(*tops)))
                amounts = amounts[np.argsort(amounts.sum(axis=1), kind="stable")]
                where = [*ends, *(items[one].place for one in chosen)]
                likely = amounts[_may_hold(question, where, np.hstack((amounts, -amounts)))]
                for each in likely:
                    cost = int(each.sum()) * TENTH
                    if best is not None and cost >= best:
                        break
                    moved = dict(zip(chosen, zip(ends, map(int, each), strict=True), strict=True))
                    lines = tuple(_moved(items, moved))
                    if holds_with(question, replace(question.declared, items=lines)):
                        best = cost
        if best is not None:
            return count, best
    return None


def _may_hold(question: Question, places: Sequence[Place], tenths: Floats) -> Floats:
    """Which rows of changes (tenths by place) may hold: in floats, a little wider than every limit, at the
    phases and at points along the burn. Whatever this lets through is then assessed in full.
    """
    result, basis = question.result, question.ready.basis
    changes = tenths / 10
    more = changes.sum(axis=1)
    along, across = (changes @ np.array([float(getattr(p, arm)) for p in places]) for arm in ARMS)
    good = np.ones(len(changes), dtype=bool)
    low, high = question.weight_range()
    good &= (more >= float(low or -1e9) - SLACK) & (more <= (1e9 if high is None else float(high)) + SLACK)
    held = held_by(question.declared)
    heavy_seats = [
        each
        for each in basis.seats
        if each.maximum and (held.get(each.id) or F(0)) > (each.maximum.value or 0)
    ]
    good &= not heavy_seats
    for maximum, members in [
        *((place.maximum, (place.id,)) for place in basis.places),
        *((zone.maximum, zone.members) for zone in basis.zones),
    ]:
        if maximum is not None and maximum.value is not None:
            room = float(maximum.value - sum((held.get(one) or F(0) for one in members), F(0)))
            good &= changes @ np.array([float(p.id in members) for p in places]) <= room + SLACK
    knots = [(one.weight, one.moment, one.lateral_moment) for one in result.states]
    for stretch in result.burn.path.stretches if result.burn else ():
        for share in range(1, 8):
            knot = stretch.at(stretch.start.weight + (stretch.end.weight - stretch.start.weight) * share / 8)
            knots.append((knot.weight, knot.moment, knot.lateral_moment))
    for weight, moment, lateral in knots:
        heavy = float(weight) + more
        for envelope in basis.envelopes:
            moments = float(moment) + along if envelope.axis == "longitudinal" else float(lateral) + across
            good &= _in_polygon(moments if envelope.plane == "moment" else moments / heavy, heavy, envelope)
    return good


def _in_polygon(x: Floats, y: Floats, envelope: Envelope) -> Floats:
    """Even and odd crossings, and whatever is within a hair of an edge."""
    corners = [(float(a), float(b)) for a, b in envelope.points]
    inside, near = np.zeros(len(x), dtype=bool), np.zeros(len(x), dtype=bool)
    for (x1, y1), (x2, y2) in zip(corners, [*corners[1:], corners[0]], strict=True):
        if y1 != y2:
            inside ^= ((y1 > y) != (y2 > y)) & (x < x1 + (y - y1) * (x2 - x1) / (y2 - y1))
        length = ((x2 - x1) ** 2 + (y2 - y1) ** 2) ** 0.5
        near |= np.abs((x - x1) * (y2 - y1) - (y - y1) * (x2 - x1)) <= SLACK * length
    return inside | near


def _moved(items: Sequence[Item], moved: dict[int, tuple[Place, int]]) -> Iterator[Item]:
    for number, item in enumerate(items):
        if number not in moved or item.weight is None:
            yield item
            continue
        end, amount = moved[number]
        left = item.weight - amount * TENTH
        if left:
            yield replace(item, weight=left)
        yield replace(item, place=end, weight=amount * TENTH)


def _sums(tops: list[int], total: int) -> Iterator[tuple[int, ...]]:
    """Every way to write a total as a sum, each part up to its own top."""
    if not tops:
        if not total:
            yield ()
        return
    for first in range(min(tops[0], total), -1, -1):
        for rest in _sums(tops[1:], total - first):
            yield (first, *rest)


def least_fuel_out(question: Question) -> Fraction | None:
    """The least volume that may be left out of both tanks alike, or of one, in tenths of a tank."""
    plan = question.declared.fuel
    best: Fraction | None = None
    for names in (("LEFT", "RIGHT"), ("LEFT",), ("RIGHT",)):
        full = min(held.usable for held in plan.tanks if held.tank.id in names)
        for tenths in range(1, int(full / TENTH) + 1):
            out = tenths * TENTH * len(names)
            if best is not None and out >= best:
                break
            tanks = tuple(
                replace(held, usable=held.usable - tenths * TENTH) if held.tank.id in names else held
                for held in plan.tanks
            )
            if holds_with(question, replace(question.declared, fuel=replace(plan, tanks=tanks))):
                best = out
    return best
