"""Aircraft, configuration and flight of a load document: what is read, and each refusal word for word."""

from dataclasses import replace
from datetime import UTC, datetime, timedelta, timezone
from typing import Any

import pytest

from loads.balance.aboard import Flight, Outline
from loads.balance.outline import read_outline
from records.refusal import Invalid
from tests.pure.loads.making import load

DEPARTURE = datetime(2026, 12, 1, 8, 30, tzinfo=timezone(timedelta(hours=-6)))
FLIGHT = Flight("KT-214", 1, DEPARTURE, "XNAL", "XKOR", "passenger-charter", None)
EARLIER = "0B5C6F1e-92a4-4d3b-8E77-5a1f0c2d9b34"
TIME_FORM = "not a date and time; write it like 2026-12-01T08:30:00-06:00"
NO_SUCH_TIME = "no such date, time or offset; correct it"
NO_OFFSET = "the offset from UTC is missing; add it, such as -06:00, or Z for UTC"
NO_LOAD = "not the id of a load; write the id its answer gave"
MISSING = "this field is needed and nothing is assumed; state it"


def flying(**changes: Any) -> dict[str, Any]:
    """The sound load with fields of its flight exchanged; None takes one out."""
    made = load()
    made["flight"] = {name: value for name, value in (made["flight"] | changes).items() if value is not None}
    return made


def faults_of(document: Any) -> list[tuple[str, str]]:
    with pytest.raises(Invalid) as refused:
        read_outline(document)
    return [(fault.pointer, fault.detail) for fault in refused.value.faults]


def test_the_outline_of_a_sound_load() -> None:
    assert read_outline(load()) == Outline("Q9-KTB", "six-seat", FLIGHT)


def test_the_leg_before_is_named_by_the_id_of_its_load_in_small_letters() -> None:
    found = read_outline(flying(follows=EARLIER))

    assert found.flight == replace(FLIGHT, follows="0b5c6f1e-92a4-4d3b-8e77-5a1f0c2d9b34")


@pytest.mark.parametrize(
    ("typed", "read"),
    [
        ("2026-12-01T08:30Z", datetime(2026, 12, 1, 8, 30, tzinfo=UTC)),
        ("2026-12-01T08:30:15.25+05:30", datetime(2026, 12, 1, 3, 0, 15, 250_000, tzinfo=UTC)),
        ("1950-01-01T00:00:00Z", datetime(1950, 1, 1, tzinfo=UTC)),
        ("2150-12-31T23:59:59Z", datetime(2150, 12, 31, 23, 59, 59, tzinfo=UTC)),
    ],
)
def test_a_departure_in_any_offset(typed: str, read: datetime) -> None:
    assert read_outline(flying(departure=typed)).flight.departure == read


@pytest.mark.parametrize(
    ("field", "value", "detail"),
    [
        ("departure", "tomorrow", TIME_FORM),
        ("departure", "2026-12-01 08:30:00Z", TIME_FORM),
        ("departure", "2026-12-01T08:30:00.1234567Z", TIME_FORM),
        ("departure", "2026-12-01T08:30:00", NO_OFFSET),
        ("departure", "2026-02-30T08:30:00Z", NO_SUCH_TIME),
        ("departure", "2026-12-01T08:30:00+99:00", NO_SUCH_TIME),
        ("departure", "1949-12-31T23:59:59Z", "the year 1949 is not a flight's; correct it"),
        ("departure", "2151-01-01T00:00:00Z", "the year 2151 is not a flight's; correct it"),
        ("departure", "2" * 65, "65 characters; at most 64 are kept, so shorten it"),
        ("follows", "KT-213", NO_LOAD),
        ("follows", f"{EARLIER}0", NO_LOAD),
        ("follows", 7, "a text is needed here; write it in quotes"),
        ("leg", 0, "out of range; write a number from 1 to 99"),
        ("leg", 100, "out of range; write a number from 1 to 99"),
        ("reference", "R" * 65, "65 characters; at most 64 are kept, so shorten it"),
        ("origin", "O" * 81, "81 characters; at most 80 are kept, so shorten it"),
        ("destination", "D" * 81, "81 characters; at most 80 are kept, so shorten it"),
        ("operation", "O" * 81, "81 characters; at most 80 are kept, so shorten it"),
        (
            "colour",
            "blue",
            "no such field here; the fields are reference, leg, departure, origin, destination, operation, "
            "follows",
        ),
    ],
)
def test_one_spoiled_field_of_the_flight_is_named_with_what_is_wrong(
    field: str, value: Any, detail: str
) -> None:
    assert faults_of(flying(**{field: value})) == [(f"/flight/{field}", detail)]


@pytest.mark.parametrize("field", ["reference", "leg", "departure", "origin", "destination", "operation"])
def test_a_field_of_the_flight_that_is_missing_is_asked_for(field: str) -> None:
    assert faults_of(flying(**{field: None})) == [(f"/flight/{field}", MISSING)]


@pytest.mark.parametrize("field", ["aircraft", "configuration"])
def test_aircraft_and_configuration_are_words_of_64_characters(field: str) -> None:
    too_long = [(f"/{field}", "65 characters; at most 64 are kept, so shorten it")]

    assert faults_of(load(**{field: "W" * 65})) == too_long
    read_outline(load(**{field: "W" * 64}))


def test_the_longest_words_and_legs_are_read() -> None:
    found = read_outline(
        flying(reference="R" * 64, leg=99, origin="O" * 80, destination="D" * 80, operation="P" * 80)
    )

    assert found.flight == Flight("R" * 64, 99, DEPARTURE, "O" * 80, "D" * 80, "P" * 80, None)


def test_a_load_without_a_flight_or_of_another_form_has_no_outline() -> None:
    made = load()
    del made["flight"]

    assert faults_of(made) == [("/flight", MISSING)]
    assert faults_of("load") == [("", "an object is needed here; write {...} with named fields")]
    assert faults_of(load(schema="load/2")) == [
        ("/schema", "not one of the words used here; write tarebook.load/1")
    ]
