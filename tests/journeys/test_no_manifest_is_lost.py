"""Manifests are filed, each once, although the broker is down, is flushed, and the worker is killed.

A real broker, a real worker process, a database in which all commits. The short form of the promise.
"""

import os
import signal
import subprocess
import sys
import time
from collections.abc import Callable, Iterator
from datetime import timedelta
from pathlib import Path

import pytest
import redis
from celery import Celery
from django.conf import settings
from django.db import connections
from django.utils import timezone

from loads.actions.file_manifest import FILING, manifest_bytes
from loads.models import FiledPaper, Paper
from records import outbox
from records.models import Act, Outbox
from records.tasks import MOST_AT_ONCE, sweep_outbox
from service.embedded import valkey
from tests.cast import cast
from tests.loads.making import accepted
from tests.makers import ready_aircraft

# The long form is that of the promise.
MANIFESTS, KILLS = (200, 5) if os.environ.get("TAREBOOK_LONG_FORMS") == "1" else (4, 1)
ROOT = Path(__file__).resolve().parents[2]
PATIENCE = 120.0 + 2 * MANIFESTS


@pytest.fixture
def broker_address(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> str:
    address = valkey.address(tmp_path / "valkey")
    monkeypatch.setattr(settings, "BROKER_URL", address)
    monkeypatch.setattr(outbox, "current_app", Celery("test", broker=address, set_as_current=False))
    return address


@pytest.fixture
def start_worker(broker_address: str, own_database: str, tmp_path: Path) -> Iterator[Callable[[], "Worker"]]:
    running: list[Worker] = []

    def start() -> Worker:
        running.append(Worker(broker_address, tmp_path / f"worker-{len(running)}.log"))
        return running[-1]

    yield start
    for worker in running:
        worker.kill()


class Worker:
    """A worker process with its children, and the way it dies here."""

    def __init__(self, broker: str, log: Path) -> None:
        place = connections.settings["default"]
        database = (
            f"postgresql://{place['USER']}:{place['PASSWORD']}@/{place['NAME']}"
            f"?host={place['HOST']}&port={place['PORT'] or 5432}"
        )
        with log.open("wb") as output:
            self.process = subprocess.Popen(
                [
                    sys.executable,
                    "-m",
                    "celery",
                    "-A",
                    "service.worker",
                    "worker",
                    "-c",
                    "1",
                    "-l",
                    "warning",
                ],
                cwd=ROOT,
                env={**os.environ, "DATABASE_URL": database, "BROKER_URL": broker, "CELERY_RDBSIG": "0"},
                stdout=output,
                stderr=subprocess.STDOUT,
                start_new_session=True,
            )

    def kill(self) -> None:
        """Kill -9 the process and all its children."""
        if self.process.poll() is None:
            os.killpg(self.process.pid, signal.SIGKILL)
            self.process.wait()


def _wait_for(what: Callable[[], bool]) -> bool:
    end = time.monotonic() + PATIENCE
    while not what():
        if time.monotonic() > end:
            return False
        time.sleep(0.2)
    return True


def _sweep_now() -> int:
    Outbox.objects.filter(done_at__isnull=True).update(try_after=timezone.now() - timedelta(seconds=1))
    return sweep_outbox()


@pytest.mark.slow
@pytest.mark.django_db(transaction=True)
def test_every_accepted_load_gets_its_one_paper(
    own_database: str, broker_address: str, start_worker: Callable[[], Worker], tmp_path: Path
) -> None:
    people = cast("journey-papers")
    ready_aircraft(people)

    # The broker is down: loads are accepted all the same, and a paper is to be had on demand.
    begun = time.monotonic()
    loads = [accepted(people).load for _ in range(MANIFESTS)]
    assert time.monotonic() - begun < 7.5 * MANIFESTS
    assert manifest_bytes(people.operator.code, loads[0].id).startswith(b"%PDF-")

    # It comes up; the sweeper sends what is not done; the worker is killed in the middle of it, each time.
    broker = valkey.start(tmp_path / "valkey")
    try:
        papers_due = Outbox.objects.filter(done_at__isnull=True, task=FILING).count()
        assert papers_due == MANIFESTS - 1  # the first was filed on demand
        for _ in range(KILLS):
            worker, filed = start_worker(), FiledPaper.objects.count()
            # The approvals of the aircraft promised work of their own.
            assert _sweep_now() >= min(MANIFESTS - filed, MOST_AT_ONCE)
            assert _wait_for(lambda filed=filed: FiledPaper.objects.count() > filed)
            worker.kill()
            assert FiledPaper.objects.count() <= MANIFESTS
        # What the broker knew is gone.
        redis.Redis(unix_socket_path=str(broker.socket)).flushall()

        start_worker()
        _sweep_now()  # whatever the kills left undone
        assert _wait_for(lambda: FiledPaper.objects.count() == MANIFESTS)
        _sweep_now()  # more than one sweep takes
        assert _wait_for(lambda: not Outbox.objects.filter(done_at__isnull=True).exists())
    finally:
        valkey.stop(broker)

    assert sorted(Paper.objects.values_list("number", flat=True)) == list(range(1, MANIFESTS + 1))
    assert Act.objects.filter(kind="file-manifest").count() == MANIFESTS
    assert FiledPaper.objects.values("document").distinct().count() == MANIFESTS
