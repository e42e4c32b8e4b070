"""A change of an operator's settings: what it says, by column, and every refusal word by word."""

from datetime import UTC, datetime

import pytest

from fleet.settings_reading import SettingsChange, read_settings
from tests.pure.fleet.documents import told

BOUND = {"weight": {"value": "100.125", "unit": "kg"}, "persons": 2}


def change(**more):
    return {"reason": "manual revised"} | more


def test_everything_a_change_may_say():
    document = change(
        true_from="2026-06-01T00:00:00+02:00",
        last_minute_bound=BOUND,
        weighing_threshold_percent="0.5",
        operations_mail=["ops@example.org", "duty@example.org"],
        prepare_and_accept_by_one=True,
        estimates_may_be_signed=False,
        rule_set="US",
        procedure="OM-A 8.1",
        weight_method="standard weights",
    )

    assert read_settings(document) == SettingsChange(
        datetime(2026, 5, 31, 22, tzinfo=UTC),
        "manual revised",
        {
            "last_minute_weight": "100.125",
            "last_minute_unit": "kg",
            "last_minute_persons": 2,
            "weighing_threshold_percent": "0.5",
            "operations_mail": ["ops@example.org", "duty@example.org"],
            "prepare_and_accept_by_one": True,
            "estimates_may_be_signed": False,
            "rule_set": "US",
            "procedure": "OM-A 8.1",
            "weight_method": "standard weights",
        },
    )


def test_what_is_left_out_stays_as_it_is():
    assert read_settings(change()) == SettingsChange(None, "manual revised", {})


def test_null_takes_a_bound_and_a_threshold_away():
    assert read_settings(change(last_minute_bound=None, weighing_threshold_percent=None)).columns == {
        "last_minute_weight": "",
        "last_minute_unit": "",
        "last_minute_persons": None,
        "weighing_threshold_percent": "",
    }


@pytest.mark.parametrize(
    ("typed", "kept"), [("0", "0"), ("-0", "0"), (7, "7"), ("99.999", "99.999"), ("0.10", "0.10")]
)
def test_figures_are_kept_as_typed(typed, kept):
    assert read_settings(change(weighing_threshold_percent=typed)).columns == {
        "weighing_threshold_percent": kept
    }


PERCENT, WEIGHT = "/weighing_threshold_percent", "/last_minute_bound/weight/value"
FORM = "write a plain decimal number: digits, one point, a minus; no exponent, blank or comma"


def bound(value):
    return {"last_minute_bound": {"weight": {"value": value, "unit": "lb"}, "persons": 0}}


@pytest.mark.parametrize(
    ("changes", "faults"),
    [
        (
            {"weighing_threshold_percent": 100},
            [(PERCENT, "out-of-range", "must be 0 or more and less than 100; correct it")],
        ),
        (
            {"weighing_threshold_percent": "-0.1"},
            [(PERCENT, "out-of-range", "must be 0 or more and less than 100; correct it")],
        ),
        (
            {"weighing_threshold_percent": "0.1234"},
            [(PERCENT, "too-fine", "at most three decimal places; round it")],
        ),
        ({"weighing_threshold_percent": "1e1"}, [(PERCENT, "number-form", FORM)]),
        (
            bound("1000000"),
            [(WEIGHT, "out-of-range", "must be 0 or more and less than 1000000; correct it")],
        ),
        (bound("1,5"), [(WEIGHT, "number-form", FORM)]),
        (
            {"operations_mail": ["ops@example.org", "nobody"]},
            [("/operations_mail/1", "mail-form", "write one address, like ops@example.org")],
        ),
        (
            {"true_from": "1899-01-01T00:00:00Z"},
            [("/true_from", "instant-implausible", "the year cannot be meant; correct it")],
        ),
        ({"reason": ...}, [("/reason", "missing", "reason is missing; give it")]),
        (
            {"weighing_threshold_percent": "x", "operations_mail": ["nobody"]} | bound("y"),
            [
                (WEIGHT, "number-form", FORM),
                (PERCENT, "number-form", FORM),
                ("/operations_mail/0", "mail-form", "write one address, like ops@example.org"),
            ],
        ),
    ],
)
def test_a_refusal_says_where_and_what_to_do(changes, faults):
    document = {name: value for name, value in change(**changes).items() if value is not ...}

    assert told(read_settings, document) == faults


def test_a_bound_just_below_the_most_is_read():
    assert read_settings(change(**bound("999999.999"))).columns["last_minute_weight"] == "999999.999"


def test_what_is_no_object_is_refused():
    assert told(read_settings, ["settings"]) == [
        ("", "wrong-type", "not the kind of value asked for here; see the schema")
    ]
