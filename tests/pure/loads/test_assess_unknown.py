"""What is not known: it is unresolved or told openly, and never taken for zero or for a pass."""

from dataclasses import replace

import pytest

from loads.balance.assess import assess
from loads.balance.declared import read_outline
from tests.pure.loads.making import ROOMY, load, result_of, twin, twin_empty, with_limits


def test_a_limit_that_was_not_entered_is_unresolved_and_one_shown_to_be_none_passes():
    values = {name: value for name, value in ROOMY.items() if name != "landing"}
    unresolved = result_of(basis=with_limits(**values))
    none = result_of(basis=with_limits(**{**values, "landing": None}))

    assert unresolved.check("weight.landing").outcome == "unresolved"
    assert unresolved.verdict == "unresolved"
    assert unresolved.as_document()["allowable_take_off"]["not_entered"] == ["landing limit + trip fuel"]
    assert none.check("weight.landing").margin_text == "no limit"
    assert none.check("weight.landing").source == "VP2-FM rev B p. 6-4"
    assert none.verdict == "within"


def test_no_empty_weight_in_force_is_unresolved_and_computes_no_phase():
    result = result_of(empty=None)
    document = result.as_document()

    assert result.verdict == "unresolved"
    assert result.check("standing.empty-weight").margin_text == "no empty weight in force"
    assert document["phases"] == []
    assert document["allowable_take_off"] is None
    assert document["operating_weight"] is None
    assert document["sumsheet"][0]["weight"] is None
    assert result.check("seat.ROW1-L").outcome == "pass"


def test_no_loading_basis_in_force_is_unresolved():
    result = assess(read_outline(load()), None, None)

    assert result.verdict == "unresolved"
    assert [check.code for check in result.checks] == ["standing.loading-basis"]
    assert result.as_document()["phases"] == []


@pytest.mark.parametrize("changed", [{"datum": "firewall"}, {"fit": "floats"}])
def test_an_empty_weight_of_another_datum_or_fit_is_never_mixed_in(changed):
    result = result_of(empty=replace(twin_empty(), **changed))

    assert result.verdict == "unresolved"
    assert result.states == ()


def test_a_standard_weight_without_a_table_is_unresolved_and_counts_as_nothing_known():
    document = load()
    adult = document["passengers"][0]
    del adult["weight"]
    adult |= {"how": "standard", "category": "adult"}

    result = result_of(document)

    assert result.verdict == "unresolved"
    assert result.check("weights.unknown").outcome == "unresolved"
    assert result.check("seat.ROW1-L").outcome == "unresolved"
    assert result.states == ()


def test_an_estimated_person_is_computed_but_unresolved_and_an_estimated_bag_is_told():
    document = load()
    document["passengers"][0]["how"] = "estimated"
    document["items"][0]["how"] = "estimated"

    result = result_of(document)

    assert result.verdict == "unresolved"
    assert result.check("weights.estimated").outcome == "unresolved"
    assert len(result.states) == 5
    assert "1 of 1 item weights are estimates" in result.as_document()["advisories"]


def test_a_broken_limit_weighs_more_than_an_open_question():
    document = load()
    document["items"][0]["weight"]["value"] = 301

    assert result_of(document, empty=None).verdict == "outside"


def test_a_seat_or_place_without_an_entered_limit_is_unresolved_only_when_it_is_used():
    basis = twin()
    bare = tuple(replace(one, maximum=None) for one in basis.places)
    result = result_of(basis=replace(basis, places=bare))

    assert result.check("place.AFT-HOLD").outcome == "unresolved"
    with pytest.raises(KeyError):
        result.check("place.NOSE-HOLD")


def test_without_a_zero_fuel_envelope_the_zero_fuel_cg_is_told_and_not_judged():
    basis = twin()
    basis = replace(basis, envelopes=(replace(basis.envelopes[0], phases=("take-off", "landing")),))
    result = result_of(basis=basis)

    assert result.check("cg.zero-fuel").outcome == "advisory"
    assert result.check("cg.ramp").outcome == "advisory"
    assert result.check("cg.minimum-at-landing").outcome == "pass"
    assert result.verdict == "within"
    assert any("zero fuel" in line for line in result.as_document()["not_assessed"])


def test_without_a_landing_envelope_a_load_is_unresolved():
    basis = twin()
    basis = replace(basis, envelopes=(replace(basis.envelopes[0], phases=("take-off",)),))

    assert result_of(basis=basis).check("cg.landing").outcome == "unresolved"


def test_lateral_limits_nobody_entered_are_unresolved():
    result = result_of(basis=replace(twin(), lateral_limits_entered=False))

    assert result.check("lateral.take-off").outcome == "unresolved"
    assert result.verdict == "unresolved"


def test_where_everything_is_known_nothing_is_left_unassessed_and_the_burn_is_a_check():
    document = result_of().as_document()

    assert document["not_assessed"] == []
    assert "path.longitudinal" in [check["code"] for check in document["checks"]]


def test_without_a_computed_load_there_is_no_path():
    document = result_of(empty=None).as_document()

    assert document["path"] is None
    assert document["not_assessed"] == ["weights and centres of gravity: a figure they need is not known"]
    assert not [check for check in document["checks"] if check["code"].startswith("path.")]


def test_with_a_basis_an_outline_alone_is_not_assessed():
    with pytest.raises(TypeError):
        assess(read_outline(load()), twin(), twin_empty())
