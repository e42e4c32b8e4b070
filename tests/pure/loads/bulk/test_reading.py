"""Load documents as rows of numbers, worked by hand; and each thing that leaves a load to be read in full."""

from copy import deepcopy
from dataclasses import fields, replace

import numpy as np
import pytest

from fleet.quantities import Unit
from loads.balance.bulk import reading as reading_module
from loads.balance.bulk.reading import Batch, Reading
from tests.pure.loads.bulk.plain_basis import plain_basis, plainly_known

INFINITE = float("inf")


def lb(value):
    return {"value": value, "unit": "lb"}


def gal(value):
    return {"value": value, "unit": "US gal"}


PLAIN = {
    "schema": "tarebook.load/1",
    "aircraft": "Q9-KTB",
    "configuration": "one",
    "flight": {},
    "persons_on_board": 2,
    "crew": [
        {"name": "R. Amani", "position": "pilot", "seat": "LEFT", "weight": lb("180.5"), "how": "weighed"}
    ],
    "passengers": [{"name": "L. Osei", "seat": "BACK", "weight": lb("150"), "how": "declared"}],
    "items": [
        {"kind": "cargo", "what": "box", "place": "HOLD", "weight": lb("40"), "how": "estimated"},
        {"kind": "cargo", "what": "bag", "place": "HOLD", "weight": lb("2.25"), "how": "declared"},
    ],
    "fuel": {
        "density": {"value": "6", "unit": "lb/US gal", "source": "note"},
        "at_engine_start": {"AUX": gal("20"), "MAIN": gal("60")},
        "taxi": lb("12"),
        "trip": gal("30"),
        "minimum_at_landing": lb("60"),
    },
    "limits": [{"at": "take-off", "weight": lb("2800"), "source": "sheet"}],
}
ROW = {
    "held": [180.5, 0.0, 150.0, 0.0, 42.25, 0.0],
    "usable": [60.0, 20.0],
    "density": 6.0,
    "taxi": 2.0,
    "trip": 30.0,
    "least": 10.0,
    "take_off": 2800.0,
    "landing": INFINITE,
}


def changed(*path, to):
    """The plain load with another value at a path; None takes it away."""
    document = deepcopy(PLAIN)
    at = document
    for step in path[:-1]:
        at = at[step]
    if to is None:
        del at[path[-1]]
    else:
        at[path[-1]] = to
    return document


def rows(batch):
    columns = {field.name: getattr(batch, field.name).tolist() for field in fields(Batch)}
    return [dict(zip(columns, each, strict=True)) for each in zip(*columns.values(), strict=True)]


def row_of(document, known=None):
    reading = Reading(known or plainly_known())
    assert reading.add(document) is True
    (row,) = rows(reading.batch())
    return row


def test_a_load_is_a_row_in_the_units_of_the_basis():
    assert row_of(PLAIN) == ROW


def test_kilograms_litres_and_a_density_of_its_own_are_turned_into_the_units_of_the_basis():
    """1 kg is 1/0.45359237 lb and 1 l 1/3.785411784 US gal, by definition; 0.8 kg/l is
    0.8 * 3.785411784 / 0.45359237 = 6.676... lb/US gal, and 20 kg of it are 25 l.
    """
    document = deepcopy(PLAIN)
    document["crew"][0]["weight"] = {"value": "80", "unit": "kg"}
    fuel = document["fuel"]
    fuel["density"] = {"value": "0.8", "unit": "kg/l", "source": "note"}
    fuel["at_engine_start"]["AUX"] = {"value": "50", "unit": "l"}
    fuel["taxi"] = {"value": "20", "unit": "kg"}
    document["limits"] = [{"at": "landing", "weight": {"value": "1200", "unit": "kg"}, "source": "sheet"}]

    row = row_of(document)

    pound, gallon = 0.45359237, 3.785411784
    assert row["held"][0] == pytest.approx(80 / pound, rel=1e-14)
    assert row["density"] == pytest.approx(0.8 * gallon / pound, rel=1e-14)
    assert row["usable"] == [60.0, pytest.approx(50 / gallon, rel=1e-14)]
    assert row["taxi"] == pytest.approx(25 / gallon, rel=1e-14)
    assert (row["take_off"], row["landing"]) == (INFINITE, pytest.approx(1200 / pound, rel=1e-14))


