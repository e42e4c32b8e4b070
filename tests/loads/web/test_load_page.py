"""The page of one load: what it shows of each verdict and state, and what it offers to whom."""

import re

import pytest

from loads.actions import file_manifest
from loads.actions.depart_load import depart_load
from loads.actions.revise_load import revise_load
from loads.actions.submit_load import submit_load
from loads.actions.withdraw_load import withdraw_load
from loads.cautions import CAUTIONS, INVENTED
from loads.models import Step
from records.archive import DocumentAltered
from tests.cast import actor, browser, strangers
from tests.loads.making import accepted, load_document, outside_document, prepared, submitted
from tests.makers import make_aircraft, make_basis, make_empty_weight
from tests.reading_pages import Page

pytestmark = pytest.mark.django_db


def shown(person, current):
    return Page(browser(person).get(f"/loads/{current.load.id}"))


def unresolved(people):
    make_basis(people, make_aircraft(people, "Q9-KTC"))
    return submit_load(load_document(people, aircraft="Q9-KTC"), by=actor(people.preparer))


def departed(people):
    current = accepted(people)
    return depart_load(current.load.id, at=current.step.at, seen="3", by=actor(people.pilot))


def withdrawn(people):
    current = submitted(people)
    return withdraw_load(current.load.id, reason="no crew", seen="1", by=actor(people.preparer))


def test_a_load_within_shows_what_a_pilot_asks_first(people) -> None:
    page = shown(people.pilot, submitted(people))

    assert page.h1 == "Q9-KTB"
    for words in (
        "KT-214",
        "XNAL to XKOR",
        "2026-12-01 07:30",
        "2026-12-01 14:30 UTC",
        "Allowable take-off",
        "Zero fuel",
        "Landing",
        "left tank",
        "Persons on board 3",
        "entre of gravity along the burn",
    ):
        assert words in page.words, words


def test_every_line_of_the_computation_names_who_sits_there_and_how_the_weight_was_got(people) -> None:
    words = shown(people.pilot, submitted(people)).words

    assert "L. Osei" in words
    assert "M. Dravo" in words
    assert "declared" in words
    assert "weighed" in words
    assert "checked bags" in words


def test_an_outside_load_says_what_is_in_the_way_and_what_would_help_and_offers_no_signature(people) -> None:
    current = submit_load(outside_document(people), by=actor(people.preparer))

    page = shown(people.pilot, current)

    assert "What is in the way, and what would help" in page.words
    failed = [one for one in current.result()["checks"] if one["result"] == "fail"]
    assert failed
    for check in failed:
        assert check["margin_text"] in page.words
        assert check["what_next"] in page.words
    assert page.actions() == {"withdraw"}


def test_an_unresolved_load_names_what_is_missing_and_offers_no_signature(people) -> None:
    page = shown(people.pilot, unresolved(people))

    assert "empty weight" in page.words
    assert "Empty weight: none in force" in page.words
    assert "Not known" not in page.words  # said once, under what was not assessed
    assert "Not assessed: weights and centres of gravity" in page.words
    assert page.actions() == {"withdraw"}


def test_the_plot_and_the_digest_that_is_signed_are_on_the_page(people) -> None:
    current = submitted(people)

    answer = browser(people.pilot).get(f"/loads/{current.load.id}")

    assert answer.content.count(b"<svg") >= 1
    assert current.assessment.digest in Page(answer).words


@pytest.mark.parametrize("make", [submitted, unresolved, prepared, accepted, departed, withdrawn])
def test_cautions_stand_beside_every_verdict(people, make) -> None:
    words = shown(people.auditor, make(people)).words

    for caution in (*CAUTIONS, INVENTED):
        assert caution in words


@pytest.mark.parametrize(
    ("make", "who", "offered"),
    [
        (submitted, "preparer", {"sign", "withdraw"}),
        (submitted, "pilot", {"sign", "withdraw"}),
        (submitted, "auditor", set()),
        (submitted, "maintenance", set()),
        (submitted, "approver", set()),
        (prepared, "pilot", {"sign", "withdraw"}),
        (prepared, "other_pilot", {"withdraw"}),
        (prepared, "preparer", {"withdraw"}),
        (prepared, "manager", {"withdraw"}),
        (prepared, "auditor", set()),
        (accepted, "pilot", {"depart", "withdraw"}),
        (accepted, "auditor", set()),
        (departed, "pilot", {"note"}),
        (departed, "manager", {"note"}),
        (departed, "auditor", set()),
        (withdrawn, "manager", set()),
    ],
)
def test_what_can_be_done_is_offered_only_to_who_may(people, make, who, offered) -> None:
    current = make(people)
    page = shown(getattr(people, who), current)

    assert page.actions() == offered
    assert ("Revise" in page.links) is ("withdraw" in offered)


