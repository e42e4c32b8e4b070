"""Who asks, found out through the real stack: a token, a signed-in browser, or nobody."""

import json
from datetime import timedelta

import pytest
from django.test import Client
from django.utils import timezone

from fleet.actions.end_duty import end_duty
from fleet.actions.grant_duty import grant_duty
from fleet.actions.issue_token import issue_token
from fleet.actions.revoke_token import revoke_token
from fleet.queries import tokens
from service import actors, allowed
from tests.cast import actor, browser, cast

pytestmark = [pytest.mark.django_db, pytest.mark.urls("tests.service.stub_addresses")]
ASKS = "/api/v1/asks"


def _token(person, *scopes, roles=("pilot",), by=None, integration=False):
    grantable = allowed.grantable(roles, integration=integration)
    return issue_token(
        actor(by or person),
        person,
        label="desk",
        scopes=scopes,
        grantable=grantable,
        valid_for=timedelta(days=1),
        integration=integration,
    )


def _ask(secret, method="get"):
    return getattr(Client(), method)(ASKS, headers={"Authorization": f"Bearer {secret}"})


def _body(response):
    return json.loads(response.content)


def test_nobody_is_told_to_sign_in():
    response = Client().get(ASKS)

    assert response.status_code == 401
    assert _body(response)["code"] == "not-signed-in"
    assert response["WWW-Authenticate"] == 'Bearer realm="tarebook"'


def test_a_token_may_what_its_scopes_and_its_persons_duties_both_allow():
    people = cast()
    secret = _token(people.pilot, "read", "submit-load").secret

    body = _body(_ask(secret))

    assert body["may"] == ["read", "submit-load"]
    assert body["capacity"] == "pilot"
    assert body["key"].startswith("token:")


def test_a_duty_that_ends_is_gone_from_the_token_at_once_and_comes_back_with_it():
    people = cast()
    secret = _token(people.pilot, "read", "submit-load").secret

    end_duty(actor(people.manager), people.pilot, "pilot")
    assert _ask(secret).status_code == 403
    assert _body(_ask(secret))["code"] == "read-not-allowed"
    assert _body(_ask(secret, "post"))["may"] == []

    grant_duty(actor(people.manager), people.pilot, "load preparer")
    assert _body(_ask(secret))["may"] == ["read", "submit-load"]


def test_a_token_without_the_scope_read_reads_nothing():
    people = cast()
    secret = _token(people.pilot, "submit-load").secret

    assert _ask(secret).status_code == 403
    assert _ask(secret, "post").status_code == 200


@pytest.mark.parametrize(
    ("header", "code"),
    [
        ("Basic dXNlcjpwYXNz", "token-malformed"),
        ("Bearer", "token-malformed"),
        ("Bearer tb_short", "token-malformed"),
        ("Bearer tb_" + "A" * 43, "token-unknown"),
        ("Token tb_" + "A" * 43, "token-malformed"),
        ("Bearer tb_" + "é" * 43, "token-malformed"),
    ],
)
def test_an_odd_token_is_refused_by_name(header, code):
    response = Client().get(ASKS, headers={"Authorization": header})

    assert response.status_code == 401
    assert _body(response)["code"] == code
    assert response["WWW-Authenticate"] == 'Bearer realm="tarebook", error="invalid_token"'


def test_a_revoked_and_an_expired_token_are_refused_by_name(monkeypatch):
    people = cast()
    revoked, expired = _token(people.pilot, "read"), _token(people.pilot, "read")
    revoke_token(actor(people.pilot), revoked.token.pk, reason="lost")

    assert _body(_ask(revoked.secret))["code"] == "token-revoked"
    monkeypatch.setattr(actors.timezone, "now", lambda: expired.token.expires_at)
    assert _body(_ask(expired.secret))["code"] == "token-expired"


def test_the_token_of_a_person_who_has_left_does_not_serve(monkeypatch):
    people = cast()
    secret = _token(people.pilot, "read").secret
    kept = tokens.Token.objects.select_related("person").get()
    kept.person.is_active = False
    monkeypatch.setattr(tokens, "_found", lambda _digest: (kept, 0, False))

    assert _body(_ask(secret))["code"] == "token-person-inactive"


def test_a_bad_token_is_not_mended_by_a_session():
    people = cast()

    response = browser(people.pilot).get(ASKS, headers={"Authorization": "Bearer tb_short"})

    assert response.status_code == 401


def test_a_signed_in_person_may_what_their_duties_allow():
    people = cast()

    body = _body(browser(people.pilot).get(ASKS))

    assert body["key"] == f"person:{people.pilot.pk}"
    assert "accept-load" in body["may"]
    assert set(body["may"]) == allowed.to_person(["pilot"])


def test_a_person_without_any_duty_reads_nothing():
    people = cast()

    response = browser(people.idle).get(ASKS)

    assert response.status_code == 403
    assert _body(response)["code"] == "read-not-allowed"


def test_a_browser_needs_the_csrf_token_for_what_is_not_safe():
    people = cast()
    client = Client(enforce_csrf_checks=True)
    client.force_login(people.pilot, backend="django.contrib.auth.backends.ModelBackend")

    response = client.post(ASKS)

    assert response.status_code == 403
    assert _body(response)["code"] == "not-allowed"
    assert client.get(ASKS).status_code == 200


def test_a_token_needs_no_csrf_token():
    people = cast()
    secret = _token(people.pilot, "read").secret

    response = Client(enforce_csrf_checks=True).post(ASKS, headers={"Authorization": f"Bearer {secret}"})

    assert response.status_code == 200


def test_an_integration_never_signs_whoever_it_belongs_to():
    people = cast()
    scopes = allowed.grantable(["pilot"], integration=True)
    secret = _token(people.pilot, *scopes, integration=True, by=people.manager).secret

    body = _body(_ask(secret))

    assert body["capacity"] == "integration"
    assert "submit-load" in body["may"]
    assert not {"prepare-load", "accept-load", "issue-token", "change-password"} & set(body["may"])


def test_a_persons_token_signs_only_with_the_scope_sign():
    people = cast()

    without = _token(people.pilot, "read", "accept-load").secret
    with_it = _token(people.pilot, "read", "accept-load", "sign").secret

    assert _body(_ask(without))["may"] == ["read"]
    assert _body(_ask(with_it))["may"] == ["accept-load", "read"]


def test_the_actor_of_a_page_is_the_signed_in_person_and_nobody_otherwise(rf):
    people = cast()
    seen = []
    middleware = actors.ActorMiddleware(lambda request: seen.append(request.actor))

    for user in (people.pilot, None):
        request = rf.get("/loads")
        request.user = user
        middleware(request)

    assert seen[0].key == f"person:{people.pilot.pk}"
    assert seen[0].operator == people.operator.code
    assert seen[1] == actors.STRANGER
    assert timezone.now() > people.pilot.duties.get().since
