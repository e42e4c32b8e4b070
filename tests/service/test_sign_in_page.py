"""Signing in and out with a browser."""

import pytest
from axes.models import AccessAttempt
from django.conf import settings
from django.test import Client

from tests.cast import PASSWORD, browser, cast
from tests.reading_pages import Page

pytestmark = pytest.mark.django_db
WRONG = "wrong-harbour-lantern-7"


@pytest.fixture(scope="module")
def people(own_database, django_db_blocker):
    with django_db_blocker.unblock():
        return cast()


def try_in(client, login, password=PASSWORD, /, **more):
    return client.post("/sign-in", {"login": login, "password": password} | more)


def signed_in(client):
    return client.get("/").status_code == 200


def test_the_right_login_and_password_lead_to_the_days_loads(people) -> None:
    client = Client()

    form = Page(client.get("/sign-in")).form("")
    answer = client.post("/sign-in", form.filled({"login": people.pilot.login, "password": PASSWORD}))
    page = Page(client.get(answer["Location"]))

    assert (answer.status_code, answer["Location"]) == (302, "/")
    assert page.h1.startswith("Loads of ")
    assert "R. Amani, kestrel-test Air" in page.words


def test_the_login_is_taken_in_any_case_and_with_blanks_around_it(people) -> None:
    client = Client()

    try_in(client, f"  {people.pilot.login.upper()} ")

    assert signed_in(client)


@pytest.mark.parametrize("login", ["kestrel-test.pilot", "nobody.at.all"])
def test_a_wrong_password_and_an_unknown_login_get_the_same_answer(people, login) -> None:
    client = Client()

    page = Page(try_in(client, login, WRONG))

    assert page.status == 422
    assert page.alerts == ["That login and password do not belong together. Type both again."]
    assert page.form("").values["login"] == login
    assert page.form("").values["password"] == ""
    assert not signed_in(client)


def test_repeated_failures_lock_the_login_out_wherever_they_come_from_with_the_wait_stated(people) -> None:
    for number in range(settings.AXES_FAILURE_LIMIT):
        try_in(Client(REMOTE_ADDR=f"10.0.0.{number}"), people.pilot.login, WRONG)

    client = Client()
    page = Page(try_in(client, people.pilot.login))

    assert page.status == 429
    assert "Too many wrong passwords. Wait" in page.alerts[0]
    assert not signed_in(client)
    other = Client()
    try_in(other, people.preparer.login)
    assert signed_in(other)


def test_a_success_forgets_the_failures_before_it(people) -> None:
    client = Client()
    for _ in range(settings.AXES_FAILURE_LIMIT - 1):
        try_in(client, people.pilot.login, WRONG)

    try_in(client, people.pilot.login)

    assert signed_in(client)
    assert AccessAttempt.objects.count() == 0


@pytest.mark.parametrize(
    "wanted",
    [
        "https://elsewhere.example/",
        "//elsewhere.example",
        "///elsewhere.example",
        "/\\elsewhere.example",
        "\\\\elsewhere.example",
        "http:elsewhere.example",
        "javascript:alert(1)",
        "data:text/html,x",
        "https://testserver@elsewhere.example/",
        "http://[",
        "\x00//elsewhere.example",
        " //elsewhere.example",
        "?only=a-query",
        "",
    ],
)
def test_after_signing_in_nobody_is_sent_elsewhere(people, wanted) -> None:
    client = Client()

    kept = Page(client.get("/sign-in", {"next": wanted})).form("").values["next"]
    answer = try_in(client, people.pilot.login, next=wanted)

    assert (kept, answer.status_code, answer["Location"]) == ("/", 302, "/")


def test_the_page_that_was_asked_for_is_where_signing_in_leads(people) -> None:
    client = Client()
    asked = client.get("/?day=2026-12-01&more=%2F%26")

    form = Page(client.get(asked["Location"])).form("")
    answer = client.post("/sign-in", form.filled({"login": people.pilot.login, "password": PASSWORD}))

    assert answer["Location"] == "/?day=2026-12-01&more=%2F%26"


@pytest.mark.parametrize("path", ["/", "/declare", "/aircraft", "/aircraft/Q9-KTB"])
def test_every_page_asks_a_stranger_to_sign_in_first(people, path) -> None:
    answer = Client().get(path)

    assert answer.status_code == 302
    assert answer["Location"].startswith("/sign-in?next=/")


def test_signing_out_ends_the_session_and_needs_a_form(people) -> None:
    client = browser(people.pilot)
    assert client.get("/sign-out").status_code == 405
    assert signed_in(client)

    client.post("/sign-out")

    assert not signed_in(client)


def test_a_new_session_begins_with_signing_in(people) -> None:
    client = Client()
    client.cookies[settings.SESSION_COOKIE_NAME] = "chosen-by-somebody-else-0123456789"

    try_in(client, people.pilot.login)

    assert client.cookies[settings.SESSION_COOKIE_NAME].value != "chosen-by-somebody-else-0123456789"
    assert client.cookies[settings.SESSION_COOKIE_NAME]["httponly"]
    assert client.cookies[settings.SESSION_COOKIE_NAME]["samesite"] == "Lax"


HOSTILE = ["\x00", "a\x00b", "🛩" * 100, "x" * 100_000, "' OR 1=1 --", "", "kestrel-test.pilot\x00"]


@pytest.mark.parametrize("login", HOSTILE, ids=lambda login: ascii(login)[:20])
def test_hostile_logins_and_passwords_are_answered_like_wrong_ones(people, login) -> None:
    for password in ("\x00", "x" * 100_000, "", "🛩"):
        page = Page(try_in(Client(), login, password))

        assert page.status == 422
        assert "do not belong together" in page.alerts[0]


@pytest.mark.parametrize("password", ["\x00", "x" * 100_000, "", f"{PASSWORD}\x00", PASSWORD.upper()])
def test_a_hostile_password_of_a_real_login_is_a_wrong_one(people, password) -> None:
    assert Page(try_in(Client(), people.pilot.login, password)).status == 422


@pytest.mark.parametrize("cookie", ["\x00", "x" * 4000, "'; DROP TABLE", "../../etc/passwd", "\xf0\x9f"])
def test_a_hostile_session_cookie_is_nobodys(people, cookie) -> None:
    client = Client()
    client.cookies[settings.SESSION_COOKIE_NAME] = cookie

    assert client.get("/").status_code == 302


def test_hostile_fields_beside_the_login_are_answered_too(people) -> None:
    client = Client(headers={"User-Agent": "x" * 3000, "Accept": "y" * 3000})
    for extra in ({"next": "\x00"}, {"\x00": "\x00"}, {"more": "z" * 50_000}):
        assert (
            client.post("/sign-in?q=%00&next=%00", {"login": people.pilot.login} | extra).status_code == 422
        )


def test_missing_fields_are_a_failed_try(people) -> None:
    assert Page(Client().post("/sign-in", {})).status == 422


def test_the_password_is_never_sent_back(people) -> None:
    answer = try_in(Client(), people.pilot.login, WRONG)

    assert WRONG not in answer.content.decode()
