"""People who were not weighed count what the operator's approved table says: its row by seats installed, its
season by the local date of the departure.

Figures: AMC1 CAT.POL.MAB.100(e) and NCC.POL.105(e) as in `fleet/samples/standard-weights-eu.json` (read), and
an invented table in pounds; the rest is common practice.
"""

from fractions import Fraction

import pytest

from fleet.standard_weights_reading import read_standard_weights
from loads.balance.declared import read_load
from records.refusal import Invalid
from tests.pure.loads.making import twin
from tests.pure.loads.standards import (
    assessed,
    document_with,
    eu,
    eu_document,
    passenger,
    seasonal_document,
    standard,
)

LB_PER_KG = 1 / Fraction("0.45359237")


def seat_weight(result, words):
    return next(line.weight for line in result.lines if line.what.startswith(words))


def test_a_standard_passenger_counts_the_figure_of_the_row_for_the_seats_installed():
    """The twin has five passenger seats: 104 kg a man, 86 a woman, whoever else is aboard."""
    people = [standard("A", "ROW1-L", "male"), standard("B", "ROW1-R", "female")]

    result = assessed(document_with(people), eu())

    assert seat_weight(result, "row1 l") == 104 * LB_PER_KG
    assert seat_weight(result, "row1 r") == 86 * LB_PER_KG
    check = result.check("weights.standard")
    assert check.outcome == "pass"
    assert check.margin_text == (
        "2 standard, by Standard masses, small aircraft and up, row 1, 1 to 5 seats installed"
    )
    assert "point (e), table" in check.source
    assert result.as_document()["standard_weights"]["standard"] == 2


def test_without_a_table_a_standard_weight_is_not_known():
    result = assessed(document_with([standard("A", "ROW1-L", "adult")]), None)

    check = result.check("weights.unknown")
    assert (result.verdict, check.outcome) == ("unresolved", "unresolved")
    assert check.what_next.endswith("Or have a table of standard weights approved.")


@pytest.mark.parametrize(
    ("departure", "weight"),
    [
        ("2026-10-31T23:59:00-06:00", 195),  # local date is still October, though it is November in UTC
        ("2026-11-01T00:00:00-06:00", 200),
        ("2027-04-30T23:30:00-06:00", 200),  # 1 May in UTC
        ("2027-05-01T00:00:00+10:00", 195),  # 30 April in UTC
        ("2028-02-29T12:00:00Z", 200),
    ],
)
def test_the_local_date_of_the_departure_picks_the_season(departure, weight):
    table = read_standard_weights(seasonal_document())

    result = assessed(document_with([standard("A", "ROW1-L", "adult")], departure=departure), table)

    assert seat_weight(result, "row1 l") == weight
    season = "winter" if weight == 200 else "summer"
    assert result.check("weights.standard").margin_text.endswith(season)


def test_a_declared_weight_counts_with_the_additions_of_the_table():
    """82 kg declared + 4 clothing + 6 hand baggage = 92 kg, in two lines that can be added by hand."""
    mass = {"value": 82, "unit": "kg"}

    result = assessed(document_with([passenger("A", "ROW1-L", how="declared", weight=mass)]), eu())

    lines = [line for line in result.lines if line.what.startswith("row1 l")]
    assert [line.weight for line in lines] == [82 * LB_PER_KG, 10 * LB_PER_KG]
    assert lines[1].what == "row1 l, added to the declared weight"
    assert "1 declared with clothing 4 kg, hand baggage 6 kg" in result.check("weights.standard").margin_text
    held = next(one for one in result.checks if one.code == "seat.ROW1-L")
    assert held.actual == "202.8"  # 92 kg = 202.825 lb: what the seat holds counts the additions


def test_a_weighed_passenger_counts_as_weighed():
    mass = {"value": 82, "unit": "kg"}

    result = assessed(document_with([passenger("A", "ROW1-L", how="weighed", weight=mass)]), eu())

    assert seat_weight(result, "row1 l") == 82 * LB_PER_KG
    assert all(check.code != "weights.standard" for check in result.checks)
    assert "standard_weights" not in result.as_document()


def test_where_the_table_allows_no_declared_weight_one_leaves_the_load_unresolved():
    table = read_standard_weights(eu_document(declared={"none": True, "source": {"page": "d"}}))
    mass = {"value": 82, "unit": "kg"}

    result = assessed(document_with([passenger("A", "ROW1-L", how="declared", weight=mass)]), table)

    check = result.check("weights.declared")
    assert (check.outcome, result.verdict) == ("unresolved", "unresolved")
    assert "row1 l" in check.margin_text


def test_a_declared_weight_is_allowed_below_the_number_of_seats_and_not_at_it():
    mass = {"value": 82, "unit": "kg"}
    document = document_with([passenger("A", "ROW1-L", how="declared", weight=mass)])

    def below(seats):
        return read_standard_weights(eu_document(declared={"below_seats": seats, "source": {"page": "d"}}))

    five = assessed(document, below(5))
    six = assessed(document, below(6))

    assert five.check("weights.declared").outcome == "unresolved"
    assert all(check.code != "weights.declared" for check in six.checks)


def test_the_crew_counts_by_kind_and_a_position_of_no_kind_is_not_guessed():
    document = document_with([])
    pilot = document["crew"][0]
    pilot |= {"how": "standard"}
    del pilot["weight"]
    assert seat_weight(assessed(document, eu()), "cockpit l") == 85 * LB_PER_KG

    document["crew"].append({"name": "H", "position": "hoist operator", "seat": "ROW1-L", "how": "standard"})
    document["persons_on_board"] = 2
    result = assessed(document, eu())
    assert result.verdict == "unresolved"
    assert result.check("weights.standard").margin_text == "no kind of crew in the table for row1 l"

    document["crew"][1]["category"] = "cabin"
    assert seat_weight(assessed(document, eu()), "row1 l") == 75 * LB_PER_KG


def test_no_row_for_this_operation_leaves_the_weights_unknown():
    document = seasonal_document()
    for row in document["rows"]:
        row["operations"] = ["freight"]

    result = assessed(document_with([standard("A", "ROW1-L", "adult")]), read_standard_weights(document))

    check = result.check("weights.standard")
    assert check.outcome == "unresolved"
    assert check.margin_text == (
        "no row of Company weights is for 5 seats installed, operation passenger-charter, on 2026-12-01"
    )
    assert not result.as_document()["phases"]


def test_a_row_for_the_route_stands_before_the_one_for_all():
    document = seasonal_document()
    special = {
        "from_seats": 1,
        "routes": [{"origin": "XNAL", "destination": "XKOR"}],
        "weights": [
            {"category": "adult", "value": "220", "unit": "lb"},
            {"category": "child", "value": "90", "unit": "lb"},
        ],
        "source": {"page": "A-3"},
    }
    document["rows"].insert(0, special)
    table = read_standard_weights(document)

    there = assessed(document_with([standard("A", "ROW1-L", "adult")]), table)
    back = assessed(
        document_with([standard("A", "ROW1-L", "adult")], origin="XKOR", destination="XNAL"), table
    )

    assert (seat_weight(there, "row1 l"), seat_weight(back, "row1 l")) == (220, 200)


def test_a_category_the_table_does_not_have_is_refused_by_its_field():
    with pytest.raises(Invalid) as refused:
        read_load(document_with([standard("A", "ROW1-L", "adult")]), twin(), eu())

    (fault,) = refused.value.faults
    assert (fault.pointer, fault.code) == ("/passengers/0/category", "unknown-category")
    assert "male, female, child, infant" in fault.detail
