"""Reading an operator's margins: exact, in the basis's units, and refused by name when they cannot be."""

from fractions import Fraction

import pytest

from fleet.basis_reading import read_basis
from records.refusal import Invalid
from tests.pure.fleet.documents import basis_document, found_in, is_a_sentence_with_a_next_step

F = Fraction


def margin(**changes):
    entry = {
        "id": "SEATING",
        "for": "seating variation",
        "phases": ["take-off", "landing"],
        "amounts": [{"forward": {"value": 900, "unit": "lb in"}, "aft": {"value": "0.6", "unit": "in"}}],
        "source": {"document": "OM-A", "revision": "4", "page": "8-12"},
    }
    return entry | changes


def twin(*margins):
    return basis_document("twin") | {"curtailments": list(margins)}


def refused(*margins):
    with pytest.raises(Invalid) as caught:
        read_basis(twin(*margins))
    assert all(is_a_sentence_with_a_next_step(fault) for fault in caught.value.faults)
    return found_in(caught.value)


def test_amounts_are_kept_exactly_in_the_units_of_the_basis():
    """10 kg m are 10,000 kg mm: 10000 / (0.45359237 * 25.4) lb in. 1.27 cm are half an inch."""
    amounts = [
        {
            "from": {"value": 2000, "unit": "kg"},
            "forward": {"value": 10, "unit": "kg m"},
            "aft": {"value": "1.27", "unit": "cm"},
        }
    ]

    (found,) = read_basis(twin(margin(amounts=amounts))).curtailments

    (row,) = found.rows
    assert row.least == F(2000) / F("0.45359237")
    assert row.forward.moment == F(10000) / (F("0.45359237") * F("25.4"))
    assert row.aft.arm == F(1, 2)
    assert str(found.source) == "OM-A rev 4 p. 8-12"
    assert found.phases == ("take-off", "landing", "minimum at landing")


def test_a_curtailment_larger_than_the_envelope_is_refused_by_name():
    huge = [{"forward": {"value": 30, "unit": "in"}, "aft": {"value": 30, "unit": "in"}}]

    assert refused(margin(), margin(id="FUEL", amounts=huge)) == {
        ("/curtailments/1/amounts", "curtailment-too-large")
    }


def test_margins_that_are_too_large_only_together_are_refused_too():
    wide = [{"forward": {"value": "5.9", "unit": "in"}}]

    found = refused(margin(amounts=wide), margin(id="FUEL", amounts=wide), margin(id="CREW", amounts=wide))

    assert {code for _, code in found} == {"curtailment-too-large"}


@pytest.mark.parametrize(
    ("changes", "pointer", "code"),
    [
        (
            {"amounts": [{"aft": {"value": 0, "unit": "in"}}]},
            "/curtailments/0/amounts/0/aft/value",
            "not-above-zero",
        ),
        (
            {"amounts": [{"aft": {"value": -1, "unit": "in"}}]},
            "/curtailments/0/amounts/0/aft/value",
            "not-above-zero",
        ),
        (
            {
                "amounts": [
                    {
                        "from": {"value": 6000, "unit": "lb"},
                        "to": {"value": 5000, "unit": "lb"},
                        "aft": {"value": 1, "unit": "in"},
                    }
                ]
            },
            "/curtailments/0/amounts/0/to",
            "curtailment-weights",
        ),
        (
            {
                "amounts": [
                    {"to": {"value": 6000, "unit": "lb"}, "aft": {"value": 1, "unit": "in"}},
                    {"from": {"value": 5999, "unit": "lb"}, "aft": {"value": 1, "unit": "in"}},
                ]
            },
            "/curtailments/0/amounts/1",
            "curtailment-overlaps",
        ),
        (
            {"amounts": [{"left": {"value": 1, "unit": "in"}}]},
            "/curtailments/0/phases",
            "curtails-nothing",
        ),
    ],
)
def test_what_is_wrong_is_named(changes, pointer, code):
    assert (pointer, code) in refused(margin(**changes))


def test_form_is_judged_before_anything_is_read():
    found = refused(margin(source={"page": "8-12"}), margin(amounts=[{}]), margin(**{"for": "luck"}))

    assert {pointer for pointer, _ in found} >= {
        "/curtailments/0/source/document",
        "/curtailments/1/amounts/0",
        "/curtailments/2/for",
    }


def test_margins_of_different_configurations_are_not_counted_together():
    """Each leaves something; both at once would not, but they never hold at once."""
    first, second = (entry["id"] for entry in basis_document("twin")["configurations"][:2])
    wide = [{"forward": {"value": "6", "unit": "in"}}]
    one = margin(amounts=wide, configurations=[first])
    other = margin(id="FREIGHT", amounts=wide, configurations=[second])

    assert len(read_basis(twin(one, other)).curtailments) == 2
    assert refused(one, other | {"configurations": ["attic"]}) >= {
        ("/curtailments/1/configurations/0", "unknown-id")
    }


def test_rows_may_meet_at_one_weight_and_an_id_is_used_once():
    rows = [
        {"to": {"value": 6000, "unit": "lb"}, "aft": {"value": 1, "unit": "in"}},
        {"from": {"value": 6000, "unit": "lb"}, "aft": {"value": 2, "unit": "in"}},
    ]

    assert len(read_basis(twin(margin(amounts=rows))).curtailments[0].rows) == 2
    assert refused(margin(), margin()) == {("/curtailments/1/id", "duplicate-id")}
