"""The certification category and what a limit comes from, typed on the page and back into its inputs."""

from dataclasses import replace

from fleet.flight_rules import CertificationCategory
from loads.web.copied import typed_of
from loads.web.desk import lay_desk
from loads.web.form import document_of
from tests.pure.loads.hand import PAGE
from tests.pure.loads.making import load, twin

CATEGORIES = (
    CertificationCategory("normal", "normal category", (), PAGE),
    CertificationCategory("utility", "utility category", (), PAGE),
)


def desk(basis, typed=None, faults=None):
    made = lay_desk(basis, basis.configurations[0], typed=typed or {}, faults=faults or {}, zone="UTC")
    return {field.name: field for field in (*made["flight"], *(one for row in made["limits"] for one in row))}


def test_the_category_is_asked_where_the_basis_has_several_and_none_is_chosen_for_anybody():
    field = desk(replace(twin(), certification_categories=CATEGORIES))["certification_category"]
    assert field.choices == (("", "choose"), ("normal", "normal category"), ("utility", "utility category"))
    assert field.value == ""
    assert "certification_category" not in desk(twin())


def test_a_category_copied_from_elsewhere_stays_on_the_page_to_be_refused_by_name():
    field = desk(twin(), {"certification_category": "utility"})["certification_category"]
    assert (field.value, ("utility", "utility") in field.choices) == ("utility", True)


def test_both_go_into_the_document_and_back():
    basis = twin()
    limit = {
        "at": "take-off",
        "weight": {"value": "6700", "unit": "lb"},
        "source": "sheet 12",
        "kind": "climb",
    }
    document = load(limits=[limit], certification_category="utility")
    typed = typed_of(document)
    assert (typed["limit:0:kind"], typed["certification_category"]) == ("climb", "utility")
    made, fields = document_of(
        typed,
        departure="2026-12-01T08:30:00-06:00",
        seats=[seat.id for seat in basis.seats],
        tanks=[tank.id for tank in basis.tanks],
    )
    assert made["limits"] == [limit]
    assert made["certification_category"] == "utility"
    assert fields["/certification_category"] == "certification_category"
    assert fields["/limits/0/kind"] == "limit:0:kind"
