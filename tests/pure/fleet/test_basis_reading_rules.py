"""Reading categories, modifications, performance, lateral limits, fuel balance, trim: faults by name."""

from fractions import Fraction

import pytest

from fleet.basis_reading import read_basis
from records.refusal import Invalid
from tests.pure.fleet.documents import basis_document, changed, found_in, is_a_sentence_with_a_next_step
from tests.pure.loads.rich_bases import helicopter_with_limits, twin_with_limits

F = Fraction
PAGE = {"page": "6-9"}


def twin():
    return twin_with_limits(basis_document("twin"))


def helicopter():
    return helicopter_with_limits(basis_document("helicopter"))


def faults_of(document):
    with pytest.raises(Invalid) as refused:
        read_basis(document)
    assert all(is_a_sentence_with_a_next_step(fault) for fault in refused.value.faults)
    return found_in(refused.value)


def test_everything_is_read_into_the_units_of_the_basis():
    basis = read_basis(changed(twin(), "/fuel_balance/0/maximum", {"value": "81.6466266", "unit": "kg"}))
    assert [one.id for one in basis.certification_categories] == ["normal", "utility"]
    assert basis.certification_categories[1].limits[0][1].value == 6100
    assert basis.fuel_balance[0].maximum == 180  # 81.6466266 kg are 180 lb exactly
    assert basis.trim.step == F(1, 10)
    assert [(table.flap, len(table.lines)) for table in basis.trim.tables] == [("up", 2), ("10", 2)]
    assert basis.performance[0].operations == ("passenger-charter",)
    limit = read_basis(helicopter()).lateral_by_cg[0]
    assert limit.phases == ("ramp", "take-off", "landing", "minimum at landing")
    assert limit.points[0] == (2200, -40)


def test_a_lateral_limit_against_the_cg_counts_as_entered_and_contradicts_a_page_that_says_none():
    document = helicopter()
    document["envelopes"] = [one for one in document["envelopes"] if one["axis"] == "longitudinal"]
    assert read_basis(document).lateral_limits_entered
    assert faults_of(changed(document, "/lateral_limits", {"none": True, "source": PAGE})) == {
        ("/lateral_limits", "limits-contradict")
    }


@pytest.mark.parametrize(
    ("pointer", "value", "fault"),
    [
        ("/certification_categories/1/id", "normal", ("/certification_categories/1/id", "duplicate-id")),
        (
            "/certification_categories/1/limits/take_off/value",
            99999,
            ("/certification_categories/1/limits/take_off", "limit-looser"),
        ),
        ("/envelopes/0/categories", ["acrobatic"], ("/envelopes/0/categories/0", "unknown-id")),
        ("/envelopes/0/configurations", ["nine-seat"], ("/envelopes/0/configurations/0", "unknown-id")),
        ("/envelopes/0/categories", ["normal"], ("/envelopes", "envelope-missing")),
        ("/performance/0/rule", "perhaps", ("/performance/0/rule", "not-a-choice")),
        (
            "/performance/0",
            {"at": "landing", "rule": "structural only", "kinds": ["climb"], "source": PAGE},
            ("/performance/0/kinds", "kinds-not-required"),
        ),
        (
            "/performance/1",
            {
                "at": "take-off",
                "rule": "structural only",
                "operations": ["Passenger-charter"],
                "source": PAGE,
            },
            ("/performance/1/operations/0", "rule-twice"),
        ),
        ("/fuel_balance/0/left/0", "LEFT-TIP", ("/fuel_balance/0/left/0", "unknown-id")),
        ("/fuel_balance/0/right/0", "LEFT-MAIN", ("/fuel_balance/0/right/0", "tank-on-both-sides")),
        ("/fuel_balance/0/maximum/value", -1, ("/fuel_balance/0/maximum/value", "negative")),
        ("/fuel_balance/0/maximum", ..., ("/fuel_balance/0", "one-of")),
        ("/fuel_balance/0/maximum/unit", "stone", ("/fuel_balance/0/maximum/unit", "unit-unknown")),
        ("/trim/against_unit", ..., ("/trim/against_unit", "unit-missing")),
        ("/trim/step", 0, ("/trim/step", "not-above-zero")),
        ("/trim/range/high", 0, ("/trim/range/high", "range-empty")),
        ("/trim/tables/0/points/1", [140, 3], ("/trim/tables/0/points/1", "not-rising")),
        ("/trim/tables/1/weight/value", 4000, ("/trim/tables/1/weight", "duplicate")),
        ("/trim/tables/1/weight", ..., ("/trim/tables/1", "weight-missing")),
        ("/trim/tables/0/flap", ..., ("/trim/tables", "flap-missing")),
        ("/trim/tables/0/source", ..., ("/trim/tables/0/source", "source-missing")),
        ("/trim/tables/0/points/0/0", "1e3", ("/trim/tables/0/points/0/0", "number-form")),
    ],
)
def test_a_fault_of_the_twin_is_named(pointer, value, fault):
    assert fault in faults_of(changed(twin(), pointer, value))


