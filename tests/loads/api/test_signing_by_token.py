"""Signing with a bearer token: a person's own with the scope, and the password; an integration's never."""

import json
from datetime import timedelta
from uuid import uuid4

import pytest
from django.test import Client

from fleet.actions.grant_duty import grant_duty
from fleet.actions.issue_token import issue_token
from loads.models import Signature
from service.allowed import grantable
from tests.cast import PASSWORD, actor, cast
from tests.loads.making import submitted
from tests.makers import ready_aircraft

pytestmark = pytest.mark.django_db


def token(by, person, *scopes, roles=("pilot",), integration=False):
    issued = issue_token(
        actor(by),
        person,
        label="tablet",
        scopes=scopes,
        grantable=grantable(roles, integration=integration),
        valid_for=timedelta(days=1),
        integration=integration,
    )
    return issued.secret


def sign(secret, current, **changes):
    body = {"meaning": "prepared", "digest": current.assessment.digest, "password": PASSWORD} | changes
    headers = {"Authorization": f"Bearer {secret}", "Idempotency-Key": str(uuid4()), "If-Match": '"1"'}
    return Client(headers=headers).post(
        f"/api/v1/loads/{current.load.id}/signatures", json.dumps(body), content_type="application/json"
    )


@pytest.fixture
def people():
    made = cast()
    ready_aircraft(made)
    return made


def test_a_persons_token_with_the_scope_signs_with_the_password(people) -> None:
    secret = token(people.pilot, people.pilot, "read", "sign", "prepare-load")

    done = sign(secret, submitted(people))

    assert done.status_code == 200
    assert (Signature.objects.get().person, Signature.objects.get().means) == (people.pilot, "token")


def test_the_token_alone_is_no_password(people) -> None:
    secret = token(people.pilot, people.pilot, "read", "sign", "prepare-load")

    refused = sign(secret, submitted(people), password="something else")

    assert (refused.status_code, Signature.objects.count()) == (422, 0)
    assert refused.json()["errors"][0]["pointer"] == "/password"


def test_without_the_scope_a_token_does_not_sign(people) -> None:
    secret = token(people.pilot, people.pilot, "read", "prepare-load")

    refused = sign(secret, submitted(people))

    assert (refused.status_code, refused.json()["code"]) == (403, "signature-not-allowed")


def test_an_integrations_token_never_signs(people) -> None:
    grant_duty(actor(people.manager), people.idle, "integration")
    secret = token(
        people.manager, people.idle, "read", "submit-load", roles=("integration",), integration=True
    )

    refused = sign(secret, submitted(people))

    assert (refused.status_code, refused.json()["code"]) == (403, "signature-not-allowed")
    assert Signature.objects.count() == 0


def test_after_repeated_wrong_passwords_the_signer_waits(people) -> None:
    secret = token(people.pilot, people.pilot, "read", "sign", "prepare-load")
    current = submitted(people)

    answers = [sign(secret, current, password=f"wrong {turn}").status_code for turn in range(6)]
    locked = sign(secret, current)

    assert answers[0] == 422
    assert (locked.status_code, locked.json()["code"]) == (429, "locked-out")
    assert int(locked["Retry-After"]) > 0
    assert Signature.objects.count() == 0
