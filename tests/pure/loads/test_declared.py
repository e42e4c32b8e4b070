"""A sound load document is read once, exactly, into the units of the basis."""

from datetime import timedelta
from fractions import Fraction

from loads.balance.declared import read_load
from loads.balance.outline import read_outline
from tests.pure.loads.making import load, twin

F = Fraction

KG_PER_LB = F("0.45359237")
L_PER_US_GAL = F("3.785411784")


def test_the_outline_is_read_without_a_basis():
    outline = read_outline(load())

    assert (outline.aircraft, outline.configuration) == ("Q9-KTB", "six-seat")
    assert (outline.flight.reference, outline.flight.leg) == ("KT-214", 1)
    assert outline.flight.departure.utcoffset() == timedelta(hours=-6)


def test_weights_are_converted_exactly_and_lines_keep_their_pointers():
    declared = read_load(load(), twin())
    pilot, dravo = declared.crew[0], declared.passengers[1]

    assert (pilot.weight, pilot.how, pilot.login) == (F(181), "weighed", "r.amani")
    assert dravo.weight == F("71.5") / KG_PER_LB
    assert dravo.lap_infant is not None
    assert dravo.lap_infant.weight == 9 / KG_PER_LB
    assert dravo.lap_infant.pointer == "/passengers/1/lap_infant"
    assert declared.items[0].pointer == "/items/0"


def test_fuel_by_weight_or_volume_in_any_unit_comes_out_the_same():
    document = load()
    document["fuel"]["density"] = {"value": "0.72", "unit": "kg/l", "source": "note"}
    document["fuel"]["at_engine_start"]["LEFT-MAIN"] = {"value": 100, "unit": "l"}
    document["fuel"]["at_engine_start"]["RIGHT-MAIN"] = {"value": 72, "unit": "kg"}

    plan = read_load(document, twin()).fuel

    assert plan.tanks[0].usable == plan.tanks[1].usable == 100 / L_PER_US_GAL
    assert plan.density == F("0.72") * L_PER_US_GAL / KG_PER_LB


def test_what_may_be_left_out_is_left_out():
    document = load()
    del document["limits"]
    del document["fuel"]["not_usable"]
    del document["crew"][0]["person"]
    document["passengers"] = []
    document["items"] = []
    document["persons_on_board"] = 1

    declared = read_load(document, twin())

    assert (declared.limits, declared.items, declared.passengers) == ((), (), ())
    assert declared.crew[0].login is None


def test_a_removed_equipment_is_a_signed_line():
    document = load()
    document["items"].append(
        {
            "kind": "equipment",
            "what": "rear cabinet",
            "place": "AFT-HOLD",
            "weight": {"value": 22, "unit": "lb"},
            "how": "weighed",
            "removed": True,
        }
    )

    item = read_load(document, twin()).items[1]

    assert (item.weight, item.removed) == (F(-22), True)


def test_an_infant_on_the_lap_of_a_standard_adult_has_no_weight_of_its_own():
    document = load()
    adult = document["passengers"][1]
    del adult["weight"]
    adult["how"] = "standard"
    adult["lap_infant"] = {"name": "I. Dravo"}

    person = read_load(document, twin()).passengers[1]

    assert person.weight is None
    assert person.lap_infant is not None
    assert person.lap_infant.weight is None


def test_a_small_child_in_its_own_seat_is_believed_when_it_is_called_a_child():
    document = load()
    document["passengers"][0]["weight"] = {"value": 12, "unit": "kg"}
    document["passengers"][0]["category"] = "child"

    assert read_load(document, twin()).passengers[0].weight == 12 / KG_PER_LB
