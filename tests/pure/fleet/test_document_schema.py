"""What is told of a document that does not have the form its schema asks for: each keyword in full."""

from decimal import Decimal

import pytest

from fleet.document_schema import MOST_FAULTS, is_date, is_decimal, is_instant, shape_faults
from records.refusal import Fault
from tests.pure.fleet.documents import basis_document, changed, empty_weight_document
from tests.pure.loads.papers import restriction_document
from tests.pure.loads.standards import seasonal_document

BASIS, TABLE = "loading-basis-1", "standard-weights-1"
PLAINLY = "write a plain decimal number: digits, one point, a minus; no exponent, blank or comma"
WHEN = "write a day as 2026-05-02, an instant with its offset as 2026-05-03T00:00:00Z"
FORM = "not in the form asked for here (ids: A-Z 0-9 -, at most 24; texts: not blank)"


def twin(at, value):
    return shape_faults(BASIS, changed(basis_document("twin"), at, value))


def table(at, value):
    return shape_faults(TABLE, changed(seasonal_document(), at, value))


@pytest.mark.parametrize(
    ("told", "code", "detail"),
    [
        (lambda at: twin(at, "1e3"), "number-form", PLAINLY),
        (
            lambda at: twin(at, "1234567890.123456"),
            "number-digits",
            "more than 15 digits; round it as the source does",
        ),
    ],
)
def test_a_number_is_judged_as_numbers_are(told, code, detail):
    assert told("/seats/0/arm/value") == [Fault("/seats/0/arm/value", code, detail)]


@pytest.mark.parametrize(
    ("at", "value", "pointer", "code", "detail"),
    [
        ("/seats/0/name", ..., "/seats/0/name", "missing", "name is missing; give it"),
        (
            "/seats/0/arm/unit",
            ...,
            "/seats/0/arm/unit",
            "unit-missing",
            "the unit is missing, and none is inferred; state it",
        ),
        (
            "/tanks/0/table/gives_unit",
            ...,
            "/tanks/0/table/gives_unit",
            "unit-missing",
            "the unit is missing, and none is inferred; state it",
        ),
        (
            "/seats/0/source",
            ...,
            "/seats/0/source",
            "source-missing",
            "every figure names where it stands; give document and page",
        ),
        ("/a~b", 1, "/a~0b", "unknown-field", "not a field here; remove or correct it"),
        (
            "/seats/0/for",
            "cargo",
            "/seats/0/for",
            "not-a-choice",
            "not one of the choices; use one of crew, passenger, either",
        ),
        (
            "/seats/0/arm/unit",
            "kg",
            "/seats/0/arm/unit",
            "unit-dimension",
            "kg does not measure this; use one of mm, cm, m, in, ft",
        ),
        (
            "/seats/0/arm/unit",
            "yd",
            "/seats/0/arm/unit",
            "unit-unknown",
            "not a known unit; use one of mm, cm, m, in, ft",
        ),
        (
            "/seats/0/arm/unit",
            7,
            "/seats/0/arm/unit",
            "unit-unknown",
            "not a known unit; use one of mm, cm, m, in, ft",
        ),
        (
            "/units/weight",
            "in",
            "/units/weight",
            "unit-dimension",
            "in does not measure this; use one of kg, lb",
        ),
        (
            "/units/length",
            "lb",
            "/units/length",
            "unit-dimension",
            "lb does not measure this; use one of mm, cm, m, in, ft",
        ),
        (
            "/units/volume",
            "kg",
            "/units/volume",
            "unit-dimension",
            "kg does not measure this; use one of l, US gal, imp gal",
        ),
        (
            "/lateral_positive",
            "left",
            "/lateral_positive",
            "lateral-positive",
            "lateral arms count right as positive; turn the signs where the manual counts left",
        ),
        (
            "/schema",
            "x",
            "/schema",
            "schema-unknown",
            "not a schema this service reads here; write tarebook.loading-basis/1",
        ),
        (
            "/limits/minimum_flying/none",
            False,
            "/limits/minimum_flying/none",
            "not-a-choice",
            "must be true when it is given; otherwise leave it out",
        ),
        (
            "/seats/0/arm",
            132,
            "/seats/0/arm",
            "wrong-type",
            "not the kind of value asked for here; see the schema",
        ),
        ("/seats/0/id", "A_B", "/seats/0/id", "wrong-form", FORM),
        ("/seats/0/name", "n" * 121, "/seats/0/name", "too-long", "is too long; shorten it"),
        (
            "/zones/0/members",
            [],
            "/zones/0/members",
            "too-few",
            "has too few entries; enter the missing ones",
        ),
        ("/fits", ["wheels", "wheels"], "/fits", "duplicate", "has an entry twice; remove one"),
        ("/engines", -1, "/engines", "too-small", "is smaller than makes sense; correct it"),
        ("/engines", 9999, "/engines", "too-large", "is larger than makes sense; correct it"),
        (
            "/sample_loads/0/weights/0/arm",
            ...,
            "/sample_loads/0/weights/0",
            "one-of",
            "needs exactly what it can be reckoned from: arm or moment; give one of them",
        ),
    ],
)
def test_a_basis_that_has_not_its_form_is_refused_in_full(at, value, pointer, code, detail):
    assert twin(at, value) == [Fault(pointer, code, detail)]


