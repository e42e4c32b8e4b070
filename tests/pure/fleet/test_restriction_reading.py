"""Restrictions and permits as they are entered: an envelope that is none, or lies elsewhere than the one it
is for, and a limit the basis does not have are refused by name. The twin's lies around 110 to 130 in.
"""

from typing import Any

import pytest

from fleet.restriction_reading import read_entered, read_paper
from records.refusal import Invalid
from tests.pure.loads.making import twin
from tests.pure.loads.papers import permit_document, restriction_document, ruled

CORNERS = [["112", "4000"], ["112", "6000"], ["120", "6000"], ["120", "4000"]]


def _envelope(points: list[list[str]], **changes: str) -> dict[str, Any]:
    own = {"effect": "envelope", "of": twin().envelopes[0].id, "unit": "in", "weight_unit": "lb"}
    return {**own, "points": points, **changes}


def _refused(effect: dict[str, Any], basis: Any = None) -> list[tuple[str, str]]:
    with pytest.raises(Invalid) as caught:
        read_entered(restriction_document(effect), "restriction", basis)
    return [(fault.pointer, fault.code) for fault in caught.value.faults]


@pytest.mark.parametrize(
    ("points", "code"),
    [
        ([CORNERS[0], *CORNERS], "envelope-repeated-point"),
        ([CORNERS[0], CORNERS[2], CORNERS[1], CORNERS[3]], "envelope-no-area"),
        ([["112", "4000"], ["112", "6000"], ["112", "5000"]], "envelope-no-area"),
        ([["112", "0"], *CORNERS[1:]], "envelope-weight"),
    ],
)
@pytest.mark.parametrize("basis", [None, twin()], ids=["no basis yet", "with one"])
def test_corners_that_are_no_envelope_are_refused_at_the_points(
    points: list[list[str]], code: str, basis: Any
) -> None:
    assert _refused(_envelope(points), basis) == [("/effects/0/points", code)]


def test_an_outline_that_crosses_itself_is_refused_at_the_points() -> None:
    crossing = [["112", "4000"], ["120", "6000"], ["118", "6500"], ["120", "4000"]]
    assert _refused(_envelope(crossing)) == [("/effects/0/points", "envelope-crosses-itself")]


@pytest.mark.parametrize("document", [restriction_document, permit_document])
def test_corners_typed_weight_first_or_in_another_unit_lie_elsewhere_and_are_refused(document: Any) -> None:
    kind = "permit" if document is permit_document else "restriction"
    turned = _envelope([[weight, arm] for arm, weight in CORNERS])
    for effect in (turned, _envelope(CORNERS, unit="mm")):
        with pytest.raises(Invalid) as caught:
            read_entered(document(effect), kind, twin())
        (fault,) = caught.value.faults
        assert (fault.pointer, fault.code) == ("/effects/0/points", "envelope-elsewhere")
        assert "[arm, weight]" in fault.detail


def test_a_limit_the_basis_does_not_have_is_named_at_the_limit() -> None:
    effect = {"effect": "limit", "limit": "with_external_load", "weight": {"value": "6000", "unit": "lb"}}
    assert _refused(effect, twin()) == [("/effects/0/limit", "unknown-id")]


def test_what_was_stored_is_read_as_it_stands_and_leaves_loads_unresolved() -> None:
    paper = read_paper(restriction_document(_envelope([CORNERS[0], *CORNERS])), "restriction")
    assert ruled(paper).unmet == (
        "the envelope of restriction DD-14 is none in the units of the loading basis",
    )


def test_a_sound_envelope_is_taken() -> None:
    assert read_entered(restriction_document(_envelope(CORNERS)), "restriction", twin()).number == "DD-14"
