"""The people of the tests, the same everywhere: one operator with its duties, and strangers of another."""

import dataclasses
import json
import uuid
from dataclasses import dataclass

from django.http import HttpResponse
from django.test import Client
from rest_framework.test import APIClient

from fleet.actions.enter_operator import FirstPerson, NewOperator, enter_operator
from fleet.actions.enter_person import enter_person
from fleet.actions.grant_duty import grant_duty
from fleet.models import Operator, Person
from records.actor import Actor
from service.actors import actor_of_person

PASSWORD = "quiet-harbour-lantern-7"
HOUSE = Actor(
    operator=None,
    kind="service",
    key="service:set-up",
    name="",
    capacity="set-up",
    may=frozenset({"enter-operator"}),
)


@dataclass(frozen=True, slots=True)
class Cast:
    """One operator's people. `manager` enters and approves, `maintenance` enters, `approver` approves."""

    operator: Operator
    manager: Person
    maintenance: Person
    approver: Person
    pilot: Person
    other_pilot: Person
    preparer: Person
    auditor: Person
    idle: Person  # holds no duty at all


@dataclass(frozen=True, slots=True)
class Strangers:
    """Another operator, with people who hold every duty there."""

    operator: Operator
    manager: Person
    pilot: Person


def actor(person: Person, /, **changes: object) -> Actor:
    """This function will return the actor a person is now, with fields changed for the test."""
    return dataclasses.replace(actor_of_person(person), **changes)


def cast(code: str = "kestrel-test") -> Cast:
    """This function will enter an operator with all its people."""
    operator, manager = _operator(code, "m")
    return Cast(
        operator=operator,
        manager=manager,
        maintenance=_person(manager, f"{code}.mechanic", "N. Tarrow", "maintenance"),
        approver=_person(manager, f"{code}.approver", "E. Quill", "records approver"),
        pilot=_person(manager, f"{code}.pilot", "R. Amani", "pilot"),
        other_pilot=_person(manager, f"{code}.pilot2", "S. Vey", "pilot"),
        preparer=_person(manager, f"{code}.preparer", "D. Lorn", "load preparer"),
        auditor=_person(manager, f"{code}.auditor", "P. Ister", "auditor"),
        idle=_person(manager, f"{code}.idle", "W. None"),
    )


def strangers(code: str = "other-test") -> Strangers:
    """This function will enter another operator, whose people must see nothing of the first."""
    operator, manager = _operator(code, "x")
    pilot = _person(manager, f"{code}.pilot", "Z. Farrow", "pilot")
    return Strangers(operator, manager, pilot)


def api(person: Person) -> APIClient:
    """This function will return an API client signed in as the person, by session."""
    client = APIClient(enforce_csrf_checks=False)
    client.force_login(person, backend="django.contrib.auth.backends.ModelBackend")
    return client


def browser(person: Person) -> Client:
    """This function will return a browser signed in as the person."""
    client = Client()
    client.force_login(person, backend="django.contrib.auth.backends.ModelBackend")
    return client


def _operator(code: str, initial: str) -> tuple[Operator, Person]:
    return enter_operator(
        HOUSE,
        NewOperator(
            code=code,
            name=f"{code} Air",
            time_zone="America/Denver",
            rule_set="US",
            procedure="Operations manual, section 8, revision 5",
            weight_method="weighed and declared weights",
            invented=True,
        ),
        FirstPerson(login=f"{code}.manager", name=f"{initial.upper()}. Keel", password=PASSWORD),
    )


def _person(manager: Person, login: str, name: str, *roles: str) -> Person:
    person = enter_person(actor(manager), manager.operator, login=login, name=name, password=PASSWORD)
    for role in roles:
        grant_duty(actor(manager), person, role)
    return person


def post(client: APIClient, path: str, document: object, *, key: str | None = None) -> HttpResponse:
    """This function will send a document to a path after /api/v1, under a fresh key unless one is given."""
    body = document if isinstance(document, bytes) else json.dumps(document).encode()
    return client.post(
        f"/api/v1{path}",
        data=body,
        content_type="application/json",
        headers={"Idempotency-Key": key or str(uuid.uuid4())},
    )


def get(client: APIClient, path: str) -> HttpResponse:
    """This function will read a path after /api/v1."""
    return client.get(f"/api/v1{path}")
