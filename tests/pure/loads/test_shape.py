"""A load document without a loading basis: each spoiled in one place, and what is told, word for word."""

from typing import Any

import pytest

from loads.balance.shape import check_shape
from records.refusal import Invalid
from tests.pure.loads.making import load

GONE = object()
LB, NO_LB = {"value": 100, "unit": "lb"}, {"value": 0, "unit": "lb"}
INCHES = {"value": 1, "unit": "in"}
C0, P0, I0, L0, INFANT = "/crew/0", "/passengers/0", "/items/0", "/limits/0", "/passengers/1/lap_infant"
MISSING = "this field is needed and nothing is assumed; state it"
NO_ZERO = "zero makes no sense here; write the true figure, or leave the line out"
HOW = "not one of the words used here; write weighed or declared or standard or estimated"
A_FLAG = "true or false is needed here, without quotes"
A_TEXT = "a text is needed here; write it in quotes"
AN_OBJECT = "an object is needed here; write {...} with named fields"
A_LIST = "a list is needed here; write [...], empty if there is nothing"
FUEL_UNIT = "in is no unit of weight or volume; use one of kg, lb, l, US gal, imp gal"
TANKS = "an object of at most 100 tanks is needed here"


def no_field(*fields: str) -> str:
    return f"no such field here; the fields are {', '.join(fields)}"


def longer_than(most: int) -> str:
    return f"{most + 1} characters; at most {most} are kept, so shorten it"


def more_than(most: int) -> str:
    return f"{most + 1} lines; at most {most} are read, so put lines together"


def tanks(number: int) -> dict[str, Any]:
    return {f"TANK-{each}": LB for each in range(number)}


