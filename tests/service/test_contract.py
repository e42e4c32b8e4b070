"""The API answers as its published description says: judged by schemathesis, over every operation.

The description is read without its `default` answers, so that a status it does not name for an operation is
a difference. Requests are drawn from the description with a fixed seed, right ones and wrong ones, and go to
the WSGI application in this process; what they did is taken back after each.
"""

import copy
import json
import os
import uuid
from collections.abc import Iterator
from typing import Any

import pytest
import schemathesis
from django.core.signals import request_finished, request_started
from django.db import close_old_connections
from django.test import Client
from hypothesis import HealthCheck, Phase, given, seed, settings
from schemathesis import GenerationMode
from schemathesis.checks import not_a_server_error
from schemathesis.specs.openapi.checks import (
    content_type_conformance,
    negative_data_rejection,
    response_headers_conformance,
    response_schema_conformance,
    status_code_conformance,
)

from service.openapi import COMMITTED
from service.wsgi import application
from tests.service.permission_table import API, EVERYBODY, Row, Sent
from tests.service.permission_world import World, make_world
from tests.service.test_permissions import undone

pytestmark = pytest.mark.django_db
CHECKS = [
    not_a_server_error,
    status_code_conformance,
    content_type_conformance,
    response_schema_conformance,
    response_headers_conformance,
]
# A role and how it asks.
ROLES = (("pilot", "token"), ("maintenance", "session"), ("integration", "program"))
EXAMPLES = 60 if os.environ.get("TAREBOOK_LONG_FORMS") == "1" else 4
SEED = 135
ROWS = [row for row in API if row.path != "/api/v1/openapi.json"]
DOCUMENT = json.loads(COMMITTED.read_text("utf-8"))
OPERATIONS = [(method.upper(), path) for path, of_path in DOCUMENT["paths"].items() for method in of_path]


def described() -> schemathesis.BaseSchema:
    """This function will return the description without its `default` answers, at this application."""
    document = copy.deepcopy(DOCUMENT)
    for of_path in document["paths"].values():
        for operation in of_path.values():
            del operation["responses"]["default"]
    # Whatever refuses will do for a wrong request: the state is looked at before the document.
    refusals = {"expected-statuses": [str(status) for status in range(400, 500)]}
    config = schemathesis.Config.from_dict({"checks": {"negative_data_rejection": refusals}})
    schema = schemathesis.openapi.from_dict(document, config=config)
    schema.app = application
    return schema


SCHEMA = described()


@pytest.fixture(autouse=True)
def one_connection() -> Iterator[None]:
    """This fixture will keep the application from closing the connection whose transaction the test is in."""
    for signal in (request_started, request_finished):
        signal.disconnect(close_old_connections)
    yield
    for signal in (request_started, request_finished):
        signal.connect(close_old_connections)


@pytest.fixture(scope="module")
def world(own_database: str, django_db_blocker: object) -> World:
    with django_db_blocker.unblock():
        return make_world("kestrel-test", "Q9-KTB")


def signed_in(world: World, role: str, way: str) -> tuple[dict[str, str], dict[str, str]]:
    """This function will return headers and cookies of somebody of the role."""
    if way != "session":
        return {"Authorization": f"Bearer {world.secrets[role, way == 'program']}"}, {}
    client = Client()
    client.force_login(world.by_role[role], backend="django.contrib.auth.backends.ModelBackend")
    session, forgery = client.cookies["sessionid"].value, "c" * 32
    return {"X-CSRFToken": forgery}, {"sessionid": session, "csrftoken": forgery}


def standing(world: World, path: str, role: str) -> Sent | None:
    """This function will return what a valid request of the operation names in its address, if anything."""
    return next((row.send(world, role) for row in API if row.path == path and "{" in path), None)


# Of an operation that takes nothing, no wrong request can be drawn.
TAKES_NOTHING = ("GET", "/api/v1/health")


@pytest.mark.parametrize("mode", [GenerationMode.POSITIVE, GenerationMode.NEGATIVE], ids=["right", "wrong"])
@pytest.mark.parametrize(("method", "path"), OPERATIONS, ids=lambda word: word)
def test_whatever_is_drawn_gets_an_answer_that_is_described(world, method, path, mode):
    if (method, path) == TAKES_NOTHING and mode is GenerationMode.NEGATIVE:
        return
    operation = SCHEMA[path][method]
    checks = [*CHECKS, negative_data_rejection] if mode is GenerationMode.NEGATIVE else CHECKS

    @seed(SEED)
    @settings(
        max_examples=EXAMPLES,
        database=None,
        deadline=None,
        phases=[Phase.generate],
        suppress_health_check=list(HealthCheck),
    )
    @given(case=operation.as_strategy(generation_mode=mode))
    def ask(case: schemathesis.Case) -> None:
        for role, way in ROLES:
            headers, cookies = signed_in(world, role, way)
            # Nobody draws a number that stands in the database, so what is there is put into the right ones.
            if mode is GenerationMode.POSITIVE and (known := standing(world, path, role)):
                case.path_parameters = dict(known.at)
                headers |= known.headers
            with undone():
                case.call_and_validate(checks=checks, headers=headers, cookies=cookies)

    ask()


@pytest.mark.parametrize("row", ROWS, ids=lambda row: row.name)
def test_what_is_done_is_answered_as_described(world, row):
    role = "operations manager" if row.may is EVERYBODY or "operations manager" in row.may else min(row.may)
    sent = row.send(world, role)
    case = request_of(row, sent, world, role)

    with undone():
        response = case.call()

    assert response.status_code == row.then
    case.validate_response(response, checks=CHECKS)


def request_of(row: Row, sent: Sent, world: World, role: str) -> schemathesis.Case:
    """This function will return the valid request of a row as the judging library sends it."""
    headers, cookies = signed_in(world, role, "session" if row.way == "session" else "token")
    headers |= sent.headers
    if row.method != "GET":
        headers["Idempotency-Key"] = str(uuid.uuid4())
    body: dict[str, Any] = {} if sent.body is None else {"body": sent.body, "media_type": "application/json"}
    operation = SCHEMA[row.path][row.method]
    return operation.Case(
        path_parameters=dict(sent.at), query=dict(sent.query), headers=headers, cookies=cookies, **body
    )


def test_every_operation_described_is_one_of_the_table():
    assert set(OPERATIONS) == {(row.method, row.path) for row in ROWS}
