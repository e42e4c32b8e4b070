"""What of a basis holds for one configuration, in one certification category."""

from dataclasses import replace
from fractions import Fraction

import pytest

from fleet.applicable import MOST_KEPT, applicable, holds_for, tightest
from fleet.basis import Limits
from fleet.curtailment import Amounts, Curtailment, Inset
from fleet.lateral import LateralByCg
from fleet.sourced import Limit, Source
from tests.pure.loads.making import envelope, limits, twin

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


def held(kind, **more):
    if kind == "envelope":
        return replace(envelope(*BOX), **more)
    if kind == "lateral":
        corners = ((F(1), F(1)), (F(1), F(2)), (F(2), F(2)))
        return LateralByCg("l", ("landing",), "arm", corners, PAGE, **more)
    return Curtailment("c", "fuel", ("landing",), (Amounts(None, None, Inset(F(1))),), PAGE, **more)


@pytest.mark.parametrize(
    ("kind", "field"),
    [("envelope", "envelopes"), ("lateral", "lateral_by_cg"), ("curtailment", "curtailments")],
)
def test_each_kind_of_limit_is_left_where_it_holds(kind, field):
    freight = held(kind, configurations=("freight",))
    utility = held(kind, categories=("utility",))
    every = held(kind)
    basis = replace(twin(), **{field: (freight, utility, every)})
    assert getattr(applicable(basis, "freight", "utility"), field) == (freight, utility, every)
    assert getattr(applicable(basis, "freight", None), field) == (freight, every)
    assert getattr(applicable(basis, "six-seat", "utility"), field) == (utility, every)
    assert getattr(applicable(basis, "six-seat", "normal"), field) == (every,)
    assert applicable(replace(twin(), **{field: (every,)}), "freight", None).seats == twin().seats


def test_a_limit_for_a_configuration_and_a_category_needs_both():
    both = held("envelope", configurations=("freight",), categories=("utility",))
    cases = (("freight", "utility", True), ("freight", "normal", False), ("six-seat", "utility", False))
    for configuration, category, holds in (*cases, ("freight", None, False)):
        assert holds_for(both, configuration, category) is holds
    assert holds_for(held("envelope"), "any", None) is True


def test_lateral_limits_that_are_left_still_count_as_entered():
    freight = held("lateral", configurations=("freight",))
    basis = replace(twin(), lateral_by_cg=(freight,), lateral_limits_entered=True)
    assert applicable(basis, "freight", None).lateral_limits_entered is True
    assert applicable(basis, "six-seat", None).lateral_limits_entered is False
    none = replace(twin(), envelopes=(held("envelope", configurations=("freight",)),))
    assert applicable(none, "six-seat", None).lateral_limits_entered is twin().lateral_limits_entered is True


def test_the_tightest_limits_field_by_field():
    base = limits(take_off=6000, landing=None, minimum_flying=4000)

    def own(**values):
        return tuple(
            (field, Limit(None if value is None else F(value), PAGE)) for field, value in values.items()
        )

    assert tightest(base, ()) is base
    found = tightest(base, own(take_off=5000, landing=5500, zero_fuel=5200, minimum_flying=4100))
    assert (found.take_off.value, found.landing.value, found.zero_fuel.value) == (5000, 5500, 5200)
    assert found.minimum_flying.value == 4100
    loose = tightest(base, own(take_off=6001, minimum_flying=3999, landing=None, ramp=None))
    assert (loose.take_off.value, loose.minimum_flying.value) == (6000, 4000)
    assert (loose.landing, loose.ramp) == (base.landing, Limit(None, PAGE))


def test_the_latest_answers_are_kept_and_no_more():
    basis = replace(twin(), envelopes=(named("n", categories=("normal",)),))
    first = applicable(basis, "0", None)
    for number in range(1, MOST_KEPT):
        applicable(basis, str(number), None)
    assert applicable(basis, "0", None) is first
    applicable(basis, str(MOST_KEPT), None)
    assert applicable(basis, "1", None) is applicable(basis, "1", None)
    assert applicable(basis, "0", None) is not first
    assert applicable(replace(basis), "0", None) is not applicable(basis, "0", None)
