"""Reading empty weights: which figure stands, in which units, and what is refused."""

from datetime import UTC, date, datetime
from fractions import Fraction
from typing import Any

import pytest

from fleet.basis import Basis
from fleet.basis_reading import read_basis
from fleet.empty_weight_reading import read_empty_weight, read_particulars
from records.refusal import Invalid
from tests.pure.fleet.documents import (
    NAMES,
    basis_document,
    changed,
    empty_weight_document,
    example,
    found_in,
    is_a_sentence_with_a_next_step,
)


@pytest.fixture
def twin() -> Basis:
    return read_basis(basis_document("twin"))


@pytest.mark.parametrize("name", NAMES)
def test_the_invented_empty_weights_are_read(name: str) -> None:
    figures = read_empty_weight(empty_weight_document(name), read_basis(basis_document(name)))

    assert figures.weight > 0
    assert figures.how == empty_weight_document(name)["how"]


def test_a_recorded_moment_stands_against_weight_times_arm(twin: Basis) -> None:
    # Read: FAA-H-8083-25C figure 10-10 has 69,393.0 on record, 69,416.34 by product.
    row = example("PHAK-10-10")["inputs"]["items"][0]
    document = empty_weight_document("twin")
    for field, figure in (("weight", "weight_lb"), ("arm", "arm_in"), ("moment", "moment_lb_in")):
        document = changed(document, f"/{field}/value", row[figure])

    assert Fraction(row["weight_lb"]) * Fraction(row["arm_in"]) == Fraction("69416.34")
    assert read_empty_weight(document, twin).moment == 69393


def test_without_a_moment_weight_times_arm_is_taken(twin: Basis) -> None:
    document = changed(empty_weight_document("twin"), "/moment", ...)
    document = changed(document, "/lateral_moment", ...)
    document = changed(document, "/lateral_arm", {"value": "-0.3", "unit": "in"})

    figures = read_empty_weight(document, twin)

    assert figures.moment == 3962 * Fraction("157.5")
    assert figures.lateral_moment == 3962 * Fraction("-0.3")


def test_figures_are_brought_exactly_into_the_units_of_the_basis(twin: Basis) -> None:
    document = changed(empty_weight_document("twin"), "/weight", {"value": "1800", "unit": "kg"})
    document = changed(document, "/moment", {"value": "7200000", "unit": "kg mm"})
    document = changed(document, "/arm", {"value": "4", "unit": "m"})

    figures = read_empty_weight(document, twin)

    assert figures.weight == 1800 / Fraction("0.45359237")
    assert figures.moment == 7_200_000 / Fraction("11.521246198")


@pytest.mark.parametrize(
    ("at", "value", "pointer", "code"),
    [
        ("/datum", "firewall", "/datum", "datum-differs"),
        ("/fit", "skis", "/fit", "fit-unknown"),
        ("/arm/value", "155.9", "/moment", "moment-against-arm"),
        ("/arm", {"value": "157.5", "unit": "mm"}, "/moment", "moment-against-arm"),
        ("/lateral_arm", {"value": "-3", "unit": "in"}, "/lateral_moment", "moment-against-arm"),
        ("/weight/value", 0, "/weight/value", "not-above-zero"),
        ("/weight/value", "-1", "/weight/value", "not-above-zero"),
        ("/weight/value", "4e3", "/weight/value", "number-form"),
        ("/weight/unit", ..., "/weight/unit", "unit-missing"),
        ("/weight/unit", "in", "/weight/unit", "unit-dimension"),
        ("/moment/unit", "lb", "/moment/unit", "unit-dimension"),
        ("/lateral_moment", ..., "", "one-of"),
        ("/how", "guess", "/how", "not-a-choice"),
        ("/includes/oil", "half", "/includes/oil", "not-a-choice"),
        ("/includes/fuel", True, "/includes/fuel", "unknown-field"),
        ("/date", "18.3.2026", "/date", "wrong-form"),
        ("/date", "2026-02-30", "/date", "wrong-form"),
        ("/date", "20260318", "/date", "wrong-form"),
        ("/true_from", "2026-03-19", "/true_from", "wrong-form"),
        ("/true_from", "2026-03-19T00:00:00", "/true_from", "wrong-form"),
        ("/true_from", "2026-13-19T00:00:00Z", "/true_from", "wrong-form"),
        ("/true_from", 20260319, "/true_from", "wrong-type"),
        ("/true_from", "2026-03-16T23:59:59Z", "/true_from", "true-before-weighing"),
        ("/report", "", "/report", "empty"),
        ("/signed_by", ..., "/signed_by", "missing"),
        ("/schema", "tarebook.empty-weight/2", "/schema", "schema-unknown"),
    ],
)
def test_a_faulty_empty_weight_is_refused_by_field_and_code(
    twin: Basis, at: str, value: Any, pointer: str, code: str
) -> None:
    with pytest.raises(Invalid) as refused:
        read_empty_weight(changed(empty_weight_document("twin"), at, value), twin)

    assert (pointer, code) in found_in(refused.value)
    assert all(is_a_sentence_with_a_next_step(fault) for fault in refused.value.faults)


def test_neither_moment_nor_arm_is_refused(twin: Basis) -> None:
    document = changed(changed(empty_weight_document("twin"), "/moment", ...), "/arm", ...)

    with pytest.raises(Invalid) as refused:
        read_empty_weight(document, twin)

    assert found_in(refused.value) == {("", "one-of")}


def test_rounding_of_a_printed_arm_near_the_centreline_is_no_gross_difference(twin: Basis) -> None:
    document = changed(empty_weight_document("twin"), "/lateral_arm", {"value": "-0.3", "unit": "in"})

    assert read_empty_weight(document, twin).lateral_moment == -1180  # by product -1188.6, 0.7 %
    document = changed(document, "/lateral_moment/value", "-1100")  # 8 % away, yet -0.28 in prints as -0.3
    assert read_empty_weight(document, twin).lateral_moment == -1100


def test_datum_and_fit_are_both_named_when_both_are_wrong(twin: Basis) -> None:
    document = changed(changed(empty_weight_document("twin"), "/datum", "firewall"), "/fit", "floats")

    with pytest.raises(Invalid) as refused:
        read_empty_weight(document, twin)

    assert found_in(refused.value) == {("/datum", "datum-differs"), ("/fit", "fit-unknown")}


def test_the_particulars_can_be_read_before_a_basis_is_known() -> None:
    particulars = read_particulars(empty_weight_document("helicopter"))

    assert particulars.true_from == datetime(2024, 8, 23, tzinfo=UTC)
    assert particulars.date == date(2024, 8, 22)
    assert (particulars.how, particulars.fit) == ("opening entry", "skids")


@pytest.mark.parametrize("document", [None, [], "text", 5, {}])
def test_what_is_no_empty_weight_at_all_is_refused(document: Any) -> None:
    with pytest.raises(Invalid):
        read_particulars(document)


@pytest.mark.parametrize("day", ["0001-01-01", "9999-12-31"])
def test_the_ends_of_the_calendar_are_days_like_others(day: str) -> None:
    document = changed(empty_weight_document("twin"), "/how", "weighing")
    document = changed(changed(document, "/date", day), "/true_from", "2026-05-03T00:00:00Z")

    if day < "2026":
        assert read_particulars(document).date.year == 1
    else:
        with pytest.raises(Invalid) as refused:
            read_particulars(document)
        assert found_in(refused.value) == {("/true_from", "true-before-weighing")}
