"""Between the page and the document: nothing is lost, nothing is made up, and a fault finds its input."""

from copy import deepcopy
from typing import Any

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from loads.balance.declared import read_load
from loads.web.copied import can_carry, typed_of
from loads.web.desk import lay_desk
from loads.web.form import MOST_ROWS, document_of, field_of
from records.refusal import Fault, Invalid
from tests.pure.loads.load_documents import DEPARTURE, SEATS, TANKS, documents
from tests.pure.loads.making import load, twin


def written(typed: dict[str, str]) -> tuple[dict[str, Any], dict[str, str]]:
    return document_of(typed, departure=DEPARTURE, seats=SEATS, tanks=TANKS)


def carries(document: dict[str, Any]) -> bool:
    return can_carry(document, seats=SEATS, tanks=TANKS)


def inputs_on_the_desk(typed: dict[str, str]) -> set[str]:
    """The names of all inputs the page shows."""
    basis = twin()
    desk = lay_desk(basis, basis.configurations[0], typed=typed, faults={}, zone="UTC")
    fields = [*desk["flight"], desk["persons"]]
    for row in (*desk["seats"], *desk["tanks"], *desk["fuel"]):
        fields += row["fields"]
    for line in (*desk["items"], *desk["limits"]):
        fields += line
    return {field.name for field in fields if field}


@settings(max_examples=80, deadline=None, derandomize=True)
@given(documents())
def test_a_document_put_on_the_page_and_taken_off_it_is_the_same(document: dict[str, Any]) -> None:
    again, _ = written(typed_of(document))

    assert again == document
    assert carries(document)


@settings(max_examples=40, deadline=None, derandomize=True)
@given(documents())
def test_what_is_put_on_the_page_stands_in_inputs_the_page_shows(document: dict[str, Any]) -> None:
    typed = typed_of(document)

    assert set(typed) <= inputs_on_the_desk(typed) | {"aircraft", "configuration"}


def _with(path: tuple[Any, ...], value: object) -> dict[str, Any]:
    document = load()
    inner: Any = document
    for step in path[:-1]:
        inner = inner[step]
    inner[path[-1]] = value
    return document


def _row(number: int) -> dict[str, Any]:
    return {
        "kind": "cargo",
        "what": f"crate {number}",
        "place": "AFT-HOLD",
        "weight": {"value": "1", "unit": "lb"},
        "how": "weighed",
    }


@pytest.mark.parametrize(
    "document",
    [
        pytest.param(_with(("items", 0, "removed"), True), id="baggage of the empty weight"),
        pytest.param(_with(("sequence",), [{"what": "gear up"}]), id="a sequence"),
        pytest.param(_with(("remark",), "fragile"), id="an unknown part"),
        pytest.param(_with(("flight", "alternate"), "XALT"), id="an unknown part of the flight"),
        pytest.param(_with(("crew", 0, "rank"), "captain"), id="an unknown part of the crew"),
        pytest.param(_with(("passengers", 0, "age"), 44), id="an unknown part of a passenger"),
        pytest.param(_with(("passengers", 1, "lap_infant", "age"), 1), id="an unknown part of a lap infant"),
        pytest.param(_with(("items", 0, "size"), "large"), id="an unknown part of an item"),
        pytest.param(_with(("fuel", "additive"), "none"), id="an unknown part of the fuel"),
        pytest.param(_with(("fuel", "density", "at"), "15 C"), id="an unknown part of the density"),
        pytest.param(_with(("fuel", "taxi", "source"), "manual"), id="an unknown part of a quantity"),
        pytest.param(_with(("limits", 0, "phase"), "x"), id="an unknown part of a limit"),
        pytest.param(_with(("passengers", 0, "seat"), "ROW1-R"), id="two people in one seat"),
        pytest.param(load(items=[_row(n) for n in range(MOST_ROWS + 1)]), id="more items than rows"),
        pytest.param(load(schema="tarebook.load/2"), id="another schema"),
    ],
)
def test_a_document_the_page_would_lose_a_part_of_is_not_carried(document: dict[str, Any]) -> None:
    assert carries(load())
    assert not carries(document)


@pytest.mark.parametrize(
    "document",
    [
        pytest.param(_with(("passengers", 0, "seat"), "ROW9-L"), id="a seat that is not here"),
        pytest.param(
            _with(("fuel", "at_engine_start", "BELLY"), {"value": 1, "unit": "l"}), id="a tank not here"
        ),
        pytest.param(
            _with(("fuel", "not_usable", "LEFT-MAIN"), {"value": 1, "unit": "l"}), id="two units in one tank"
        ),
        pytest.param(
            _with(("passengers", 1, "lap_infant", "weight", "unit"), "lb"), id="two units in one seat"
        ),
        pytest.param(_with(("flight", "follows"), "01980a11-2222-7333-8444-555566667777"), id="a leg before"),
        pytest.param(
            _with(("items", 0), _row(1) | {"kind": "equipment", "removed": True}), id="equipment taken out"
        ),
        pytest.param(_with(("items", 0, "jettisonable"), True), id="what can be released"),
    ],
)
def test_what_the_page_shows_only_where_a_load_has_it_is_carried_and_shown(document: dict[str, Any]) -> None:
    typed = typed_of(document)

    assert carries(document)
    assert set(typed) <= inputs_on_the_desk(typed) | {"aircraft", "configuration"}


def test_a_unit_behind_a_figure_counts_only_where_the_figure_has_no_list_of_its_own() -> None:
    assert "seat:ROW1-L:weight" in _faults_of(typed_of(load()) | {"seat:ROW1-L:weight": "80 kg"})
    document, _ = written(typed_of(load()) | {"seat:ROW1-R:infant_weight": "9 kg"})
    assert document["passengers"][1]["lap_infant"]["weight"] == {"value": "9", "unit": "kg"}


