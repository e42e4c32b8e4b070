"""Last-minute changes word by word: every line that is refused, and each as it is kept, said, measured."""

from copy import deepcopy
from fractions import Fraction
from typing import Any

import pytest

from loads.balance.late_change import NOTHING, Moved, Settled, measured, said, settle
from loads.balance.late_reading import MOST_LINES, read_late_change
from records.refusal import Invalid
from tests.pure.loads.agreed import faults_told
from tests.pure.loads.test_late_change import CLOTHING, DECLARED, ON, POUND, change

DENSITY = DECLARED["fuel"]["density"]


def kg(value: str) -> dict[str, str]:
    return {"value": value, "unit": "kg"}


def off(seat: str) -> dict[str, Any]:
    return {"change": "passenger-off", "seat": seat}


def item_off(what: str = "bags", place: str = "AFT", **more: Any) -> dict[str, Any]:
    return {"change": "item-off", "what": what, "place": place, **more}


def fuel(way: str, amount: dict[str, str], tank: str = "L") -> dict[str, Any]:
    return {"change": f"fuel-{way}", "tank": tank, "quantity": amount}


def with_load(**changes: Any) -> dict[str, Any]:
    return deepcopy(DECLARED) | deepcopy(changes)


BOXED = with_load(
    items=[
        {"kind": "cargo", "what": "drum", "place": "AFT", "weight": kg("20"), "how": "weighed"}
        | {"net": {"weight": kg("2")}},
        {"kind": "cargo", "what": "ice", "place": "AFT", "how": "standard"},
        {"kind": "baggage", "what": "bags", "place": "AFT", "weight": kg("5"), "how": "weighed"},
        {"kind": "cargo", "what": "bags", "place": "AFT", "weight": kg("6"), "how": "weighed"},
        {"kind": "cargo", "what": "bags", "place": "NOSE", "weight": kg("7"), "how": "estimated"},
    ]
)
UNWEIGHED_INFANT = with_load(
    passengers=[DECLARED["passengers"][1] | {"lap_infant": {"name": "C"}}, DECLARED["passengers"][2]]
)
REFUSED: list[tuple[Any, list[dict[str, Any]], list[str]]] = [
    (DECLARED, [off("9")], [
        "/lines/0/seat nobody-there: no passenger is in this seat; name the seat that empties"]),
    (DECLARED, [off("1"), off("1")], [
        "/lines/1/seat nobody-there: no passenger is in this seat; name the seat that empties"]),
    (DECLARED, [off("3")], [
        "/lines/0/seat weight-unknown: the weight of who leaves is a standard one, so what moves is not "
        "known; revise the load"]),
    (UNWEIGHED_INFANT, [off("2")], [
        "/lines/0/seat weight-unknown: the weight of who leaves is a standard one, so what moves is not "
        "known; revise the load"]),
    (DECLARED, [item_off("bag"), item_off(place="NOSE"), item_off("seat")], [
        f"/lines/{line}/what no-such-item: nothing is called so there; write it as it was declared, or "
        "revise the load" for line in range(3)]),
    (BOXED, [item_off()], [
        "/lines/0/what several-such-items: more than one item is called so there; write it as it was "
        "declared, or revise the load"]),
    (BOXED, [item_off("drum")], [
        "/lines/0/what item-rigged: it stands on a pallet or spreader, or under a net, which leaves or "
        "stays; revise the load"]),
    (BOXED, [item_off("ice")], [
        "/lines/0/what weight-unknown: its weight was not declared; revise the load"]),
    (DECLARED, [item_off(weight=kg("50.51"))], [
        "/lines/0/weight below-zero: only 50.5 kg is there, and no more can come off; correct it"]),
    (DECLARED, [item_off(weight={"value": "1", "unit": "lb"})], [
        "/lines/0/weight/unit unit-differs: this was declared in kg; write the change in the same unit"]),
    (DECLARED, [fuel("on", {"value": "1", "unit": "l"}, "R")], [
        "/lines/0/tank unknown-tank: no such tank; the load has L"]),
    (DECLARED, [fuel("on", kg("1")), fuel("off", kg("1"))], [
        f"/lines/{line}/quantity/unit unit-differs: this was declared in l; write the change in the same unit"
        for line in range(2)]),
    (DECLARED, [fuel("off", {"value": "100.01", "unit": "l"})], [
        "/lines/0/quantity below-zero: only 100 l is there, and no more can come off; correct it"]),
]  # fmt: skip


