"""Every unit is stated, every combination is taken, every conversion is exact, and what was typed is kept.

Factors: international yard and pound agreement (1959), US gallon of 231 cubic inches, UK Weights and Measures
Act 1985; every pair of units against `pint` in tests/pure/fleet/test_conversion.py. The loads are
invented and reckoned by hand beside each case.
"""

from copy import deepcopy
from fractions import Fraction
from itertools import product
from types import SimpleNamespace

import pytest

from fleet.conversion import converted
from fleet.quantities import LENGTHS, MOMENT_OF, VOLUMES, WEIGHTS, Unit
from loads.balance.declared import read_load
from loads.manifest.pilot_block import fuel_block
from loads.manifest.tables import computation
from loads.manifest.words import WORDS
from records.refusal import Invalid
from tests.pure.loads.making import load, result_of, twin

F = Fraction


def exactly(value, given, wanted):
    """A number of another unit as a decimal text; only pairs whose factor ends are asked for."""
    found = converted(F(value), given, wanted)
    digits = 0
    while (found * 10**digits).denominator != 1:
        digits += 1
        assert digits <= 12
    whole = str(int(found * 10**digits)).zfill(digits + 1)
    return f"{whole[:-digits]}.{whole[-digits:]}" if digits else whole


def in_units(weight, volume, density):
    """The sound load of the twin, with all of it typed in other units; exact, since kg end and lb do not."""
    document = load()
    quantities = [
        *(person["weight"] for person in document["crew"] + document["passengers"]),
        *(item["weight"] for item in document["items"]),
        *(document["fuel"][name] for name in ("taxi", "trip", "minimum_at_landing")),
        document["limits"][0]["weight"],
        document["passengers"][1]["lap_infant"]["weight"],
        *document["fuel"]["at_engine_start"].values(),
        document["fuel"]["density"],
    ]
    wanted = {"lb": weight, "kg": weight, "US gal": volume, "lb/US gal": density}
    for each in quantities:
        given = Unit(each["unit"])
        if given.value != "kg" or weight is Unit.KG:
            each["value"] = exactly(str(each["value"]), given, wanted[given.value])
            each["unit"] = wanted[given.value].value
    return document


def test_a_load_typed_in_kilograms_and_litres_is_the_same_load_to_the_last_digit():
    """1 lb is 0.45359237 kg and 1 US gal 3.785411784 l, both exact."""
    typed = in_units(Unit.KG, Unit.L, Unit.LB_PER_US_GAL)

    same, other = result_of(), result_of(typed)

    assert other.states == same.states
    assert [line.moment for line in other.lines] == [line.moment for line in same.lines]
    assert other.verdict == same.verdict


def test_imperial_gallons_are_not_us_gallons():
    """50 imp gal are 50 * 4.54609 / 3.785411784 = 60.0475 US gal: more than the 60 the tank holds."""
    document = load()
    document["fuel"]["at_engine_start"]["LEFT-MAIN"] = {"value": 50, "unit": "imp gal"}

    with pytest.raises(Invalid) as refused:
        read_load(document, twin())

    assert [fault.pointer for fault in refused.value.faults] == ["/fuel/at_engine_start/LEFT-MAIN"]


def test_litres_become_weight_by_the_delivered_density():
    """151.41647136 l are 40 US gal; at 0.72 kg/l they weigh 109.0199 kg, which is 240.348 lb."""
    document = load()
    document["fuel"]["density"] = {"value": "0.72", "unit": "kg/l", "source": "delivery note 4472"}
    document["fuel"]["at_engine_start"]["LEFT-MAIN"] = {"value": "151.41647136", "unit": "l"}

    declared = read_load(document, twin())

    left = next(held for held in declared.fuel.tanks if held.tank.id == "LEFT-MAIN")
    assert left.usable == 40
    assert left.usable * declared.fuel.density == F("151.41647136") * F("0.72") / F("0.45359237")


