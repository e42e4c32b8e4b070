"""Published examples, run through the whole assessment. Source, provenance and tolerance stand in the JSON
beside it.

`figures_are` says of each example whether its figures were read, computed or remembered; declared misprints
are compared with the figure the arithmetic gives, and the printed one is named in the file.
"""

import json
from collections.abc import Callable
from dataclasses import replace
from fractions import Fraction
from pathlib import Path
from typing import Any

import pytest

from fleet.conversion import FACTOR, in_unit
from fleet.quantities import Quantity, Unit
from fleet.standard_weights_reading import read_standard_weights
from loads.balance.declared import read_load
from tests.pure.loads.making import load, twin
from tests.pure.loads.standards import document_with, eu_document, passenger, standard
from tests.reference.plain_aircraft import FuelTank, PlainAircraft
from tests.reference.weighings import WEIGHINGS

EXAMPLES: list[dict[str, Any]] = json.loads(
    (Path(__file__).parent / "worked_examples.json").read_text(), parse_float=str
)
BY_ID = {example["id"]: example for example in EXAMPLES}
F = Fraction

RUN: dict[str, Callable[[dict[str, Any], dict[str, Any]], dict[str, Any]]] = dict(WEIGHINGS)


def example(*ids: str):
    """Register what puts an example through the engine and returns the figures the example expects."""

    def keep(runner):
        for name in ids:
            RUN[name] = runner
        return runner

    return keep


def lines_of(items: list[dict[str, Any]]) -> list[tuple[Any, Any, Any]]:
    return [(item["weight"], item["arm"], 0) for item in items]


def figures(result, phase="ramp"):
    state = result.state(phase)
    return {"weight_lb": state.weight, "moment_lb_in": state.moment, "cg_in": state.arm}


@example("PHAK-10-2")
def moment(inputs, _):
    made = PlainAircraft(1, 0, lines=[(inputs["weight_lb"], inputs["arm_in"], 0)])
    return {"moment_lb_in": made.result().lines[2].moment}


@example("PHAK-10-4")
def lever(inputs, _):
    """The lever balances on the datum: what lies left of it has a negative arm."""
    left = [(one["weight_lb"], -one["arm_in"], 0) for one in inputs["left"]]
    right = [(one["weight_lb"], one["arm_in"], 0) for one in inputs["right"]]
    result = PlainAircraft(1, 0, lines=left + right).result()
    assert result.state("ramp").moment == 0
    return {
        "left_moment_lb_in": -PlainAircraft(1, 0, lines=left).result().state("ramp").moment,
        "right_moment_lb_in": PlainAircraft(1, 0, lines=right).result().state("ramp").moment,
    }


@example("PHAK-10-5")
def light_single(inputs, _):
    empty, *others = inputs["items"]
    fuel = next(item for item in others if item["name"].startswith("fuel"))
    low, high = inputs["cg_range_in"]
    most = inputs["max_gross_lb"]
    made = PlainAircraft(
        empty["weight"],
        empty["weight"] * F(empty["arm"]),
        lines=lines_of([item for item in others if item is not fuel]),
        tanks=[FuelTank(inputs["fuel_gal"], [(0, fuel["arm"]), (inputs["fuel_gal"], fuel["arm"])])],
        density=inputs["fuel_lb_per_gal"],
        envelope=((low, 1), (low, most), (high, most), (high, 1)),
        most=most,
    )
    result = made.result()
    assert result.state("ramp").fuel == fuel["weight"]
    return {**figures(result), "within": result.verdict == "within"}


@example("PHAK-10-6")
def index_moments(inputs, _):
    """The graph gives moments, so each line lies at the arm its moment and weight make."""
    empty, *others = inputs["rows"]
    lines = [
        (row["weight_lb"], 1000 * F(row["moment_lb_in_over_1000"]) / row["weight_lb"], 0) for row in others
    ]
    found = figures(
        PlainAircraft(empty["weight_lb"], 1000 * F(empty["moment_lb_in_over_1000"]), lines=lines).result()
    )
    return {**found, "moment_index": found["moment_lb_in"] / 1000}