# where it is written, what is written, the field that is named, what is said of it
ROWS: list[tuple[str, Any, str, str]] = [
    (
        "/colour",
        "blue",
        "/colour",
        no_field(
            *("schema", "aircraft", "configuration", "flight", "persons_on_board", "crew", "passengers"),
            *("items", "fuel", "limits", "certification_category", "conditions", "seat_settings", "sequence"),
        ),
    ),
    ("/schema", "load/2", "/schema", "not one of the words used here; write tarebook.load/1"),
    ("/persons_on_board", 0, "/persons_on_board", "out of range; write a number from 1 to 1000"),
    ("/persons_on_board", 1001, "/persons_on_board", "out of range; write a number from 1 to 1000"),
    ("/persons_on_board", GONE, "/persons_on_board", MISSING),
    ("/certification_category", "C" * 65, "/certification_category", longer_than(64)),
    ("/conditions", 7, "/conditions", "a list is needed here; write [...], or leave it out"),
    (
        "/seat_settings",
        [{"setting": "fully aft"}],
        "/seat_settings/0/seat",
        "a line is for one seat or for one row; state one of the two",
    ),
    ("/sequence", 7, "/sequence", A_LIST),
    # crew
    ("/crew", [{}] * 61, "/crew", more_than(60)),
    (
        f"{C0}/colour",
        1,
        f"{C0}/colour",
        no_field("name", "position", "seat", "how", "person", "category", "weight"),
    ),
    (f"{C0}/how", GONE, f"{C0}/how", MISSING),
    (f"{C0}/how", "guessed", f"{C0}/how", HOW),
    (f"{C0}/name", 7, f"{C0}/name", A_TEXT),
    (f"{C0}/name", "N" * 121, f"{C0}/name", longer_than(120)),
    (f"{C0}/seat", "S" * 65, f"{C0}/seat", longer_than(64)),
    (f"{C0}/category", "C" * 65, f"{C0}/category", longer_than(64)),
    (f"{C0}/weight", NO_LB, f"{C0}/weight/value", NO_ZERO),
    (f"{C0}/position", "P" * 121, f"{C0}/position", longer_than(120)),
    (f"{C0}/person", "P" * 65, f"{C0}/person", longer_than(64)),
    # passengers
    ("/passengers", [{}] * 901, "/passengers", more_than(900)),
    (
        f"{P0}/colour",
        1,
        f"{P0}/colour",
        no_field("name", "seat", "how", "category", "weight", "lap_infant", "restraint"),
    ),
    (f"{P0}/seat", GONE, f"{P0}/seat", MISSING),
    (f"{P0}/name", 7, f"{P0}/name", A_TEXT),
    (f"{P0}/restraint", NO_LB, f"{P0}/restraint/value", NO_ZERO),
    (INFANT, [], INFANT, AN_OBJECT),
    (f"{INFANT}/colour", 1, f"{INFANT}/colour", no_field("name", "weight", "how")),
    (f"{INFANT}/name", GONE, f"{INFANT}/name", MISSING),
    (f"{INFANT}/name", "N" * 121, f"{INFANT}/name", longer_than(120)),
    (f"{INFANT}/how", "guessed", f"{INFANT}/how", HOW),
    (f"{INFANT}/weight", NO_LB, f"{INFANT}/weight/value", NO_ZERO),
    # items
    ("/items", [{}] * 401, "/items", more_than(400)),
    (
        f"{I0}/colour",
        1,
        f"{I0}/colour",
        no_field(
            *("kind", "what", "place", "how", "weight", "removed", "jettisonable"),
            *("footprint", "pallet", "net", "spreader"),
        ),
    ),
    (f"{I0}/how", GONE, f"{I0}/how", MISSING),
    (f"{I0}/how", "guessed", f"{I0}/how", HOW),
    (
        f"{I0}/kind",
        "fish",
        f"{I0}/kind",
        "not one of the words used here; write baggage or cargo or ballast or equipment or consumable",
    ),
    (f"{I0}/what", "W" * 121, f"{I0}/what", longer_than(120)),
    (f"{I0}/place", "P" * 65, f"{I0}/place", longer_than(64)),
    (f"{I0}/removed", "yes", f"{I0}/removed", A_FLAG),
    (f"{I0}/jettisonable", 1, f"{I0}/jettisonable", A_FLAG),
    (f"{I0}/footprint", 7, f"{I0}/footprint", AN_OBJECT),
    (f"{I0}/weight", NO_LB, f"{I0}/weight/value", NO_ZERO),
    # limits of the flight
    ("/limits", [{}] * 21, "/limits", more_than(20)),
    (f"{L0}/colour", 1, f"{L0}/colour", no_field("at", "weight", "source", "kind")),
    (f"{L0}/source", GONE, f"{L0}/source", MISSING),
    (f"{L0}/source", "S" * 201, f"{L0}/source", longer_than(200)),
    (f"{L0}/at", "ramp", f"{L0}/at", "not one of the words used here; write take-off or landing"),
    (f"{L0}/weight", NO_LB, f"{L0}/weight/value", NO_ZERO),
    (
        f"{L0}/kind",
        "weather",
        f"{L0}/kind",
        "not one of the words used here; "
        "write field length or climb or obstacles or en-route or brakes or tyres",
    ),
    # fuel
    ("/fuel", 7, "/fuel", AN_OBJECT),
    (
        "/fuel/colour",
        1,
        "/fuel/colour",
        no_field("density", "at_engine_start", "taxi", "trip", "minimum_at_landing", "not_usable"),
    ),
    ("/fuel/taxi", GONE, "/fuel/taxi", MISSING),
    ("/fuel/density", {"value": 0, "unit": "kg/l"}, "/fuel/density/value", NO_ZERO),
    (
        "/fuel/density/colour",
        1,
        "/fuel/density/colour",
        "not a field of a quantity; remove it",
    ),
    ("/fuel/taxi", INCHES, "/fuel/taxi/unit", FUEL_UNIT),
    ("/fuel/trip", INCHES, "/fuel/trip/unit", FUEL_UNIT),
    ("/fuel/minimum_at_landing", INCHES, "/fuel/minimum_at_landing/unit", FUEL_UNIT),
    ("/fuel/at_engine_start", 7, "/fuel/at_engine_start", TANKS),
    ("/fuel/at_engine_start", tanks(101), "/fuel/at_engine_start", TANKS),
    ("/fuel/at_engine_start", {"A": INCHES}, "/fuel/at_engine_start/A/unit", FUEL_UNIT),
    ("/fuel/not_usable", [], "/fuel/not_usable", TANKS),
    ("/fuel/not_usable", tanks(101), "/fuel/not_usable", TANKS),
    (
        "/fuel/not_usable",
        {"A/B": {"value": -1, "unit": "l"}},
        "/fuel/not_usable/A~1B/value",
        "below zero; write a positive figure",
    ),
]


