"""Reading quantities: what is taken as typed and what is refused, by pointer and code."""

from decimal import Decimal
from typing import Any

import pytest

from fleet.quantities import (
    DIMENSION_OF,
    Dimension,
    Quantity,
    Unit,
    number_or_fault,
    quantity_or_fault,
    read_quantity,
)
from records.refusal import Fault, Invalid


@pytest.mark.parametrize("typed", [181, Decimal("181.0"), "181.00", "-0.5", "0", "999999999999999", -12])
def test_a_number_is_kept_as_typed(typed: Any) -> None:
    quantity = read_quantity({"value": typed, "unit": "lb"}, "/weight", Dimension.WEIGHT)

    assert quantity == Quantity(Decimal(typed), Unit.LB)
    assert str(quantity.value) == str(typed)


@pytest.mark.parametrize(
    "typed",
    [
        "1e3",
        "1E3",
        "NaN",
        "Infinity",
        "-",
        "",
        " 1",
        "1 ",
        "1\n",
        "1,5",
        "+1",
        ".5",
        "1.",
        "007",
        "0x10",
        "\uff11\uff12",
        "1_0",
    ],
)
def test_text_that_is_no_plain_decimal_is_refused(typed: str) -> None:
    assert _code(typed) == "number-form"


@pytest.mark.parametrize(
    "typed", [True, False, None, [], {}, 1.5, Decimal("NaN"), Decimal("Infinity"), Decimal("1E+3")]
)
def test_what_is_no_exact_number_is_refused(typed: Any) -> None:
    assert _code(typed) == "number-form"


@pytest.mark.parametrize(
    "typed", [10**15, -(10**15), "1234567890123456", "0.0000000000000001", Decimal("0.1234567890123456")]
)
def test_more_than_fifteen_digits_are_refused(typed: Any) -> None:
    assert _code(typed) == "number-digits"


@pytest.mark.parametrize(
    ("given", "pointer", "code"),
    [
        ({"value": 1}, "/w/unit", "unit-missing"),
        ({"value": 1, "unit": None}, "/w/unit", "unit-missing"),
        ({"value": 1, "unit": "gal"}, "/w/unit", "unit-unknown"),
        ({"value": 1, "unit": "KG"}, "/w/unit", "unit-unknown"),
        ({"value": 1, "unit": ["kg"]}, "/w/unit", "unit-unknown"),
        ({"value": 1, "unit": "in"}, "/w/unit", "unit-dimension"),
        ({"unit": "kg"}, "/w/value", "missing"),
        ({"value": 1, "unit": "kg", "about~/": 1}, "/w/about~0~1", "unknown-field"),
        (181, "/w", "quantity-form"),
        ("181 lb", "/w", "quantity-form"),
    ],
)
def test_a_quantity_without_number_or_fitting_unit_is_refused(given: Any, pointer: str, code: str) -> None:
    with pytest.raises(Invalid) as refused:
        read_quantity(given, "/w", Dimension.WEIGHT)

    assert [(fault.pointer, fault.code) for fault in refused.value.faults] == [(pointer, code)]


def test_one_of_several_dimensions_is_taken_and_further_fields_only_where_named() -> None:
    given = {"value": "6.7", "unit": "lb/US gal", "source": "delivery note 4471"}

    density = read_quantity(given, "", (Dimension.VOLUME, Dimension.DENSITY), also=frozenset({"source"}))

    assert density.unit is Unit.LB_PER_US_GAL
    assert isinstance(quantity_or_fault(given, "", Dimension.DENSITY), Fault)


def test_every_unit_has_one_dimension() -> None:
    assert set(DIMENSION_OF) == set(Unit)


def _code(typed: Any) -> str:
    found = number_or_fault(typed, "/value")
    assert isinstance(found, Fault)
    assert found.pointer == "/value"
    return found.code