@example("PHAK-10-7-UNITS")
def gallons(inputs, _):
    """Entered in US gallons in a tank the basis keeps in litres."""
    return {str(gal): in_unit(Quantity(gal, Unit.US_GAL), Unit.L) for gal in inputs["gal"]}


def limits_envelope():
    """The polygon of PHAK-10-9-LIMITS, straight in arm; below 2,475 lb both limits stay as they are there."""
    points = BY_ID["PHAK-10-9-LIMITS"]["inputs"]["cg_limits"]
    first = points[0]
    front = [(first["fwd_in"], 100), *((point["fwd_in"], point["weight_lb"]) for point in points)]
    back = [(first["aft_in"], 100), *((point["aft_in"], point["weight_lb"]) for point in points)]
    return tuple(front + back[::-1])


@example("PHAK-10-9-LIMITS")
def moment_limits(inputs, expected):
    found = {}
    for name in expected:
        side, weight = name.split("@")
        check = (
            PlainAircraft(int(weight), int(weight) * 80, envelope=limits_envelope())
            .result()
            .check("cg.take-off")
        )
        arm = F(check.low if side == "min" else check.limit)
        found[name] = arm * int(weight) / inputs["moment_divisor"]
    return found


@example("PHAK-10-9-SAMPLE")
def moment_sample(inputs, _):
    moment = 100 * inputs["moment_index_over_100"]
    result = PlainAircraft(inputs["weight_lb"], moment, envelope=limits_envelope()).result()
    check = result.check("cg.take-off")
    weight = result.state("take-off").weight
    return {
        "min_index": F(check.low) * weight / 100,
        "max_index": F(check.limit) * weight / 100,
        "within": result.verdict == "within",
        "cg_in": result.state("take-off").arm,
    }


@example("PHAK-10-10")
def recorded_moment(inputs, _):
    empty, *others = inputs["items"]
    lines = [(item["weight_lb"], item["arm_in"], 0) for item in others]
    result = PlainAircraft(empty["weight_lb"], empty["moment_lb_in"], lines=lines).result()
    by_product = PlainAircraft(empty["weight_lb"], F(empty["weight_lb"]) * F(empty["arm_in"]), lines=lines)
    assert abs(by_product.result().state("ramp").arm - 74) > F("0.05")
    return figures(result)


@example("PHAK-SHIFT-1")
def shift(inputs, _):
    weight = inputs["shifted_lb"]
    rest = inputs["total_lb"] - weight
    moment = inputs["moment_lb_in"] - weight * inputs["from_in"]
    before = PlainAircraft(rest, moment, lines=[(weight, inputs["from_in"], 0)]).result().state("ramp")
    after = PlainAircraft(rest, moment, lines=[(weight, inputs["to_in"], 0)]).result().state("ramp")
    return {"moment_change": after.moment - before.moment, "new_moment": after.moment, "new_cg_in": after.arm}


@example("PHAK-ADD")
def addition(inputs, _):
    made = PlainAircraft(
        inputs["total_lb"],
        inputs["total_lb"] * inputs["cg_in"],
        lines=[(inputs["added_lb"], inputs["at_in"], 0)],
    )
    state = made.result().state("ramp")
    return {"new_lb": state.weight, "new_cg_in": state.arm}


@example("PHAK-REMOVE")
def removal(inputs, _):
    moment = inputs["total_lb"] * inputs["cg_in"]
    made = PlainAircraft(inputs["total_lb"], moment, lines=[(-inputs["removed_lb"], inputs["at_in"], 0)])
    state = made.result().state("ramp")
    return {"new_lb": state.weight, "new_cg_in": state.arm}


@example("AC43-10-10", "AC43-10-13")
def extreme_loadings(inputs, _):
    empty, *others = inputs["items"]
    most = inputs["max_weight_lb"]
    forward = inputs.get("fwd_limit_in", -100)
    made = PlainAircraft(
        empty["weight"],
        empty["weight"] * F(empty["arm"]),
        lines=lines_of(others),
        envelope=((forward, 1), (forward, most), (1000, most), (1000, 1)),
        most=most,
    )
    result = made.result()
    return {**figures(result), "within": result.verdict == "within"}


