"""Normal and utility: a category of certification has limits and envelopes of its own; a load states which.

Common practice (14 CFR 23 before amendment 64 certified one airframe in several categories, remembered).
Figures invented: 1,240 lb at 100 in.
"""

from dataclasses import replace
from fractions import Fraction

import pytest

from fleet.basis import Envelope, Limits
from fleet.flight_rules import CertificationCategory
from fleet.sourced import Limit
from loads.balance.category import in_category as within_category
from loads.balance.declared import read_load
from records.refusal import Invalid
from tests.pure.fleet.documents import found_in
from tests.pure.loads.hand import PAGE, plain, result_with
from tests.pure.loads.making import load, result_of, twin

F = Fraction
PHASES = ("ramp", "take-off", "landing")
NORMAL = CertificationCategory("normal", "normal category", (), PAGE)
UTILITY = CertificationCategory("utility", "utility category", (("take_off", Limit(F(1200), PAGE)),), PAGE)


def envelope(name, aft, categories):
    points = ((F(90), F(500)), (F(90), F(3000)), (F(aft), F(3000)), (F(aft), F(500)))
    return Envelope(name, "longitudinal", PHASES, "arm", points, PAGE, categories=categories)


def two_envelopes(basis):
    """Aft to 110 in in the normal category, to 99 in in the utility one."""
    pair = (envelope("normal", 110, ("normal",)), envelope("utility", 99, ("utility",)))
    return replace(basis, certification_categories=(NORMAL, UTILITY), envelopes=pair)


def in_category(category):
    return lambda declared: replace(declared, category=category)


def test_each_category_is_judged_by_its_own_envelope():
    normal = result_with(plain(), two_envelopes, in_category(NORMAL)).check("cg.take-off")
    utility = result_with(plain(), two_envelopes, in_category(UTILITY)).check("cg.take-off")
    assert (normal.outcome, normal.limit) == ("pass", "110")
    assert (utility.outcome, utility.limit, utility.room) == ("fail", "99", F(-1))


def twin_in_categories():
    tighter = CertificationCategory(
        "utility", "utility category", (("take_off", Limit(F(5700), PAGE)),), PAGE
    )
    return replace(twin(), certification_categories=(NORMAL, tighter))


def test_a_weight_limit_of_the_category_counts_and_its_page_is_named():
    """The sound load takes off with 5,760.5 lb: within 6,800 lb, beyond 5,700 lb of the utility one."""
    utility = result_of(load(certification_category="utility"), twin_in_categories())
    check = utility.check("weight.take-off")
    assert (check.outcome, check.limit, check.source) == ("fail", "5700", "HAND rev A p. 6-9")
    assert utility.document["allowable_take_off"]["weight"] == "5700"
    assert utility.document["certification_category"] == {"id": "utility", "name": "utility category"}
    assert result_of(load(certification_category="normal"), twin_in_categories()).verdict == "within"


def test_a_category_never_loosens_what_the_configuration_tightens():
    """The configuration allows 1,100 lb, its category 1,200 lb: 1,100 lb hold."""
    configuration = plain().basis().configurations[0]
    tight = replace(configuration, limits=Limits(None, Limit(F(1100), PAGE), None, None, None))
    assert within_category(tight, UTILITY).limits.take_off.value == 1100
    assert within_category(configuration, UTILITY).limits.take_off.value == 1200


@pytest.mark.parametrize(
    ("changes", "code"),
    [({}, "missing"), ({"certification_category": "acrobatic"}, "unknown-category")],
)
def test_with_several_categories_a_load_states_a_known_one(changes, code):
    with pytest.raises(Invalid) as refused:
        read_load(load(**changes), twin_in_categories())
    assert found_in(refused.value) == {("/certification_category", code)}


def test_with_one_category_nothing_needs_to_be_stated():
    basis = replace(twin(), certification_categories=(NORMAL,))
    assert read_load(load(), basis).category is NORMAL


def test_a_category_of_a_basis_that_has_none_is_refused():
    with pytest.raises(Invalid) as refused:
        read_load(load(certification_category="normal"), twin())
    assert found_in(refused.value) == {("/certification_category", "unknown-category")}
