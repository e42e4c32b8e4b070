"""Signing on the page: the password again, exactly what was shown, and nothing stored when refused."""

import pytest
from django.conf import settings

from loads.models import Signature, Step
from loads.queries.current import load_of
from tests.cast import PASSWORD, browser
from tests.loads.making import accepted, load_document, prepared, submitted
from tests.makers import make_empty_weight
from tests.reading_pages import Page

pytestmark = pytest.mark.django_db


def sign(person, current, *, client=None, **changes):
    """This function will fill in the form on the page as shown, with fields changed, and send it."""
    client = client or browser(person)
    form = Page(client.get(f"/loads/{current.load.id}")).form("/sign")
    assert form.method == "post"
    return client.post(form.action, form.filled({"password": PASSWORD}) | changes)


def state(people, current):
    return load_of(people.operator.code, current.load.id).state


def test_a_load_is_signed_as_prepared_and_accepted_from_its_page(people) -> None:
    current = submitted(people)

    first = sign(people.preparer, current)
    assert (first.status_code, first["Location"]) == (302, f"/loads/{current.load.id}")
    assert state(people, current) == "prepared"

    second = sign(people.pilot, current)
    assert (second.status_code, second["Location"]) == (302, f"/loads/{current.load.id}")
    assert state(people, current) == "accepted"

    signatures = list(Signature.objects.order_by("signed_at"))
    assert [(one.meaning, one.person, one.means) for one in signatures] == [
        ("prepared", people.preparer, "session"),
        ("accepted", people.pilot, "session"),
    ]
    assert {one.digest for one in signatures} == {current.assessment.digest}
    assert {one.signed_from for one in signatures} == {"127.0.0.1"}


def test_the_words_on_the_page_are_the_words_that_are_signed(people) -> None:
    current = submitted(people)
    words = Page(browser(people.preparer).get(f"/loads/{current.load.id}")).words

    sign(people.preparer, current)

    assert " ".join(Signature.objects.get().statement.split()) in words


@pytest.mark.parametrize(
    ("changes", "status", "reason"),
    [
        ({"password": "not-the-password-at-all"}, 422, "not the password of the person who is signed in"),
        ({"password": ""}, 422, "type your password again to sign"),
        ({"password": "x" * 5000}, 422, "type your password again to sign"),
        ({"step": "7"}, 412, "The load has moved on since it was read"),
        ({"step": ""}, 412, "The load has moved on since it was read"),
        ({"step": "1; drop"}, 412, "The load has moved on since it was read"),
        ({"digest": "0" * 64}, 409, "What was shown is not what would be signed"),
        ({"digest": ""}, 409, "What was shown is not what would be signed"),
        ({"meaning": "loaded"}, 403, "may not sign here"),
        ({"meaning": ""}, 422, "sign as prepared, as loaded or as accepted"),
        ({"meaning": "accepted"}, 403, "may not sign here"),
    ],
)
def test_what_is_refused_is_said_on_the_page_and_nothing_is_stored(people, changes, status, reason) -> None:
    current = submitted(people)

    page = Page(sign(people.preparer, current, **changes))

    assert page.status == status
    assert page.h1 == "Q9-KTB"
    assert reason in " ".join(page.alerts)
    assert state(people, current) == "open"
    assert (Signature.objects.count(), Step.objects.count()) == (0, 1)
    assert PASSWORD not in page.words


def test_a_form_shown_before_somebody_else_signed_is_refused(people) -> None:
    current = submitted(people)
    client = browser(people.pilot)
    form = Page(client.get(f"/loads/{current.load.id}")).form("/sign")
    prepared(people, current)

    page = Page(client.post(form.action, form.filled({"password": PASSWORD})))

    assert page.status == 412
    assert "it is prepared now" in " ".join(page.alerts)
    assert Signature.objects.count() == 1


def test_a_load_that_went_stale_after_it_was_shown_is_not_signed(people) -> None:
    current = submitted(people)
    client = browser(people.preparer)
    form = Page(client.get(f"/loads/{current.load.id}")).form("/sign")
    make_empty_weight(people, current.load.aircraft)

    page = Page(client.post(form.action, form.filled({"password": PASSWORD})))

    assert page.status == 409
    assert "Changed since it was assessed: empty weight." in page.words
    assert page.actions() == {"assess", "withdraw"}


def test_another_pilot_than_the_loads_own_does_not_accept(people) -> None:
    current = prepared(people)
    form = Page(browser(people.pilot).get(f"/loads/{current.load.id}")).form("/sign")

    answer = browser(people.other_pilot).post(form.action, form.filled({"password": PASSWORD}))

    assert Page(answer).status == 409
    assert "Only the pilot in command of this load accepts it." in Page(answer).alerts[0]
    assert state(people, current) == "prepared"


def test_repeated_wrong_passwords_lock_signing_out_with_the_wait_stated(people) -> None:
    current = submitted(people)
    client = browser(people.preparer)

    pages = [
        Page(sign(people.preparer, current, client=client, password="wrong-wrong-wrong"))
        for _ in range(settings.AXES_FAILURE_LIMIT + 1)
    ]
    locked = Page(sign(people.preparer, current, client=client))

    assert pages[0].status == 422
    assert locked.status == 429
    assert "Too many wrong passwords. Wait" in " ".join(locked.alerts)
    assert state(people, current) == "open"


def test_weights_of_people_that_are_estimates_are_not_signed_here_either(people) -> None:
    document = load_document(people)
    document["passengers"][0]["how"] = "estimated"
    current = submitted(people, passengers=document["passengers"])

    client = browser(people.preparer)
    shown = Page(client.get(f"/loads/{current.load.id}"))
    sent = {"meaning": "prepared", "digest": current.assessment.digest, "step": "1", "password": PASSWORD}
    refused = Page(client.post(f"/loads/{current.load.id}/sign", sent))

    assert "sign" not in shown.actions()
    assert refused.status == 409
    assert Signature.objects.count() == 0


def test_somebody_who_signed_out_in_another_window_is_asked_to_sign_in(people) -> None:
    current = submitted(people)
    client = browser(people.preparer)
    form = Page(client.get(f"/loads/{current.load.id}")).form("/sign")
    client.logout()

    answer = client.post(form.action, form.filled({"password": PASSWORD}))

    assert answer.status_code == 302
    assert answer["Location"].startswith("/sign-in?next=")
    assert state(people, current) == "open"


def test_a_form_without_its_token_is_refused(people) -> None:
    current = submitted(people)
    client = browser(people.preparer)
    client.handler.enforce_csrf_checks = True

    answer = client.post(f"/loads/{current.load.id}/sign", {"meaning": "prepared", "password": PASSWORD})

    assert Page(answer).status == 403
    assert state(people, current) == "open"


def test_an_accepted_load_offers_no_further_signature(people) -> None:
    page = Page(browser(people.pilot).get(f"/loads/{accepted(people).load.id}"))

    assert "sign" not in page.actions()
