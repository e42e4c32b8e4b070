"""Reading tables of standard weights: what is wrong is named by its field, all at once."""

import pytest

from fleet.standard_weights import MonthDay, Season
from fleet.standard_weights_reading import read_standard_weights
from records.refusal import Invalid
from tests.pure.loads.standards import eu_document, lb, seasonal_document


def faults_of(document):
    with pytest.raises(Invalid) as refused:
        read_standard_weights(document)
    return {(fault.pointer, fault.code) for fault in refused.value.faults}


def test_the_sample_file_is_a_sound_table_and_names_its_source():
    table = read_standard_weights(eu_document())

    assert table.source.startswith("NCC.POL.105(e)")
    assert [row.seats() for row in table.rows] == [
        "1 to 5 seats",
        "6 to 9 seats",
        "10 to 19 seats",
        "20 seats or more",
    ]
    assert [each.ages() for each in table.categories] == [
        "12 years and over",
        "12 years and over",
        "2 to under 12 years",
        "under 2 years",
    ]
    assert str(table.rows[0].source) == ("NCC.POL.105(e), AMC1 CAT.POL.MAB.100(e) p. point (e), table")


def test_a_season_may_run_over_the_end_of_the_year():
    from datetime import date  # noqa: PLC0415  # one test alone needs it

    winter = Season("w", "winter", MonthDay(11, 1), MonthDay(4, 30))

    assert winter.holds(date(2026, 12, 31))
    assert winter.holds(date(2027, 4, 30))
    assert not winter.holds(date(2027, 5, 1))
    assert str(MonthDay(4, 30)) == "04-30"


@pytest.mark.parametrize(
    ("seasons", "code"),
    [
        ([("11-01", "04-30"), ("05-02", "10-31")], "season-gap"),
        ([("11-01", "05-01"), ("05-01", "10-31")], "season-overlap"),
    ],
)
def test_seasons_hold_every_day_exactly_once(seasons, code):
    document = seasonal_document()
    for season, (first, last) in zip(document["seasons"], seasons, strict=True):
        season |= {"first": first, "last": last}

    assert ("/seasons", code) in faults_of(document)


def test_every_fault_is_named_at_once():
    document = seasonal_document()
    document["rows"][0]["weights"] = [lb("0", "adult"), lb("10", "dog")]
    document["rows"][1]["season"] = "monsoon"
    document["rows"][1]["to_seats"] = 0
    document["categories"].append({"id": "infant", "name": "infant", "counts_as": "baby"})
    document["categories"].append({"id": "adult", "name": "adult again", "from_age": 9, "below_age": 9})

    assert faults_of(document) >= {
        ("/rows/0/weights/0/value", "not-above-zero"),
        ("/rows/0/weights/1/category", "unknown-category"),
        ("/rows/0/weights", "category-missing"),
        ("/rows/1/season", "unknown-season"),
        ("/rows/1/to_seats", "out-of-order"),
        ("/categories/2/counts_as", "unknown-category"),
        ("/categories/3/id", "duplicate"),
        ("/categories/3/below_age", "out-of-order"),
    }


def test_crew_positions_and_declared_weights_are_read_strictly():
    document = eu_document()
    document["crew"][1]["positions"] = ["co-pilot"]
    document["crew"].append({**document["crew"][0], "positions": []})
    document["declared"] = {"none": True, "below_seats": 10, "source": {"page": "d"}}

    assert faults_of(document) == {
        ("/crew/1/positions", "duplicate"),
        ("/crew/2/id", "duplicate"),
        ("/declared", "none-and-more"),
    }


def test_a_table_without_the_document_it_was_taken_from_is_refused():
    assert faults_of(eu_document(source={"page": "1"})) == {("/source/document", "missing")}


def test_a_day_that_no_year_has_is_refused():
    document = seasonal_document()
    document["seasons"][0]["last"] = "02-30"

    assert ("/seasons/0/last", "wrong-form") in faults_of(document)


def test_what_is_no_object_is_refused():
    assert faults_of([]) == {("", "wrong-type")}
