"""One actual against one limit: the texts of the margin, and the check that holds them."""

from collections.abc import Callable
from fractions import Fraction
from typing import NamedTuple

from fleet.sourced import Limit
from loads.balance.exact import minus
from loads.balance.result import Check
from loads.balance.rounding import against_maximum, against_minimum, printed, unsigned

Fix = Callable[[Fraction], str]  # from the exact excess to the sentence that says what to do


class Figure(NamedTuple):
    """What is checked: the code and title of the check, the exact actual with its unit, digits and phase."""

    code: str
    title: str
    actual: Fraction
    unit: str
    places: int
    phase: str | None = None


def at_most(figure: Figure, limit: Limit | None, fix: Fix) -> Check:
    """Return the check of an upper limit: entered, shown to be none, or not entered (`unresolved`)."""
    if limit is None or limit.value is None:
        return _without_value(figure, limit)
    return below(figure, limit.value, str(limit.source), fix)


def at_least(figure: Figure, limit: Limit | None, fix: Fix) -> Check:
    """Return the check of a lower limit: entered, shown to be none, or not entered (`unresolved`)."""
    if limit is None or limit.value is None:
        return _without_value(figure, limit)
    return above(figure, limit.value, str(limit.source), fix)


def below(figure: Figure, limit: Fraction, source: str, fix: Fix) -> Check:
    """Return the check of an upper limit that has a value; on the limit is within."""
    code, title, actual, unit, places, phase = figure
    shown, bound, digits = against_maximum(actual, limit, places)
    left = minus(limit, actual)
    margin = printed(left, digits, "down")
    if left.numerator < 0:
        text = f"{unsigned(margin)} {unit} above the limit"
        advice = fix(-left)
        return Check(code, title, "fail", phase, shown, bound, None, unit, margin, text, source, advice, left)
    text = _room_in_words(left, margin, unit, "below the limit")
    return Check(code, title, "pass", phase, shown, bound, None, unit, margin, text, source, "", left)


def above(figure: Figure, limit: Fraction, source: str, fix: Fix) -> Check:
    """Return the check of a lower limit that has a value; on the limit is within."""
    code, title, actual, unit, places, phase = figure
    shown, bound, digits = against_minimum(actual, limit, places)
    left = minus(actual, limit)
    margin = printed(left, digits, "down")
    if left.numerator < 0:
        text = f"{unsigned(margin)} {unit} below the minimum"
        advice = fix(-left)
        return Check(code, title, "fail", phase, shown, None, bound, unit, margin, text, source, advice, left)
    text = _room_in_words(left, margin, unit, "above the minimum")
    return Check(code, title, "pass", phase, shown, None, bound, unit, margin, text, source, "", left)


def not_entered(code: str, title: str, actual: str | None, unit: str, phase: str | None) -> Check:
    """Return the check of a limit nobody entered: neither a value nor a page that shows there is none."""
    return Check(
        code,
        title,
        "unresolved",
        phase,
        actual,
        unit=unit,
        margin_text="the limit was not entered",
        what_next="Enter this limit in the loading basis, or the page that shows there is none.",
    )


def _without_value(figure: Figure, limit: Limit | None) -> Check:
    code, title, exact, unit, places, phase = figure
    actual = printed(exact, places)
    if limit is None:
        return not_entered(code, title, actual, unit, phase)
    source = str(limit.source)
    return Check(code, title, "pass", phase, actual, unit=unit, margin_text="no limit", source=source)


def _room_in_words(left: Fraction, margin: str, unit: str, where: str) -> str:
    """Return a margin of 0 or more in words: on the limit, less than the last digit, or a figure."""
    if margin != "0":
        return f"{margin} {unit} {where}"
    return f"just {where}" if left.numerator else "on the limit"
