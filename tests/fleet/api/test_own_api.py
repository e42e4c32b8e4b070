"""One's own password and sessions over the API."""

import json
import uuid

import pytest
from axes.models import AccessAttempt

from fleet.models import Person
from records.models import Access, Act
from tests.cast import PASSWORD, api, browser, cast, get, post
from tests.fleet.api.test_tokens_api import bearer, issued

pytestmark = pytest.mark.django_db
NEW = "another-good-phrase-4"


def body(response):
    return json.loads(response.content)


def change(client, *, key=None, **changes):
    return post(client, "/me/password", {"current": PASSWORD, "new": NEW} | changes, key=key)


def test_a_changed_password_ends_every_session_but_the_one_that_asked():
    people = cast()
    here, elsewhere, page = api(people.pilot), api(people.pilot), browser(people.pilot)

    answer = change(here)

    assert answer.status_code == 200, answer.content
    assert get(here, "/me").status_code == 200
    assert get(elsewhere, "/me").status_code == 401
    assert page.get("/").status_code == 302
    assert Person.objects.get(pk=people.pilot.pk).check_password(NEW)
    assert Act.objects.filter(kind="change-password", about=f"person:{people.pilot.pk}").count() == 1


def test_the_same_key_changes_it_once_although_the_old_password_is_sent_again():
    people, key = cast(), str(uuid.uuid4())
    client = api(people.pilot)

    first, again = change(client, key=key), change(client, key=key)

    assert first.content == again.content
    assert again["Idempotency-Replayed"] == "true"
    assert not AccessAttempt.objects.exists()


@pytest.mark.parametrize(
    ("changes", "pointer", "code"),
    [
        ({"new": "short"}, "/new", "password-weak"),
        ({"new": "123456789012"}, "/new", "password-weak"),
        ({"new": PASSWORD}, "/new", "password-same"),
        ({"new": "x" * 201}, "/new", "too-long"),
        ({"new": 5}, "/new", "wrong-type"),
        ({"current": ""}, "/current", "empty"),
        ({"current": None}, "/current", "wrong-type"),
        ({"again": NEW}, "/again", "unknown-field"),
    ],
)
def test_what_is_wrong_is_named_and_nothing_changes(changes, pointer, code):
    people = cast()
    client = api(people.pilot)

    answer = change(client, **changes)

    assert answer.status_code == 422
    assert {(one["pointer"], one["code"]) for one in body(answer)["errors"]} == {(pointer, code)}
    assert Person.objects.get(pk=people.pilot.pk).check_password(PASSWORD)
    assert get(client, "/me").status_code == 200


def test_wrong_passwords_are_counted_noted_and_lock_the_login_out():
    people = cast()
    client = api(people.pilot)

    answers = [change(client, current="a wrong one") for _ in range(6)]

    assert [one.status_code for one in answers] == [422, 422, 422, 422, 429, 429]
    assert int(answers[-1]["Retry-After"]) > 800
    noted = Access.objects.filter(key=f"person:{people.pilot.pk}").order_by("number")
    assert [one.what for one in noted].count("password-wrong") == 5
    assert change(client).status_code == 429


def test_all_other_sessions_end_and_tokens_serve_on():
    people = cast()
    here, elsewhere, page = api(people.pilot), api(people.pilot), browser(people.pilot)
    token = issued(people.pilot, scopes=["read"])

    answer = post(here, "/me/sessions/ending", b"")

    assert answer.status_code == 200, answer.content
    assert get(here, "/me").status_code == 200
    assert get(elsewhere, "/me").status_code == 401
    assert page.get("/").status_code == 302
    assert bearer(token["secret"]).get("/api/v1/me").status_code == 200
    assert get(api(people.other_pilot), "/me").status_code == 200
    assert Act.objects.filter(kind="end-sessions").count() == 1


def test_a_token_changes_no_password_and_ends_no_session():
    people = cast()
    client = bearer(issued(people.pilot, scopes=["read"])["secret"])

    assert post(client, "/me/password", {"current": PASSWORD, "new": NEW}).status_code == 403
    assert post(client, "/me/sessions/ending", b"").status_code == 403
    assert not Act.objects.filter(kind__in=("change-password", "end-sessions")).exists()


def test_everybody_sees_who_they_are_and_what_they_may():
    people = cast()

    who = body(get(api(people.pilot), "/me"))

    assert (who["key"], who["capacity"]) == (f"person:{people.pilot.pk}", "pilot")
    assert "accept-load" in who["may"]
    assert who["registrations"] is None