@example("AC43-OIL")
def oil(inputs, _):
    gallons = F(inputs["quarts"], 4)
    made = PlainAircraft(
        1, 0, tanks=[FuelTank(gallons, [(0, 0), (gallons, 0)])], density=inputs["lb_per_gal"]
    )
    return {"lb": made.result().state("ramp").fuel}


@example("WBH-BALLAST")
def ballast(inputs, expected):
    """The ballast the example names is tried: it reaches the limit, and a tenth of a pound less does not."""
    limit = F(inputs["fwd_limit_in"])
    moment = inputs["empty_lb"] * F(inputs["ewcg_in"])

    def with_ballast(weight):
        envelope = ((limit, 1), (limit, 9000), (99, 9000), (99, 1))
        line = (weight, inputs["ballast_station_in"], 0)
        return PlainAircraft(inputs["empty_lb"], moment, lines=[line], envelope=envelope).result()

    named = F(expected["ballast_lb"])
    assert with_ballast(named).verdict == "within"
    assert with_ballast(named - F("0.1")).verdict == "outside"
    return {"ballast_lb": named, "new_cg_in": with_ballast(named).state("ramp").arm}


@example("MAC-2")
def chord(inputs, _):
    length = inputs["temac_in"] - inputs["lemac_in"]
    result = PlainAircraft(1000, 1000 * inputs["cg_in"], chord=(inputs["lemac_in"], length)).result()
    phase = result.as_document()["phases"][0]
    return {"mac_in": length, "percent": F(phase["percent_chord"])}


def bent_tank(inputs, held):
    return FuelTank(held, inputs["arm_against_gallons"])


@example("AH64-TANK")
def bent_arms(inputs, _):
    found = {}
    for held in inputs["quantities_gal"]:
        made = PlainAircraft(1, 0, tanks=[bent_tank(inputs, held)], density=inputs["density_lb_gal"])
        line = next(line for line in made.result().lines if line.group == "fuel")
        found |= {f"arm@{held}": line.arm, f"weight@{held}": line.weight}
        found[f"moment/100@{held}"] = line.moment / 100
    return found


@example("AH64-BURN")
def bent_burn(inputs, _):
    points = BY_ID["AH64-TANK"]["inputs"]
    density = F(inputs["density_lb_gal"])
    burned = (F(inputs["from_gal"]) - F(inputs["to_gal"])) * density
    made = PlainAircraft(1, 0, tanks=[bent_tank(points, inputs["from_gal"])], density=density, trip=burned)
    trip = next(line for line in made.result().lines if line.group == "trip")
    return {"burned_lb": -trip.weight, "burned_moment": -trip.moment, "arm_of_burned_in": trip.arm}


@example("C12-FUEL", "U21-FUEL")
def fuel_weights(inputs, _):
    sizes = {tank["tank"]: tank["gal"] for tank in inputs.get("per_side", ())}
    sizes = sizes or {"nacelle": inputs["nacelle_gal"], "wing": inputs["wing_gal"]}
    tanks = [FuelTank(size, [(0, 0), (size, 0)]) for size in sizes.values() for _ in range(inputs["sides"])]
    result = PlainAircraft(1, 0, tanks=tanks, density=inputs["lb_per_gal"]).result()
    lines = [line for line in result.lines if line.group == "fuel"]
    names = [name for name in sizes for _ in range(inputs["sides"])]
    found = {
        f"{name[:3] if name == 'auxiliary' else name}_lb": line.weight
        for name, line in zip(names, lines, strict=True)
    }
    return {**found, "total_lb": result.state("ramp").fuel, "total_gal": sum(tank.held for tank in tanks)}


