"""Something does not work: a limit is lowered, a seat blocked, a hold closed, fuel trapped; for a time.

Common practice (a minimum equipment list with its loading notes); figures reckoned by hand beside them.
"""

from fractions import Fraction

import pytest

from fleet.restriction_reading import read_entered
from loads.balance.declared import read_load
from loads.balance.trapped import with_trapped
from records.refusal import Invalid
from tests.pure.loads.making import load, twin
from tests.pure.loads.papers import lb, restriction, restriction_document, result_under, ruled

LOWER = {"effect": "limit", "limit": "take_off", "weight": lb("6000")}


def fault_of(document, *papers):
    with pytest.raises(Invalid) as refused:
        read_load(document, ruled(*papers).basis)
    (fault,) = refused.value.faults
    return fault


def test_a_lowered_limit_counts_and_names_the_restriction():
    """4,350 empty + 181 + 176 + 157.6 + 19.8 people + 120 bags + 756 fuel take off at 5,760.5 lb: inside
    6,800, inside 6,000, and outside 5,760.
    """
    check = result_under(restriction(LOWER)).check("weight.take-off")
    broken = result_under(restriction(LOWER | {"weight": lb("5760")})).check("weight.take-off")

    assert (check.limit, check.outcome) == ("6000", "pass")
    assert check.source == "restriction DD-14, MEL rev 7 p. 25-3"
    assert broken.outcome == "fail"


def test_of_a_lowered_limit_and_a_lower_one_the_tightest_wins():
    """A restriction to 9,000 lb loosens nothing: the manual's 6,800 stays, with its own page."""
    higher = result_under(restriction(LOWER | {"weight": lb("9000")})).check("weight.take-off")
    both = result_under(
        restriction(LOWER), restriction(LOWER | {"weight": lb("5900")}, number="DD-15")
    ).check("weight.take-off")

    assert (higher.limit, higher.source) == ("6800", "VP2-FM rev B p. 6-4")
    assert both.limit == "5900"
    assert both.source.startswith("restriction DD-15")


def test_a_raised_minimum_is_the_tighter_one():
    effect = {"effect": "limit", "limit": "minimum_flying", "weight": lb("5900")}

    failing = [one for one in result_under(restriction(effect)).checks if one.outcome == "fail"]

    assert failing
    assert all(one.source.startswith("restriction DD-14") for one in failing)


def test_somebody_in_a_blocked_seat_is_refused_by_the_field():
    fault = fault_of(load(), restriction({"effect": "seats", "ids": ["ROW1-R", "ROW2-L"]}))

    assert (fault.pointer, fault.code) == ("/passengers/1/seat", "seat-blocked")
    assert fault.detail == "row1 r is blocked by restriction DD-14; choose another seat"


def test_something_in_a_closed_hold_is_refused_by_the_field():
    fault = fault_of(load(), restriction({"effect": "places", "ids": ["AFT-HOLD"]}))

    assert (fault.pointer, fault.code) == ("/items/0/place", "place-closed")
    assert "restriction DD-14" in fault.detail


def test_trapped_fuel_weighs_at_its_arm_and_is_of_no_use():
    """10 US gal at 6 lb in the left main, arm 121: 60 lb and 7,260 lb in more at every phase; the usable fuel
    is what it was.
    """
    fuel = {"effect": "fuel", "of": "LEFT-MAIN", "volume": {"value": "10", "unit": "US gal"}}

    before, after = result_under(), result_under(restriction(fuel))

    for phase in ("ramp", "take-off", "zero fuel", "landing"):
        was, now = before.state(phase), after.state(phase)
        assert now.weight - was.weight == 60
        assert now.moment - was.moment == 7260
        assert now.fuel == was.fuel
    assert any("10 US gal in left-main cannot be used" in line for line in after.as_document()["advisories"])


def test_more_than_a_tank_holds_with_its_trapped_fuel_is_refused():
    """50 usable and 11 trapped in a tank of 60."""
    fuel = {"effect": "fuel", "of": "LEFT-MAIN", "volume": {"value": "11", "unit": "US gal"}}
    under = ruled(restriction(fuel))

    with pytest.raises(Invalid) as refused:
        with_trapped(read_load(load(), under.basis), under)

    (fault,) = refused.value.faults
    assert (fault.pointer, fault.code) == ("/fuel/at_engine_start/LEFT-MAIN", "over-capacity")
    full = {"effect": "fuel", "of": "LEFT-MAIN", "volume": {"value": "10", "unit": "US gal"}}
    ten = ruled(restriction(full))
    assert with_trapped(read_load(load(), ten.basis), ten)  # 50 and 10: exactly full


def test_a_lowered_maximum_of_a_place_holds_whatever_is_fitted():
    effect = {"effect": "maximum", "of": "AFT-HOLD", "weight": lb("119")}

    check = result_under(restriction(effect)).check("place.AFT-HOLD")

    assert (check.outcome, check.limit) == ("fail", "119")


def test_a_narrower_envelope_must_hold_beside_the_manuals_own():
    """The aft edge comes from 128 to 118 in: the load at 118.x is outside."""
    corners = [["110", "4000"], ["110", "5200"], ["116", "6800"], ["118", "6800"], ["118", "4000"]]
    effect = {
        "effect": "envelope",
        "of": "longitudinal-arm",
        "points": corners,
        "unit": "in",
        "weight_unit": "lb",
    }
    free = result_under()

    result = result_under(restriction(effect))

    arms = {state.phase: state.arm for state in free.states}
    outside = {phase for phase, arm in arms.items() if arm > 118}
    assert free.verdict == "within"
    assert outside
    assert result.verdict == "outside"


def test_what_the_basis_does_not_have_leaves_the_load_unresolved_and_is_refused_at_entry():
    effect = {"effect": "seats", "ids": ["ROW9-L"]}

    under = ruled(restriction(effect))

    assert under.unmet == ("restriction DD-14 names ROW9-L, which the loading basis does not have",)
    with pytest.raises(Invalid) as refused:
        read_entered(restriction_document(effect), "restriction", twin())
    assert [(fault.pointer, fault.code) for fault in refused.value.faults] == [
        ("/effects/0/ids", "unknown-id")
    ]


def test_nothing_changes_without_a_restriction():
    basis = twin()

    assert ruled().basis == basis
    assert result_under().as_document() == result_under().as_document()
    assert Fraction(0) == sum(ruled().trapped.values())
