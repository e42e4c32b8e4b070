"""What of a basis holds for one configuration, in one certification category."""

from dataclasses import replace
from fractions import Fraction

import pytest

from fleet.applicable import applicable, tightest
from fleet.basis import Limits
from fleet.sourced import Limit, Source
from tests.pure.loads.making import envelope, twin

F = Fraction
PAGE = Source("FM", "A", "1")
BOX = ((100, 4000), (100, 6800), (130, 6800), (130, 4000))


def named(name, **held):
    return replace(envelope(*BOX), id=name, **held)


def test_a_basis_whose_limits_hold_for_all_is_itself():
    basis = twin()
    assert applicable(basis, "six-seat", None) is basis


def test_only_what_holds_is_left_and_the_same_question_gives_the_same_object():
    normal, utility = named("n", categories=("normal",)), named("u", categories=("utility",))
    seats = named("s", configurations=("six-seat",))
    basis = replace(twin(), envelopes=(normal, utility, seats))
    found = applicable(basis, "six-seat", "utility")
    assert found.envelopes == (utility, seats)
    assert applicable(basis, "six-seat", "utility") is found
    assert applicable(basis, "freight", "normal").envelopes == (normal,)
    assert applicable(basis, "freight", None).envelopes == ()


def test_lateral_limits_of_others_are_no_page_that_shows_there_are_none():
    lateral = replace(named("l", configurations=("freight",)), axis="lateral")
    basis = replace(twin(), envelopes=(*twin().envelopes, lateral), lateral_limits_entered=True)
    assert applicable(basis, "freight", None).lateral_limits_entered
    assert not applicable(basis, "six-seat", None).lateral_limits_entered


@pytest.mark.parametrize(
    ("held", "own", "stands"),
    [(6000, 5700, 5700), (6000, 6300, 6000), (None, 5700, 5700), ("absent", 5700, 5700), (6000, None, 6000)],
)
def test_of_two_limits_the_tighter_stands(held, own, stands):
    def limit(value):
        return None if value == "absent" else Limit(None if value is None else F(value), PAGE)

    limits = Limits(None, limit(held), None, None, None)
    assert tightest(limits, (("take_off", limit(own)),)).take_off.value == stands


def test_of_two_minimum_weights_the_greater_stands():
    limits = Limits(None, None, None, None, Limit(F(4000), PAGE))
    assert tightest(limits, (("minimum_flying", Limit(F(4300), PAGE)),)).minimum_flying.value == 4300
    assert tightest(limits, (("minimum_flying", Limit(F(3900), PAGE)),)).minimum_flying.value == 4000


def test_none_with_a_page_stands_where_nothing_was_entered():
    limits = Limits(None, None, None, None, None)
    assert tightest(limits, (("ramp", Limit(None, PAGE)),)).ramp == Limit(None, PAGE)
    assert tightest(limits, ()) is limits
