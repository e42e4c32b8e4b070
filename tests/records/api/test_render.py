"""Answers are exact: decimals as they are, fractions never rounded, no binary float at all."""

import json
from datetime import UTC, date, datetime, timedelta, timezone
from decimal import Decimal
from fractions import Fraction
from uuid import UUID

import pytest

from records.api.render import ExactJSONRenderer, PDFRenderer, fraction_text, rendered


def test_each_kind_of_value_is_written_exactly():
    body = {
        "decimal": Decimal("6.70"),
        "small": Decimal("1E-9"),
        "fraction": Fraction(1, 8),
        "instant": datetime(2026, 12, 1, 8, 30, tzinfo=timezone(timedelta(hours=-6))),
        "day": date(2026, 12, 1),
        "id": UUID(int=7),
        "text": "é ✈ \u2028",
        "tuple": (1, True, None),
    }

    assert json.loads(rendered(body)) == {
        "decimal": "6.70",
        "small": "0.000000001",
        "fraction": "0.125",
        "instant": "2026-12-01T14:30:00Z",
        "day": "2026-12-01",
        "id": "00000000-0000-0000-0000-000000000007",
        "text": "é ✈ \u2028",
        "tuple": [1, True, None],
    }
    assert "é".encode() in rendered(body)
    assert list(json.loads(rendered(body))) == list(body)


@pytest.mark.parametrize("body", [{"a": 0.1}, [1, [2, (3.0,)]], 1.5, {"a": float("nan")}], ids=repr)
def test_a_binary_float_has_no_place_in_an_answer(body):
    with pytest.raises(TypeError):
        rendered(body)


@pytest.mark.parametrize("body", [object(), {"a": {1}}, {"a": b"x"}], ids=["object", "set", "bytes"])
def test_what_is_no_json_is_refused(body):
    with pytest.raises(TypeError):
        rendered(body)


def test_an_instant_without_offset_is_refused():
    with pytest.raises(ValueError, match="without offset"):
        rendered({"at": datetime(2026, 12, 1, tzinfo=UTC).replace(tzinfo=None)})


@pytest.mark.parametrize(
    ("value", "text"),
    [
        (Fraction(0), "0"),
        (Fraction(-7), "-7"),
        (Fraction(13142, 100), "131.42"),
        (Fraction(-1, 8), "-0.125"),
        (Fraction(1, 1000), "0.001"),
        (Fraction(1, 3), "1/3"),
        (Fraction(-22, 7), "-22/7"),
        (Fraction(1, 2**20 * 5**3), "0.00000000762939453125"),
    ],
)
def test_a_fraction_is_a_decimal_when_it_ends_and_never_rounded(value, text):
    assert fraction_text(value) == text
    assert Fraction(text) == value


def test_the_renderers_write_what_they_are_given():
    assert ExactJSONRenderer().render({"a": Decimal("1.0")}) == b'{"a":"1.0"}'
    assert ExactJSONRenderer().render(None) == b""
    assert PDFRenderer().render(b"%PDF-1.7") == b"%PDF-1.7"
    with pytest.raises(TypeError):
        PDFRenderer().render({"a": 1})
