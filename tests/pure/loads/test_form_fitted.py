"""What is fitted, rails, footprints and restraints between the page and the document: carried or refused,
never lost.
"""

from dataclasses import replace
from typing import Any

import pytest

from fleet.basis import Basis
from fleet.stations import Condition, Floor, Rail, Setting
from loads.web.copied import can_carry, typed_of
from loads.web.desk import lay_desk
from loads.web.form import document_of, field_of
from tests.pure.loads.load_documents import DEPARTURE, SEATS, TANKS
from tests.pure.loads.making import SOURCE, F, load, twin

SIDES = {
    "length": {"value": "24", "unit": "in"},
    "width": {"value": "18.5", "unit": "in"},
    "lies": "across",
}


def document(**item: Any) -> dict[str, Any]:
    """A load that uses every part at once."""
    full = load(conditions=["NET"], seat_settings=[{"row": "1", "setting": "3"}])
    full["seat_settings"].append({"seat": "ROW2-L", "setting": "5"})
    full["items"][0] |= {"footprint": {**SIDES, "feet_lengthwise": 2}} | item
    full["passengers"][0]["restraint"] = {"value": "8", "unit": "lb"}
    full["flight"]["departure"] = DEPARTURE
    return full


def again(typed: dict[str, str]) -> dict[str, Any]:
    return document_of(typed, departure=DEPARTURE, seats=SEATS, tanks=TANKS)[0]


def marked() -> Basis:
    basis = twin()
    rail = Rail(F(150), F(160), (Setting("3", F(152)), Setting("5", F(158))), SOURCE)
    seats = tuple(
        replace(seat, rail=replace(rail, forward=seat.arm - 5, aft=seat.arm + 5), row=seat.id[3])
        if seat.id.startswith("ROW")
        else seat
        for seat in basis.seats
    )
    places = tuple(
        replace(place, floor=Floor("along", None, None)) if place.id == "AFT-HOLD" else place
        for place in basis.places
    )
    return replace(basis, seats=seats, places=places, conditions=(Condition("NET", "net fitted", SOURCE),))


def desk_of(basis: Basis, typed: dict[str, str]) -> dict[str, Any]:
    return lay_desk(basis, basis.configurations[0], typed=typed, faults={}, zone="UTC")


def names(desk: dict[str, Any]) -> set[str]:
    rows = [*desk["floor"], desk["fitted"], *(seat["fields"] for seat in desk["seats"])]
    return {field.name for row in rows for field in row if field}


SPREADER = {"weight": {"value": "12", "unit": "lb"}, **SIDES}


@pytest.mark.parametrize(
    "item",
    [
        {},
        {"spreader": SPREADER},
        {"spreader": {"weight": SPREADER["weight"]}},
        {"pallet": {"weight": {"value": "30", "unit": "lb"}}},
        {"pallet": SPREADER, "net": {"weight": {"value": "5", "unit": "lb"}}},
        {"spreader": {**SPREADER, "length": {"value": "60", "unit": "cm"}}},  # one item, two units of length
        {"spreader": {**SPREADER, "weight": {"value": "6", "unit": "kg"}}},  # another unit than the item's
    ],
)
def test_all_of_it_put_on_the_page_and_taken_off_it_is_the_same(item: dict[str, Any]) -> None:
    full = document(**item)

    assert can_carry(full, seats=SEATS, tanks=TANKS)
    carried = again(typed_of(full))
    for part in ("conditions", "seat_settings"):
        assert carried[part] == full[part]
    for part in ("footprint", "pallet", "net", "spreader"):
        assert _as_text(carried["items"][0].get(part)) == _as_text(full["items"][0].get(part))
    assert carried["passengers"][0]["restraint"] == full["passengers"][0]["restraint"]


@pytest.mark.parametrize("basis", [marked(), twin()], ids=["asks for it", "knows nothing of it"])
def test_whatever_is_put_on_the_page_stands_in_an_input_the_page_shows(basis: Basis) -> None:
    typed = typed_of(document(spreader=SPREADER))
    ours = {
        name
        for name in typed
        if name.startswith(("condition:", "setting:")) or name.endswith((":restraint", ":lies", ":length"))
    }

    assert len(ours) == 6
    assert ours <= names(desk_of(basis, typed))


def test_a_plain_basis_asks_for_none_of_it_and_a_plain_load_gets_none_of_it() -> None:
    desk = desk_of(twin(), {})

    assert (desk["floor"], desk["fitted"], desk["restraints"]) == ([], [], False)
    assert not {"conditions", "seat_settings"} & again(typed_of(load())).keys()


def test_the_page_offers_conditions_rows_seats_and_their_settings() -> None:
    asked = {field.name: field for field in desk_of(marked(), {})["fitted"]}

    assert list(asked)[:3] == ["condition:NET", "setting:row:1", "setting:row:2"]
    assert "setting:seat:ROW1-L" in asked
    assert asked["setting:row:1"].choices == (("", "not stated: both ends"), ("3", "3"), ("5", "5"))


@pytest.mark.parametrize(
    ("pointer", "name"),
    [
        ("/conditions/0", "condition:NET"),
        ("/seat_settings/0/setting", "setting:row:1"),
        ("/items/0/footprint/width", "item:0:width"),
        ("/items/0/spreader/weight/value", "item:0:spreader_weight"),
        ("/passengers/0/restraint/value", "seat:ROW1-L:restraint"),
    ],
)
def test_a_fault_finds_its_input(pointer: str, name: str) -> None:
    typed = typed_of(document(spreader=SPREADER))
    _, fields = document_of(typed, departure=DEPARTURE, seats=SEATS, tanks=TANKS)

    assert field_of(pointer, fields) == name


def _as_text(part: Any) -> Any:
    return {name: _as_text(value) for name, value in part.items()} if isinstance(part, dict) else str(part)
