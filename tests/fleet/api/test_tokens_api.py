"""Tokens over the API: issued once, two secrets live during a rotation, revoked, and whose they are."""

import json
import uuid
from datetime import timedelta

import pytest
from django.db import connection
from django.utils import timezone
from rest_framework.test import APIClient

from fleet.models import Rotation, Token
from fleet.queries.tokens import TokenRefused, token_sent
from records.models import Act, Change, Receipt
from tests.cast import api, cast, get, post, strangers

pytestmark = pytest.mark.django_db
NEW = {"label": "planning desk", "scopes": ["read", "submit-load"], "days": 30}
ROTATE = {"overlap_hours": 24, "days": 90, "reason": "yearly"}


def body(response):
    return json.loads(response.content)


def bearer(secret):
    return APIClient(headers={"Authorization": f"Bearer {secret}"})


def issued(person, /, by=None, **changes):
    answer = post(api(by or person), "/tokens", NEW | changes)
    assert answer.status_code == 201, answer.content
    return body(answer)


def serves(secret, at=None):
    try:
        token_sent(secret, at=at or timezone.now())
    except TokenRefused as refused:
        return refused.code
    return "serves"


def test_a_token_is_issued_with_its_secret_shown_once_and_kept_nowhere_readable():
    people, key = cast(), str(uuid.uuid4())
    client = api(people.pilot)

    answer = post(client, "/tokens", NEW, key=key)
    again = post(client, "/tokens", NEW, key=key)

    secret = body(answer)["secret"]
    assert bearer(secret).get("/api/v1/me").status_code == 200
    assert again.content == answer.content
    assert Token.objects.count() == 1
    listed = get(client, "/tokens").content
    with connection.cursor() as cursor:
        cursor.execute("SELECT string_agg(t::text, '') FROM fleet_token t")
        (rows,) = cursor.fetchone()
    kept = b"".join(bytes(one.body) for one in Receipt.objects.all())
    images = "".join(Change.objects.values_list("image", flat=True))
    assert secret.encode() not in listed + rows.encode() + kept + images.encode()


@pytest.mark.parametrize(
    ("changes", "pointer", "code"),
    [
        ({"label": ""}, "/label", "empty"),
        ({"label": "x" * 81}, "/label", "too-long"),
        ({"scopes": []}, "/scopes", "too-few"),
        ({"scopes": ["read", "read"]}, "/scopes", "duplicate"),
        ({"scopes": ["grant-duty"]}, "/scopes/0", "scope-not-grantable"),
        ({"scopes": ["issue-token"]}, "/scopes/0", "scope-not-grantable"),
        ({"days": 0}, "/days", "too-small"),
        ({"days": 366}, "/days", "too-large"),
        ({"days": "30"}, "/days", "wrong-type"),
        ({"days": 1.5}, "/days", "wrong-type"),
        ({"registrations": ["Q9-NOT"]}, "/registrations/0", "aircraft-not-known"),
        ({"registrations": []}, "/registrations", "too-few"),
        ({"registrations": ["q9 kt"]}, "/registrations/0", "wrong-form"),
        ({"person": "me"}, "/person", "wrong-type"),
        ({"integration": "yes"}, "/integration", "wrong-type"),
        ({"secret": "tb_mine"}, "/secret", "unknown-field"),
    ],
)
def test_what_is_wrong_with_a_token_is_named_and_none_is_issued(changes, pointer, code):
    people = cast()

    answer = post(api(people.pilot), "/tokens", NEW | changes)

    assert answer.status_code == 422, answer.content
    assert (pointer, code) in {(one["pointer"], one["code"]) for one in body(answer)["errors"]}
    assert not Token.objects.exists()


def test_during_the_overlap_two_secrets_serve_as_one_token_then_only_the_new_one():
    people = cast()
    first = issued(people.pilot)
    client = api(people.pilot)

    answer = post(client, f"/tokens/{first['id']}/rotation", ROTATE)

    assert answer.status_code == 201, answer.content
    second, now = body(answer), timezone.now()
    assert {serves(first["secret"]), serves(second["secret"])} == {"serves"}
    keys = {body(bearer(one["secret"]).get("/api/v1/me"))["key"] for one in (first, second)}
    assert keys == {f"token:{first['id']}"}
    assert [one["number"] for one in second["secrets"]] == [0, 1]
    after = now + timedelta(hours=24, seconds=5)
    assert serves(first["secret"], after) == "token-rotated"
    assert serves(second["secret"], after) == "serves"
    # The first lived thirty days, the new secret has ninety of its own.
    assert serves(second["secret"], now + timedelta(days=60)) == "serves"
    assert serves(second["secret"], now + timedelta(days=91)) == "token-expired"


def test_never_do_three_secrets_serve():
    people = cast()
    first, client = issued(people.pilot), api(people.pilot)
    path = f"/tokens/{first['id']}/rotation"

    second, third = body(post(client, path, ROTATE)), body(post(client, path, ROTATE))

    assert serves(first["secret"]) == "token-rotated"
    assert serves(second["secret"]) == serves(third["secret"]) == "serves"
    assert [one["number"] for one in third["secrets"]] == [1, 2]


