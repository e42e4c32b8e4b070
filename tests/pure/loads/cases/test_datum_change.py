"""A datum change: all arms change and nothing physical does; every version names its datum, none are mixed.

Common practice. The same aircraft told from the nose and from a datum 40 in ahead of it: every arm is 40 in
more, every weight, margin and verdict the same.
"""

from dataclasses import replace
from fractions import Fraction

import pytest

from fleet.basis_reading import read_basis
from fleet.empty_weight_reading import read_as_recorded, read_empty_weight
from fleet.web.rules_shown import rule_rows
from fleet.weighing import Restated
from records.refusal import Invalid
from tests.pure.fleet.documents import basis_document, changed, empty_weight_document, found_in
from tests.pure.loads.making import SOURCE, envelope, result_of, twin, twin_empty

F = Fraction
MOVED = F(40)


def moved_table(table):
    return replace(table, points=tuple((volume, arm + MOVED) for volume, arm in table.points))


def twin_from_further_ahead():
    basis = twin()
    return replace(
        basis,
        datum="a point 40 in ahead of the nose",
        chord=replace(basis.chord, leading_edge=basis.chord.leading_edge + MOVED),
        seats=tuple(replace(one, arm=one.arm + MOVED) for one in basis.seats),
        places=tuple(replace(one, arm=one.arm + MOVED) for one in basis.places),
        tanks=tuple(replace(one, table=moved_table(one.table)) for one in basis.tanks),
        envelopes=tuple(envelope(*((x + MOVED, y) for x, y in one.points)) for one in basis.envelopes),
    )


def empty_from_further_ahead():
    empty = twin_empty()
    return replace(empty, datum="a point 40 in ahead of the nose", moment=empty.moment + MOVED * empty.weight)


def test_every_arm_moves_and_every_margin_and_percent_stays():
    before = result_of()
    after = result_of(basis=twin_from_further_ahead(), empty=empty_from_further_ahead())
    for one, other in zip(before.states, after.states, strict=True):
        assert other.arm == one.arm + MOVED
        assert (other.weight, other.lateral_moment) == (one.weight, one.lateral_moment)
    rooms = [(check.code, check.outcome, check.room) for check in before.checks]
    assert [(check.code, check.outcome, check.room) for check in after.checks] == rooms
    percents = [phase["percent_chord"] for phase in before.document["phases"]]
    assert [phase["percent_chord"] for phase in after.document["phases"]] == percents


@pytest.mark.parametrize("which", ["empty", "basis"])
def test_versions_of_different_datums_are_never_mixed(which):
    """Either one moved alone would put the CG 40 in off and still inside: it is not computed."""
    basis = twin_from_further_ahead() if which == "basis" else twin()
    empty = empty_from_further_ahead() if which == "empty" else twin_empty()
    result = result_of(basis=basis, empty=empty)
    check = result.check("standing.empty-weight")
    assert (result.verdict, check.outcome, result.states) == ("unresolved", "unresolved", ())
    assert "40 in ahead of the nose" in check.margin_text
    assert check.what_next.startswith("Enter the empty weight from the datum of the loading basis")


def test_an_empty_weight_entered_against_another_datum_is_refused_with_the_field():
    basis = read_basis(basis_document("twin"))
    document = changed(empty_weight_document("twin"), "/datum", "firewall")
    with pytest.raises(Invalid) as refused:
        read_empty_weight(document, basis)
    assert found_in(refused.value) == {("/datum", "datum-differs")}
    assert "restate the figures for that datum" in refused.value.faults[0].detail


def restating(offset="40", **more):
    """The twin's basis, which states how far ahead of its datum an earlier one lies."""
    other = {
        "name": "the earlier datum",
        "offset": {"value": offset, "unit": "in"},
        "source": {"page": "6-2"},
    }
    return changed(basis_document("twin"), "/other_datums", [other | more])


def from_earlier():
    """The twin's empty weight as a weighing from the earlier datum gave it: 40 in of arm less."""
    document = empty_weight_document("twin")
    weight, moment = (F(document[name]["value"]) for name in ("weight", "moment"))
    without = {name: part for name, part in document.items() if name != "arm"}
    there = moment - 40 * weight
    return without | {"datum": "the earlier datum", "moment": {"value": str(float(there)), "unit": "lb in"}}


def test_an_empty_weight_from_an_earlier_datum_is_restated_by_the_offset_the_basis_states():
    basis = read_basis(restating())
    own, earlier = (
        read_empty_weight(each, basis) for each in (empty_weight_document("twin"), from_earlier())
    )
    assert (earlier.weight, earlier.moment, earlier.lateral_moment) == (
        own.weight,
        own.moment,
        own.lateral_moment,
    )
    assert earlier.datum == basis.datum
    assert own.restated is None
    assert (earlier.restated.datum, earlier.restated.offset) == ("the earlier datum", 40)
    assert earlier.restated.moment + earlier.weight * 40 == earlier.moment
    assert read_as_recorded(from_earlier(), basis) == earlier


def test_the_working_stands_in_the_check_and_in_the_loading_computation():
    # 507,240.5 - 40 x 4,350 = 333,240.5 lb in from the earlier datum
    empty = twin_empty()
    told = Restated("the earlier datum", empty.moment - 40 * empty.weight, F(40), SOURCE)
    result = result_of(empty=replace(empty, restated=told))
    check = result.check("standing.empty-weight")
    assert check.outcome == "pass"
    assert (
        "restated from 'the earlier datum': 333240.5 + 4350 x 40 = 507240.5 lb in from 'nose cone'"
        in check.margin_text
    )
    assert result.lines[0].what.endswith("restated from 'the earlier datum'")
    assert result.lines[0].moment == empty.moment


@pytest.mark.parametrize(
    ("document", "fault"),
    [
        (restating(name="nose tip"), None),
        (restating("0.0"), None),
        (restating("far"), ("/other_datums/0/offset/value", "number-form")),
    ],
)
def test_an_offset_is_a_length_and_names_a_datum(document, fault):
    if fault is None:
        assert read_basis(document).other_datums
        return
    with pytest.raises(Invalid) as refused:
        read_basis(document)
    assert fault in found_in(refused.value)


def test_a_datum_is_stated_once_and_never_the_basis_s_own():
    own = basis_document("twin")["datum"]["name"]
    twice = restating()
    twice["other_datums"] *= 2
    for document, code in ((restating(name=own), "datum-own"), (twice, "duplicate")):
        with pytest.raises(Invalid) as refused:
            read_basis(document)
        assert code in {each for _, each in found_in(refused.value)}


def test_the_page_of_the_aircraft_says_what_is_added():
    rows = rule_rows(restating())
    assert rows[0]["title"] == "Arms from the earlier datum"
    assert str(rows[0]["value"]).startswith("40 in is added")
