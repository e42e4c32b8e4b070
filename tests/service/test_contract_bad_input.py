"""Bad input: every field of every request document, spoiled in every way, is refused by name and stores
nothing.
"""

import json
import os
import re
import uuid
from typing import Any

import pytest
from django.db import connection
from rest_framework.test import APIClient

from tests.service.bad_input import Schema, Spoiled, fields, name_of, plain, spoiled
from tests.service.bad_input_flights import enter_rich_aircraft
from tests.service.bad_input_samples import NOT_TAKEN, RIGHT, SAMPLES
from tests.service.permission_table import API, Row
from tests.service.permission_world import World, make_world
from tests.service.test_contract import DOCUMENT, OPERATIONS, signed_in
from tests.service.test_permissions import undone

pytestmark = pytest.mark.django_db
LONG = os.environ.get("TAREBOOK_LONG_FORMS") == "1"
# The longest documents, each answer to which takes long: spoiled in every way only in the long form.
LONGEST = ("/api/v1/aircraft/{registration}/loading-bases",)
# Read by the reader of `POST /loads`, on which every field is spoiled in every way.
READ_ALIKE = ("/api/v1/assessments", "/api/v1/loads/{load}/revisions")


@pytest.fixture(scope="module")
def world(own_database: str, django_db_blocker: object) -> World:
    with django_db_blocker.unblock():
        made = make_world("kestrel-test", "Q9-KTB")
        enter_rich_aircraft(made)
        return made


def schema_of(method: str, path: str) -> Any:
    body = DOCUMENT["paths"][path][method.lower()].get("requestBody", {})
    return body.get("content", {}).get("application/json", {}).get("schema")


TAKE_A_DOCUMENT = [(method, path) for method, path in OPERATIONS if schema_of(method, path)]


def test_every_document_that_is_taken_has_samples_with_every_field_it_may_have(world):
    lacking = {}
    for method, path in TAKE_A_DOCUMENT:
        shown = {plain(pointer) for document in SAMPLES[path](world) for pointer, _ in fields(document)}
        shown = {re.sub("/(LEFT|RIGHT|GEAR)(?=/|$)", "/*", pointer) for pointer in shown}
        missing = (
            Schema(schema_of(method, path), DOCUMENT).fields() - shown - NOT_TAKEN.get(path, frozenset())
        )
        if missing:
            lacking[path] = sorted(missing)

    assert lacking == {}
    assert set(SAMPLES) == {path for _, path in TAKE_A_DOCUMENT}


@pytest.mark.parametrize(("method", "path"), TAKE_A_DOCUMENT, ids=lambda word: word)
def test_a_spoiled_field_is_refused_by_name_and_nothing_is_stored(world, method, path):
    row = next(row for row in API if (row.method, row.path) == (method, path) and row.case != "accepted")
    role = "pilot" if "pilot" in row.may and "operations manager" not in row.may else "operations manager"
    wrong = []
    headers, schema = headers_of(world, row, role), Schema(schema_of(method, path), DOCUMENT)
    before, seen = rows(), set()
    one_in = 6 if path in LONGEST and not LONG else 1
    for document in SAMPLES[path](world):
        if path in READ_ALIKE and not LONG:
            seen |= {name_of(*field) for field in fields(document)}
        assert send(world, row, role, headers, json.dumps(document).encode())[0] < 300, document
        for one in spoiled(document, schema, seen=seen, one_in=one_in):
            status, code, faults, after = send(world, row, role, headers, one.body)
            if right_after_all(path, one):
                refused = status < 300 or after == before
            else:
                named = covers(code, one) if not faults else any(covers_at(fault, one) for fault in faults)
                refused = 400 <= status < 500 and named and after == before
            if not refused:
                wrong.append((one.pointer, one.how, status, code, faults[:3], after == before))

    assert wrong == []


def right_after_all(path: str, one: Spoiled) -> bool:
    return any(
        path.endswith(end) and how == one.how and plain(one.pointer) in pointers
        for end, how, pointers in RIGHT
    )


def covers(code: str, one: Spoiled) -> bool:
    """Whether the code of a refusal without single faults names the field: `digest-differs`."""
    return code.startswith(one.pointer.rpartition("/")[2])


def covers_at(fault: dict[str, str], one: Spoiled) -> bool:
    """Whether a fault names the field, or something in it; of what stands twice, or is left out, what it
    stands in or what should stand there instead.
    """
    pointer, wanted = fault["pointer"], one.pointer
    if one.how in ("sent twice", "left out"):
        wanted = wanted.rpartition("/")[0]
    return pointer == wanted or pointer.startswith(f"{wanted}/")


def headers_of(world: World, row: Row, role: str) -> dict[str, str]:
    headers, cookies = signed_in(world, role, "session" if row.way == "session" else "token")
    kept = "; ".join(f"{name}={value}" for name, value in cookies.items())
    return {**headers, **({"Cookie": kept} if kept else {})}


def send(
    world: World, row: Row, role: str, headers: dict[str, str], body: bytes
) -> tuple[int, str, list[dict[str, str]], tuple[int, ...]]:
    sent = row.send(world, role)
    headers = headers | sent.headers | {"Idempotency-Key": str(uuid.uuid4())}
    path = row.path.format(**sent.at)
    with undone():
        answer = APIClient().generic(row.method, path, body, content_type="application/json", headers=headers)
        found = rows()
    told = answer.json()
    assert answer.status_code < 400 or answer["Content-Type"] == "application/problem+json"
    return answer.status_code, told.get("code", ""), told.get("errors", []), found


def rows() -> tuple[int, ...]:
    """This function will count the rows of every table under guard, the acts and the kept answers."""
    with connection.cursor() as cursor:
        cursor.execute(
            "SELECT name FROM records_guarded_table WHERE mode <> 'exempt' "
            # A wrong password is noted in the log of sign-ins, as it must be.
            "AND has_table_privilege(name, 'SELECT') AND name <> 'records_access' ORDER BY 1"
        )
        names = [name for (name,) in cursor.fetchall()]
        counted = ", ".join(
            f"(SELECT count(*) FROM {name})" for name in [*names, "records_receipt", "records_outbox"]
        )
        cursor.execute(f"SELECT {counted}")
        return tuple(cursor.fetchone())
