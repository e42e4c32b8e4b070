"""Performance-limited weights: stated with the load, required by aircraft, configuration and operation.

Common practice (14 CFR 121.189 and 135.379, remembered, limit the take-off weight by performance; a small
aeroplane flown privately needs its structural limits alone). The figures are invented.
"""

from dataclasses import replace
from fractions import Fraction

import pytest

from fleet.flight_rules import PerformanceRule
from loads.balance.declared import read_load
from records.refusal import Invalid
from tests.pure.fleet.documents import found_in
from tests.pure.loads.hand import PAGE
from tests.pure.loads.making import load, result_of, twin

F = Fraction


def rule(at="take-off", required=True, kinds=(), operations=()):
    return PerformanceRule(at, required, kinds, operations, PAGE)


def with_rules(*rules):
    return replace(twin(), performance=rules)


def stated(*kinds, at="take-off"):
    return [
        {"at": at, "weight": {"value": 6700, "unit": "lb"}, "source": f"sheet {kind}", "kind": kind}
        for kind in kinds
    ]


def test_required_and_absent_is_unresolved_and_names_what_to_enter():
    result = result_of(load(limits=[]), with_rules(rule()))
    check = result.check("performance.required.take-off")
    assert (result.verdict, check.outcome, check.source) == ("unresolved", "unresolved", "HAND rev A p. 6-9")
    assert check.margin_text == "required for passenger-charter, not stated"
    assert check.what_next == (
        "State in `limits` the greatest take-off weight the performance allows, "
        "with the sheet or page it comes from."
    )


def test_stated_it_is_kept_and_governs_where_it_is_the_least():
    result = result_of(load(), with_rules(rule()))
    assert result.check("performance.required.take-off").outcome == "pass"
    assert result.document["allowable_take_off"]["governed_by"] == "performance sheet 12"


def test_every_kind_asked_for_must_be_stated():
    basis = with_rules(rule(kinds=("field length", "climb")))
    one = result_of(load(limits=stated("field length")), basis).check("performance.required.take-off")
    both = result_of(load(limits=stated("field length", "climb")), basis)
    assert (one.outcome, one.margin_text) == (
        "unresolved",
        "required for passenger-charter, not stated: climb",
    )
    assert both.check("performance.required.take-off").outcome == "pass"
    assert both.check("performance.take-off.2").title == "take-off weight, climb, sheet climb"


def test_the_rule_that_names_the_operation_counts():
    """All operations need it, but a charter of passengers, by its own page, does not."""
    basis = with_rules(rule(), rule(required=False, operations=("Passenger-Charter",)))
    check = result_of(load(limits=[]), basis).check("performance.required.take-off")
    assert (check.outcome, check.margin_text) == (
        "pass",
        "the structural limits are enough for this operation",
    )


def test_a_configuration_may_have_rules_of_its_own():
    basis = with_rules(rule(required=False))
    own = (rule(at="landing"),)
    basis = replace(
        basis, configurations=tuple(replace(one, performance=own) for one in basis.configurations)
    )
    result = result_of(load(limits=[]), basis)
    assert result.check("performance.required.landing").outcome == "unresolved"
    assert not [check for check in result.checks if check.code == "performance.required.take-off"]


def test_a_limit_stated_for_landing_is_none_for_take_off():
    result = result_of(load(limits=stated("field length", at="landing")), with_rules(rule()))
    assert result.check("performance.required.take-off").outcome == "unresolved"


def test_an_unknown_kind_is_refused():
    with pytest.raises(Invalid) as refused:
        read_load(load(limits=stated("runway")), twin())
    assert found_in(refused.value) == {("/limits/0/kind", "choice")}


def test_a_basis_without_rules_has_no_such_check():
    assert not [one for one in result_of().checks if one.code.startswith("performance.required")]