def document() -> dict[str, Any]:
    """A sound document that has nearly everything a load may have."""
    made = load(
        certification_category="normal",
        conditions=["night"],
        seat_settings=[{"setting": "fully aft", "seat": "ROW1-L"}],
    )
    made["crew"][0]["category"] = "adult"
    made["passengers"][0]["restraint"] = LB
    made["items"][0] |= {"removed": False, "jettisonable": True}
    made["limits"][0]["kind"] = "climb"
    return made


def written(where: str, what: Any) -> dict[str, Any]:
    made = document()
    node: Any = made
    *steps, last = where[1:].split("/")
    for step in steps:
        node = node[int(step)] if isinstance(node, list) else node[step]
    if what is GONE:
        del node[last]
    else:
        node[last] = what
    return made


@pytest.mark.parametrize(("where", "what", "pointer", "detail"), ROWS, ids=[f"{r[0]} {r[2]}" for r in ROWS])
def test_one_spoiled_field_is_named_with_what_is_wrong(
    where: str, what: Any, pointer: str, detail: str
) -> None:
    with pytest.raises(Invalid) as refused:
        check_shape(written(where, what))

    assert [(fault.pointer, fault.detail) for fault in refused.value.faults] == [(pointer, detail)]


@pytest.mark.parametrize(
    ("where", "what"),
    [
        ("/persons_on_board", 1),
        ("/persons_on_board", 1000),
        ("/fuel/at_engine_start", tanks(100)),
        ("/fuel/at_engine_start", {"A": {"value": 0, "unit": "l"}}),
        ("/fuel/not_usable", {"A": NO_LB}),
        ("/fuel/not_usable", GONE),
        ("/fuel/taxi", NO_LB),
        ("/fuel/trip", NO_LB),
        ("/fuel/minimum_at_landing", NO_LB),
        ("/certification_category", GONE),
        ("/crew", []),
        ("/limits", GONE),
        (f"{P0}/category", "C" * 64),
    ],
)
def test_what_only_a_basis_could_refuse_is_taken(where: str, what: Any) -> None:
    check_shape(written(where, what))


def test_a_sound_document_is_taken_and_something_that_is_none_is_refused() -> None:
    check_shape(document())

    with pytest.raises(Invalid) as refused:
        check_shape([])
    assert [(fault.pointer, fault.detail) for fault in refused.value.faults] == [("", AN_OBJECT)]


def test_both_lists_of_tanks_are_looked_at_whatever_is_wrong_with_the_first() -> None:
    made = document()
    made["fuel"] |= {"at_engine_start": [], "not_usable": {"A": INCHES}}
    with pytest.raises(Invalid) as refused:
        check_shape(made)

    assert [(fault.pointer, fault.code) for fault in refused.value.faults] == [
        ("/fuel/at_engine_start", "object-form"),
        ("/fuel/not_usable/A/unit", "unit-dimension"),
    ]
    del made["fuel"]["at_engine_start"]
    with pytest.raises(Invalid) as refused:
        check_shape(made)

    assert [(fault.pointer, fault.code) for fault in refused.value.faults] == [
        ("/fuel/at_engine_start", "missing"),
        ("/fuel/not_usable/A/unit", "unit-dimension"),
    ]
