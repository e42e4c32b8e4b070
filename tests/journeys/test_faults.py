"""Each call to database, clock, file and broker from the submission to the filed manifest fails in turn.

Whatever fails: a problem body, nothing of the step in the database, no signature, and the same step works
afterwards. What is done and not answered is done once.
"""

import json
import os
import uuid
from collections.abc import Callable
from contextlib import AbstractContextManager, suppress
from dataclasses import dataclass
from typing import Any

import pytest
import redis
from django.db import DatabaseError, connection
from django.http import HttpResponse
from rest_framework.test import APIClient

from fleet.models import Person
from loads import tasks
from loads.models import FiledPaper, Signature
from loads.queries.current import Current, load_of
from records import broker
from records.models import Outbox
from tests.cast import PASSWORD, Cast, cast
from tests.journeys.faults import (
    Fault,
    clock_fails,
    commit_is_not_answered,
    file_fails,
    full,
    locked,
    lost,
    one_after_the_other,
    statement_fails,
)
from tests.journeys.trail import unsound
from tests.loads.making import accepted, load_document, prepared, signing, submitted
from tests.makers import ready_aircraft

pytestmark = pytest.mark.django_db(transaction=True)
STEPS = ("submitted", "prepared", "accepted", "filed")


@pytest.fixture
def people(own_database: str) -> Cast:
    made = cast("kestrel-faults")
    ready_aircraft(made)
    return made


@dataclass
class Step:
    """One step about to be taken: by whom, with which request; the same request again has the same key."""

    client: APIClient
    method: str
    path: str
    body: Any = None
    seen: str = ""
    key: str = ""
    kept_by: Current | None = None

    def take(self) -> HttpResponse:
        headers = {"Idempotency-Key": self.key} | ({"If-Match": f'"{self.seen}"'} if self.seen else {})
        data = json.dumps(self.body) if self.body is not None else ""
        response = self.client.generic(
            self.method, f"/api/v1{self.path}", data, content_type="application/json", headers=headers
        )
        connection.close()  # as a server does with a connection that broke
        return response


def about_to(people: Cast, name: str) -> Step:
    """This function will bring a load to where the step is next."""

    def step(
        person: Person, method: str, path: str, body: Any = None, current: Current | None = None
    ) -> Step:
        client = APIClient(raise_request_exception=False)
        client.force_login(person, backend="django.contrib.auth.backends.ModelBackend")
        seen = str(current.step.number) if current else ""
        return Step(client, method, path, body, seen, str(uuid.uuid4()), current)

    if name == "submitted":
        return step(people.preparer, "POST", "/loads", load_document(people))
    made = {"prepared": submitted, "accepted": prepared, "filed": accepted}[name](people)
    at = f"/loads/{made.load.id}"
    if name == "filed":
        return step(people.auditor, "GET", f"{at}/manifest", current=made)
    signature = {"meaning": name, "digest": signing(made).digest, "password": PASSWORD}
    person = people.preparer if name == "prepared" else people.pilot
    return step(person, "POST", f"{at}/signatures", signature, made)


def rows() -> dict[str, int]:
    """This function will count every table an act writes, the kept answers and the promised work."""
    with connection.cursor() as cursor:
        cursor.execute(
            "SELECT name FROM records_guarded_table WHERE mode <> 'exempt' "
            "AND has_table_privilege(name, 'SELECT') AND name <> 'records_access' ORDER BY 1"
        )
        names = [name for (name,) in cursor.fetchall()] + ["records_receipt", "records_outbox"]
        cursor.execute("SELECT " + ", ".join(f"(SELECT count(*) FROM {name})" for name in names))
        return dict(zip(names, cursor.fetchone(), strict=True))


def refuse_partial(response: HttpResponse, before: dict[str, int]) -> None:
    """This function will hold that a failure says so and left nothing."""
    assert response.status_code in (500, 503), response.content[:300]
    assert response["Content-Type"] == "application/problem+json"
    assert response.json()["code"] in ("unexpected", "database-unavailable")
    assert rows() == before


