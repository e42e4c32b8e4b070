"""Places outside the aircraft and the maximum weight with an external load: read from a loading basis, and
refused with the field where they contradict another limit. The figures are invented.
"""

from fractions import Fraction
from typing import Any

import pytest

from fleet.basis_reading import read_basis
from fleet.sourced import Limit, Source
from fleet.web.stations_shown import station_rows
from records.refusal import Invalid
from tests.pure.fleet.documents import basis_document, changed, found_in

HIGHER = {"value": "6500", "unit": "lb", "source": {"page": "9-2"}}
AT = "/limits/with_external_load"


def test_a_place_may_be_outside_and_the_maximum_with_an_external_load_has_its_page() -> None:
    document = changed(changed(basis_document("twin"), AT, HIGHER), "/places/0/external", True)
    basis = read_basis(document)

    assert [place.external for place in basis.places][:2] == [True, False]
    assert basis.limits.with_external_load == Limit(Fraction(6500), Source("OK62-FM", "D", "9-2"))
    assert basis.configurations[0].limits.with_external_load == basis.limits.with_external_load


def test_a_basis_without_them_has_none() -> None:
    basis = read_basis(basis_document("twin"))
    assert basis.limits.with_external_load is None
    assert not any(place.external for place in basis.places)


@pytest.mark.parametrize(
    ("at", "value", "code"),
    [
        (AT, HIGHER | {"value": "6199"}, "limits-contradict"),  # the take-off limit is 6,200 lb
        (AT, {"none": True, "source": {"page": "9-2"}}, "unknown-field"),
        ("/places/0/external", "yes", "wrong-type"),
    ],
)
def test_what_contradicts_another_limit_or_is_no_figure_is_refused(at: str, value: Any, code: str) -> None:
    with pytest.raises(Invalid) as caught:
        read_basis(changed(basis_document("twin"), at, value))
    found = found_in(caught.value)
    assert any(fault_code == code for _, fault_code in found), found


def test_a_configuration_may_lower_it_and_not_raise_it() -> None:
    document = changed(basis_document("twin"), AT, HIGHER)
    lower = changed(document, "/configurations/0/limits", {"with_external_load": HIGHER | {"value": "6400"}})
    assert read_basis(lower).configurations[0].limits.with_external_load == Limit(
        Fraction(6400), Source("OK62-FM", "D", "9-2")
    )
    with pytest.raises(Invalid) as caught:
        read_basis(
            changed(document, "/configurations/0/limits", {"with_external_load": HIGHER | {"value": "6501"}})
        )
    assert ("/configurations/0/limits/with_external_load", "limit-looser") in found_in(caught.value)


def test_the_page_of_the_aircraft_says_which_place_is_outside() -> None:
    document = changed(basis_document("twin"), "/places/0/external", True)
    titles = [row["title"] for row in station_rows(document)]
    found = [title for title in titles if title.endswith(", outside the aircraft")]
    assert [title.casefold() for title in found] == [
        f"{document['places'][0]['name']}, outside the aircraft".casefold()
    ]