@pytest.mark.parametrize(("declared", "lines", "faults"), REFUSED)
def test_a_line_that_does_not_fit_is_refused_in_words(declared: Any, lines: Any, faults: list[str]) -> None:
    with pytest.raises(Invalid) as refused:
        settle(declared, change(*lines))
    assert faults_told(refused.value.faults) == faults


def test_all_of_an_item_or_of_the_fuel_may_come_off_and_no_line_or_a_zero_is_left() -> None:
    whole = settle(
        DECLARED, change(item_off(weight=kg("50.50")), fuel("off", {"value": "100.0", "unit": "l"}))
    )

    assert [item["what"] for item in whole.document["items"]] == ["seat"]
    assert whole.document["fuel"]["at_engine_start"] == {"L": {"value": "0.0", "unit": "l"}}


def test_what_is_put_in_stands_in_the_document_as_it_was_typed_and_points_back_to_its_line() -> None:
    infant = {"name": "F", "weight": kg("9"), "how": "weighed"}
    passenger = ON | {"lap_infant": infant, "restraint": kg("3")}
    bag = {"change": "item-on", "kind": "baggage", "what": "bag", "place": "AFT", "weight": kg("5")}
    bag |= {"how": "weighed"}
    lines = [
        bag,
        off("1"),
        passenger,
        fuel("on", {"value": "2.5", "unit": "l"}),
        ON | {"name": "G", "seat": "5"},
    ]

    settled = settle(DECLARED, change(*lines, persons=5))

    typed = {name: value for name, value in passenger.items() if name != "change"}
    assert settled == Settled(
        with_load(
            persons_on_board=5,
            passengers=[*DECLARED["passengers"][1:], typed, {**ON_TYPED, "name": "G", "seat": "5"}],
            items=[*DECLARED["items"], {name: value for name, value in bag.items() if name != "change"}],
            fuel=DECLARED["fuel"] | {"at_engine_start": {"L": {"value": "102.5", "unit": "l"}}},
        ),
        (
            bag,
            {**off("1"), "name": "A", "weight": {"value": "170", "unit": "lb"}, "how": "declared"},
            *lines[2:],
        ),
        {
            "/passengers/2": "/lines/2",
            "/passengers/3": "/lines/4",
            "/items/2": "/lines/0",
            "/fuel/at_engine_start/L": "/lines/3/quantity",
        },
    )


ON_TYPED = {name: value for name, value in ON.items() if name != "change"}


def test_a_part_of_an_item_is_kept_with_what_it_is_and_how_its_weight_is_known() -> None:
    settled = settle(BOXED, change(item_off(place="NOSE", weight=kg("2"))))

    assert settled.lines == (item_off(place="NOSE", weight=kg("2")) | {"kind": "cargo", "how": "estimated"},)
    assert settled.document["items"][4]["weight"] == kg("5")
    assert settled.origins == {}


SAID: list[tuple[dict[str, Any], str, str]] = [
    (ON, "passenger E on, 4, 70 kg declared", "passenger on, 4, 70 kg declared"),
    (
        {**off("2"), "name": "B", "weight": kg("68"), "how": "weighed", "restraint": kg("3")}
        | {"lap_infant": {"name": "C", "weight": kg("9")}},
        "passenger B off, 2, 68 kg weighed, with lap infant C, 9 kg, with restraint, 3 kg",
        "passenger off, 2, 68 kg weighed, with lap infant, 9 kg, with restraint, 3 kg",
    ),
    (
        ON | {"additions": list(CLOTHING), "restraint": kg("3")},
        "passenger E on, 4, 70 kg declared, with restraint, 3 kg, and by the table of standard weights "
        "clothing 4 kg, bags 6 kg",
        "passenger on, 4, 70 kg declared, with restraint, 3 kg, and by the table of standard weights "
        "clothing 4 kg, bags 6 kg",
    ),
    (
        item_off(kind="baggage", weight=kg("5"), how="weighed"),
    ) + ("baggage “bags” off, AFT, 5 kg weighed",) * 2,
    (
        item_off(kind="cargo", weight=kg("5"), how="weighed") | {"change": "item-on"},
    ) + ("cargo “bags” on, AFT, 5 kg weighed",) * 2,
    (fuel("on", {"value": "2", "unit": "l"}),) + ("fuel up, L, 2 l",) * 2,
    (fuel("off", kg("2")),) + ("fuel down, L, 2 kg",) * 2,
]  # fmt: skip


