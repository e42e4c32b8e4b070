"""Fuel imbalance: a greatest difference between left and right, at every phase and over the whole burn.

Common practice (flight manuals of aeroplanes with wing tanks state a greatest difference). Figures invented,
worked by hand: 6 lb/US gal, the left tank is burned first.
"""

from dataclasses import replace
from fractions import Fraction

from fleet.fuel_balance import FuelBalance
from tests.pure.loads.hand import PAGE, one_after_the_other, plain, result_with

F = Fraction
EVERYWHERE = ("ramp", "take-off", "landing")


def balance(maximum=None, points=(), by="weight", phases=EVERYWHERE):
    exact = tuple((F(x), F(y)) for x, y in points)
    most = None if maximum is None else F(maximum)
    return FuelBalance("WINGS", "wing tanks", ("T0",), ("T1",), by, most, exact, phases, PAGE)


def check_of(made, limit, change=one_after_the_other):
    return result_with(made, lambda basis: replace(change(basis), fuel_balance=(limit,))).check(
        "fuel-balance.WINGS"
    )


def test_the_worst_of_the_flight_is_where_one_side_has_run_dry():
    """20 US gal each side: when the left has fed, 0 against 120 lb. Take-off and landing are even."""
    check = check_of(plain(trip=240), balance(119))
    assert (check.outcome, check.actual, check.limit, check.room) == ("fail", "120", "119", F(-1))
    assert check.margin_text == "1 lb above the limit between take-off and landing: left 0, right 120 lb"
    assert check.what_next == (
        "Load or transfer fuel so that the right side holds at least 1 lb less between take-off and landing."
    )
    assert check_of(plain(trip=240), balance(120)).outcome == "pass"  # on the limit


def test_tanks_that_feed_together_stay_even():
    check = check_of(plain(trip=240), balance(0), change=lambda basis: basis)
    assert (check.outcome, check.room) == ("pass", F(0))


def test_a_difference_in_volume():
    """15 against 5 US gal from the start."""
    check = check_of(plain(left=15, right=5), balance(10, by="volume"))
    assert (check.outcome, check.actual, check.unit, check.phase) == ("pass", "10", "US gal", "ramp")


def test_a_limit_for_landing_alone_does_not_bind_before():
    """In flight 120 lb apart; at landing, 60 lb burned out of the right tank, 60 lb."""
    check = check_of(plain(trip=180), balance(60, phases=("landing",)))
    assert (check.outcome, check.actual, check.phase) == ("pass", "60", "landing")


def test_the_difference_allowed_may_vary_with_the_fuel_aboard():
    """Up to 120 lb aboard 120 lb apart are allowed, at 240 lb 20 lb: straight between.

    x lb burned from the left: x apart, 240 - x aboard, allowed 20 + x * 100 / 120. x passes that at x = 120:
    20 + 100 = 120, so the burn touches the limit at one kink and nowhere passes it.
    """
    table = balance(points=[(0, 120), (120, 120), (240, 20)])
    check = check_of(plain(trip=240), table)
    assert (check.outcome, check.room) == ("pass", F(0))


def test_the_worst_may_lie_at_a_point_of_the_table():
    """At 180 lb aboard only 50 lb are allowed, and 60 lb are burned out of the left tank there."""
    table = balance(points=[(0, 200), (120, 200), (180, 50), (240, 200)])
    check = check_of(plain(trip=240), table)
    assert (check.outcome, check.actual, check.limit) == ("fail", "60", "50")


def test_off_the_table_is_unresolved_and_what_next_names_the_table():
    check = check_of(plain(trip=240), balance(points=[(0, 200), (200, 200)]))
    assert (check.outcome, check.actual) == ("unresolved", None)
    assert "enter the rest of its table" in check.what_next.lower()


def test_a_basis_without_such_a_limit_has_no_such_check():
    assert not [c for c in result_with(plain()).checks if c.code.startswith("fuel-balance")]
