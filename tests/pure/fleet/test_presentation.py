"""Index units and divided moments: exact both ways, and what a manual prints in them is read as printed."""

from fractions import Fraction

import pytest

from fleet.basis_reading import read_basis
from fleet.presentation import IndexUnits
from fleet.sourced import Source
from records.refusal import Invalid
from tests.pure.fleet.documents import basis_document, changed, found_in, is_a_sentence_with_a_next_step

F = Fraction
PAGE = {"page": "6-20"}
INDEX = {
    "index": {
        "reference_arm": {"value": 155, "unit": "in"},
        "divisor": {"value": 1000, "unit": "lb in"},
        "constant": 40,
        "source": PAGE,
    }
}
BASIS = IndexUnits(F(155), F(1000), F(40), Source("VP2-FM", "B", "6-20"))


def twin(**more):
    return basis_document("twin") | more


def refused(document):
    with pytest.raises(Invalid) as caught:
        read_basis(document)
    assert all(is_a_sentence_with_a_next_step(fault) for fault in caught.value.faults)
    return found_in(caught.value)


def test_by_hand_the_index_of_an_aircraft_and_of_a_line():
    """5,000 lb at 157 in: 5000 * (157 - 155) / 1000 + 40 = 50. 200 lb at 190 in add 200 * 35 / 1000 = 7."""
    assert BASIS.of_total(F(5000), F(5000 * 157)) == 50
    assert BASIS.of_line(F(200), F(200 * 190)) == 7
    assert BASIS.of_total(F(5200), F(5000 * 157 + 200 * 190)) == 57


def test_an_index_and_a_weight_give_the_moment_back():
    """Index 57 at 5,200 lb: (57 - 40) * 1000 + 155 * 5200 = 823,000 lb in, at 158.27 in."""
    assert BASIS.moment(F(5200), F(57)) == 823_000
    assert BASIS.arm(F(5200), F(57)) == F(823_000, 5200)
    for weight, moment in ((F(4321), F("712345.6")), (F(9), F(-4))):
        assert BASIS.moment(weight, BASIS.of_total(weight, moment)) == moment


def test_an_envelope_typed_in_index_units_holds_what_the_same_one_in_moments_holds():
    """Each corner is worked to its moment by (index - 40) * 1000 + 155 * weight, and edges straight in index
    are straight in moment.
    """
    corners = [(3700, "24"), (4800, "18.5"), (6240, "45.5"), (6240, "83.25"), (3700, "69.5")]
    document = changed(twin(presentation=INDEX), "/envelopes/0/plane", "moment")
    document = changed(document, "/envelopes/0/unit", "index")
    document = changed(document, "/envelopes/0/points", [[weight, index] for weight, index in corners])

    (envelope,) = read_basis(document).envelopes

    assert envelope.points == tuple(
        ((F(index) - 40) * 1000 + 155 * weight, weight) for weight, index in corners
    )
    assert envelope.shape.holds(F(5520), BASIS.moment(F(5520), F(32)))  # half way from 18.5 to 45.5
    assert not envelope.shape.holds(F(5520), BASIS.moment(F(5520), F("31.999")))


def test_an_envelope_typed_in_percent_of_the_chord_stands_at_the_arms_it_means():
    """The chord begins at 148 in and is 64 in long: 12.5 % is 156 in, 25 % is 164 in."""
    document = changed(twin(), "/envelopes/0/unit", "% MAC")
    document = changed(
        document, "/envelopes/0/points", [[3700, "12.5"], [6240, "12.5"], [6240, 25], [3700, 25]]
    )

    (envelope,) = read_basis(document).envelopes

    assert {arm for arm, _ in envelope.points} == {156, 164}


def test_moments_typed_divided_as_printed_are_the_whole_moments():
    document = changed(twin(), "/envelopes/0/plane", "moment")
    document = changed(document, "/envelopes/0/unit", "lb in")
    document = changed(document, "/envelopes/0/divided_by", 1000)
    corners = [[3700, "556.9"], [6240, "972.8"], [6240, "1010.6"], [3700, "603.1"]]
    document = changed(document, "/envelopes/0/points", corners)

    (envelope,) = read_basis(document).envelopes

    assert envelope.points[1] == (972_800, 6240)


