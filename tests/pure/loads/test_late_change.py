"""Last-minute changes as plain values: what is put in, what it measures, and how it is said."""

import copy
from decimal import Decimal
from fractions import Fraction

import pytest
from hypothesis import given
from hypothesis import strategies as st

from loads.balance.late_change import Moved, faults_in_the_change, measured, said, settle
from loads.balance.late_reading import MOST_LINES, LateChange, read_late_change
from records.refusal import Fault, Invalid

POUND = Fraction("0.45359237")  # kg, exact by definition (international yard and pound agreement, 1959)
DECLARED = {
    "persons_on_board": 3,
    "passengers": [
        {"name": "A", "seat": "1", "weight": {"value": "170", "unit": "lb"}, "how": "declared"},
        {
            "name": "B",
            "seat": "2",
            "weight": {"value": "150", "unit": "lb"},
            "how": "weighed",
            "lap_infant": {"name": "C", "weight": {"value": "20", "unit": "lb"}, "how": "weighed"},
        },
        {"name": "D", "seat": "3", "category": "adult", "how": "standard"},
    ],
    "items": [
        {
            "kind": "baggage",
            "what": "bags",
            "place": "AFT",
            "weight": {"value": "50.5", "unit": "kg"},
            "how": "weighed",
        },
        {
            "kind": "equipment",
            "what": "seat",
            "place": "AFT",
            "weight": {"value": "9", "unit": "kg"},
            "how": "weighed",
            "removed": True,
        },
    ],
    "fuel": {
        "density": {"value": "0.8", "unit": "kg/l", "source": "note"},
        "at_engine_start": {"L": {"value": "100", "unit": "l"}},
    },
}


def change(*lines, persons=3):
    return read_late_change({"lines": list(lines), "persons_on_board": persons})


def codes(refused):
    return {(fault.pointer, fault.code) for fault in refused.value.faults}


def test_what_was_declared_is_left_as_it_was() -> None:
    before = copy.deepcopy(DECLARED)

    settle(DECLARED, change({"change": "passenger-off", "seat": "1"}, persons=2))

    assert before == DECLARED


def test_who_leaves_takes_the_infant_along_and_both_count() -> None:
    settled = settle(DECLARED, change({"change": "passenger-off", "seat": "2"}, persons=1))

    assert [one["seat"] for one in settled.document["passengers"]] == ["1", "3"]
    assert measured(settled.lines, DECLARED["fuel"]["density"]) == Moved(170 * POUND, 2)
    assert (
        said(settled.lines[0], named=True) == "passenger B off, 2, 150 lb weighed, with lap infant C, 20 lb"
    )
    assert said(settled.lines[0], named=False) == "passenger off, 2, 150 lb weighed, with lap infant, 20 lb"


def test_a_person_of_standard_weight_cannot_leave_at_the_last_minute() -> None:
    with pytest.raises(Invalid) as refused:
        settle(DECLARED, change({"change": "passenger-off", "seat": "3"}))

    assert codes(refused) == {("/lines/0/seat", "weight-unknown")}


def test_part_of_an_item_comes_off_exactly_and_all_of_it_leaves_no_line() -> None:
    part = {"change": "item-off", "what": "bags", "place": "AFT", "weight": {"value": "0.5", "unit": "kg"}}
    settled = settle(DECLARED, change(part))
    whole = settle(DECLARED, change({"change": "item-off", "what": "bags", "place": "AFT"}))

    assert settled.document["items"][0]["weight"] == {"value": "50.0", "unit": "kg"}
    assert [item["kind"] for item in whole.document["items"]] == ["equipment"]
    assert measured(whole.lines, DECLARED["fuel"]["density"]) == Moved(Fraction("50.5"), 0)


def test_equipment_stays_where_it_is() -> None:
    with pytest.raises(Invalid) as refused:
        settle(DECLARED, change({"change": "item-off", "what": "seat", "place": "AFT"}))

    assert codes(refused) == {("/lines/0/what", "no-such-item")}


def test_two_items_of_one_name_are_not_guessed_between() -> None:
    twice = copy.deepcopy(DECLARED)
    twice["items"].append(twice["items"][0])

    with pytest.raises(Invalid) as refused:
        settle(twice, change({"change": "item-off", "what": "bags", "place": "AFT"}))

    assert codes(refused) == {("/lines/0/what", "several-such-items")}


def test_faults_of_the_changed_load_are_told_at_the_line_they_come_from() -> None:
    on = {
        "change": "passenger-on",
        "name": "E",
        "seat": "9",
        "weight": {"value": "150", "unit": "lb"},
        "how": "declared",
    }
    fuel = {"change": "fuel-on", "tank": "L", "quantity": {"value": "1", "unit": "l"}}
    settled = settle(DECLARED, change(fuel, on, persons=4))
    faults = [
        Fault(pointer, "code", "detail")
        for pointer in ("/passengers/3/seat", "/passengers/1/seat", "/fuel/at_engine_start/L", "/crew")
    ]

    told = faults_in_the_change(faults, settled.origins)

    assert [fault.pointer for fault in told] == [
        "/lines/1/seat",
        "/passengers/1/seat",
        "/lines/0/quantity",
        "/crew",
    ]


