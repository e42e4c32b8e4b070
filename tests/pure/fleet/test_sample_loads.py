"""The manual's sample loads: they pass as printed, and any slip in the basis they touch makes them fail."""

from typing import Any

import pytest

from fleet.basis_reading import read_basis
from fleet.sample_loads import failures_of
from tests.pure.fleet.documents import NAMES, basis_document, changed


@pytest.mark.parametrize("name", NAMES)
def test_the_sample_loads_of_the_invented_manuals_come_out_as_printed(name: str) -> None:
    basis = read_basis(basis_document(name))

    assert {sample.within for sample in basis.sample_loads} == {True, False}
    assert failures_of(basis) == ()


@pytest.mark.parametrize(
    ("at", "value", "codes"),
    [
        ("/sample_loads/0/total_weight/value", 5677, ["sample-weight"]),
        ("/sample_loads/0/weights/3/arm/value", "201.0", ["sample-moment"]),
        ("/sample_loads/0/within", False, ["sample-verdict"]),
        ("/sample_loads/1/within", True, ["sample-verdict"]),
        (
            "/sample_loads/0/weights/0/weight/value",
            4500,
            ["sample-weight", "sample-moment", "sample-verdict"],
        ),
        ("/envelopes/0/points/0", ["3700", "158.5"], []),
        ("/envelopes/0/points/1", ["4800", "162.0"], ["sample-verdict"]),
        ("/envelopes/0/phases", ["ramp", "take-off", "landing"], ["sample-no-envelope"]),
    ],
)
def test_what_differs_from_the_printed_figures_is_named(at: str, value: Any, codes: list[str]) -> None:
    basis = read_basis(changed(basis_document("twin"), at, value))

    assert [failure.code for failure in failures_of(basis)] == codes


def test_a_sample_load_above_the_limit_is_outside_however_well_balanced() -> None:
    document = changed(basis_document("twin"), "/limits/take_off/value", 5677)
    document = changed(document, "/limits/landing/value", 5600)

    assert [failure.code for failure in failures_of(read_basis(document))] == ["sample-verdict"]


def test_a_printed_moment_is_added_as_it_stands() -> None:
    document = basis_document("helicopter")
    for number, row in enumerate(document["sample_loads"][0]["weights"]):
        moment = {"value": str(float(row["weight"]["value"]) * float(row["arm"]["value"])), "unit": "kg mm"}
        document = changed(document, f"/sample_loads/0/weights/{number}/arm", ...)
        document = changed(document, f"/sample_loads/0/weights/{number}/moment", moment)

    assert failures_of(read_basis(document)) == ()
    document = changed(document, "/sample_loads/0/weights/0/moment/value", "1982000")
    assert [failure.code for failure in failures_of(read_basis(document))] == ["sample-moment"]


def test_a_manual_without_sample_loads_says_so_with_its_page() -> None:
    document = changed(basis_document("twin"), "/sample_loads", {"none": True, "source": {"page": "6-1"}})

    basis = read_basis(document)

    assert basis.sample_loads == ()
    assert failures_of(basis) == ()
