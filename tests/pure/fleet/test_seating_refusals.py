"""Every refusal of a cabin word by word, and the whole of a cabin that is read."""

from fractions import Fraction

import pytest

from fleet.quantities import Unit
from fleet.seating import CabinRow
from fleet.seating_reading import Cabin, read_cabin
from tests.pure.fleet.cabins import cabin
from tests.pure.fleet.documents import changed, told

F = Fraction


def test_everything_of_a_cabin_is_read():
    document = changed(cabin(), "/rows/1/arm", {"value": 254, "unit": "cm"})  # 100 in
    document = changed(document, "/rows/2/section", ...)
    document = changed(document, "/rows/2/remaining", 3)
    document = changed(document, "/assumed/1", {"arm": {"value": 1, "unit": "ft"}})
    document = changed(document, "/weight/value", "0.5")

    assert read_cabin(document) == Cabin(
        rows=(
            CabinRow("1", F(200), 2, 1, 0, "cabin"),
            CabinRow("2", F(100), 2, 1, 0, "cabin"),
            CabinRow("3", F(260), 2, 1, 3, ""),
        ),
        weight=F("0.5"),
        assumed={"cabin": F(230), "": F(12)},
        unit=Unit.LB,
        length=Unit.IN,
    )


def test_without_assumed_arms_there_are_none():
    document = cabin()
    del document["assumed"]

    assert read_cabin(document).assumed == {}


@pytest.mark.parametrize(
    ("at", "value", "faults"),
    [
        ("/weight/value", 0, [("/weight/value", "not-above-zero", "must be above zero; correct it")]),
        ("/weight/value", "-1", [("/weight/value", "not-above-zero", "must be above zero; correct it")]),
        ("/rows/2/row", "1", [("/rows/2/row", "duplicate", "row 1 stands here twice; remove one")]),
        (
            "/rows/1",
            {"row": "2", "arm": {"value": 1, "unit": "in"}, "window": 0, "aisle": 0, "remaining": 0},
            [("/rows/1", "row-without-seats", "this row has no seat; enter its seats or leave it out")],
        ),
        (
            "/assumed/0/section",
            "attic",
            [
                (
                    "/assumed/0/section",
                    "unknown-id",
                    "no row is counted in this section; correct or remove it",
                )
            ],
        ),
        (
            "/assumed/0/section",
            ...,
            [
                (
                    "/assumed/0/section",
                    "unknown-id",
                    "no row is counted in this section; correct or remove it",
                )
            ],
        ),
        (
            "/assumed/1",
            {"section": "cabin", "arm": {"value": 1, "unit": "in"}},
            [("/assumed/1/section", "duplicate", "this section stands here twice; remove one")],
        ),
        (
            "/weight/unit",
            ...,
            [("/weight/unit", "unit-missing", "the unit is missing, and none is inferred; state it")],
        ),
        ("/rows", [], [("/rows", "too-few", "has too few entries; enter the missing ones")]),
    ],
)
def test_a_refusal_says_where_and_what_to_do(at, value, faults):
    assert told(read_cabin, changed(cabin(), at, value)) == faults


def test_all_faults_are_told_at_once_in_the_order_of_the_document():
    document = changed(cabin(), "/rows/1/row", "1")
    document = changed(document, "/assumed/0/section", "attic")
    document = changed(document, "/weight/value", 0)

    assert [at for at, _, _ in told(read_cabin, document)] == [
        "/rows/1/row",
        "/assumed/0/section",
        "/weight/value",
    ]


def test_what_is_no_object_is_refused():
    assert told(read_cabin, [cabin()]) == [
        ("", "wrong-type", "not the kind of value asked for here; see the schema")
    ]
