"""Exactly one effect per key, tried with real threads and real commits against PostgreSQL."""

import subprocess
import sys
import threading
import uuid
from concurrent.futures import ThreadPoolExecutor
from datetime import timedelta

import pytest
from django.db import connection, connections
from django.db.models.functions import Now
from rest_framework.request import Request
from rest_framework.test import APIRequestFactory

from records.act import act
from records.actor import Actor
from records.api.once import once
from records.api.parser import StrictJSONParser
from records.kind import Kind
from records.models import Act, Receipt
from records.models.receipt import KEPT_FOR
from records.refusal import Invalid, NotAllowed, NotSignedIn, StepRefused, Unreadable
from records.tasks import forget_old_answers

TRIED = Kind("try-something", "tried something")
ACTOR = Actor(
    operator="once-test",
    kind="person",
    key="person:7",
    name="",
    capacity="tester",
    may=frozenset({TRIED.name}),
    person=7,
)

pytestmark = pytest.mark.usefixtures("own_database")


def _request(
    key: str | None, body: dict | None = None, *, path: str = "/api/v1/tries", actor: Actor | None = ACTOR
):
    headers = {} if key is None else {"HTTP_IDEMPOTENCY_KEY": key}
    plain = APIRequestFactory().post(path, body or {"a": 1}, format="json", **headers)
    request = Request(plain, parsers=[StrictJSONParser()])
    request.actor = actor
    return request


def _work(about: str, *, number: list[int] | None = None):
    def work():
        with act(TRIED, by=ACTOR, about=about) as entry:
            pass
        if number is not None:
            number.append(1)
        return (
            201,
            {"Location": f"/api/v1/tries/{entry.id}", "ETag": '"1"'},
            {"id": str(entry.id), "é": "6.70"},
        )

    return work


def _effects(about: str) -> int:
    return Act.objects.filter(about=about).count()


@pytest.fixture(autouse=True)
def _allow_database(django_db_blocker):
    with django_db_blocker.unblock():
        yield


def test_a_repeated_request_has_one_effect_and_the_same_answer_byte_for_byte():
    key, about = uuid.uuid4().hex, f"try:{uuid.uuid4()}"

    first = once(_request(key), _work(about))
    again = once(_request(key), _work(about))

    assert _effects(about) == 1
    assert first.status_code == again.status_code == 201
    assert first.content == again.content
    assert first.content.decode().startswith('{"id":"')
    assert (first["Location"], first["ETag"]) == (again["Location"], again["ETag"])
    assert first["Content-Type"] == again["Content-Type"] == "application/json"
    assert not first.has_header("Idempotency-Replayed")
    assert again["Idempotency-Replayed"] == "true"


def test_fifty_parallel_calls_with_one_key_have_one_effect():
    key, about = uuid.uuid4().hex, f"try:{uuid.uuid4()}"
    together = threading.Barrier(50)

    def call(_number):
        try:
            together.wait(timeout=60)
            return once(_request(key), _work(about)).content
        except StepRefused as refused:
            return refused.code
        finally:
            connections.close_all()

    with ThreadPoolExecutor(50) as pool:
        answers = list(pool.map(call, range(50)))

    told_to_wait = [answer for answer in answers if answer == "idempotency-key-in-flight"]
    given = {answer for answer in answers if isinstance(answer, bytes)}
    assert _effects(about) == 1
    assert len(given) == 1
    assert len(told_to_wait) + sum(isinstance(answer, bytes) for answer in answers) == 50
    assert once(_request(key), _work(about)).content in given
    assert _effects(about) == 1


def test_a_second_call_while_the_first_is_working_is_told_to_wait():
    key, about = uuid.uuid4().hex, f"try:{uuid.uuid4()}"
    working, go_on = threading.Event(), threading.Event()

    def slow():
        working.set()
        assert go_on.wait(timeout=60)
        return _work(about)()

    def first():
        try:
            return once(_request(key), slow)
        finally:
            connections.close_all()

    with ThreadPoolExecutor(1) as pool:
        future = pool.submit(first)
        assert working.wait(timeout=60)
        with pytest.raises(StepRefused) as refused:
            once(_request(key), _work(about))
        go_on.set()
        answer = future.result(timeout=60)

    assert refused.value.code == "idempotency-key-in-flight"
    assert once(_request(key), _work(about)).content == answer.content
    assert _effects(about) == 1


@pytest.mark.parametrize(
    "other", [{"body": {"a": 2}}, {"path": "/api/v1/other"}, {"path": "/api/v1/tries?x=1"}], ids=str
)
def test_a_key_that_came_with_another_request_is_refused(other):
    key, about = uuid.uuid4().hex, f"try:{uuid.uuid4()}"
    once(_request(key), _work(about))

    with pytest.raises(Invalid) as refused:
        once(_request(key, **other), _work(about))

    assert refused.value.code == "idempotency-key-reused"
    assert _effects(about) == 1


