"""The pages of aircraft: what is in force, every version, and approval by a second person."""

import pytest

from fleet.actions.enter_empty_weight import enter_empty_weight
from fleet.actions.enter_loading_basis import enter_loading_basis
from fleet.models import Approval
from fleet.queries.aircraft import aircraft_of
from tests.cast import actor, browser, cast, strangers
from tests.makers import basis_document, empty_weight_document, make_aircraft, q, ready_aircraft
from tests.reading_pages import Page

pytestmark = pytest.mark.django_db


@pytest.fixture(scope="module")
def people(own_database, django_db_blocker):
    with django_db_blocker.unblock():
        made = cast()
        ready_aircraft(made)
    return made


def shown(person, path="/aircraft/Q9-KTB"):
    return Page(browser(person).get(path))


def weighed(people, **changes):
    aircraft = aircraft_of(people.operator.code, "Q9-KTB")
    document = empty_weight_document(weight=q("5240", "lb"), report="W-2026-02", **changes)
    return enter_empty_weight(actor(people.maintenance), aircraft, document)


def test_the_list_names_every_aircraft_with_what_is_in_force(people) -> None:
    make_aircraft(people, "Q9-NEW")

    page = shown(people.auditor, "/aircraft")

    assert page.links["Q9-KTB"] == "/aircraft/Q9-KTB"
    assert "5214 lb revision 1" in page.words
    assert page.words.count("none in force") == 2


def test_the_list_of_another_operator_is_its_own(people) -> None:
    page = shown(strangers().manager, "/aircraft")

    assert "No aircraft is entered yet." in page.words
    assert "Q9-KTB" not in page.words


def test_the_page_shows_figures_limits_and_versions_with_their_sources(people) -> None:
    page = shown(people.auditor)

    assert page.h1 == "Q9-KTB"
    for words in (
        "Empty weight, wheels 5214 lb",
        "moment 641000 lb in",
        "by weighing, 2025-12-30, report W-2025-31",
        "Fenlark 9 flight manual FL9-FM rev C",
        "FL9-FM rev C p. 2-4",
        "by N. Tarrow",
        "by E. Quill",
        "in force",
    ):
        assert words in page.words, words


def test_an_aircraft_with_nothing_in_force_says_what_that_means(people) -> None:
    make_aircraft(people, "Q9-NEW")

    page = shown(people.auditor, "/aircraft/Q9-NEW")

    assert page.words.count("No load can be signed.") == 2
    assert page.words.count("None is entered yet.") == 2


def test_a_second_person_approves_an_empty_weight_and_it_is_in_force(people) -> None:
    weight = weighed(people)
    client = browser(people.approver)
    form = Page(client.get("/aircraft/Q9-KTB")).form("/approval")

    answer = client.post(form.action, form.filled({}))

    assert (answer.status_code, answer["Location"]) == (302, "/aircraft/Q9-KTB")
    assert "Empty weight, wheels 5240 lb" in shown(people.auditor).words
    assert "superseded" in shown(people.auditor).words
    assert Approval.objects.get(empty_weight=weight).approved_by == people.approver


def test_a_second_person_approves_a_loading_basis(people) -> None:
    aircraft = make_aircraft(people, "Q9-NEW")
    basis = enter_loading_basis(actor(people.maintenance), aircraft, basis_document())
    client = browser(people.manager)
    form = Page(client.get("/aircraft/Q9-NEW")).form("/approval")

    answer = client.post(form.action, form.filled({}))

    assert answer.status_code == 302
    assert Approval.objects.get(loading_basis=basis).approved_by == people.manager


@pytest.mark.parametrize("who", ["maintenance", "pilot", "auditor", "preparer"])
def test_the_form_of_approval_is_offered_only_to_who_may(people, who) -> None:
    weighed(people)

    page = shown(getattr(people, who))

    assert "approval" not in page.actions()
    assert "awaits a second person" in page.words


def test_who_entered_a_version_does_not_approve_it_either_way(people) -> None:
    aircraft = aircraft_of(people.operator.code, "Q9-KTB")
    weight = enter_empty_weight(actor(people.manager), aircraft, empty_weight_document(report="W-2026-03"))

    offered = shown(people.manager).actions()
    answer = browser(people.manager).post(f"/aircraft/Q9-KTB/empty-weights/{weight.id}/approval")

    assert "approval" not in offered
    assert Page(answer).status == 403
    assert Page(answer).alerts
    assert not Approval.objects.filter(empty_weight=weight).exists()


@pytest.mark.parametrize("who", ["pilot", "auditor", "maintenance"])
def test_an_approval_sent_past_the_page_is_refused(people, who) -> None:
    weight = weighed(people)

    answer = browser(getattr(people, who)).post(f"/aircraft/Q9-KTB/empty-weights/{weight.id}/approval")

    assert Page(answer).status == 403
    assert not Approval.objects.filter(empty_weight=weight).exists()


def test_an_approval_is_given_once(people) -> None:
    weight = weighed(people)
    address = f"/aircraft/Q9-KTB/empty-weights/{weight.id}/approval"
    browser(people.approver).post(address)

    again = Page(browser(people.manager).post(address))

    assert again.status == 409
    assert "approved already" in again.alerts[0]


def test_a_basis_whose_sample_load_does_not_come_out_is_refused_on_the_page_with_the_reason(people) -> None:
    aircraft = make_aircraft(people, "Q9-NEW")
    document = basis_document()
    document["sample_loads"][0]["total_moment"] = q("700000", "lb in")
    basis = enter_loading_basis(actor(people.maintenance), aircraft, document)

    page = Page(browser(people.approver).post(f"/aircraft/Q9-NEW/loading-bases/{basis.id}/approval"))

    assert page.status == 409
    assert "Sample loads do not come out as printed." in page.alerts[0]
    assert not Approval.objects.filter(loading_basis=basis).exists()


@pytest.mark.parametrize("path", ["", "/empty-weights/{weight}/approval"])
def test_another_operators_aircraft_is_not_there(people, path) -> None:
    weight = weighed(people)
    client = browser(strangers().manager)
    address = f"/aircraft/Q9-KTB{path}".format(weight=weight.id)

    page = Page(client.post(address) if path else client.get(address))

    assert page.status == 404
    assert "5214" not in page.words
    assert not Approval.objects.filter(empty_weight=weight).exists()


def test_the_registration_is_found_in_any_case(people) -> None:
    assert shown(people.auditor, "/aircraft/q9-ktb").h1 == "Q9-KTB"


def test_what_was_entered_is_shown_as_text(people) -> None:
    weighed(people, signed_by="<b>N. Tarrow</b>")

    body = browser(people.auditor).get("/aircraft/Q9-KTB").content.decode()

    assert "<b>N. Tarrow" not in body


def test_the_envelopes_in_force_are_told_corner_by_corner(people):
    (first, *_) = basis_document()["envelopes"]

    words = shown(people.pilot).words

    assert f"Envelope {first['id']}, centre of gravity, at " in words
    assert "; ".join(f"{value} at {weight}" for weight, value in first["points"]) in words