def test_a_stale_load_offers_to_be_assessed_again_and_no_signature(people) -> None:
    current = prepared(people)
    make_empty_weight(people, current.load.aircraft)

    page = shown(people.pilot, current)

    assert "Changed since it was assessed: empty weight." in page.words
    assert page.actions() == {"assess", "withdraw"}


def test_the_record_tells_every_step_with_who_and_why(people) -> None:
    words = shown(people.auditor, withdrawn(people)).words

    assert re.search(r"submitted and assessed D\. Lorn", words)
    assert re.search(r"withdrawn D\. Lorn no crew", words)


def test_the_signed_words_and_the_capacity_stand_in_the_record(people) -> None:
    words = shown(people.auditor, accepted(people)).words

    assert "R. Amani as pilot in command:" in words
    assert "D. Lorn as load preparer:" in words


def test_a_replaced_load_and_its_revision_lead_to_each_other(people) -> None:
    first = submitted(people)
    second = revise_load(first.load.id, load_document(people), reason="x", seen="1", by=actor(people.pilot))

    assert shown(people.pilot, first).links["Open the revision"] == f"/loads/{second.load.id}"
    assert shown(people.pilot, second).links["an earlier load"] == f"/loads/{first.load.id}"


def test_what_was_typed_is_shown_as_text_and_never_as_markup(people) -> None:
    document = load_document(people)
    document["passengers"][0]["name"] = "<script>alert(1)</script>"
    document["items"][0]["what"] = '"><img src=x onerror=alert(1)>'
    current = submit_load(document, by=actor(people.preparer))

    body = browser(people.pilot).get(f"/loads/{current.load.id}").content.decode()

    assert "<script>alert" not in body
    assert "<img" not in body
    assert "&lt;script&gt;alert(1)&lt;/script&gt;" in body


def test_the_manifest_is_linked_once_it_has_a_number_and_is_a_pdf(people) -> None:
    current = prepared(people)
    assert not [words for words in shown(people.pilot, current).links if "PDF" in words]

    done = accepted(people, current)
    link = shown(people.auditor, done).links["No. 1 (PDF)"]
    answer = browser(people.auditor).get(link)

    assert (answer.status_code, answer["Content-Type"]) == (200, "application/pdf")
    assert answer.content.startswith(b"%PDF-")
    assert answer["Content-Disposition"] == 'inline; filename="manifest-Q9-KTB-KT-214.pdf"'
    assert browser(people.auditor).get(link).content == answer.content


def test_a_load_that_was_never_accepted_has_no_manifest(people) -> None:
    answer = browser(people.pilot).get(f"/loads/{submitted(people).load.id}/manifest")

    assert Page(answer).status == 404


def test_a_manifest_whose_bytes_do_not_fit_its_digest_is_not_handed_out(people, monkeypatch) -> None:
    current = accepted(people)
    filed = file_manifest.file_manifest(current.load.paper)
    filed.document.body = b"%PDF-1.7 forged"
    monkeypatch.setattr(file_manifest, "filed_paper", lambda _paper: filed)

    answer = browser(people.auditor).get(f"/loads/{current.load.id}/manifest")

    assert answer.status_code == DocumentAltered.status
    assert b"forged" not in answer.content
    assert "do not fit the digest" in Page(answer).words


@pytest.mark.parametrize("path", ["", "/manifest", "/revise", "/sign", "/assess", "/depart", "/withdraw"])
def test_another_operators_load_is_not_there(people, path) -> None:
    current = accepted(people)
    steps = Step.objects.count()
    client = browser(strangers().pilot)
    address = f"/loads/{current.load.id}{path}"
    answer = (
        client.get(address) if path in {"", "/manifest", "/revise"} else client.post(address, {"step": "3"})
    )

    page = Page(answer)

    assert page.status == 404
    assert "Q9-KTB" not in page.words
    assert Step.objects.count() == steps