@pytest.mark.parametrize(
    ("at", "value", "code", "detail"),
    [
        ("/true_from", "2026-05-03", "wrong-form", WHEN),
        ("/seasons/0/first", "13-01", "wrong-form", FORM),
        (
            "/seasons",
            [{"id": "s", "name": "s", "first": "01-01", "last": "12-31"}] * 13,
            "too-many",
            "has more entries than are read; split or correct it",
        ),
        ("/categories/0/from_age", 131, "too-large", "is larger than makes sense; correct it"),
    ],
)
def test_a_table_that_has_not_its_form_is_refused_in_full(at, value, code, detail):
    assert table(at, value) == [Fault(at, code, detail)]


def test_an_empty_text_is_told_as_empty_and_as_blank():
    assert Fault("/seats/0/name", "empty", "is empty; write it out, or leave the field away") in twin(
        "/seats/0/name", ""
    )


def test_what_can_be_given_in_one_of_two_ways_is_asked_for_by_name():
    document = changed(changed(empty_weight_document("twin"), "/moment", ...), "/arm", ...)
    assert shape_faults("empty-weight-1", document) == [
        Fault("", "one-of", "needs exactly what it can be reckoned from: moment or arm; give one of them")
    ]


def test_every_fault_is_told_once_in_the_order_of_the_schema_and_no_more_than_the_most():
    faults = shape_faults("restriction-1", restriction_document() | {"b": 1, "a": 1})
    assert [fault.pointer for fault in faults if fault.code == "unknown-field"] == ["/b", "/a"]
    assert shape_faults(TABLE, seasonal_document()) == []
    many = twin("/tanks/0/table/points", [["x", "y"]] * 200)
    assert len(many) == MOST_FAULTS == 200
    assert len(set(many)) == 200
    assert len(twin("/tanks/0/table/points", [["x", "y"]] * 99 + [["1", "y"]])) == 199


def test_what_is_a_decimal_a_day_and_an_instant():
    assert [is_decimal(value) for value in ("1.5", 1, Decimal("1.5"), "1,5", True, None)] == [
        True,
        True,
        True,
        False,
        False,
        False,
    ]
    assert is_date("2026-05-02") is True
    assert is_date("20260502") is False
    assert is_date(7) is True  # its type is refused elsewhere
    with pytest.raises(ValueError, match="month"):
        is_date("2026-13-02")
    for text in (
        "2026-05-03T00:00Z",
        "2026-05-03T00:00:00Z",
        "2026-05-03T00:00:00.123456Z",
        "2026-05-03T00:00:00+02:00",
        "2026-05-03T00:00:00-02:00",
    ):
        assert is_instant(text) is True
    for text in ("2026-05-03", "2026-05-03T00:00:00", "2026-05-03 00:00:00Z", "2026-05-03T00:00:00.1234567Z"):
        assert is_instant(text) is False
    assert is_instant(20260503) is True
    with pytest.raises(ValueError, match="month"):
        is_instant("2026-13-03T00:00:00Z")
