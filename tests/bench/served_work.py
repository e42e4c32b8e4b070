"""Worker and scheduler beside what is served, as the service starts them, and work that goes through them.

A pilot has loads accepted, each of which has its manifest filed; a receiver on this machine is told of every
manifest and every rejected load; and rechecks are asked for.
"""

import json
import os
import subprocess
import sys
import tempfile
import threading
import time
from collections.abc import Iterator
from contextlib import contextmanager
from dataclasses import dataclass, field
from pathlib import Path

from tests.bench.served import ROOT, Served, address_of_database, at_its_own_time

# isort: split
from django.conf import settings
from django.db import connection

from loads.actions.ask_recheck import ask_recheck
from loads.actions.submit_load import submit_load
from loads.models import FiledPaper, Paper, Recheck, RecheckResult
from records.models import WebhookAttempt
from service.worker import app
from tests.cast import actor
from tests.loads.making import accepted, load_document, outside_document, prepared
from tests.records.webhooks.making import subscribed
from tests.records.webhooks.receiver import running

MOST_WAITING = 6  # the pilot waits when so many manifests are not filed yet
_CELERY = (sys.executable, "-W", "ignore:You're running the worker with superuser", "-m", "celery", "--quiet")
# The words of `service/start/supervisor.py`, but for how much is logged.
_COMMANDS = {
    "worker": ("worker", "--concurrency", "2", "--without-gossip", "--without-mingle", "--loglevel", "ERROR"),
    "scheduler": ("beat", "--pidfile=", "--loglevel", "ERROR"),
}


@dataclass
class AtWork:
    """The numbers of the two processes, and what went wrong with the work that is given to them."""

    processes: dict[str, int]
    failures: list[BaseException] = field(default_factory=list)

    def wait_for_manifests(self, count: int) -> None:
        """This function will return once so many manifests are filed; it gives up after two minutes."""
        until = time.monotonic() + 120
        while FiledPaper.objects.count() < count:
            if self.failures or time.monotonic() > until:
                raise SystemExit(f"the work beside does not go on: {self.failures or 'nothing is filed'}")
            time.sleep(0.5)

    def counted(self) -> dict[str, int]:
        """This function will return how much work of each kind was done so far."""
        return {
            "manifests filed": FiledPaper.objects.count(),
            "tries to tell a receiver": WebhookAttempt.objects.count(),
            "rechecks finished": RecheckResult.objects.count(),
        }


@contextmanager
def at_work(of: Served) -> Iterator[AtWork]:
    """This function will run worker, scheduler, receiver and pilot until the block ends."""
    settings.BROKER_URL = app.conf.broker_url = os.environ["BROKER_URL"]
    with tempfile.TemporaryDirectory() as folder, running() as receiver:
        settings.WEBHOOK_TRUSTED_RECEIVERS = frozenset({receiver.place})
        subscribed(of.people, receiver, "load.rejected", "manifest.filed")
        environment = {
            **os.environ,
            "DATABASE_URL": address_of_database(),
            "WEBHOOK_TRUSTED_RECEIVERS": receiver.place,
            "LOG_LEVEL": "ERROR",
        }
        environment.pop("OWNER_DATABASE_URL", None)
        more = {"scheduler": ("--schedule", str(Path(folder) / "schedule"))}
        started = {
            name: subprocess.Popen(
                (*_CELERY, "-A", "service.worker", *words, *more.get(name, ())), cwd=ROOT, env=environment
            )
            for name, words in _COMMANDS.items()
        }
        work = AtWork({name: process.pid for name, process in started.items()})
        ended = threading.Event()
        pilot = threading.Thread(target=_fly, args=(of, work, ended))
        pilot.start()
        try:
            yield work
        finally:
            ended.set()
            pilot.join()
            for process in started.values():
                process.terminate()
            for process in started.values():
                process.wait(60)


def _fly(of: Served, work: AtWork, ended: threading.Event) -> None:
    """Have loads accepted as quickly as manifests are filed; every tenth is outside and stays so."""
    try:
        number = 0
        while not ended.is_set():
            if Paper.objects.filter(filed__isnull=True).count() >= MOST_WAITING:
                time.sleep(0.1)
                continue
            number += 1
            document = outside_document if number % 10 == 0 else load_document
            written = json.loads(at_its_own_time(json.dumps(document(of.people))))
            current = submit_load(written, by=actor(of.people.preparer))
            if number % 10:
                accepted(of.people, prepared(of.people, current))
            if number % 50 == 1 and not Recheck.objects.filter(result__isnull=True).exists():
                ask_recheck({"reason": "measured"}, by=actor(of.people.manager))
    except BaseException as problem:  # noqa: BLE001  # told by the measurement, which must not go on without
        work.failures.append(problem)
    finally:
        connection.close()
