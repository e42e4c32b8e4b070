"""A datum change: all arms change and nothing physical does; every version names its datum, none are mixed.

Common practice. The same aircraft told from the nose and from a datum 40 in ahead of it: every arm is 40 in
more, every weight, margin and verdict the same.
"""

from dataclasses import replace
from fractions import Fraction

import pytest

from fleet.basis_reading import read_basis
from fleet.empty_weight_reading import read_empty_weight
from records.refusal import Invalid
from tests.pure.fleet.documents import basis_document, changed, empty_weight_document, found_in
from tests.pure.loads.making import envelope, result_of, twin, twin_empty

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
