"""The minimum flying weight holds from take-off to the least fuel at landing: entered, none, or not entered.

Common practice (helicopters and some aeroplanes have one). By hand: 1,000 lb dry, 240 lb of fuel, 120 burned,
down to the least fuel of 120 lb: the lightest moment of the flight is 1,120 lb.
"""

from dataclasses import replace
from fractions import Fraction

from fleet.sourced import Limit
from tests.pure.loads.hand import PAGE, plain, result_with

F = Fraction


def check(limit, declare=lambda declared: declared):
    def change(basis):
        limits = replace(basis.configurations[0].limits, minimum_flying=limit)
        return replace(basis, configurations=(replace(basis.configurations[0], limits=limits),))

    return result_with(plain(trip=120), change, declare).check("weight.minimum-flying")


def test_the_lightest_moment_of_the_flight_is_judged():
    on_the_line = check(Limit(F(1120), PAGE))
    assert (on_the_line.outcome, on_the_line.phase, on_the_line.room) == ("pass", "landing", 0)
    below = check(Limit(F(1121), PAGE))
    assert (below.outcome, below.margin_text) == ("fail", "1 lb below the minimum")


def test_fuel_that_may_be_burned_after_landing_counts():
    """A minimum at landing of 60 lb lets the flight go on to 1,060 lb."""

    def declare(declared):
        return replace(declared, fuel=replace(declared.fuel, minimum_at_landing=F(60)))

    found = check(Limit(F(1061), PAGE), declare)
    assert (found.outcome, found.phase, found.actual) == ("fail", "minimum at landing", "1060")


def test_none_with_a_page_is_kept_and_not_entered_is_unresolved():
    none, absent = check(Limit(None, PAGE)), check(None)
    assert (none.outcome, none.margin_text, none.source) == ("pass", "no limit", "HAND rev A p. 6-9")
    assert (absent.outcome, absent.margin_text) == ("unresolved", "the limit was not entered")
    assert "Enter this limit in the loading basis" in absent.what_next