def each_call_fails(people: Cast, name: str, failing: Callable[[int], AbstractContextManager[Fault]]) -> int:
    """This function will let each call of one step fail, one after the other, and return how many there are.

    A call whose failure does no harm leaves the step done, and whole: then the next load takes its place.
    """
    whole_step(people, name)  # so that whatever is kept once (how an actor is called) stands
    usual = whole_step(people, name)
    step, before = about_to(people, name), rows()
    for number in one_after_the_other():
        with failing(number) as fault:
            response = step.take()
        if response.status_code < 300:
            done = {table: count - before[table] for table, count in rows().items() if count != before[table]}
            assert done == usual, number
            if not fault.struck:
                return number - 1
            step, before = about_to(people, name), rows()
        else:
            assert fault.struck, response.content[:300]
            refuse_partial(response, before)
    raise AssertionError


def whole_step(people: Cast, name: str) -> dict[str, int]:
    """This function will take the step with nothing failing and return the rows it adds."""
    step, before = about_to(people, name), rows()
    assert step.take().status_code in (200, 201)
    return {table: count - before[table] for table, count in rows().items() if count != before[table]}


# Each manifest is printed anew, so the short form has one way of failing for it.
WAYS = [
    (name, how)
    for name in STEPS
    for how in (lost, full, locked)
    if name != "filed" or how is lost or os.environ.get("TAREBOOK_LONG_FORMS") == "1"
]


@pytest.mark.parametrize(("name", "how"), WAYS, ids=lambda one: one if isinstance(one, str) else one.__name__)
def test_a_statement_that_fails_leaves_nothing(people, name, how):
    counted = each_call_fails(people, name, lambda number: statement_fails(number, how))

    assert counted > 8
    assert unsound() == ()


@pytest.mark.parametrize("name", STEPS)
def test_a_clock_that_fails_leaves_nothing(people, name):
    assert each_call_fails(people, name, clock_fails) > 0
    assert unsound() == ()


@pytest.mark.parametrize("name", STEPS)
def test_what_was_done_and_not_answered_is_done_once(people, name):
    whole_step(people, name)
    usual = whole_step(people, name)
    step, before = about_to(people, name), rows()

    with commit_is_not_answered() as fault:
        first = step.take()
    again = step.take()

    assert fault.struck
    assert first.status_code == 503
    assert first["Content-Type"] == "application/problem+json"
    assert "nothing was stored" not in first.json()["detail"]
    assert again.status_code in (200, 201)
    assert {table: n - before[table] for table, n in rows().items() if n != before[table]} == usual
    assert unsound() == ()


def test_a_file_that_cannot_be_written_or_read_files_nothing(people, monkeypatch):
    assert each_call_fails(people, "filed", file_fails) >= 0

    step, before = about_to(people, "filed"), rows()
    for error in (MemoryError(), OSError(28, "No space left on device"), ValueError("no such glyph")):
        with monkeypatch.context() as patch:
            patch.setattr("loads.manifest.printing.press", raising(error))
            refuse_partial(step.take(), before)

    assert step.take().content.startswith(b"%PDF-")
    assert unsound() == ()


@pytest.mark.parametrize("how", [redis.ConnectionError, OSError, TimeoutError, RuntimeError])
def test_a_broker_that_fails_in_any_way_stops_no_step(people, monkeypatch, how):
    monkeypatch.setattr(broker, "answers", lambda: True)
    monkeypatch.setattr("celery.app.base.Celery.send_task", raising(how("broker")))
    monkeypatch.setattr("redis.Redis.execute_command", raising(redis.ConnectionError("broker")))

    for name in STEPS:
        assert about_to(people, name).take().status_code in (200, 201)

    assert Signature.objects.filter(meaning="accepted").count() == 2
    assert Outbox.objects.filter(done_at__isnull=True, task="loads.tasks.file_manifest").count() == 1
    assert unsound() == ()


def test_a_worker_whose_statement_fails_leaves_the_paper_to_the_next_one(people):
    load = accepted(people).load
    for number in one_after_the_other():
        with statement_fails(number, lost) as fault, suppress(DatabaseError):
            tasks.file_manifest(str(load.id))
        connection.close()
        filed = FiledPaper.objects.count()
        undone = Outbox.objects.filter(done_at__isnull=True, task="loads.tasks.file_manifest").count()
        assert (filed, undone) in ((0, 1), (1, 0))
        if filed:
            break
        assert fault.struck

    assert number > 8
    assert load_of(people.operator.code, load.id).state == "accepted"
    assert unsound() == ()


def raising(error: BaseException) -> Callable[..., Any]:
    def fail(*_args: Any, **_kwargs: Any) -> Any:
        raise error

    return fail