# About 0.8 kg/l each, as somebody would type it in that unit.
DENSITIES = {
    "kg/l": "0.8",
    "kg/US gal": 3,
    "kg/imp gal": "3.6",
    "lb/l": "1.76",
    "lb/US gal": "6.7",
    "lb/imp gal": 8,
}


@pytest.mark.parametrize(("weight", "volume"), list(product(WEIGHTS, VOLUMES)), ids=lambda unit: unit.value)
def test_every_density_goes_with_every_volume(weight, volume):
    """Twenty of a volume unit at a density by that unit weigh twenty times its figure, in its weight unit."""
    document = load()
    density = DENSITIES[f"{weight.value}/{volume.value}"]
    document["fuel"]["density"] = {
        "value": density,
        "unit": f"{weight.value}/{volume.value}",
        "source": "delivery note 4473",
    }
    document["fuel"] |= {name: {"value": 10, "unit": "lb"} for name in ("taxi", "trip", "minimum_at_landing")}
    for tank in document["fuel"]["at_engine_start"]:
        document["fuel"]["at_engine_start"][tank] = {"value": 20, "unit": volume.value}

    declared = read_load(document, twin())

    held = declared.fuel.tanks[0]
    assert held.usable * declared.fuel.density == converted(20 * F(density), weight, Unit.LB)


@pytest.mark.parametrize(("weight", "length"), list(product(WEIGHTS, LENGTHS)), ids=lambda unit: unit.value)
def test_a_moment_unit_is_its_weight_unit_times_its_length_unit(weight, length):
    product_of_both = converted(F(1), weight, Unit.KG) * converted(F(1), length, Unit.M)

    assert converted(F(1), MOMENT_OF[weight, length], Unit.KG_M) == product_of_both


def test_kilograms_typed_as_pounds_are_told_apart_by_the_unit_that_stands_there():
    """80 kg are 176.37 lb: the same figure with the other unit is another load."""
    heavy, light = deepcopy(load()), deepcopy(load())
    heavy["passengers"][0]["weight"] = {"value": 80, "unit": "kg"}
    light["passengers"][0]["weight"] = {"value": 80, "unit": "lb"}

    more = read_load(heavy, twin()).passengers[0].weight - read_load(light, twin()).passengers[0].weight

    assert more == 80 / F("0.45359237") - 80


@pytest.mark.parametrize("unit", [None, "gal", "lbs", "KG", "pound", "kg/l", "in"])
def test_a_weight_without_a_unit_or_in_another_one_is_refused_by_name(unit):
    document = load()
    document["items"][0]["weight"] = {"value": 120} if unit is None else {"value": 120, "unit": unit}

    with pytest.raises(Invalid) as refused:
        read_load(document, twin())

    (fault,) = refused.value.faults
    assert fault.pointer == "/items/0/weight/unit"
    assert fault.code in {"unit-missing", "unit-unknown", "unit-dimension"}
    assert "use one of kg, lb" in fault.detail


def test_both_values_are_kept_as_typed_beside_converted():
    """M. Dravo was typed as 71.5 kg, which is 157.6 lb; whoever redoes the sum sees both."""
    document = load()
    document["fuel"]["at_engine_start"]["LEFT-AUX"] = {"value": "56.5", "unit": "l"}
    result = result_of(document).as_document()
    shown = SimpleNamespace(inputs=document, result=result)

    lines = {line["name"]: line for line in computation(shown, WORDS["US"])}
    tanks = [tank["name"] for tank in fuel_block(shown)["tanks"]]

    converted_line = next(line for name, line in lines.items() if name.startswith("M. Dravo"))
    assert converted_line["how"] == "declared, 71.5 kg"
    assert converted_line["weight"] == "157.6"
    assert lines["L. Osei"]["how"] == "declared"
    assert "left-aux (56.5 l typed)" in tanks
    assert "right-aux" in tanks
