"""One actual against one limit: the whole check, on the limit, a hair off it, and with no limit at all."""

from fractions import Fraction

import pytest

from fleet.sourced import Limit, Source
from loads.balance.margins import Figure, above, at_least, at_most, below, not_entered
from loads.balance.result import Check

F = Fraction
PAGE = Source("VP2-FM", "B", "6-4")
TEXT = str(PAGE)


def figure(actual):
    return Figure("weight.test", "a weight", F(actual), "lb", 1, "landing")


def fix(excess):
    return f"Take {excess} off."


def check(outcome, actual, limit=None, low=None, **rest):
    """A check of this figure; what is not named is as in a check of a limit of 100 lb."""
    more = {"margin_text": "", "margin": None, "source": "the page", "what_next": "", "room": None} | rest
    return Check(
        "weight.test", "a weight", outcome, "landing", actual, limit, low, "lb", more.pop("margin"), **more
    )


@pytest.mark.parametrize(
    ("actual", "expected"),
    [
        ("90.25", ("pass", "90.3", "9.7", "9.7 lb below the limit", "", F("9.75"))),
        ("100", ("pass", "100", "0", "on the limit", "", F(0))),
        ("99.97", ("pass", "100", "0", "just below the limit", "", F("0.03"))),
        ("99.9", ("pass", "99.9", "0.1", "0.1 lb below the limit", "", F("0.1"))),
        # A failure is told with the digits it takes to be seen as one, and the excess rounds up.
        ("100.03", ("fail", "100.03", "-0.03", "0.03 lb above the limit", "Take 3/100 off.", F("-0.03"))),
        ("112.34", ("fail", "112.3", "-12.4", "12.4 lb above the limit", "Take 617/50 off.", F("-12.34"))),
    ],
)
def test_an_upper_limit(actual, expected):
    outcome, shown, margin, text, what_next, left = expected

    assert below(figure(actual), F(100), "the page", fix) == check(
        outcome, shown, "100", margin=margin, margin_text=text, what_next=what_next, room=left
    )


@pytest.mark.parametrize(
    ("actual", "expected"),
    [
        ("109.75", ("pass", "109.8", "9.7", "9.7 lb above the minimum", "", F("9.75"))),
        ("100", ("pass", "100", "0", "on the limit", "", F(0))),
        ("100.03", ("pass", "100", "0", "just above the minimum", "", F("0.03"))),
        ("99.97", ("fail", "99.97", "-0.03", "0.03 lb below the minimum", "Take 3/100 off.", F("-0.03"))),
        ("87.66", ("fail", "87.7", "-12.4", "12.4 lb below the minimum", "Take 617/50 off.", F("-12.34"))),
    ],
)
def test_a_lower_limit(actual, expected):
    outcome, shown, margin, text, what_next, left = expected

    assert above(figure(actual), F(100), "the page", fix) == check(
        outcome, shown, None, "100", margin=margin, margin_text=text, what_next=what_next, room=left
    )


def test_a_limit_that_was_entered_is_judged_with_its_page():
    entered = Limit(F(100), PAGE)

    assert at_most(figure(101), entered, fix) == below(figure(101), F(100), TEXT, fix)
    assert at_least(figure(99), entered, fix) == above(figure(99), F(100), TEXT, fix)


@pytest.mark.parametrize("judge", [at_most, at_least])
def test_a_limit_shown_to_be_none_is_kept_by_any_figure(judge):
    found = judge(figure("100.04"), Limit(None, PAGE), fix)

    assert found == check("pass", "100", margin_text="no limit", source=TEXT)


@pytest.mark.parametrize("judge", [at_most, at_least])
def test_a_limit_nobody_entered_is_not_judged(judge):
    expected = check(
        "unresolved",
        "100",
        margin_text="the limit was not entered",
        source="",
        what_next="Enter this limit in the loading basis, or the page that shows there is none.",
    )

    assert judge(figure("100.04"), None, fix) == expected
    assert not_entered("weight.test", "a weight", "100", "lb", "landing") == expected
