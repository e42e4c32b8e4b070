"""Promised work: kept with its cause, sent again until it is done, and never in the way of a request."""

import time
from datetime import timedelta

import pytest
from celery import Celery
from django.conf import settings
from django.db import IntegrityError, transaction
from django.utils import timezone

from records import broker, outbox
from records.act import act
from records.kind import Kind
from records.models import Outbox
from records.tasks import sweep_outbox
from tests.cast import actor, cast

pytestmark = pytest.mark.django_db
KIND = Kind("submit-load", "submitted a load")
TASK = "loads.tasks.file_manifest"


class FakeQueue:
    """Stands for the broker: it takes messages, or fails."""

    def __init__(self) -> None:
        self.up = True
        self.sent: list[tuple[str, str]] = []

    def send_task(self, task: str, args: list[str], **_more: object) -> None:
        if not self.up:
            raise ConnectionError("gone")
        self.sent.append((task, args[0]))


@pytest.fixture
def queue(monkeypatch: pytest.MonkeyPatch) -> FakeQueue:
    fake = FakeQueue()
    monkeypatch.setattr(outbox, "current_app", fake)
    monkeypatch.setattr(broker, "answers", lambda: True)
    return fake


def _promised(*keys: str) -> None:
    people = cast()
    with act(KIND, by=actor(people.preparer), about="load:x") as entry:
        for key in keys:
            outbox.put(entry, TASK, key)


def _make_due(**changes: object) -> None:
    Outbox.objects.update(try_after=timezone.now() - timedelta(seconds=1), **changes)


def test_a_worker_is_woken_after_the_commit_and_not_before(
    queue: FakeQueue, django_capture_on_commit_callbacks
) -> None:
    with django_capture_on_commit_callbacks(execute=True):
        _promised("1")
        assert queue.sent == []

    assert queue.sent == [(TASK, "1")]
    assert Outbox.objects.get().done_at is None


def test_work_promised_in_an_act_that_fails_is_not_promised(queue: FakeQueue) -> None:
    people = cast()

    def promise_and_fail() -> None:
        with act(KIND, by=actor(people.preparer), about="load:x") as entry:
            outbox.put(entry, TASK, "1")
            raise ZeroDivisionError

    with pytest.raises(ZeroDivisionError):
        promise_and_fail()

    assert Outbox.objects.count() == 0


def test_the_same_work_is_promised_once(queue: FakeQueue) -> None:
    _promised("1")

    with pytest.raises(IntegrityError), transaction.atomic():
        Outbox.objects.create(
            task=TASK, key="1", operator_id="x", act=Outbox.objects.get().act,
            put_at=timezone.now(), try_after=timezone.now(),
        )  # fmt: skip


def test_a_broker_that_is_down_costs_a_request_little_and_raises_nothing(
    monkeypatch: pytest.MonkeyPatch,
) -> None:
    dead = Celery("dead", broker="redis://127.0.0.1:1/0", set_as_current=False)
    monkeypatch.setattr(outbox, "current_app", dead)
    monkeypatch.setattr(settings, "BROKER_URL", "redis://127.0.0.1:1/0")
    begun = time.monotonic()

    taken = outbox.wake(TASK, "1")

    assert not taken
    assert time.monotonic() - begun < 1.5


def test_a_broker_that_fails_after_its_answer_raises_nothing_either(queue: FakeQueue) -> None:
    queue.up = False

    assert outbox.wake(TASK, "1") is False


def test_the_sweeper_sends_what_is_due_and_waits_longer_each_time(queue: FakeQueue) -> None:
    _promised("1", "2")
    assert sweep_outbox() == 0  # the worker that was woken gets its time first

    _make_due()
    assert sweep_outbox() == 2
    assert sweep_outbox() == 0

    assert queue.sent == [(TASK, "1"), (TASK, "2")]
    assert set(Outbox.objects.values_list("tries", flat=True)) == {1}
    assert [outbox.wait_after(tries).total_seconds() for tries in (0, 1, 2, 7, 40)] == [
        30,
        60,
        120,
        3600,
        3600,
    ]


def test_a_flushed_broker_loses_nothing(queue: FakeQueue) -> None:
    _promised("1", "2", "3")
    queue.sent.clear()  # flushed

    _make_due()
    sweep_outbox()

    assert [key for _task, key in queue.sent] == ["1", "2", "3"]


def test_a_sweep_stops_at_a_broker_that_is_down_and_the_rows_come_again(queue: FakeQueue) -> None:
    _promised("1", "2")
    _make_due()
    queue.up = False
    assert sweep_outbox() == 0

    queue.up = True
    _make_due()

    assert sweep_outbox() == 2


def test_done_work_is_not_sent_again(queue: FakeQueue) -> None:
    _promised("1", "2")

    outbox.done(TASK, "1")
    outbox.done(TASK, "1")
    _make_due()
    sweep_outbox()

    assert queue.sent == [(TASK, "2")]


def test_a_failure_is_noted_by_its_kind_without_data(queue: FakeQueue) -> None:
    _promised("1")

    outbox.failed(TASK, "1", ValueError("L. Osei, 176 lb"))

    assert Outbox.objects.get().last_problem == "ValueError"