@pytest.mark.parametrize(
    ("pointer", "value", "fault"),
    [
        ("/lateral_by_cg/0/unit", "kg mm", ("/lateral_by_cg/0/unit", "unit-dimension")),
        ("/lateral_by_cg/0/longitudinal_unit", ..., ("/lateral_by_cg/0/longitudinal_unit", "unit-missing")),
        ("/lateral_by_cg/0/points/1", [2200, -40], ("/lateral_by_cg/0/points", "envelope-repeated-point")),
        ("/lateral_by_cg/0/points/2", [2100, -30], ("/lateral_by_cg/0/points", "envelope-crosses-itself")),
        ("/lateral_by_cg/0/configurations", ["none"], ("/lateral_by_cg/0/configurations/0", "unknown-id")),
    ],
)
def test_a_fault_of_the_helicopter_is_named(pointer, value, fault):
    assert fault in faults_of(changed(helicopter(), pointer, value))


def test_two_lateral_limits_for_the_same_phase_are_refused_but_not_for_different_configurations():
    document = helicopter()
    other = {**document["lateral_by_cg"][0], "id": "other"}
    assert ("/lateral_by_cg/1/phases/0", "envelope-twice") in faults_of(
        changed(document, "/lateral_by_cg/1", other)
    )
    first, *rest = [one["id"] for one in document["configurations"]]
    document["lateral_by_cg"][0]["configurations"] = [first]
    other["configurations"] = rest
    assert len(read_basis(changed(document, "/lateral_by_cg/1", other)).lateral_by_cg) == 2


def test_percent_of_the_chord_needs_a_chord_and_has_no_unit():
    without = changed(twin(), "/chord", {"none": True, "source": PAGE})
    without = changed(changed(without, "/trim/against", "chord"), "/trim/against_unit", ...)
    assert faults_of(without) == {("/trim/against", "no-chord")}
    assert ("/trim/against_unit", "unit-dimension") in faults_of(changed(twin(), "/trim/against", "chord"))


def test_a_fuel_balance_table_that_does_not_rise_is_refused():
    table = {"unit": "lb", "points": [[0, 100], [0, 50], [-5, 20]]}
    document = changed(changed(twin(), "/fuel_balance/0/maximum", ...), "/fuel_balance/0/table", table)
    assert faults_of(document) == {
        ("/fuel_balance/0/table/points/1", "not-rising"),
        ("/fuel_balance/0/table/points/2", "not-rising"),
        ("/fuel_balance/0/table/points/2", "negative"),
    }


def test_an_envelope_of_a_category_must_reach_the_limit_of_that_category_only():
    """The utility envelope may end at 6,100 lb, its own limit; the normal one may not."""
    document = twin()
    plain = document["envelopes"][0]
    low = dict(plain, id="low", points=[[min(float(w), 6100), x] for w, x in plain["points"]])
    low["points"] = [[str(w), x] for w, x in dict.fromkeys(map(tuple, low["points"]))]
    high = dict(plain, id="high", categories=["normal"])
    low["categories"] = ["utility"]
    others = document["envelopes"][1:]
    reading = changed(document, "/envelopes", [low, high, *others])
    found = set()
    try:
        read_basis(reading)
    except Invalid as refused:
        found = found_in(refused)
    assert ("/envelopes/0/phases/1", "envelope-below-limit") not in found
    swapped = changed(
        changed(reading, "/envelopes/0/categories", ["normal"]), "/envelopes/1/categories", ["utility"]
    )
    assert any(
        pointer.startswith("/envelopes/0/") and code == "envelope-below-limit"
        for pointer, code in faults_of(swapped)
    )


def test_a_category_may_allow_less_at_take_off_than_the_basis_allows_at_landing():
    """The utility category takes off with 5,000 lb at most; that nothing heavier lands follows by itself."""
    document = changed(twin(), "/certification_categories/1/limits/take_off/value", 5000)
    basis = read_basis(document)
    assert basis.limits.landing.value > 5000
    assert basis.certification_categories[1].limits[0][1].value == 5000
