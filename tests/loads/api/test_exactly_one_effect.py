"""One Idempotency-Key, one effect, at the real endpoints: with real threads, real commits and a real kill."""

import json
import subprocess
import sys
import threading
from collections import Counter
from concurrent.futures import ThreadPoolExecutor
from pathlib import Path
from typing import Any
from uuid import uuid4

import pytest
from django.db import connection, connections
from django.utils import timezone

import loads.api.loads
from loads.models import Load, Step
from records.models import Act
from records.models.receipt import Receipt
from tests.cast import PASSWORD, Cast, api, cast
from tests.loads.making import load_document
from tests.makers import ready_aircraft

ROOT = Path(__file__).resolve().parents[3]
CALLS = 50


@pytest.fixture(autouse=True)
def _allow_database(django_db_blocker: Any) -> Any:
    with django_db_blocker.unblock():
        yield


@pytest.fixture(scope="module")
def people(own_database: str) -> Cast:
    made = cast("one-effect")
    ready_aircraft(made)
    return made


def send(client: Any, path: str, document: Any, key: str, seen: str = "") -> Any:
    headers = {"Idempotency-Key": key} | ({"If-Match": seen} if seen else {})
    return client.post(
        f"/api/v1{path}", data=json.dumps(document), content_type="application/json", headers=headers
    )


def flight(people: Cast, reference: str) -> dict[str, Any]:
    return load_document(people, flight=load_document(people)["flight"] | {"reference": reference})


def effects(reference: str) -> tuple[int, int]:
    """How many loads of this reference there are, and how many acts submitted them."""
    numbers = list(Load.objects.filter(reference=reference).values_list("id", flat=True))
    acts = Act.objects.filter(kind="submit-load", about__in=[f"load:{number}" for number in numbers])
    return len(numbers), acts.count()


def test_fifty_calls_at_once_submit_one_load_and_get_one_answer(people: Cast) -> None:
    document, key, together = flight(people, "KT-50"), str(uuid4()), threading.Barrier(CALLS)
    clients = [api(people.preparer) for _ in range(CALLS)]

    def call(client: Any) -> Any:
        together.wait(timeout=120)
        try:
            return send(client, "/loads", document, key)
        finally:
            connections.close_all()

    with ThreadPoolExecutor(CALLS) as pool:
        answers = list(pool.map(call, clients))

    assert effects("KT-50") == (1, 1)
    counted = Counter(one.status_code for one in answers)
    assert set(counted) <= {201, 409}
    assert counted[201] >= 1
    assert {one.json()["code"] for one in answers if one.status_code == 409} <= {"idempotency-key-in-flight"}
    assert len({one.content for one in answers if one.status_code == 201}) == 1
    # Whoever was told to wait asks again, and gets the same bytes.
    again = [send(api(people.preparer), "/loads", document, key) for _ in range(5)]
    assert {one.content for one in again} == {one.content for one in answers if one.status_code == 201}
    assert {(one.status_code, one["Idempotency-Replayed"], one["ETag"]) for one in again} == {
        (201, "true", '"1"')
    }
    assert effects("KT-50") == (1, 1)


def test_a_call_while_the_first_is_being_answered_is_told_to_wait(
    people: Cast, monkeypatch: pytest.MonkeyPatch
) -> None:
    document, key = flight(people, "KT-51"), str(uuid4())
    working, go_on, submit = threading.Event(), threading.Event(), loads.api.loads.submit_load

    def slowly(*words: Any, **named: Any) -> Any:
        made = submit(*words, **named)
        working.set()
        assert go_on.wait(timeout=120)
        return made

    def first() -> Any:
        try:
            return send(api(people.preparer), "/loads", document, key)
        finally:
            connections.close_all()

    monkeypatch.setattr(loads.api.loads, "submit_load", slowly)
    with ThreadPoolExecutor(1) as pool:
        answer = pool.submit(first)
        assert working.wait(timeout=120)
        meanwhile = send(api(people.preparer), "/loads", document, key)
        go_on.set()
        made = answer.result(timeout=120)

    assert (meanwhile.status_code, meanwhile.json()["code"]) == (409, "idempotency-key-in-flight")
    assert made.status_code == 201
    assert send(api(people.preparer), "/loads", document, key).content == made.content
    assert effects("KT-51") == (1, 1)


