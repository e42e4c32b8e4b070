"""Every refusal of a table of standard weights, in full, and the whole table of one that has everything."""

from datetime import UTC, datetime
from decimal import Decimal

import pytest

from fleet.quantities import Quantity, Unit
from fleet.standard_weights import (
    Addition,
    Category,
    CrewKind,
    DeclaredRule,
    MonthDay,
    Row,
    Season,
    StandardWeights,
)
from fleet.standard_weights_reading import read_standard_weights, standard_weights_from_text, true_from_of
from records.canonical import canonical
from tests.pure.fleet.documents import changed, told
from tests.pure.loads.standards import lb, seasonal_document

OWN = "Operations manual A rev 4 p. A-2"
TWICE = "stands there twice; give each its own id"


def full_document():
    """Two seasons, a row for some routes and operations, declared weights, two kinds of crew."""
    document = seasonal_document()
    document["categories"] += [
        {"id": "infant-seat", "name": "infant in a seat", "below_age": 2, "counts_as": "child"}
    ]
    document["rows"][0] |= {
        "to_seats": 9,
        "operations": ["charter", "ferry"],
        "routes": [{"origin": "XAAA", "destination": "XBBB"}, {"origin": "XBBB", "destination": "XAAA"}],
        "source": {"page": "A-3", "authority": "FSDO-98"},
    }
    document["rows"][1]["source"] = {"document": "Survey", "page": "7"}
    document["declared"] = {
        "below_seats": 10,
        "additions": [{"what": "clothing", "weight": {"value": "8.5", "unit": "lb"}}],
        "source": {"page": "A-4", "revision": "5"},
    }
    document["crew"] = [
        {
            "id": "flight",
            "name": "flight crew",
            "positions": ["pilot", "co-pilot"],
            "weight": {"value": 190, "unit": "lb"},
            "source": {"page": "A-5"},
        },
        {
            "id": "cabin",
            "name": "cabin crew",
            "positions": ["attendant"],
            "weight": {"value": 80, "unit": "kg"},
            "source": {"document": "Survey", "revision": "2", "page": "8"},
        },
    ]
    return document


def pounds(value):
    return Quantity(Decimal(value), Unit.LB)


TABLE = StandardWeights(
    title="Company weights",
    source=f"{OWN}, approved by FSDO-99",
    categories=(
        Category("adult", "adult", 13),
        Category("child", "child", 2, 13),
        Category("infant-seat", "infant in a seat", None, 2, "child"),
    ),
    seasons=(
        Season("winter", "winter", MonthDay(11, 1), MonthDay(4, 30)),
        Season("summer", "summer", MonthDay(5, 1), MonthDay(10, 31)),
    ),
    rows=(
        Row(
            number=1,
            from_seats=1,
            to_seats=9,
            season="winter",
            operations=("charter", "ferry"),
            routes=(("XAAA", "XBBB"), ("XBBB", "XAAA")),
            weights={"adult": pounds("200"), "child": pounds("90")},
            source="Operations manual A rev 4 p. A-3, approved by FSDO-98",
        ),
        Row(
            number=2,
            from_seats=1,
            to_seats=None,
            season="summer",
            operations=(),
            routes=(),
            weights={"adult": pounds("195"), "child": pounds("85")},
            source="Survey p. 7",
        ),
    ),
    declared=DeclaredRule(
        True, 10, (Addition("clothing", pounds("8.5")),), "Operations manual A rev 5 p. A-4"
    ),
    crew=(
        CrewKind(
            "flight", "flight crew", ("pilot", "co-pilot"), pounds("190"), "Operations manual A rev 4 p. A-5"
        ),
        CrewKind("cabin", "cabin crew", ("attendant",), Quantity(Decimal(80), Unit.KG), "Survey rev 2 p. 8"),
    ),
)


def test_everything_a_table_says_is_read():
    assert read_standard_weights(full_document()) == TABLE


def test_the_stored_text_of_a_version_gives_the_table_under_its_title_and_number():
    text = canonical(full_document()).decode()

    assert standard_weights_from_text(text, 3).label == "Company weights, version 3"
    assert standard_weights_from_text(text, 3).rows == TABLE.rows
    assert standard_weights_from_text(text, 4).label == "Company weights, version 4"
    assert true_from_of(full_document()) == datetime(2026, 1, 1, tzinfo=UTC)


def test_a_table_may_say_that_declared_weights_are_never_used_and_name_no_seasons_and_no_crew():
    document = seasonal_document(declared={"none": True, "source": {"page": "A-9"}})
    del document["seasons"]
    for row in document["rows"]:
        del row["season"]
    del document["source"]["revision"]

    table = read_standard_weights(document)

    assert table.declared == DeclaredRule(False, None, (), "Operations manual A p. A-9")
    assert (table.seasons, table.crew) == ((), ())
    assert table.source == "Operations manual A p. A-2, approved by FSDO-99"
    assert read_standard_weights(seasonal_document()).declared is None


def test_rows_may_be_for_one_number_of_seats_and_a_category_for_one_year_of_age():
    document = changed(full_document(), "/rows/0/to_seats", 1)
    document = changed(document, "/categories/2/from_age", 1)

    table = read_standard_weights(document)

    assert table.rows[0].to_seats == 1
    assert table.categories[2].from_age == 1