@pytest.mark.parametrize(("line", "named", "unnamed"), SAID)
def test_a_line_is_said_with_and_without_names(line: Any, named: str, unnamed: str) -> None:
    assert said(line, named=True) == named
    assert said(line, named=False) == unnamed


def test_everything_that_moves_counts_by_its_weight_and_who_moves_by_heads() -> None:
    """70 + 4 + 6 and 68 + 9 + 3 kg of people, 5 kg of bags, 10 l of 0.8 kg/l and 100 lb of fuel."""
    family = {**off("2"), "weight": kg("68"), "how": "weighed", "restraint": kg("3")}
    family |= {"lap_infant": {"name": "C", "weight": kg("9")}}
    lines = [
        ON | {"additions": list(CLOTHING)},
        family,
        item_off(weight=kg("5")),
        fuel("on", {"value": "10", "unit": "l"}),
        fuel("off", {"value": "100", "unit": "lb"}),
    ]

    assert measured(lines, DENSITY) == Moved(80 + 80 + 5 + 8 + 100 * POUND, 3)
    assert measured([], DENSITY) == NOTHING == Moved(Fraction(0), 0)


def test_the_additions_of_a_table_stand_only_with_declared_passengers_and_are_copies() -> None:
    fare = deepcopy(CLOTHING)
    settled = settle(DECLARED, change(ON, ON | {"seat": "5", "name": "H", "how": "weighed"}, off("1")), fare)

    assert [line.get("additions") for line in settled.lines] == [list(CLOTHING), None, list(CLOTHING)]
    assert settled.lines[0]["additions"][0] is not fare[0]


ZERO = "zero: zero makes no sense here; write the true figure, or leave the line out"
SAY = "say what changes; write passenger-on or passenger-off or item-on or item-off or fuel-on or fuel-off"
FORM: list[tuple[Any, list[str]]] = [
    ({"lines": {}, "persons_on_board": 3}, [
        "/lines list-form: a list is needed here; write [...] with a line for each change"]),
    ({"lines": [], "persons_on_board": 3}, [
        f"/lines out-of-range: 1 to {MOST_LINES} lines make a last-minute change"]),
    ({"lines": [{}, {"change": "crew-off"}, 7], "persons_on_board": 3}, [
        f"/lines/0/change missing: {SAY}",
        f"/lines/1/change choice: {SAY}",
        "/lines/2 object-form: an object is needed here; write {...} with named fields"]),
    ({"lines": [off("1")], "persons_on_board": 1001}, [
        "/persons_on_board out-of-range: out of range; write a number from 1 to 1000"]),
    ({"lines": [off("S" * 65), off(""), item_off("w" * 121, "P" * 65)], "persons_on_board": 1}, [
        "/lines/0/seat too-long: 65 characters; at most 64 are kept, so shorten it",
        "/lines/1/seat empty: the text is empty; fill it in",
        "/lines/2/place too-long: 65 characters; at most 64 are kept, so shorten it",
        "/lines/2/what too-long: 121 characters; at most 120 are kept, so shorten it"]),
    ({"lines": [fuel("on", kg("0"), "T" * 65), item_off(weight=kg("0"))], "persons_on_board": 1}, [
        "/lines/0/tank too-long: 65 characters; at most 64 are kept, so shorten it",
        f"/lines/0/quantity/value {ZERO}",
        f"/lines/1/weight/value {ZERO}"]),
    ({"lines": [ON | {"how": "standard", "name": "n" * 121, "restraint": kg("0"), "lap_infant": {
        "name": "i" * 121, "weight": kg("0"), "how": "standard"}}], "persons_on_board": 1}, [
        "/lines/0/name too-long: 121 characters; at most 120 are kept, so shorten it",
        "/lines/0/how choice: not one of the words used here; write weighed or declared or estimated",
        f"/lines/0/restraint/value {ZERO}",
        "/lines/0/lap_infant/name too-long: 121 characters; at most 120 are kept, so shorten it",
        "/lines/0/lap_infant/how choice: not one of the words used here; "
        "write weighed or declared or estimated",
        f"/lines/0/lap_infant/weight/value {ZERO}"]),
]  # fmt: skip


@pytest.mark.parametrize(("document", "faults"), FORM)
def test_what_has_not_the_form_of_a_change_is_refused_in_words(document: Any, faults: list[str]) -> None:
    with pytest.raises(Invalid) as refused:
        read_late_change(document)
    assert faults_told(refused.value.faults) == faults