def test_a_tank_table_of_divided_moments_is_read_whole():
    """40 US gal at 6 lb/US gal and 138.5 in are 33,240 lb in: 332.4 hundreds."""
    table = {
        "against": "volume",
        "against_unit": "US gal",
        "gives": "moment",
        "gives_unit": "lb in",
        "divided_by": 100,
        "straight_in": "moment",
        "density": {"value": 6, "unit": "lb/US gal"},
        "points": [[0, 0], [40, "332.4"]],
    }

    basis = read_basis(changed(twin(), "/tanks/0/table", table))

    assert basis.tanks[0].moment(F(40), F(6)) == 33_240
    assert basis.tanks[0].moment(F(20), F(3)) == 8_310


def test_a_trim_table_in_index_units_stands_at_the_arm_of_its_weight():
    """At 6,000 lb index 52 is the moment (52 - 40) * 1000 + 155 * 6000 = 942,000, so 157 in."""
    trim = {
        "against": "index",
        "unit": "units",
        "step": "0.1",
        "tables": [
            {"weight": {"value": 6000, "unit": "lb"}, "points": [[52, 1], [64, 3]], "source": PAGE},
            {"weight": {"value": 5000, "unit": "lb"}, "points": [[50, 1], [60, 3]], "source": PAGE},
        ],
    }

    found = read_basis(twin(presentation=INDEX, trim=trim)).trim

    assert found is not None
    assert found.against == "arm"
    assert found.tables[0].setting(F(158), F(6000)) == 2
    assert found.tables[0].setting(F(157), F(5000)) == 1


ENVELOPE = "/envelopes/0"


@pytest.mark.parametrize(
    ("changes", "pointer", "code"),
    [
        ({"unit": "index", "plane": "moment"}, "/envelopes/0/unit", "no-index"),
        ({"unit": "index"}, "/envelopes/0/unit", "unit-dimension"),
        ({"unit": "% MAC", "plane": "moment"}, "/envelopes/0/unit", "unit-dimension"),
        ({"divided_by": 100}, "/envelopes/0/divided_by", "divided-arms"),
        ({"plane": "moment", "unit": "lb in", "divided_by": 0}, "/envelopes/0/divided_by", "not-above-zero"),
    ],
)
def test_what_cannot_be_meant_is_named(changes, pointer, code):
    document = twin()
    for field, value in changes.items():
        document = changed(document, f"{ENVELOPE}/{field}", value)

    assert (pointer, code) in refused(document)


def test_percent_without_a_chord_is_named():
    document = changed(twin(chord={"none": True, "source": PAGE}), "/envelopes/0/unit", "% MAC")

    assert ("/envelopes/0/unit", "no-chord") in refused(document)


def test_a_divisor_must_be_above_zero():
    index = changed(twin(presentation=INDEX), "/presentation/index/divisor/value", 0)
    divided = twin(presentation={"moment_divisor": {"value": 0, "source": PAGE}})

    assert refused(index) == {("/presentation/index/divisor/value", "not-above-zero")}
    assert refused(divided) == {("/presentation/moment_divisor/value", "not-above-zero")}


def test_a_presentation_shows_something():
    assert "/presentation" in {pointer for pointer, _ in refused(twin(presentation={}))}


def test_an_index_in_other_units_is_kept_exactly_in_those_of_the_basis():
    """100 kg cm to an index unit are 100 / (0.45359237 * 2.54) lb in."""
    index = changed(INDEX, "/index/divisor", {"value": 100, "unit": "kg cm"})

    presentation = read_basis(twin(presentation=index)).presentation

    assert presentation is not None
    assert presentation.index is not None
    assert presentation.index.divisor == 100 / (F("0.45359237") * F("2.54"))
