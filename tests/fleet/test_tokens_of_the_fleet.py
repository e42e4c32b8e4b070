"""Tokens on the fleet's endpoints: what the scopes leave, and what an integration never does."""

import json
import uuid
from datetime import timedelta

import pytest
from django.http import HttpResponse
from rest_framework.test import APIClient

from fleet.actions.approve_empty_weight import approve_empty_weight
from fleet.actions.enter_empty_weight import enter_empty_weight
from fleet.actions.issue_token import issue_token
from fleet.models import Approval, EmptyWeight, Person
from records.refusal import NotAllowed
from tests.cast import Cast, actor, cast
from tests.makers import empty_weight_document, make_aircraft, make_basis

pytestmark = pytest.mark.django_db

ONE = "/api/v1/aircraft/Q9-KTB"


@pytest.fixture
def people() -> Cast:
    people = cast()
    make_basis(people, make_aircraft(people))
    return people


def secret(person: Person, *scopes: str) -> str:
    issued = issue_token(
        actor(person),
        person,
        label="test",
        scopes=scopes,
        grantable=frozenset(scopes),
        valid_for=timedelta(days=1),
    )
    return issued.secret


def send(token: str, path: str, document: object) -> HttpResponse:
    return APIClient().post(
        path,
        data=json.dumps(document),
        content_type="application/json",
        headers={"Authorization": f"Bearer {token}", "Idempotency-Key": str(uuid.uuid4())},
    )


def test_a_person_enters_a_weighing_with_a_token_of_that_scope(people: Cast) -> None:
    response = send(
        secret(people.maintenance, "enter-empty-weight"), f"{ONE}/weighings", empty_weight_document()
    )

    assert response.status_code == 201, response.content
    assert EmptyWeight.objects.get().entered_by == people.maintenance


def test_a_token_without_the_scope_enters_nothing(people: Cast) -> None:
    response = send(secret(people.maintenance, "read"), f"{ONE}/weighings", empty_weight_document())

    assert response.status_code == 403
    assert not EmptyWeight.objects.exists()


def test_a_token_without_read_reads_nothing(people: Cast) -> None:
    token = secret(people.maintenance, "enter-empty-weight")

    response = APIClient().get(ONE, headers={"Authorization": f"Bearer {token}"})

    assert response.status_code == 403
    assert json.loads(response.content)["code"] == "read-not-allowed"


def test_without_a_token_there_is_nothing(people: Cast) -> None:
    assert APIClient().get(ONE).status_code == 401
    assert send("tb_" + "x" * 43, f"{ONE}/weighings", empty_weight_document()).status_code == 401


def test_an_integration_approves_nothing_even_where_its_acts_would_allow_it(people: Cast) -> None:
    aircraft = people.operator.aircraft.get()
    weight = enter_empty_weight(actor(people.maintenance), aircraft, empty_weight_document())
    integration = actor(people.approver, kind="token", capacity="integration")
    nobody = actor(people.approver, kind="service", person=None)

    for by in (integration, nobody):
        with pytest.raises(NotAllowed) as refused:
            approve_empty_weight(by, aircraft, weight)
        assert refused.value.code == "person-needed"
    assert not Approval.objects.filter(empty_weight__isnull=False).exists()
