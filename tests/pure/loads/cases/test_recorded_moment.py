"""A recorded moment against the printed arm: the record stands, whatever weight times arm comes to.

FAA-H-8083-25C figure 10-10 (read): licensed empty weight 1,011.9 lb, arm 68.6 in, moment on file 69,393.0
lb in; by product 1,011.9 * 68.6 = 69,416.34 (computed).
"""

from dataclasses import replace
from fractions import Fraction

from fleet.basis_reading import read_basis
from fleet.empty_weight_reading import read_empty_weight
from tests.pure.fleet.documents import basis_document, changed, empty_weight_document
from tests.pure.loads.hand import plain, result_with

F = Fraction


def entered(**figures):
    document = empty_weight_document("twin")
    for name in ("arm", "moment"):
        document.pop(name, None)
    return {**document, **figures}


def test_the_moment_on_file_is_the_one_that_is_added():
    made = replace(plain(left=0, right=0), weight=F("1011.9"), moment=F("69393.0"))
    state = result_with(made).state("take-off")
    assert state.moment == F("69393.0")
    assert state.moment != F("1011.9") * F("68.6") == F("69416.34")


def test_entered_with_both_the_record_stands_and_the_difference_is_rounding():
    basis = read_basis(basis_document("twin"))
    both = entered(
        weight={"value": "1011.9", "unit": "lb"},
        arm={"value": "68.6", "unit": "in"},
        moment={"value": "69393.0", "unit": "lb in"},
    )
    figures = read_empty_weight(both, basis)
    assert figures.moment == F("69393.0")
    alone = read_empty_weight(changed(both, "/moment", ...), basis)
    assert alone.moment == F("69416.34")


def test_the_computation_shows_the_arm_that_follows_from_the_record():
    made = replace(plain(left=0, right=0), weight=F("1011.9"), moment=F("69393.0"))
    line = result_with(made).document["sumsheet"][0]
    assert (line["how"], line["moment"], line["arm"]) == ("from the record", "69393", "68.58")