@pytest.mark.parametrize("count", [0, MOST_LINES + 1])
def test_a_change_has_some_lines_and_not_too_many(count: int) -> None:
    with pytest.raises(Invalid) as refused:
        change(*[{"change": "passenger-off", "seat": "1"}] * count)

    assert codes(refused) == {("/lines", "out-of-range")}


@pytest.mark.parametrize(
    ("document", "fault"),
    [
        ({"persons_on_board": 3}, ("/lines", "missing")),
        ({"lines": [], "persons_on_board": 3}, ("/lines", "out-of-range")),
        ({"lines": {}, "persons_on_board": 3}, ("/lines", "list-form")),
        ({"lines": [{}], "persons_on_board": 3}, ("/lines/0/change", "missing")),
        ({"lines": [{"change": "crew-off"}], "persons_on_board": 3}, ("/lines/0/change", "choice")),
        ({"lines": [{"change": ["x"]}], "persons_on_board": 3}, ("/lines/0/change", "choice")),
        ({"lines": [{"change": "passenger-off"}], "persons_on_board": 3}, ("/lines/0/seat", "missing")),
        ({"lines": [{"change": "passenger-off", "seat": "1"}]}, ("/persons_on_board", "missing")),
        (
            {"lines": [{"change": "passenger-off", "seat": "1"}], "persons_on_board": 0},
            ("/persons_on_board", "out-of-range"),
        ),
        (["x"], ("", "object-form")),
    ],
)
def test_what_is_no_change_is_refused_with_its_place(document, fault) -> None:
    with pytest.raises(Invalid) as refused:
        read_late_change(document)

    assert fault in codes(refused)


amounts = st.decimals(min_value=Decimal("0.001"), max_value=Decimal(200), places=3)


@given(
    st.lists(st.tuples(st.sampled_from(["fuel-on", "fuel-off"]), amounts), min_size=1, max_size=MOST_LINES)
)
def test_fuel_never_falls_below_nothing_and_every_step_counts(steps) -> None:
    lines = [
        {"change": kind, "tank": "L", "quantity": {"value": f"{amount:f}", "unit": "l"}}
        for kind, amount in steps
    ]
    held, short = Decimal(100), False
    for kind, amount in steps:
        if kind == "fuel-off" and amount > held:
            short = True
            continue
        held += amount if kind == "fuel-on" else -amount
    late = LateChange(tuple(lines), 3)
    if short:
        with pytest.raises(Invalid) as refused:
            settle(DECLARED, late)
        assert {code for _, code in codes(refused)} == {"below-zero"}
        return

    settled = settle(DECLARED, late)

    assert Decimal(settled.document["fuel"]["at_engine_start"]["L"]["value"]) == held
    moved = measured(settled.lines, DECLARED["fuel"]["density"])
    assert moved == Moved(sum((Fraction(amount) for _, amount in steps), Fraction(0)) * Fraction("0.8"), 0)


CLOTHING = ({"what": "clothing", "value": "4", "unit": "kg"}, {"what": "bags", "value": "6", "unit": "kg"})
ON = {
    "change": "passenger-on",
    "name": "E",
    "seat": "4",
    "weight": {"value": "70", "unit": "kg"},
    "how": "declared",
}


def test_what_a_table_adds_to_a_declared_passenger_moves_too_and_is_said() -> None:
    lines = (ON, {"change": "passenger-off", "seat": "1"})
    settled = settle(DECLARED, change(*lines), CLOTHING)

    assert measured(settled.lines, {}) == Moved(70 + 170 * POUND + 20, 2)
    assert said(settled.lines[0], named=False) == (
        "passenger on, 4, 70 kg declared, and by the table of standard weights clothing 4 kg, bags 6 kg"
    )
    assert "additions" not in settled.document["passengers"][-1]


def test_nothing_is_added_to_who_was_weighed_or_to_an_item() -> None:
    bag = {
        "change": "item-on",
        "kind": "baggage",
        "what": "bag",
        "place": "AFT",
        "weight": {"value": "5", "unit": "kg"},
        "how": "declared",
    }
    lines = (ON | {"how": "weighed"}, {"change": "passenger-off", "seat": "2"}, bag)

    settled = settle(DECLARED, change(*lines), CLOTHING)

    assert measured(settled.lines, {}) == Moved(70 + 170 * POUND + 5, 3)
    assert not any("additions" in line for line in settled.lines)