def test_a_basis_in_kilograms_and_litres_has_rows_in_them():
    basis = replace(plain_basis(), weight_unit=Unit.KG, volume_unit=Unit.L)
    document = changed("fuel", "at_engine_start", "MAIN", to={"value": "60", "unit": "l"})
    document["fuel"]["at_engine_start"]["AUX"] = {"value": "20", "unit": "l"}
    document["fuel"]["density"] = {"value": "0.72", "unit": "kg/l", "source": "note"}

    row = row_of(document, plainly_known(basis))

    assert row["held"][0] == pytest.approx(180.5 * 0.45359237, rel=1e-14)
    assert (row["density"], row["usable"]) == (0.72, [60.0, 20.0])
    assert row["trip"] == pytest.approx(30 * 3.785411784, rel=1e-14)


def test_of_several_limits_stated_for_one_phase_the_least_counts():
    def stated(at, value):
        return {"at": at, "weight": lb(value), "source": "sheet"}

    both = [stated("take-off", "2850"), stated("landing", "2700"), stated("take-off", "2790.5")]
    row = row_of(changed("limits", to=[*both, stated("landing", "2750")]))

    assert (row["take_off"], row["landing"]) == (2790.5, 2700.0)


def test_a_load_need_not_state_a_limit_or_fuel_that_is_not_usable():
    assert row_of(changed("limits", to=None)) == ROW | {"take_off": INFINITE}
    assert row_of(changed("limits", to=[])) == ROW | {"take_off": INFINITE}
    assert row_of(changed("fuel", "not_usable", to={})) == ROW


def test_a_tank_may_be_full():
    assert row_of(changed("fuel", "at_engine_start", "MAIN", to=gal("100")))["usable"] == [100.0, 20.0]


def test_a_seat_for_either_takes_crew_and_passengers():
    assert row_of(changed("crew", 0, "seat", to="RIGHT"))["held"] == [0, 180.5, 150, 0, 42.25, 0]
    assert row_of(changed("passengers", 0, "seat", to="RIGHT"))["held"] == [180.5, 150, 0, 0, 42.25, 0]


UNLIKE = {
    "an unknown section": changed("sequence", to=[]),
    "no crew": changed("crew", to=None),
    "no passengers": changed("passengers", to=None),
    "no items": changed("items", to=None),
    "no fuel": changed("fuel", to=None),
    "fewer crew than the configuration needs": changed("crew", to=[]) | {"persons_on_board": 1},
    "another count of persons": changed("persons_on_board", to=3),
    "a crew member's standard weight": changed("crew", 0, "how", to="standard"),
    "a crew member's estimated weight": changed("crew", 0, "how", to="estimated"),
    "a passenger's estimated weight": changed("passengers", 0, "how", to="estimated"),
    "an infant on a lap": changed("passengers", 0, "lap_infant", to={}),
    "something more of a crew member": changed("crew", 0, "more", to="x"),
    "something more of an item": changed("items", 0, "removed", to=True),
    "something more of the last item": changed("items", 1, "removed", to=True),
    "a person's word on an item": changed("items", 0, "seat", to="LEFT"),
    "an item's standard weight": changed("items", 0, "how", to="standard"),
    "no word how": changed("items", 0, "how", to=None),
    "no weight": changed("items", 0, "weight", to=None),
    "a weight without a unit": changed("items", 0, "weight", to={"value": "1"}),
    "a weight in no unit": changed("items", 0, "weight", "unit", to="stone"),
    "a weight in litres": changed("items", 0, "weight", "unit", to="l"),
    "a weight with an exponent": changed("items", 0, "weight", "value", to="1e3"),
    "a weight that is no number": changed("items", 0, "weight", "value", to="nan"),
    "crew in a passenger's seat": changed("crew", 0, "seat", to="BACK"),
    "a passenger in a crew seat": changed("passengers", 0, "seat", to="LEFT"),
    "a seat the configuration has not": changed("passengers", 0, "seat", to="SPARE"),
    "a seat nowhere": changed("passengers", 0, "seat", to="NOWHERE"),
    "a place the configuration has not": changed("items", 0, "place", to="SHELF"),
    "an item on a seat": changed("items", 0, "place", to="RIGHT"),
    "fuel that is not usable": changed("fuel", "not_usable", to={"MAIN": gal("1")}),
    "something more of the fuel": changed("fuel", "legs", to=[]),
    "a tank too many": changed("fuel", "at_engine_start", "TIP", to=gal("1")),
    "a tank too few": changed("fuel", "at_engine_start", "AUX", to=None),
    "another tank": changed("fuel", "at_engine_start", to={"MAIN": gal("1"), "TIP": gal("1")}),
    "a tank beyond its brim": changed("fuel", "at_engine_start", "MAIN", to=gal("100.001")),
    "a tank beyond its brim by weight": changed("fuel", "at_engine_start", "MAIN", to=lb("600.1")),
    "no density": changed("fuel", "density", to=None),
    "a density in no unit": changed("fuel", "density", "unit", to="lb"),
    "no taxi": changed("fuel", "taxi", to=None),
    "no trip": changed("fuel", "trip", to=None),
    "no least at landing": changed("fuel", "minimum_at_landing", to=None),
    "something more of a limit": changed("limits", 0, "why", to="x"),
    "a limit elsewhere": changed("limits", 0, "at", to="ramp"),
    "a limit without a weight": changed("limits", 0, "weight", to=None),
    "no limits at all": changed("limits", to=7),
    "nothing": {},
}


