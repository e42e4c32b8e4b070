"""Revising on the page: the figures are copied, marked as copied, and taken over only when confirmed."""

import pytest

from loads.actions.submit_load import submit_load
from loads.models import Load
from loads.queries.current import declared_in, load_of
from tests.cast import actor, browser
from tests.loads.making import accepted, load_document, submitted
from tests.makers import LONG_AGO, basis_document, make_basis
from tests.reading_pages import Page

pytestmark = pytest.mark.django_db


def revise(people, current, press="submit", *, who="preparer", **changes):
    client = browser(getattr(people, who))
    page = Page(client.get(f"/loads/{current.load.id}/revise"))
    assert page.status == 200
    return client.post(f"/loads/{current.load.id}/revise", page.form("").filled(changes, press=press))


CONFIRMED = {"checked": "yes", "reason": "one bag left behind"}


def test_the_figures_of_the_earlier_load_stand_there_and_say_that_they_are_copied(people) -> None:
    current = submitted(people)

    page = Page(browser(people.preparer).get(f"/loads/{current.load.id}/revise"))
    values = page.form("").values

    assert "copied from the load this one replaces" in page.words
    assert (values["seat:ROW1-L:name"], values["seat:ROW1-L:weight"]) == ("L. Osei", "176")
    assert (values["item:0:what"], values["tank:LEFT:quantity"]) == ("checked bags", "100")
    assert (values["date"], values["time"]) == ("2026-12-01", "07:30")
    assert (values["checked"], values["reason"], values["step"]) == ("", "", "1")


def test_a_confirmed_revision_replaces_the_load(people) -> None:
    current = submitted(people)

    answer = revise(people, current, **CONFIRMED, **{"item:0:weight": "96"})

    fresh = Load.objects.get(replaces=current.load)
    assert (answer.status_code, answer["Location"]) == (302, f"/loads/{fresh.id}")
    assert load_of(people.operator.code, current.load.id).state == "superseded"
    assert load_of(people.operator.code, current.load.id).step.reason == "one bag left behind"
    document = declared_in(fresh)
    assert document["items"][0]["weight"] == {"value": "96", "unit": "lb"}
    assert document["passengers"] == declared_in(current.load)["passengers"]


@pytest.mark.parametrize(
    ("changes", "words"),
    [
        ({"reason": "x"}, "confirm that every copied figure was checked"),
        ({"reason": "x", "checked": "no"}, "confirm that every copied figure was checked"),
        ({"checked": "yes"}, "empty"),
        ({"checked": "yes", "reason": "x" * 501}, "501 characters"),
        ({"checked": "yes", "reason": "x", "item:0:weight": ""}, "the weight is missing"),
    ],
)
def test_without_confirmation_or_reason_nothing_is_replaced(people, changes, words) -> None:
    current = submitted(people)

    page = Page(revise(people, current, **changes))

    assert page.status == 422
    assert words in page.alerts[0]
    assert load_of(people.operator.code, current.load.id).state == "open"
    assert Load.objects.filter(replaces=current.load).count() == 0


def test_computing_a_revision_stores_nothing_and_keeps_the_confirmation_open(people) -> None:
    current = submitted(people)

    page = Page(revise(people, current, "compute", **{"item:0:weight": "96"}))

    assert "Computed, nothing stored" in page.words
    assert page.form("").values["item:0:weight"] == "96"
    assert page.form("").values["checked"] == ""
    assert Load.objects.count() == 1


def test_a_load_that_moved_on_meanwhile_is_not_replaced(people) -> None:
    current = submitted(people)

    page = Page(revise(people, current, **CONFIRMED, step="9"))

    assert page.status == 412
    assert Load.objects.count() == 1


def test_an_accepted_load_is_revised_and_its_manifest_stays(people) -> None:
    current = accepted(people)

    answer = revise(people, current, who="pilot", **CONFIRMED)
    old = Page(browser(people.pilot).get(f"/loads/{current.load.id}"))

    assert answer.status_code == 302
    assert "superseded" in old.words
    assert "No. 1 (PDF)" in old.links


def test_a_time_cleared_on_the_way_keeps_every_figure_on_the_page(people) -> None:
    page = Page(revise(people, submitted(people), **CONFIRMED, time=""))

    assert page.status == 422
    assert set(page.faults) == {"time"}
    assert page.form("").values["seat:ROW1-L:weight"] == "176"


def test_a_position_and_a_unit_that_are_in_no_list_survive_the_page(people) -> None:
    document = load_document(people)
    document["passengers"].pop()
    document["crew"].append(
        {
            "name": "M. Dravo",
            "position": "flight nurse",
            "seat": "COCKPIT-R",
            "weight": {"value": "71.5", "unit": "kg"},
            "how": "weighed",
        }
    )
    document["fuel"]["density"] |= {"value": "3.04", "unit": "kg/US gal"}
    document["flight"]["operation"] = "medical-transfer"
    current = submit_load(document, by=actor(people.preparer))

    revise(people, current, **CONFIRMED)

    again = declared_in(Load.objects.get(replaces=current.load))
    assert again["crew"] == declared_in(current.load)["crew"]
    assert again["fuel"] == declared_in(current.load)["fuel"]
    assert again["flight"]["operation"] == "medical-transfer"


def test_equipment_taken_out_survives_the_page(people) -> None:
    document = load_document(people)
    document["items"].append(document["items"][0] | {"kind": "equipment", "what": "seat", "removed": True})
    current = submit_load(document, by=actor(people.preparer))

    revise(people, current, **CONFIRMED)

    assert declared_in(Load.objects.get(replaces=current.load))["items"] == document["items"]


def test_a_load_whose_configuration_the_basis_no_longer_has_is_sent_to_the_api(people) -> None:
    current = submitted(people)
    basis = basis_document()
    basis["configurations"] = basis["configurations"][1:]
    make_basis(people, current.load.aircraft, basis, true_from=LONG_AGO)

    page = Page(browser(people.preparer).get(f"/loads/{current.load.id}/revise"))

    assert page.status == 409
    assert "Revise it through the API." in page.words
    assert page.actions() == set()
    assert page.links["Back to the load"] == f"/loads/{current.load.id}"


def test_a_seat_the_basis_no_longer_has_stays_on_the_page_and_is_refused_by_name(people) -> None:
    current = submitted(people)
    basis = basis_document()
    for one in basis["configurations"]:
        one["seats"].remove("ROW1-R")
    make_basis(people, current.load.aircraft, basis, true_from=LONG_AGO)

    page = Page(revise(people, current, **CONFIRMED))

    assert page.status == 422
    assert set(page.faults) == {"seat:ROW1-R:name"}
    assert page.form("").values["seat:ROW1-R:weight"] == "190"


def test_who_may_not_revise_is_refused(people) -> None:
    current = submitted(people)

    page = Page(revise(people, current, who="auditor", **CONFIRMED))

    assert page.status == 403
    assert Load.objects.count() == 1
