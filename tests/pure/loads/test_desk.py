"""The table of inputs: it proposes no figure, and what was typed is what it shows."""

from dataclasses import replace
from typing import Any

import pytest

from fleet.quantities import Unit
from loads.balance.aboard import HOWS, KINDS
from loads.web import desk as desk_module
from loads.web.copied import typed_of
from loads.web.desk import Field, lay_desk, wrong_inputs
from loads.web.form import MOST_ROWS
from loads.web.form_lines import TAKEN_OUT
from tests.pure.loads.making import load, twin

METRIC = replace(twin(), weight_unit=Unit.KG, volume_unit=Unit.L)


def laid(typed: dict[str, str], *, basis: Any = None, faults: dict[str, str] | None = None) -> dict[str, Any]:
    basis = basis or twin()
    return lay_desk(basis, basis.configurations[0], typed=typed, faults=faults or {}, zone="America/Denver")


def fields_of(desk: dict[str, Any]) -> dict[str, Field]:
    return {field.name: field for field in everything_on(desk)}


def everything_on(desk: dict[str, Any]) -> list[Field]:
    fields = [*desk["flight"], desk["persons"]]
    for row in (*desk["seats"], *desk["tanks"], *desk["fuel"]):
        fields += row["fields"]
    for line in (*desk["items"], *desk["limits"]):
        fields += line
    return [field for field in fields if field]


def test_a_fresh_desk_holds_no_figure_no_word_and_no_choice() -> None:
    fields = fields_of(laid({}))

    assert {field.value for field in fields.values()} == {""}
    first = {name: field.choices[0][0] for name, field in fields.items() if field.choices}
    proposed = {name for name, choice in first.items() if choice}
    assert all(name.endswith((":unit", ":at")) for name in proposed)


@pytest.mark.parametrize(
    ("basis", "weight", "volume", "density"),
    [(twin(), "lb", "US gal", "lb/US gal"), (METRIC, "kg", "l", "kg/l")],
    ids=["lb and US gal", "kg and l"],
)
def test_units_stand_first_in_those_of_the_manual(basis: Any, weight: str, volume: str, density: str) -> None:
    fields = fields_of(laid({}, basis=basis))

    assert fields["seat:ROW1-L:unit"].choices[0][0] == weight
    assert fields["item:0:unit"].choices[0][0] == weight
    assert fields["limit:0:unit"].choices[0][0] == weight
    assert fields["tank:LEFT-MAIN:unit"].choices[0][0] == volume
    assert fields["density:unit"].choices[0][0] == density
    assert fields["trip:unit"].choices[0][0] == weight


def test_every_input_has_a_name_of_its_own_and_a_label() -> None:
    desk = laid({})
    everything = everything_on(desk)

    assert len({field.name for field in everything}) == len(everything)
    labels = [field.label for field in everything]
    assert all(labels)
    assert len(set(labels)) == len(labels)
    assert [seat["id"] for seat in desk["seats"]] == list(twin().configurations[0].seats)


def test_only_seats_and_places_of_the_configuration_are_offered() -> None:
    basis = twin()
    freight = basis.configurations[1]
    desk = lay_desk(basis, freight, typed={}, faults={}, zone="UTC")

    assert [seat["id"] for seat in desk["seats"]] == ["COCKPIT-L", "COCKPIT-R"]
    assert [choice[0] for choice in fields_of(desk)["item:0:place"].choices] == ["", "AFT-HOLD"]


@pytest.mark.parametrize(
    ("name", "value"),
    [
        ("seat:COCKPIT-R:position", "winch operator"),
        ("seat:COCKPIT-L:position", "flight nurse"),
        ("seat:ROW1-L:category", "teenager"),
        ("operation", "survey"),
        ("density:unit", "kg/US gal"),
        ("item:0:place", "TAIL-CONE"),
        ("item:0:kind", "livestock"),
        ("tank:LEFT-MAIN:unit", "kg"),
        ("seat:ROW1-L:unit", "st"),
    ],
)
def test_a_word_that_is_in_no_list_still_stands_chosen_and_is_not_swapped_for_another(
    name: str, value: str
) -> None:
    field = fields_of(laid(typed_of(load()) | {name: value}))[name]

    assert field.value == value
    assert value in {choice[0] for choice in field.choices}


def test_a_seat_has_only_the_inputs_it_has_use_for_unless_another_holds_something() -> None:
    def parts(seat: str, typed: dict[str, str]) -> set[str]:
        return {
            name.rpartition(":")[2] for name in fields_of(laid(typed)) if name.startswith(f"seat:{seat}:")
        }

    crew, infant = {"position", "person"}, {"infant", "infant_weight", "infant_how"}
    assert not parts("COCKPIT-L", {}) & infant
    assert not parts("ROW2-L", {}) & crew
    assert crew | infant <= parts("ROW1-L", {})
    assert infant <= parts("COCKPIT-L", {"seat:COCKPIT-L:infant_weight": "9"})
    assert crew <= parts("ROW2-L", {"seat:ROW2-L:position": "cabin attendant"})


def test_the_words_to_choose_from_are_those_the_reader_takes() -> None:
    assert {word for word, _ in desk_module.HOW if word} == set(HOWS)
    assert {word for word, _ in desk_module.INFANT_HOW if word} == set(HOWS) - {"standard"}
    assert {word for word, _ in desk_module.KINDS if word} == {*KINDS, TAKEN_OUT}
    assert {word for word, _ in desk_module.LIMITS_AT} == {"take-off", "landing"}


def test_what_was_typed_and_what_is_wrong_with_it_stand_at_the_same_input() -> None:
    fields = fields_of(laid({"trip": "1e3"}, faults={"trip": "write a plain decimal number"}))

    assert (fields["trip"].value, fields["trip"].fault) == ("1e3", "write a plain decimal number")
    assert {name for name, field in fields.items() if field.fault} == {"trip"}


def test_there_are_always_empty_rows_for_more_items() -> None:
    desk = laid({"item:7:what": "a crate"})

    assert len(desk["items"]) > 8
    assert fields_of(desk)["item:7:what"].value == "a crate"


@pytest.mark.parametrize(
    "name",
    ["item:999999999:what", f"item:{'9' * 6000}:what", "item:²:what", "item:-1:what", "item:", "item:x:y"],
)
def test_a_row_number_nobody_was_offered_makes_no_rows(name: str) -> None:
    desk = laid({name: "x", name.replace("item", "limit"): "x"})

    assert len(desk["items"]) <= MOST_ROWS
    assert len(desk["limits"]) <= MOST_ROWS


def test_faults_of_one_input_are_joined_and_those_of_none_left_out() -> None:
    assert wrong_inputs([("trip", "Too much."), ("", "The whole is wrong."), ("trip", "No unit.")]) == {
        "trip": "Too much. No unit."
    }
