"""The pages of people, tokens and oneself, and of the log of sign-ins: who sees them and what they do."""

import re

import pytest
from django.test import Client

from fleet.models import Person, Token
from fleet.queries.duties import roles_of
from records.models import Access, Act
from tests.cast import PASSWORD, actor, api, browser, cast, get, strangers
from tests.reading_pages import Page

pytestmark = pytest.mark.django_db
NEW = "another-good-phrase-4"


@pytest.fixture
def people():
    return cast()


def shown(client, path):
    return Page(client.get(path))


def sent(client, path, page, action, changes, **more):
    """What comes back when the page's form is filled and sent, as a browser would."""
    return client.post(path, page.form(action).filled(changes) | more)


def test_links_show_only_to_who_may_follow_them(people):
    of_manager, of_auditor, of_pilot = (
        shown(browser(one), "/aircraft").links for one in (people.manager, people.auditor, people.pilot)
    )

    for links in (of_manager, of_auditor):
        assert (links["People"], links["Sign-ins"], links["Tokens"]) == ("/people", "/access-log", "/tokens")
    assert {"People", "Sign-ins"} & set(of_pilot) == set()
    assert of_pilot["Tokens"] == "/tokens"
    assert of_pilot[people.pilot.name] == "/me"


@pytest.mark.parametrize("path", ["/people", "/tokens", "/me", "/access-log", "/people/1"])
def test_nobody_is_asked_to_sign_in_and_who_may_not_is_refused(people, path):
    asked = Client().get(path)

    assert asked["Location"].startswith("/sign-in?next=")
    assert browser(people.idle).get(path).status_code == 403
    if path not in {"/tokens", "/me"}:
        assert browser(people.pilot).get(path).status_code == 403


def test_a_person_is_entered_and_given_a_duty_which_ends_again(people):
    client = browser(people.manager)
    page = shown(client, "/people")

    entered = sent(
        client, "/people", page, "", {"login": "n.ewe", "name": "N. Ewe", "password": NEW, "reason": ""}
    )
    person = Person.objects.get(login="n.ewe")
    assert entered["Location"] == f"/people/{person.pk}"
    page = shown(client, entered["Location"])
    assert (page.h1, "Duties now none" in page.words) == ("N. Ewe", True)
    path = f"/people/{person.pk}/duties"
    client.post(path, {"granted": "yes", "role": "pilot", "reason": "hired"})
    assert roles_of(person, Act.objects.latest("at").at) == ("pilot",)
    client.post(path, {"granted": "no", "role": "pilot", "reason": "moves to the desk"})

    page = shown(client, f"/people/{person.pk}")
    assert "Duties now none" in page.words
    assert re.search(r"pilot ended .* pilot granted", page.words)


def test_what_is_wrong_stands_at_its_input_and_all_but_the_password_comes_back(people):
    client = browser(people.manager)
    page = shown(client, "/people")

    answer = sent(
        client,
        "/people",
        page,
        "",
        {"login": people.pilot.login, "name": "<b>N", "password": NEW, "reason": "x"},
    )

    again = Page(answer)
    assert answer.status_code == 422
    assert again.faults["login"].startswith("somebody has this login")
    assert again.form("").values["name"] == "<b>N"
    assert again.form("").values["password"] == ""
    assert b"<b>N" not in answer.content


def test_a_step_that_is_refused_says_so_on_the_page(people):
    client = browser(people.manager)

    answer = client.post(
        f"/people/{people.manager.pk}/duties",
        {"granted": "no", "role": "operations manager", "reason": "retires"},
    )
    without = client.post(
        f"/people/{people.pilot.pk}/duties", {"granted": "yes", "role": "auditor", "reason": ""}
    )

    assert (answer.status_code, without.status_code) == (409, 422)
    assert "Nobody would be left who may enter people" in Page(answer).words
    assert "Reason is missing" in Page(without).words


def test_a_person_is_deactivated_from_their_page(people):
    client = browser(people.manager)

    client.post(f"/people/{people.pilot.pk}/deactivation", {"reason": "left"})

    page = shown(client, f"/people/{people.pilot.pk}")
    assert "deactivated: no sign-in, session or token serves" in page.words
    assert page.actions() == {"duties"}  # what they held can still be ended
    assert not Person.objects.get(pk=people.pilot.pk).is_active


def test_an_auditor_looks_and_changes_nothing(people):
    client = browser(people.auditor)

    assert shown(client, "/people").actions() == set()
    assert shown(client, f"/people/{people.pilot.pk}").actions() == set()
    typed = {"granted": "yes", "role": "auditor", "reason": "x"}
    assert client.post(f"/people/{people.pilot.pk}/duties", typed).status_code == 403


def test_another_operators_person_and_token_are_not_there(people):
    others = strangers()
    client = browser(others.manager)

    assert client.get(f"/people/{people.pilot.pk}").status_code == 404
    assert client.post(f"/people/{people.pilot.pk}/deactivation", {"reason": "x"}).status_code == 404
    assert people.pilot.login not in shown(client, "/people").words
    browser(people.pilot).post("/tokens", {"label": "desk", "scopes": ["read"], "days": "30"})
    number = Token.objects.get().pk
    for step in ("rotation", "revocation"):
        typed = {"reason": "x", "overlap_hours": "1", "days": "1"}
        assert client.post(f"/tokens/{number}/{step}", typed).status_code == 404
    assert "desk" not in shown(client, "/tokens").words