@pytest.mark.parametrize(
    ("at", "value", "faults"),
    [
        (
            "/source/document",
            ...,
            [("/source/document", "missing", "the document the table was taken from is missing; name it")],
        ),
        (
            "/categories/3",
            {"id": "infant-seat", "name": "the same again", "counts_as": "adult"},
            [("/categories/3/id", "duplicate", TWICE)],
        ),
        (
            "/categories/1/below_age",
            2,
            [("/categories/1/below_age", "out-of-order", "must be above from_age; correct one")],
        ),
        (
            "/categories/2/counts_as",
            "infant-seat",
            [
                (
                    "/categories/2/counts_as",
                    "unknown-category",
                    "names no category with a weight of its own; use one of the others",
                )
            ],
        ),
        (
            "/seasons/1/id",
            "winter",
            [
                ("/seasons/1/id", "duplicate", TWICE),
                ("/rows/1/season", "unknown-season", "not a season of this table; add it"),
            ],
        ),
        (
            "/seasons/1/first",
            "06-31",
            [("/seasons/1/first", "wrong-form", "no such day in any year; correct it")],
        ),
        (
            "/seasons/1/first",
            "05-03",
            [
                (
                    "/seasons",
                    "season-gap",
                    "05-01 lies in no season; let the seasons hold every day exactly once",
                )
            ],
        ),
        (
            "/seasons/1/last",
            "11-02",
            [
                (
                    "/seasons",
                    "season-overlap",
                    "11-01 lies in 2 seasons; let the seasons hold every day exactly once",
                )
            ],
        ),
        (
            "/rows/0/to_seats",
            0,
            [("/rows/0/to_seats", "out-of-order", "must not be below from_seats; correct one")],
        ),
        (
            "/rows/1/season",
            "monsoon",
            [("/rows/1/season", "unknown-season", "not a season of this table; add it")],
        ),
        (
            "/rows/1/weights/2",
            lb("10", "dog"),
            [
                (
                    "/rows/1/weights/2/category",
                    "unknown-category",
                    "not a category with a weight of its own; use one of the table's",
                )
            ],
        ),
        (
            "/rows/1/weights/2",
            lb("10", "adult"),
            [("/rows/1/weights/2/category", "duplicate", "stands there twice; remove one")],
        ),
        (
            "/rows/1/weights/1/value",
            0,
            [("/rows/1/weights/1/value", "not-above-zero", "must be above zero; correct it")],
        ),
        (
            "/rows/1/weights",
            [lb("10", "infant-seat")],
            [
                (
                    "/rows/1/weights/0/category",
                    "unknown-category",
                    "not a category with a weight of its own; use one of the table's",
                ),
                (
                    "/rows/1/weights",
                    "category-missing",
                    "no weight for adult, child; every row has one for every category",
                ),
            ],
        ),
        (
            "/declared/none",
            True,
            [("/declared", "none-and-more", "says none and more; leave out either none or the rest")],
        ),
        (
            "/declared/additions/0/weight/value",
            "-1",
            [("/declared/additions/0/weight/value", "not-above-zero", "must be above zero; correct it")],
        ),
        ("/crew/1/id", "flight", [("/crew/1/id", "duplicate", TWICE)]),
        (
            "/crew/1/positions",
            ["attendant", "pilot"],
            [("/crew/1/positions", "duplicate", "a position is of one kind only; remove it from one")],
        ),
        (
            "/crew/1/weight/value",
            0,
            [("/crew/1/weight/value", "not-above-zero", "must be above zero; correct it")],
        ),
        ("/title", ..., [("/title", "missing", "title is missing; give it")]),
    ],
)
def test_a_refusal_says_where_and_what_to_do(at, value, faults):
    assert told(read_standard_weights, changed(full_document(), at, value)) == faults


def test_a_position_of_the_first_kind_is_remembered_past_the_second():
    document = full_document()
    document["crew"].append({**document["crew"][0], "id": "third", "positions": ["co-pilot"]})

    assert told(read_standard_weights, document) == [
        ("/crew/2/positions", "duplicate", "a position is of one kind only; remove it from one")
    ]


def test_29_february_is_a_day_of_the_year_and_must_lie_in_a_season_too():
    document = changed(full_document(), "/seasons/0/last", "02-28")
    document = changed(document, "/seasons/1/first", "03-01")

    assert told(read_standard_weights, document) == [
        ("/seasons", "season-gap", "02-29 lies in no season; let the seasons hold every day exactly once")
    ]


@pytest.mark.parametrize(
    ("first", "last", "lost"), [("01-02", "12-31", "01-01"), ("01-01", "12-30", "12-31")]
)
def test_the_first_and_the_last_day_of_the_year_are_asked_too(first, last, lost):
    document = full_document()
    document["seasons"] = [{"id": "all", "name": "all the year", "first": first, "last": last}]
    for row in document["rows"]:
        row["season"] = "all"

    assert told(read_standard_weights, document) == [
        ("/seasons", "season-gap", f"{lost} lies in no season; let the seasons hold every day exactly once")
    ]
