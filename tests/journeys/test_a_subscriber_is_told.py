"""A subscriber is told although the queue is down at first and the worker is killed in the middle of a try.

A real broker, a real worker process, a receiver on this machine, a database in which all commits.
"""

import os
import signal
import subprocess
import sys
import time
from collections.abc import Callable, Iterator
from pathlib import Path

import pytest
from celery import Celery
from django.conf import settings
from django.db import connections
from django.utils import timezone

from loads.actions.submit_load import submit_load
from records import outbox
from records.models import WebhookDelivery
from records.tasks import sweep_webhooks
from service.embedded import valkey
from tests.cast import actor, cast
from tests.loads.making import outside_document
from tests.makers import ready_aircraft
from tests.records.webhooks.making import make_due, subscribed, verified
from tests.records.webhooks.receiver import ToldReceiver, running

ROOT = Path(__file__).resolve().parents[2]
PATIENCE = 90.0


@pytest.fixture
def receiver(monkeypatch: pytest.MonkeyPatch) -> Iterator[ToldReceiver]:
    with running() as told:
        monkeypatch.setattr(settings, "WEBHOOK_TRUSTED_RECEIVERS", frozenset({told.place}))
        yield told


@pytest.fixture
def broker_address(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> str:
    address = valkey.address(tmp_path / "valkey")
    monkeypatch.setattr(settings, "BROKER_URL", address)
    monkeypatch.setattr(outbox, "current_app", Celery("test", broker=address, set_as_current=False))
    return address


@pytest.fixture
def start_worker(
    broker_address: str, receiver: ToldReceiver, own_database: str, tmp_path: Path
) -> Iterator[Callable[[], "subprocess.Popen[bytes]"]]:
    place, started = connections.settings["default"], []
    database = (
        f"postgresql://{place['USER']}:{place['PASSWORD']}@/{place['NAME']}"
        f"?host={place['HOST']}&port={place['PORT'] or 5432}"
    )
    environment = {
        **os.environ,
        "DATABASE_URL": database,
        "BROKER_URL": broker_address,
        "WEBHOOK_TRUSTED_RECEIVERS": receiver.place,
    }

    def start() -> "subprocess.Popen[bytes]":
        log = (tmp_path / f"worker-{len(started)}.log").open("wb")
        words = (sys.executable, "-m", "celery", "-A", "service.worker", "worker", "-c", "1", "-l", "warning")
        with log:
            started.append(
                subprocess.Popen(
                    words, cwd=ROOT, env=environment, stdout=log, stderr=log, start_new_session=True
                )
            )
        return started[-1]

    yield start
    for worker in started:
        _kill(worker)


def _kill(worker: "subprocess.Popen[bytes]") -> None:
    if worker.poll() is None:
        os.killpg(worker.pid, signal.SIGKILL)
        worker.wait()


def _wait_for(what: Callable[[], bool]) -> bool:
    end = time.monotonic() + PATIENCE
    while not what():
        if time.monotonic() > end:
            return False
        time.sleep(0.1)
    return True


@pytest.mark.slow
@pytest.mark.django_db(transaction=True)
def test_a_reject_reaches_its_subscriber(
    own_database: str,
    receiver: ToldReceiver,
    start_worker: Callable[[], "subprocess.Popen[bytes]"],
    tmp_path: Path,
) -> None:
    people = cast("journey-told")
    ready_aircraft(people)
    made = subscribed(people, receiver)

    # The queue is down: the load is kept all the same, and nobody is told yet.
    load = submit_load(outside_document(people), by=actor(people.preparer)).load
    assert (WebhookDelivery.objects.get().state, receiver.connections) == ("waiting", 0)

    # It comes up; the receiver takes its time, and the worker is killed while it waits.
    broker = valkey.start(tmp_path / "valkey")
    try:
        receiver.stall_seconds = 5
        first = start_worker()
        assert sweep_webhooks() == 1
        assert _wait_for(lambda: len(receiver.received) == 1)
        _kill(first)
        held = WebhookDelivery.objects.get()
        assert (held.state, held.attempts.count()) == ("waiting", 0)
        assert sweep_webhooks() == 0  # held, as if the worker were alive

        # Its time passes, and another worker takes it up.
        receiver.stall_seconds = 0
        WebhookDelivery.objects.update(held_until=timezone.now())
        make_due(made.standing.webhook.pk)
        start_worker()
        assert sweep_webhooks() == 1
        assert _wait_for(lambda: WebhookDelivery.objects.get().state == "delivered")
    finally:
        valkey.stop(broker)

    lost, taken = receiver.received
    assert lost.headers["webhook-id"] == taken.headers["webhook-id"]
    document = verified(made.secret, taken)
    assert (document["type"], document["data"]["load"]) == ("load.rejected", str(load.id))