@pytest.mark.parametrize("what", UNLIKE)
def test_anything_else_is_left_to_be_read_in_full_and_adds_nothing(what):
    reading = Reading(plainly_known())
    assert reading.add(PLAIN) is True

    assert reading.add(UNLIKE[what]) is False
    assert rows(reading.batch()) == [ROW]

    assert reading.add(changed("items", 0, "weight", to=lb("41"))) is True
    assert rows(reading.batch()) == [ROW, ROW | {"held": [180.5, 0.0, 150.0, 0.0, 43.25, 0.0]}]


def test_a_batch_has_its_columns_even_without_a_load():
    batch = Reading(plainly_known()).batch()

    assert len(batch) == 0
    assert (batch.held.shape, batch.usable.shape, batch.density.shape) == ((0, 6), (0, 2), (0,))
    assert {getattr(batch, field.name).dtype for field in fields(Batch)} == {np.dtype(np.float64)}
    assert all(getattr(batch, field.name).flags.c_contiguous for field in fields(Batch))


def test_a_part_of_a_batch_is_some_of_its_rows():
    reading = Reading(plainly_known())
    for count in ("1", "2", "3"):
        reading.add(changed("items", 1, "weight", to=lb(count)))
    batch = reading.batch()

    assert len(batch) == 3
    assert [row["held"][4] for row in rows(batch.part(slice(1, 3)))] == [42.0, 43.0]
    assert rows(batch.part(slice(0, 1))) == [ROW | {"held": [180.5, 0.0, 150.0, 0.0, 41.0, 0.0]}]


def test_figures_are_remembered_as_typed_and_not_worked_out_again():
    known = plainly_known()
    row_of(PLAIN, known)

    typed = ("6", "lb/US gal")
    assert known.kept == {
        ("180.5", "lb"): 180.5,
        ("150", "lb"): 150.0,
        ("40", "lb"): 40.0,
        ("2.25", "lb"): 2.25,
        ("MAIN", "60", "US gal", *typed): 60.0,
        ("AUX", "20", "US gal", *typed): 20.0,
        ("12", "lb", *typed): 2.0,
        ("30", "US gal", *typed): 30.0,
        ("60", "lb", *typed): 10.0,
        ("density", *typed): 6.0,
        ("2800", "lb"): 2800.0,
    }
    known.kept.update({key: value + 1 for key, value in known.kept.items()})
    assert row_of(PLAIN, known) == {
        "held": [181.5, 0.0, 151.0, 0.0, 44.25, 0.0],
        "usable": [61.0, 21.0],
        "density": 7.0,
        "taxi": 3.0,
        "trip": 31.0,
        "least": 11.0,
        "take_off": 2801.0,
        "landing": INFINITE,
    }


def test_only_so_much_is_remembered(monkeypatch):
    """With room for three all is forgotten at the fourth figure of a load, the seventh and the tenth."""
    monkeypatch.setattr(reading_module, "_MOST_KEPT", 3)
    known = plainly_known()

    assert row_of(PLAIN, known) == ROW
    assert list(known.kept) == [("density", "6", "lb/US gal"), ("2800", "lb")]
