"""Who may do what, cell by cell: every operation the URL configuration has, each role, each way of asking,
at home and at another operator's. An operation that stands in no row fails.
"""

import re
import uuid
from collections.abc import Iterator
from contextlib import contextmanager

import pytest
from django.db import transaction
from django.http import HttpResponse
from django.test import Client
from django.urls import URLPattern, URLResolver, get_resolver
from rest_framework.test import APIClient

from records.models import Act
from tests.service.permission_pages import PAGES
from tests.service.permission_table import API, EVERY, EVERYBODY, Row, Sent
from tests.service.permission_world import World, make_world

pytestmark = pytest.mark.django_db
ROWS = API + PAGES
METHODS = ("GET", "POST", "PUT", "PATCH", "DELETE")
ROLES = (*sorted(EVERY), "idle")
NOWHERE = {
    "registration": "Q9-NONE",
    "person": "2000000000",
    "token": "2000000000",
    "digest": "f" * 64,
}


@pytest.fixture(scope="module")
def worlds(own_database: str, django_db_blocker: object) -> tuple[World, World]:
    with django_db_blocker.unblock():
        return make_world("kestrel-test", "Q9-KTB"), make_world("other-test", "Q9-OTH")


def addresses() -> set[str]:
    """This function will return every address of the URL configuration, like /api/v1/loads/{load}."""

    def walk(patterns: list[URLPattern | URLResolver], before: str) -> Iterator[str]:
        for one in patterns:
            here = before + _plain(str(one.pattern))
            if isinstance(one, URLResolver):
                yield from walk(one.url_patterns, here)
            else:
                yield here

    return set(walk(get_resolver().url_patterns, "/"))


def _plain(pattern: str) -> str:
    named = re.sub(r"\(\?P<(\w+)>[^)]*\)", r"{\1}", pattern)
    return re.sub(r"<(?:\w+:)?(\w+)>", r"{\1}", named).removeprefix("^").removesuffix("$")


@contextmanager
def undone() -> Iterator[None]:
    """This function will take back whatever is done inside, and have acts done there seal as in a test."""
    whole = transaction.atomic()
    whole._from_testcase = True  # what Django's own test case says of its transaction
    with whole:
        yield
        transaction.set_rollback(True)


def ask(row: Row, sent: Sent, world: World, role: str, way: str, *, method: str = "") -> HttpResponse:
    """This function will send the request as somebody of that role in that world."""
    client = APIClient() if row.path.startswith("/api/") else Client()
    headers = dict(sent.headers)
    if way in ("token", "program"):
        headers["Authorization"] = f"Bearer {world.secrets[role, way == 'program']}"
    elif way == "session":
        client.force_login(world.by_role[role], backend="django.contrib.auth.backends.ModelBackend")
    path = row.path.format(**sent.at)
    method = method or row.method
    if method == "GET":
        return client.get(path, sent.query, headers=headers)
    if not row.path.startswith("/api/"):
        return client.generic(method, path) if method != "POST" else client.post(path, sent.body or {})
    headers["Idempotency-Key"] = str(uuid.uuid4())
    body = {} if sent.body is None else {"data": sent.body, "format": "json"}
    return getattr(client, method.lower())(path, headers=headers, **body)


def wanted(row: Row, role: str, way: str) -> int:
    if row.may is EVERYBODY:
        return row.then
    if way == "nobody":
        return 401 if row.path.startswith("/api/") else 302
    ways = {"any": ("session", "token", "program"), "person": ("session", "token"), "session": ("session",)}
    return row.then if role in row.may and way in ways[row.way] else 403


def cells(row: Row, world: World) -> Iterator[tuple[str, str]]:
    yield "", "nobody"
    if row.may is EVERYBODY:
        yield "idle", "session"
        return
    for role in ROLES:
        yield role, "session"
        if row.path.startswith("/api/"):
            yield from (
                (role, way) for way in ("token", "program") if (role, way == "program") in world.secrets
            )


def test_every_operation_of_the_url_configuration_stands_in_a_row_and_no_other(worlds):
    home = worlds[0]
    listed = {path: {row.method for row in ROWS if row.path == path} for path in addresses()}
    assert {row.path for row in ROWS} == addresses()

    found = {}
    for row in ROWS:
        for method in METHODS:
            with undone():
                sent = row.send(home, "operations manager")
                answer = ask(row, sent, home, "operations manager", "session", method=method)
            if answer.status_code != 405:
                found.setdefault(row.path, set()).add(method)

    assert found == listed
    assert len({row.name for row in ROWS}) == len(ROWS)


@pytest.mark.parametrize("row", ROWS, ids=lambda row: row.name)
def test_each_role_gets_what_the_table_says_by_each_way(worlds, row):
    home, wrong = worlds[0], []
    acts = Act.objects.count()
    for role, way in cells(row, home):
        with undone():
            answer = ask(row, row.send(home, role), home, role, way)
            status, signs_in = answer.status_code, answer.get("Location", "").startswith("/sign-in?next=")
            done = Act.objects.count() - acts
        due = wanted(row, role, way)
        if (
            status != due
            or (status in (401, 403) and done)
            or signs_in != (way == "nobody" and due == 302 and row.may is not EVERYBODY)
        ):
            wrong.append((role, way, status, due, done, answer.content[:300]))

    assert wrong == []


@pytest.mark.parametrize("row", [row for row in ROWS if row.foreign is not None], ids=lambda row: row.name)
def test_another_operators_row_does_not_exist(worlds, row):
    (home, other), wrong = worlds, []
    acts = Act.objects.count()
    for role in ROLES:
        sent = row.send(home, "pilot")
        with undone():
            answer = ask(row, sent, other, role, "session")
            done = Act.objects.count() - acts
        due = {row.foreign} if role in row.may else {403, row.foreign}
        if answer.status_code not in due or done:
            wrong.append((role, answer.status_code, due, done, answer.content[:300]))
        # What is another's and what nobody has are told in the same words.
        nowhere = Sent({**sent.at, **_nowhere(sent.at)}, sent.query, sent.body, sent.headers)
        if row.path.startswith("/api/") and sent.at:
            with undone():
                missing = ask(row, nowhere, other, role, "session")
            told = [(one.status_code, one.json()["code"]) for one in (answer, missing)]
            if told[0] != told[1]:
                wrong.append((role, *told))

    assert wrong == []


def _nowhere(at: dict[str, str]) -> dict[str, str]:
    return {name: NOWHERE.get(name, str(uuid.UUID(int=7))) for name in at}


@pytest.mark.parametrize(
    "row",
    [row for row in ROWS if row.method == "GET" and row.foreign is None and row.may is not EVERYBODY],
    ids=lambda row: row.name,
)
def test_no_list_shows_what_is_another_operators(worlds, row):
    home, other = worlds
    sent = row.send(home, "operations manager")

    with undone():
        own = ask(row, sent, home, "operations manager", "session").content.decode()
        seen = ask(row, sent, other, "operations manager", "session").content.decode()

    asked = set(sent.query.values())
    marks = {one for one in home.marks() if len(one) > 5 and not any(one in value for value in asked)}
    assert [mark for mark in marks if mark in seen] == []
    assert own != seen


def test_a_reader_without_leave_is_not_told_what_an_address_takes(worlds):
    row = next(row for row in ROWS if row.name == "GET /api/v1/loads")
    answers = {}
    for role, way in (("", "nobody"), ("idle", "session"), ("auditor", "session")):
        with undone():
            answers[role] = ask(row, Sent(), worlds[0], role, way, method="OPTIONS").status_code

    assert answers == {"": 401, "idle": 403, "auditor": 200}