@example("NCC-DENSITY")
def densities(inputs, _):
    """Declared in kg/l, kept in lb/US gal."""
    found = {}
    for name, density in inputs["kg_per_l"].items():
        document = load()
        document["fuel"]["density"] = {"value": density, "unit": "kg/l", "source": "GM1 NCC.POL.105(g)"}
        found[f"{name} lb/USgal"] = read_load(document, twin()).fuel.density
    return found


@example("UNITS")
def constants(_inputs, _expected):
    return {
        "kg per lb": FACTOR[Unit.LB] / FACTOR[Unit.KG],
        "mm per in": FACTOR[Unit.IN] / FACTOR[Unit.MM],
        "l per US gal": FACTOR[Unit.US_GAL] / FACTOR[Unit.L],
        "l per imp gal": FACTOR[Unit.IMP_GAL] / FACTOR[Unit.L],
        "kg.mm per lb.in": FACTOR[Unit.LB_IN] / FACTOR[Unit.KG_MM],
        "US gal in cubic inches": FACTOR[Unit.US_GAL] * 100**3 / FACTOR[Unit.IN] ** 3,
    }


def seated(seats: int, passengers: list[dict[str, Any]], **table: Any) -> Fraction:
    """What these passengers weigh in kg in the twin, with so many passenger seats installed."""
    basis = replace(twin(), passenger_seats_installed=seats)
    document = document_with(passengers)
    declared = read_load(document, basis, read_standard_weights(eu_document(**table)))
    return sum(in_kilograms(one.weight) for one in declared.passengers)


def in_kilograms(pounds: Fraction) -> Fraction:
    return pounds * FACTOR[Unit.LB] / FACTOR[Unit.KG]


@example("STD-SMALL")
def standard_masses(inputs, _):
    """The table of the example, entered as a table, and its party seated."""
    rows = []
    for seats, weights in inputs["table"].items():
        first, last = (int(end) for end in seats.split("-"))
        listed = [{"category": name, "value": value, "unit": "kg"} for name, value in weights.items()]
        rows.append({"from_seats": first, "to_seats": last, "weights": listed, "source": {"page": "table 2"}})
    party = [name for name, count in inputs["load"].items() for _ in range(count)]
    places = ("ROW1-L", "ROW1-R", "ROW2-L", "ROW2-R")
    people = [
        standard(f"P{number}", seat, name)
        for number, (seat, name) in enumerate(zip(places, party, strict=True))
    ]
    return {seats: seated(int(seats.split("-")[0]), people, rows=rows) for seats in inputs["table"]}


@example("STD-DECLARED")
def declared_mass(inputs, _):
    additions = [
        {"what": what, "weight": {"value": inputs[name], "unit": "kg"}}
        for what, name in (("clothing", "clothing_kg_min"), ("hand baggage", "hand_baggage_kg_min"))
    ]
    rule = {"below_seats": 10, "additions": additions, "source": {"page": "(e)(a)"}}
    weight = {"value": inputs["declared_kg"], "unit": "kg"}
    declared = [passenger("A", "ROW1-L", how="declared", weight=weight)]
    return {"mass_kg": seated(inputs["seats"], declared, declared=rule)}


def tolerance_of(given: Any, name: str) -> Fraction:
    if isinstance(given, dict):
        return F(given.get(name, given.get("*", 0)))
    return F(given)


def test_every_example_is_run():
    assert RUN.keys() == BY_ID.keys()
    assert len(EXAMPLES) == 33


@pytest.mark.parametrize("name", sorted(RUN))
def test_the_engine_gives_the_published_figures(name):
    case = BY_ID[name]
    found = RUN[name](case["inputs"], case["expected"])

    compared = 0
    for field, wanted in case["expected"].items():
        each = (
            zip(found[field], wanted, strict=True) if isinstance(wanted, list) else [(found[field], wanted)]
        )
        for ours, theirs in each:
            if isinstance(theirs, bool):
                assert ours is theirs, field
            else:
                off = abs(F(ours) - F(theirs))
                assert off <= tolerance_of(case["tolerance"], field), f"{field}: {float(ours)}, not {theirs}"
        compared += 1
    assert compared == len(case["expected"]) > 0