def test_as_many_items_as_there_are_rows_are_carried_and_no_row_is_offered_that_would_be_lost() -> None:
    document = load(items=[_row(n) for n in range(MOST_ROWS)])
    names = inputs_on_the_desk(typed_of(document))

    assert carries(document)
    assert {name for name in names if name.startswith("item:")} == {
        f"item:{row}:{part}"
        for row in range(MOST_ROWS)
        for part in ("place", "kind", "what", "weight", "unit", "how")
    }


def _faults_of(typed: dict[str, str]) -> set[str]:
    """The inputs at which the reader's faults end up."""
    document, fields = written(typed)
    with pytest.raises(Invalid) as refused:
        read_load(document, twin())
    return {field_of(fault.pointer, fields) for fault in refused.value.faults}


NEEDED = (
    "reference", "origin", "destination", "operation", "persons_on_board", "density", "density:source",
    "taxi", "trip", "minimum_at_landing", "seat:COCKPIT-L:name", "seat:COCKPIT-L:weight",
    "seat:COCKPIT-L:how", "seat:ROW1-L:name", "seat:ROW1-L:weight", "seat:ROW1-L:how",
    "seat:ROW1-R:infant_weight", "seat:ROW1-R:infant_how", "item:0:kind", "item:0:what", "item:0:place",
    "item:0:weight", "item:0:how", "tank:LEFT-MAIN:quantity", "limit:0:at",
    "limit:0:weight", "limit:0:source",
)  # fmt: skip


@pytest.mark.parametrize("name", NEEDED)
def test_an_input_left_empty_is_the_one_that_is_marked(name: str) -> None:
    typed = typed_of(load())
    assert typed[name]

    assert name in _faults_of(typed | {name: ""})
    assert name in _faults_of({other: value for other, value in typed.items() if other != name})


@pytest.mark.parametrize(
    "name",
    [name for name in typed_of(load()) if name.endswith((":weight", ":quantity", "_weight"))]
    + ["density", "taxi", "trip", "minimum_at_landing", "persons_on_board", "leg"],
)
@pytest.mark.parametrize("nonsense", ["1e3", "NaN", "-5", "12,5", "zero", "9" * 16, "9" * 6000, "٣", "²"])
def test_a_figure_that_is_none_is_marked_at_its_own_input(name: str, nonsense: str) -> None:
    assert _faults_of(typed_of(load()) | {name: nonsense}) == {name}


@pytest.mark.parametrize(
    ("changes", "marked"),
    [
        pytest.param(
            {"seat:ROW2-L:infant": "I. Nobody"}, "seat:ROW2-L:name", id="an infant on an empty seat"
        ),
        pytest.param(
            {"seat:ROW1-L:infant_weight": "9"}, "seat:ROW1-L:infant", id="a weight of an infant nobody named"
        ),
        pytest.param({"seat:ROW2-L:infant_weight": "9"}, "seat:ROW2-L:name", id="only an infant's weight"),
        pytest.param({"seat:COCKPIT-L:infant": "I. Crew"}, "seat:COCKPIT-L:infant", id="an infant with crew"),
        pytest.param({"limit:1:source": "sheet 13"}, "limit:1:weight", id="a limit without its weight"),
        pytest.param({"seat:ROW2-L:person": "r.amani"}, "seat:ROW2-L:name", id="a login on an empty seat"),
        pytest.param({"seat:ROW2-L:category": "adult"}, "seat:ROW2-L:name", id="a category on an empty seat"),
        pytest.param({"seat:ROW2-L:how": "weighed"}, "seat:ROW2-L:weight", id="a how on an empty seat"),
        pytest.param({"item:3:kind": "cargo"}, "item:3:what", id="only a kind of an item"),
        pytest.param({"seat:ROW1-L:person": "r.amani"}, "seat:ROW1-L:person", id="a login of a passenger"),
    ],
)
def test_what_is_typed_in_half_is_refused_and_never_dropped(changes: dict[str, str], marked: str) -> None:
    assert marked in _faults_of(typed_of(load()) | changes)


def test_a_fault_nobody_typed_belongs_to_no_input() -> None:
    _, fields = written(typed_of(load()))

    assert field_of("/crew/0/weight/unit", fields) == "seat:COCKPIT-L:weight"
    assert field_of("/passengers/1/lap_infant/weight/value", fields) == "seat:ROW1-R:infant_weight"
    assert field_of("/aircraft", fields) == ""
    assert field_of("", fields) == ""


def test_nothing_typed_gives_a_document_without_a_single_figure() -> None:
    document, _ = written({})

    assert (document["crew"], document["passengers"], document["items"]) == ([], [], [])
    assert document["fuel"] == {
        "density": {"value": "", "unit": "", "source": ""},
        "at_engine_start": {},
        "not_usable": {},
    }
    assert document["limits"] == []


names = st.sampled_from((*typed_of(load()), "item:7:weight", "item::", "seat:", "limit:x:at")) | st.text(
    max_size=9
)


@settings(max_examples=80, deadline=None, derandomize=True)
@given(st.dictionaries(names, st.text(max_size=12) | st.just("\x00") | st.just("9" * 5000), max_size=12))
def test_whatever_is_typed_becomes_a_document_the_reader_refuses_or_reads(changes: dict[str, str]) -> None:
    document, _ = written(typed_of(deepcopy(load())) | changes)

    faults: tuple[Fault, ...] = ()
    try:
        read = read_load(document, twin())
    except Invalid as refused:
        faults = refused.faults

    assert faults or read.persons_on_board == document["persons_on_board"]
