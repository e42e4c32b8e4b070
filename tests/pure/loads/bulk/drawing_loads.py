"""Drawn bases and loads for the bulk sums: every kind of tank, order of burn and envelope they know."""

import random
from dataclasses import replace
from fractions import Fraction
from typing import Any

from fleet.basis import Basis, BurnStage, Configuration, Envelope, Tank, TankTable, Zone
from fleet.weighing import EmptyFigures
from tests.pure.loads.making import SOURCE, envelope, limit, limits, load, place, seat, twin

F = Fraction


def drawn_basis(draw: random.Random) -> Basis:
    """A basis with drawn spots, tanks, stages, envelopes and limits."""
    seats = tuple(
        seat(
            f"S{number}",
            draw.randint(80, 180),
            draw.randint(-20, 20),
            most=draw.choice([180, 250, 300, None]),
        )
        for number in range(draw.randint(2, 6))
    )
    places = tuple(
        place(f"P{number}", draw.randint(20, 220), draw.choice([60, 100, 250, None]), draw.randint(-9, 9))
        for number in range(draw.randint(1, 3))
    )
    tanks = tuple(_tank(draw, number) for number in range(draw.randint(1, 4)))
    names = [tank.id for tank in tanks]
    draw.shuffle(names)
    weights = limits(
        ramp=draw.choice([5600, 6100, None]),
        take_off=draw.choice([5500, 6000]),
        zero_fuel=draw.choice([5200, None]),
        landing=draw.choice([5400, 5900]),
        minimum_flying=draw.choice([3900, None]),
    )
    zone = Zone("Z", "zone", (seats[0].id, places[0].id), limit(draw.choice([250, 400, None])))
    one = Configuration(
        "one", "one", tuple(s.id for s in seats), tuple(p.id for p in places), 1, "wheels", (), (), weights
    )
    lateral = draw.random() < 0.4
    envelopes = [_envelope(draw, "longitudinal", ("ramp", "take-off", "landing", "zero fuel"))]
    if draw.random() < 0.3:
        envelopes = [
            _envelope(draw, "longitudinal", ("take-off",)),
            _envelope(draw, "longitudinal", draw.choice([("landing",), ("landing", "ramp")])),
        ]
    if lateral:
        envelopes.append(_envelope(draw, "lateral", ("take-off", "landing", "minimum at landing")))
    return replace(
        twin(),
        seats=seats,
        places=places,
        zones=(zone,),
        tanks=tanks,
        burn_order=_stages(draw, names),
        taxi_order=_stages(draw, names),
        limits=weights,
        envelopes=tuple(envelopes),
        configurations=(one,),
    )


def _stages(draw: random.Random, names: list[str]) -> tuple[BurnStage, ...]:
    """Some of the tanks, in drawn groups; the last one may feed nothing."""
    left = names[: max(1, len(names) - draw.randint(0, 1))]
    found = []
    while left:
        count = draw.randint(1, len(left))
        found.append(BurnStage(tuple(left[:count])))
        left = left[count:]
    return tuple(found)


def _tank(draw: random.Random, number: int) -> Tank:
    kind, arm = draw.choice(["steady", "bent", "moment"]), F(draw.randint(100, 150))
    if kind == "steady":
        table = TankTable("volume", "arm", "arm", None, ((F(0), arm), (F(60), arm)))
    elif kind == "bent":
        points = ((F(0), arm), (F(25), arm + draw.randint(-5, 5)), (F(60), arm + draw.randint(-9, 9)))
        table = TankTable("volume", "arm", "arm", None, points)
    else:
        points = ((F(0), F(0)), (F(25), 150 * arm), (F(60), 360 * (arm + draw.randint(-6, 6))))
        table = TankTable("volume", "moment", "moment", F(6), points)
    return Tank(f"T{number}", f"tank {number}", F(60), F(draw.choice([-70, 0, 70])), table, SOURCE)


def _envelope(draw: random.Random, axis: str, phases: tuple[Any, ...]) -> Envelope:
    """An envelope with one piece at every weight: sloping, notched, straight in either plane."""
    heights = sorted(draw.sample(range(3400, 6300), draw.randint(1, 3)))
    levels = [3000, *heights, 6400]
    middle, half = (F(121), 9) if axis == "longitudinal" else (F(0), 3)
    low = [(middle - half + F(draw.randint(-30, 30), 10), level) for level in levels]
    high = [(middle + half + F(draw.randint(-30, 30), 10), level) for level in levels]
    plane = draw.choice(["arm", "moment"])
    if plane == "moment":
        low, high = ([(arm * level, level) for arm, level in side] for side in (low, high))
    return envelope(*low, *reversed(high), plane=plane, axis=axis, phases=phases)


def drawn_empty(draw: random.Random) -> EmptyFigures:
    weight = F(draw.randint(38000, 45000), 10)
    moment = weight * F(draw.randint(1130, 1290), 10)
    return EmptyFigures(weight, moment, F(draw.randint(-9000, 9000)), "nose cone", "wheels", "weighing")


def drawn_load(draw: random.Random, basis: Basis) -> dict[str, Any]:
    """A load as the reader of documents has let it through; it may be outside in any way."""
    seats = list(basis.seats)
    draw.shuffle(seats)
    people = [
        {
            "name": f"N. {number}",
            "position": "pilot in command" if number == 0 else "pilot",
            "seat": one.id,
            "weight": _weight(draw, 60, 300),
            "how": "weighed",
        }
        for number, one in enumerate(seats[: draw.randint(1, len(seats))])
    ]
    passengers = [{name: value for name, value in line.items() if name != "position"} for line in people[1:]]
    items = [
        {
            "kind": "cargo",
            "what": "box",
            "place": draw.choice(basis.places).id,
            "weight": _weight(draw, 1, 120),
            "how": draw.choice(["weighed", "estimated"]),
        }
        for _ in range(draw.randint(0, 4))
    ]
    return load(
        configuration="one",
        persons_on_board=1 + len(passengers),
        crew=people[:1],
        passengers=passengers,
        items=items,
        fuel=_fuel(draw, basis),
        limits=[{"at": "take-off", "weight": {"value": "5900", "unit": "lb"}, "source": "sheet"}]
        if draw.random() < 0.3
        else [],
    )


def _weight(draw: random.Random, low: int, high: int) -> dict[str, str]:
    if draw.random() < 0.3:
        return {"value": f"{draw.randint(low * 5, high * 4) / 10:.1f}", "unit": "kg"}
    return {"value": str(draw.randint(low, high)), "unit": "lb"}


def _fuel(draw: random.Random, basis: Basis) -> dict[str, Any]:
    full = draw.random() < 0.3
    return {
        "density": {"value": draw.choice(["6", "6.7", "5.95"]), "unit": "lb/US gal", "source": "note"},
        "at_engine_start": {
            tank.id: {"value": "60" if full else str(draw.randint(0, 60)), "unit": "US gal"}
            for tank in basis.tanks
        },
        "taxi": {"value": str(draw.choice([0, 6, 20])), "unit": "lb"},
        "trip": {"value": str(draw.randint(10, 60 + 90 * len(basis.tanks))), "unit": "lb"},
        "minimum_at_landing": {"value": str(draw.randint(10, 80)), "unit": draw.choice(["lb", "l"])},
    }