def test_the_same_key_with_another_body_or_address_is_refused(people: Cast) -> None:
    document, key = flight(people, "KT-52"), str(uuid4())
    made = send(api(people.preparer), "/loads", document, key)
    path = f"/loads/{made.json()['id']}/withdrawal"

    others = [
        send(api(people.preparer), "/loads", flight(people, "KT-53"), key),
        send(api(people.preparer), path, {"reason": "weather"}, key, '"1"'),
    ]

    assert [(one.status_code, one.json()["code"]) for one in others] == [(422, "idempotency-key-reused")] * 2
    assert (effects("KT-52"), effects("KT-53")) == ((1, 1), (0, 0))
    assert Step.objects.filter(load_id=made.json()["id"]).count() == 1


def test_every_step_sent_again_gets_its_answer_although_the_load_has_moved_on(people: Cast) -> None:
    preparer, pilot = api(people.preparer), api(people.pilot)
    first = send(preparer, "/loads", flight(people, "KT-54"), str(uuid4())).json()
    mended = flight(people, "KT-54") | {"reason": "bags"}
    sent = [(preparer, f"/loads/{first['id']}/revisions", mended, str(uuid4()), '"1"')]
    answers = [send(*sent[0])]
    load = answers[0].json()
    signing = {"digest": load["digest"], "password": PASSWORD}
    at = {"at": timezone.now().isoformat()}
    for who, step, document, seen in (
        (preparer, "signatures", signing | {"meaning": "prepared"}, '"1"'),
        (pilot, "signatures", signing | {"meaning": "accepted"}, '"2"'),
        (pilot, "departure", at, '"3"'),
    ):
        sent.append((who, f"/loads/{load['id']}/{step}", document, str(uuid4()), seen))
        answers.append(send(*sent[-1]))
    assert [one.status_code for one in answers] == [201, 200, 200, 200]
    before = (Step.objects.count(), Act.objects.count(), Receipt.objects.count())

    again = [send(*one) for one in sent]

    assert [one.content for one in again] == [one.content for one in answers]
    assert [one["ETag"] for one in again] == ['"1"', '"2"', '"3"', '"4"']
    assert {one["Idempotency-Replayed"] for one in again} == {"true"}
    # A password tried again is noted in the log of sign-ins, which is no act.
    assert (Step.objects.count(), Act.objects.count(), Receipt.objects.count()) == before


# What the killed process does: the endpoint is asked, and -9 comes at the named place.
PROGRAM = """
import os, signal
os.environ["DJANGO_SETTINGS_MODULE"] = "service.settings"
import tests.environment
import django
django.setup()
from django.db import connections
connections["default"].settings_dict.update({place!r})
import loads.api.loads
from fleet.models import Person
from loads.models import Load
from tests.cast import api
from tests.loads.api.test_exactly_one_effect import send

def killed(where):
    print(where, Load.objects.filter(reference={reference!r}).count(), flush=True)
    os.kill(os.getpid(), signal.SIGKILL)

client = api(Person.objects.get(pk={person}))
client.defaults["SERVER_NAME"] = "localhost"
if {before_commit}:
    loads.api.loads.created = lambda _current, _actor: killed("written, not committed:")
answer = send(client, "/loads", {document!r}, {key!r})
killed(f"answered {{answer.status_code}}, and it never leaves the machine:")
"""


@pytest.mark.parametrize(("before_commit", "left"), [(True, (0, 0)), (False, (1, 1))])
def test_a_server_killed_around_its_commit_leaves_one_load_once_it_is_asked_again(
    people: Cast, before_commit: bool, left: tuple[int, int]
) -> None:
    reference, key = f"KT-6{left[0]}", str(uuid4())
    document = flight(people, reference)
    where = connection.settings_dict
    place = {name: where[name] for name in ("NAME", "USER", "PASSWORD", "HOST", "PORT")}
    program = PROGRAM.format(
        place=place,
        person=people.preparer.pk,
        before_commit=before_commit,
        reference=reference,
        document=document,
        key=key,
    )

    died = subprocess.run(
        [sys.executable, "-c", program], cwd=ROOT, capture_output=True, text=True, timeout=180, check=False
    )
    said = (
        "written, not committed: 1" if before_commit else "answered 201, and it never leaves the machine: 1"
    )
    assert (died.returncode, died.stdout.strip()) == (-9, said), died.stderr
    assert effects(reference) == left
    again = send(api(people.preparer), "/loads", document, key)

    assert again.status_code == 201
    assert again.has_header("Idempotency-Replayed") == (not before_commit)
    assert again.json()["id"] == str(Load.objects.get(reference=reference).id)
    assert effects(reference) == (1, 1)