def test_two_people_may_use_the_same_key():
    key, about = uuid.uuid4().hex, f"try:{uuid.uuid4()}"
    other = Actor(
        operator="once-test", kind="person", key="person:8", name="", capacity="", may=ACTOR.may, person=8
    )

    once(_request(key), _work(about))
    once(_request(key, actor=other), _work(about))

    assert _effects(about) == 2


def test_a_refusal_leaves_nothing_and_the_key_can_be_used_again():
    key, about = uuid.uuid4().hex, f"try:{uuid.uuid4()}"

    def refuses():
        _work(about)()
        raise NotAllowed("no", "No.")

    with pytest.raises(NotAllowed):
        once(_request(key), refuses)

    assert _effects(about) == 0
    assert not Receipt.objects.filter(key=key).exists()
    assert once(_request(key), _work(about)).status_code == 201
    assert _effects(about) == 1


def test_a_refusal_that_is_returned_is_an_error_of_ours_and_leaves_nothing():
    about = f"try:{uuid.uuid4()}"

    def returns_a_refusal():
        _work(about)()
        return 409, {}, {}

    with pytest.raises(ValueError, match="raised, never returned"):
        once(_request(uuid.uuid4().hex), returns_a_refusal)

    assert _effects(about) == 0


@pytest.mark.parametrize(
    ("key", "code"),
    [
        (None, "idempotency-key-missing"),
        ("", "idempotency-key-missing"),
        ("a b", "idempotency-key-malformed"),
        ("k" * 121, "idempotency-key-malformed"),
        ("schlüssel", "idempotency-key-malformed"),
        ("tab\tkey", "idempotency-key-malformed"),
    ],
)
def test_a_missing_or_odd_key_is_refused_before_anything_is_done(key, code):
    done = []

    with pytest.raises(Unreadable) as refused:
        once(_request(key), _work("try:never", number=done))

    assert refused.value.code == code
    assert done == []


def test_nobody_gets_no_key():
    with pytest.raises(NotSignedIn):
        once(_request(uuid.uuid4().hex, actor=None), _work("try:never"))


def test_a_process_killed_between_commit_and_reply_leaves_the_answer_for_the_next_try():
    key, about = uuid.uuid4().hex, f"try:{uuid.uuid4()}"
    where = connection.settings_dict
    program = f"""
import os, signal
os.environ["DJANGO_SETTINGS_MODULE"] = "service.settings"
import tests.environment
import django
django.setup()
from django.db import connections
place = dict(NAME={where["NAME"]!r}, USER={where["USER"]!r}, PASSWORD={where["PASSWORD"]!r},
             HOST={where["HOST"]!r}, PORT={where["PORT"]!r})
connections["default"].settings_dict.update(place)
from tests.records.api import test_once as t
t.once(t._request({key!r}), t._work({about!r}))
os.kill(os.getpid(), signal.SIGKILL)
"""

    killed = subprocess.run(
        [sys.executable, "-c", program], capture_output=True, text=True, timeout=120, check=False
    )
    answer = once(_request(key), _work(about))

    assert killed.returncode == -9, killed.stderr
    assert answer["Idempotency-Replayed"] == "true"
    assert _effects(about) == 1


def test_answers_are_kept_seven_days_and_not_longer():
    key, about = uuid.uuid4().hex, f"try:{uuid.uuid4()}"
    once(_request(key), _work(about))
    # The service role may not change a receipt, so the owner makes it old.
    Receipt.objects.using("owner").filter(key=key).update(answered_at=Now() - KEPT_FOR + timedelta(minutes=1))

    assert once(_request(key), _work(about))["Idempotency-Replayed"] == "true"
    assert forget_old_answers() == 0

    Receipt.objects.using("owner").filter(key=key).update(answered_at=Now() - KEPT_FOR)
    assert not once(_request(key), _work(about)).has_header("Idempotency-Replayed")
    assert _effects(about) == 2

    Receipt.objects.using("owner").filter(key=key).update(answered_at=Now() - KEPT_FOR)
    assert forget_old_answers() == 1
    assert not Receipt.objects.filter(key=key).exists()


def test_what_is_kept_does_not_let_a_password_be_guessed_from_the_table(settings):
    key = uuid.uuid4().hex
    once(_request(key, {"password": "quiet-harbour-lantern-7"}), _work("try:password"))
    kept = Receipt.objects.get(key=key).request_digest

    settings.SECRET_KEY = "another-secret-another-secret-another-secret-0123456789"
    with pytest.raises(Invalid):
        once(_request(key, {"password": "quiet-harbour-lantern-7"}), _work("try:password"))

    assert len(kept) == 64
