"""What the log of sign-ins is told by the sign-in page, by signing and by tokens, and who reads it."""

import json
from datetime import timedelta

import pytest
from django.db import connection
from django.test import Client
from django.utils import timezone

from fleet.actions.issue_token import issue_token
from fleet.actions.revoke_token import revoke_token
from records.access_log import note
from records.models import Access, Act
from service import actors, allowed
from tests.cast import PASSWORD, actor, api, cast, get, strangers

pytestmark = pytest.mark.django_db
WRONG = "not the password"


@pytest.fixture
def people():
    return cast()


def sign_in(login, password):
    return Client().post("/sign-in", {"login": login, "password": password})


def noted(chain):
    return list(Access.objects.filter(chain=chain).order_by("number").values_list("what", "key"))


def ask(secret):
    return Client().get("/api/v1/me", headers={"Authorization": f"Bearer {secret}"})


def token_of(person):
    return issue_token(
        actor(person),
        person,
        label="desk",
        scopes=["read"],
        grantable=allowed.grantable(["pilot"], integration=False),
        valid_for=timedelta(days=1),
    )


def test_sign_ins_failures_lock_outs_and_sign_outs_stand_on_the_operators_log(people):
    login, key = people.pilot.login, f"person:{people.pilot.pk}"

    sign_in(login, WRONG)
    client = Client()
    client.post("/sign-in", {"login": login.upper(), "password": PASSWORD})
    client.post("/sign-out")
    for _ in range(5):
        sign_in(login, WRONG)

    assert noted(people.operator.code) == [
        ("sign-in-failed", key),
        ("sign-in", key),
        ("sign-out", key),
        *[("sign-in-failed", key)] * 4,
        ("locked-out", key),
    ]
    assert noted("house") == []
    assert not Act.objects.filter(kind__contains="sign").exists()


@pytest.mark.parametrize("login", ["nobody.here", "my secret password", "x\x00y", "é" * 5000, ""])
def test_a_login_that_is_nobodys_stands_on_the_houses_log_without_a_word_of_it(people, login):
    sign_in(login, WRONG)

    assert noted("house") == [("sign-in-failed", "")]
    with connection.cursor() as cursor:
        cursor.execute("SELECT string_agg(a::text, '') FROM records_access a")
        (whole,) = cursor.fetchone()
    assert "nobody" not in whole
    assert "secret" not in whole
    assert WRONG not in whole


def test_the_use_of_a_token_is_noted_once_and_its_refusal_each_time(people):
    issued, code = token_of(people.pilot), people.operator.code
    key = f"token:{issued.token.pk}"

    for _ in range(3):
        assert ask(issued.secret).status_code == 200
    revoke_token(actor(people.pilot), issued.token.pk, reason="lost")
    for _ in range(2):
        assert ask(issued.secret).status_code == 401

    assert noted(code) == [("token-used", key), ("token-refused", key), ("token-refused", key)]


def test_a_token_used_again_after_five_minutes_is_noted_again(people, monkeypatch):
    issued = token_of(people.pilot)
    ask(issued.secret)
    later = timezone.now() + actors.NOTED_EVERY
    monkeypatch.setattr(actors.timezone, "now", lambda: later)
    asked = []
    monkeypatch.setattr(actors, "note_token", lambda *given: asked.append(given[1:]))

    ask(issued.secret)
    ask(issued.secret)

    assert asked == [("token-used", issued.token)]


def test_what_is_no_token_stands_on_the_houses_log_and_a_flood_of_it_stays_small(people):
    for number in range(40):
        assert ask(f"tb_{number:043d}").status_code == 401

    assert noted("house") == [("token-refused", "")] * 20 + [("more-not-listed", "")]


def test_manager_and_auditor_read_their_operators_log_a_page_at_a_time(people):
    others = strangers()
    for number in range(1, 8):
        note("sign-in", operator=people.operator.code, key=f"person:{number}")
    note("sign-in", operator=others.operator.code, key="person:99")
    client = api(people.auditor)

    first = get(client, "/access-log?limit=3")
    second = client.get(json.loads(first.content)["next"])
    last = client.get(json.loads(second.content)["next"])

    pages = [[one["number"] for one in json.loads(each.content)["events"]] for each in (first, second, last)]
    assert pages == [[7, 6, 5], [4, 3, 2], [1]]
    assert first["Link"] == f'<{json.loads(first.content)["next"]}>; rel="next"'
    assert json.loads(last.content)["next"] is None
    only = json.loads(get(api(people.manager), "/access-log?key=person:3").content)["events"]
    assert [one["key"] for one in only] == ["person:3"]
    theirs = json.loads(get(api(others.manager), "/access-log").content)["events"]
    assert [one["key"] for one in theirs] == ["person:99"]
    for person in (people.pilot, people.preparer, people.maintenance, people.approver, people.idle):
        assert get(api(person), "/access-log").status_code == 403


@pytest.mark.parametrize(
    "query", ["limit=0", "limit=201", "limit=x", "before=-1", "before=1e3", "page=2", f"before={9**40}"]
)
def test_what_is_wrong_with_a_query_is_named(people, query):
    answer = get(api(people.auditor), f"/access-log?{query}")

    assert answer.status_code == 422
    assert json.loads(answer.content)["errors"][0]["pointer"] == f"?{query.split('=')[0]}"