def test_a_token_shows_its_secret_once_gets_a_new_one_and_is_revoked(people):
    client = browser(people.pilot)

    issued = client.post("/tokens", {"label": "desk", "scopes": ["read", "submit-load"], "days": "30"})
    first = re.search(rb"tb_[\w-]{43}", issued.content).group().decode()
    token = Token.objects.get()
    rotated = client.post(f"/tokens/{token.pk}/rotation", {"overlap_hours": "24", "days": "90"})
    second = re.search(rb"tb_[\w-]{43}", rotated.content).group().decode()

    for secret in (first, second):
        headers = {"Authorization": f"Bearer {secret}"}
        assert Client().get("/api/v1/me", headers=headers).status_code == 200
    page = shown(client, "/tokens")
    assert "(secret 1)" in page.words
    assert "(secret 2)" in page.words
    assert "tb_" not in page.words
    assert issued["Cache-Control"] == "no-store"
    client.post(f"/tokens/{token.pk}/revocation", {"reason": "done"})
    assert "revoked" in shown(client, "/tokens").words
    assert Client().get("/api/v1/me", headers=headers).status_code == 401


def test_what_is_wrong_with_a_token_stands_at_its_input(people):
    client = browser(people.pilot)

    answer = client.post(
        "/tokens", {"label": "desk", "days": "soon", "registrations": "Q9-NOT", "scopes": ["read"]}
    )
    without = client.post("/tokens", {"label": "desk", "days": "30"})
    strange = client.post(
        "/tokens", {"label": "desk", "days": "30", "scopes": ["read"], "registrations": "Q9-NOT"}
    )

    assert {one.status_code for one in (answer, without, strange)} == {422}
    assert "days" in Page(answer).faults
    assert "scopes" in Page(without).faults
    assert "no aircraft Q9-NOT" in Page(strange).faults["registrations"]
    assert not Token.objects.exists()


def test_a_manager_issues_for_an_integration_of_somebody_else(people):
    client = browser(people.manager)
    typed = {"label": "planner", "scopes": ["read"], "days": "30", "person": str(people.preparer.pk)}

    refused = client.post("/tokens", typed)
    client.post("/tokens", typed | {"integration": "yes"})

    assert refused.status_code == 403
    token = Token.objects.get()
    assert (token.person_id, token.integration) == (people.preparer.pk, True)
    assert browser(people.pilot).post(f"/tokens/{token.pk}/revocation", {"reason": "x"}).status_code == 403


def test_the_password_is_changed_on_ones_own_page_and_other_sessions_end(people):
    here, elsewhere, program = browser(people.pilot), browser(people.pilot), api(people.pilot)

    answer = here.post("/me/password", {"current": PASSWORD, "new": NEW, "again": NEW})

    assert answer["Location"] == "/me?done=password"
    assert "The password is changed" in shown(here, answer["Location"]).words
    assert elsewhere.get("/me").status_code == 302
    assert get(program, "/me").status_code == 401
    assert Client().post("/sign-in", {"login": people.pilot.login, "password": NEW}).status_code == 302


@pytest.mark.parametrize(
    ("changes", "field"),
    [
        ({"current": "not it at all"}, "current"),
        ({"again": NEW + "x"}, "again"),
        ({"new": "short", "again": "short"}, "new"),
        ({"new": PASSWORD, "again": PASSWORD}, "new"),
        ({"current": ""}, "current"),
    ],
)
def test_what_is_wrong_with_a_password_stands_at_its_input(people, changes, field):
    client = browser(people.pilot)

    answer = client.post("/me/password", {"current": PASSWORD, "new": NEW, "again": NEW} | changes)

    page = Page(answer)
    assert answer.status_code == 422
    assert set(page.faults) == {field}
    assert page.form("/me/password").values["current"] == ""
    assert Person.objects.get(pk=people.pilot.pk).check_password(PASSWORD)


def test_all_other_sessions_end_from_the_page(people):
    here, elsewhere = browser(people.pilot), browser(people.pilot)

    here.post("/me/sessions")

    assert here.get("/me").status_code == 200
    assert elsewhere.get("/me").status_code == 302


def test_sign_ins_show_to_their_person_and_to_manager_and_auditor(people):
    others = strangers()
    Client().post("/sign-in", {"login": people.pilot.login, "password": "wrong wrong"})
    client = Client()
    client.post("/sign-in", {"login": people.pilot.login, "password": PASSWORD})

    own = shown(client, "/me").words
    log = shown(browser(people.auditor), "/access-log").words

    assert re.search(r"signed in .* failed to sign in", own)
    assert re.search(rf"{people.pilot.name} signed in .* {people.pilot.name} failed to sign in", log)
    assert "Nothing is noted" in shown(browser(others.manager), "/access-log").words
    assert Access.objects.filter(chain=people.operator.code).count() == 2
    assert shown(browser(people.auditor), "/access-log?before=1").words.count("signed in") == 0
    assert browser(people.auditor).get(f"/access-log?before={9**40}").status_code == 200
    assert actor(people.auditor).kind == "person"
