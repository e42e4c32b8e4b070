"""Withdrawing, departing and assessing again from the page."""

import pytest

from loads.models import Step
from loads.queries.current import load_of
from tests.cast import browser
from tests.loads.making import accepted, prepared, submitted
from tests.makers import make_empty_weight
from tests.reading_pages import Page

pytestmark = pytest.mark.django_db


def press(person, current, action, /, **changes):
    client = browser(person)
    form = Page(client.get(f"/loads/{current.load.id}")).form(f"/{action}")
    return client.post(form.action, form.filled(changes))


def state(people, current):
    return load_of(people.operator.code, current.load.id).state


def test_a_load_is_withdrawn_for_a_reason(people) -> None:
    current = submitted(people)

    answer = press(people.preparer, current, "withdraw", reason="  cabin heater failed ")

    assert (answer.status_code, answer["Location"]) == (302, f"/loads/{current.load.id}")
    last = load_of(people.operator.code, current.load.id)
    assert (last.state, last.step.reason) == ("withdrawn", "cabin heater failed")


@pytest.mark.parametrize(
    ("reason", "words"),
    [("", "empty"), ("   ", "empty"), ("x" * 501, "501 characters"), ("a\x00b", "control character")],
)
def test_a_reason_that_is_none_is_refused_on_the_page(people, reason, words) -> None:
    current = submitted(people)

    page = Page(press(people.preparer, current, "withdraw", reason=reason))

    assert page.status == 422
    assert words in page.alerts[0]
    assert Step.objects.count() == 1


def test_an_accepted_load_departs(people) -> None:
    current = accepted(people)

    answer = press(people.pilot, current, "depart")

    assert answer.status_code == 302
    assert state(people, current) == "departed"


def test_a_departed_load_is_neither_withdrawn_nor_revised(people) -> None:
    current = accepted(people)
    client = browser(people.pilot)
    withdraw = Page(client.get(f"/loads/{current.load.id}")).form("/withdraw")
    press(people.pilot, current, "depart")

    stale = Page(client.post(withdraw.action, withdraw.filled({"reason": "too late"})))
    forced = Page(client.post(withdraw.action, {"reason": "too late", "step": "4"}))

    assert (stale.status, forced.status) == (412, 409)
    assert "departed" in forced.alerts[0]
    assert state(people, current) == "departed"


def test_a_stale_load_is_assessed_again_and_signed_anew(people) -> None:
    current = prepared(people)
    make_empty_weight(people, current.load.aircraft)

    answer = press(people.preparer, current, "assess")
    page = Page(browser(people.preparer).get(answer["Location"]))

    assert state(people, current) == "open"
    assert "assessed again" in page.words
    assert page.form("/sign").values["meaning"] == "prepared"


def test_a_load_that_is_not_stale_is_not_assessed_again(people) -> None:
    current = submitted(people)

    page = Page(browser(people.preparer).post(f"/loads/{current.load.id}/assess", {"step": "1"}))

    assert page.status == 409
    assert "Nothing it rests on has changed" in page.alerts[0]


@pytest.mark.parametrize("action", ["withdraw", "depart", "assess"])
@pytest.mark.parametrize("who", ["auditor", "maintenance", "approver"])
def test_who_has_no_such_duty_is_refused_and_nothing_moves(people, action, who) -> None:
    current = accepted(people)

    address = f"/loads/{current.load.id}/{action}"
    answer = browser(getattr(people, who)).post(address, {"step": "3", "reason": "because"})

    assert Page(answer).status == 403
    assert state(people, current) == "accepted"


@pytest.mark.parametrize("action", ["sign", "withdraw", "depart", "assess"])
def test_a_step_is_never_taken_by_looking(people, action) -> None:
    current = accepted(people)

    assert browser(people.pilot).get(f"/loads/{current.load.id}/{action}").status_code == 405


@pytest.mark.parametrize("step", ["", "0", "2", "99", "x", "3 ", "٣", "9" * 5000, "\x00"])
@pytest.mark.parametrize("action", ["withdraw", "depart", "assess"])
def test_a_state_that_was_not_seen_is_refused(people, action, step) -> None:
    current = accepted(people)

    address = f"/loads/{current.load.id}/{action}"
    answer = browser(people.pilot).post(address, {"step": step, "reason": "because"})

    assert Page(answer).status == 412
    assert state(people, current) == "accepted"