def test_without_an_overlap_the_old_secret_ends_at_once():
    people = cast()
    first = issued(people.pilot)

    second = body(post(api(people.pilot), f"/tokens/{first['id']}/rotation", ROTATE | {"overlap_hours": 0}))

    assert bearer(first["secret"]).get("/api/v1/me").status_code == 401
    assert bearer(second["secret"]).get("/api/v1/me").status_code == 200


def test_a_rotation_lengthens_no_secret_beyond_its_own_time():
    people = cast()
    first = issued(people.pilot, days=1)

    post(api(people.pilot), f"/tokens/{first['id']}/rotation", ROTATE | {"overlap_hours": 720})

    assert serves(first["secret"], timezone.now() + timedelta(days=1)) == "token-expired"


@pytest.mark.parametrize(
    ("changes", "pointer", "code"),
    [
        ({"overlap_hours": -1}, "/overlap_hours", "too-small"),
        ({"overlap_hours": 721}, "/overlap_hours", "too-large"),
        ({"days": 366}, "/days", "too-large"),
        ({"reason": ""}, "/reason", "empty"),
        ({"hours": 1}, "/hours", "unknown-field"),
    ],
)
def test_what_is_wrong_with_a_rotation_is_named(changes, pointer, code):
    people = cast()
    first = issued(people.pilot)

    answer = post(api(people.pilot), f"/tokens/{first['id']}/rotation", ROTATE | changes)

    assert answer.status_code == 422
    assert (pointer, code) in {(one["pointer"], one["code"]) for one in body(answer)["errors"]}
    assert not Rotation.objects.exists()


def test_a_revoked_token_serves_with_no_secret_and_gets_none():
    people = cast()
    first, client = issued(people.pilot), api(people.pilot)
    second = body(post(client, f"/tokens/{first['id']}/rotation", ROTATE))

    answer = post(client, f"/tokens/{first['id']}/revocation", {"reason": "the laptop is gone"})

    assert (answer.status_code, body(answer)["secrets"]) == (200, [])
    assert serves(first["secret"]) == serves(second["secret"]) == "token-revoked"
    for path, document in (("rotation", ROTATE), ("revocation", {"reason": "again"})):
        refused = post(client, f"/tokens/{first['id']}/{path}", document)
        assert (refused.status_code, body(refused)["code"]) == (409, "token-already-revoked")
    assert Act.objects.get(kind="revoke-token").reason == "the laptop is gone"


def test_everybody_sees_their_own_tokens_and_who_looks_after_people_sees_all():
    people, others = cast(), strangers()
    mine, of_other = issued(people.pilot)["id"], issued(people.other_pilot)["id"]

    def seen(person):
        return {one["id"] for one in body(get(api(person), "/tokens"))["tokens"]}

    assert seen(people.pilot) == {mine}
    assert seen(people.manager) == seen(people.auditor) == {mine, of_other}
    assert seen(others.manager) == set()


def test_a_token_of_another_person_is_left_alone():
    people, others = cast(), strangers()
    token = issued(people.pilot)["id"]

    for path, document in (("rotation", ROTATE), ("revocation", {"reason": "x"})):
        for person, status in (
            (people.other_pilot, 403),
            (people.manager, 403),
            (people.idle, 403),
            (others.manager, 404),
        ):
            assert post(api(person), f"/tokens/{token}/{path}", document).status_code == status
        assert post(api(people.pilot), f"/tokens/{token + 999}/{path}", document).status_code == 404
        big = f"/tokens/99999999999999999999999/{path}"
        assert post(api(people.pilot), big, document).status_code == 404
    assert Token.objects.get().revoked_at is None
    assert not Rotation.objects.exists()


def test_a_manager_issues_rotates_and_revokes_an_integrations_token():
    people, others = cast(), strangers()
    of_program = {"person": people.preparer.pk, "integration": True}

    token = issued(people.preparer, by=people.manager, **of_program)
    assert post(api(people.manager), f"/tokens/{token['id']}/rotation", ROTATE).status_code == 201
    ended = post(api(people.manager), f"/tokens/{token['id']}/revocation", {"reason": "ends"})

    assert token["person"] == f"person:{people.preparer.pk}"
    assert ended.status_code == 200
    refused = post(api(people.manager), "/tokens", NEW | of_program | {"integration": False})
    assert (refused.status_code, body(refused)["code"]) == (403, "token-of-another-person")
    strange = post(api(people.manager), "/tokens", NEW | of_program | {"person": others.pilot.pk})
    assert strange.status_code == 404


def test_no_token_issues_or_rotates_a_token_and_one_may_revoke_itself():
    people = cast()
    token = issued(people.pilot, scopes=["read", "revoke-token"])
    client = bearer(token["secret"])

    assert post(client, "/tokens", NEW).status_code == 403
    assert post(client, f"/tokens/{token['id']}/rotation", ROTATE).status_code == 403
    assert post(client, f"/tokens/{token['id']}/revocation", {"reason": "leaked"}).status_code == 200
    assert client.get("/api/v1/me").status_code == 401


def test_the_last_use_of_a_token_is_listed():
    people = cast()
    token = issued(people.pilot)
    assert body(get(api(people.pilot), "/tokens"))["tokens"][0]["last_used_at"] is None

    bearer(token["secret"]).get("/api/v1/me")

    assert body(get(api(people.pilot), "/tokens"))["tokens"][0]["last_used_at"] is not None
