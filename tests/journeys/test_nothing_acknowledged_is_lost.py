"""Database, web server and worker are killed under load: what was acknowledged is there, all of it once.

Ten cycles of three kills with TAREBOOK_LONG_FORMS=1, each of which takes the better part of a minute; the
short form kills the database and the web server once. A real `manage.py start` with its own database, durable
as it is for everybody. The machine itself does not lose its power here.
"""

import json
import os
import re
import signal
import subprocess
import sys
import threading
import time
import urllib.request
from collections import Counter
from collections.abc import Callable, Iterator
from dataclasses import dataclass, field
from datetime import date, timedelta
from functools import partial
from pathlib import Path

import psycopg
import pytest

from service import roles
from service.bootstrap.environment import ROOT
from service.client import Load, Patience, Refused, Tarebook, Unanswered
from service.demo.cast import PILOTS, SCHEDULER
from service.demo.day import FLIGHTS, document_of
from service.embedded import postgres, processes

LONG = os.environ.get("TAREBOOK_LONG_FORMS") == "1"
CYCLES, KILLS = (10, ("database", "web", "worker")) if LONG else (1, ("database", "web"))
EXPECTED = {(503, "database-unavailable"), (409, "idempotency-key-in-flight")}
ONCE = Patience(tries=1, answer_within=20.0)
PATIENCE = 120.0
# The supervisor gives up on a process that ends more than five times a minute.
SHORTEST_CYCLE = 15.0 if LONG else 0.0
TRIP = FLIGHTS[0]


@dataclass
class Senders:
    """What those who send submit, and what they were told is stored."""

    scheduler: Tarebook
    pilot: Tarebook
    password: str
    day: date
    stop: threading.Event = field(default_factory=threading.Event)
    acknowledged: dict[str, str] = field(default_factory=dict)
    accepted: dict[str, str] = field(default_factory=dict)
    unexpected: list[str] = field(default_factory=list)
    troubles: Counter[str] = field(default_factory=Counter)

    def send(self, sender: int) -> None:
        """Submit one load after the other; each is sent again under its key until it is acknowledged."""
        number = 0
        while not self.stop.is_set():
            number += 1
            key = f"kill-{sender}-{number}"
            document = document_of(TRIP, self.day + timedelta(days=100 * sender + number % 90))
            document["flight"]["reference"] = key
            load = self._until_done(partial(self.scheduler.submit, document, key=key))
            self.acknowledged[key] = load.id
            if sender == 0:
                for meaning in ("prepared", "accepted"):
                    sign = partial(self.pilot.sign, load, meaning, self.password, key=f"{key}-{meaning}")
                    load = self._until_done(sign)
                self.accepted[key] = load.id

    def _until_done(self, ask: Callable[[], Load]) -> Load:
        limit = time.monotonic() + PATIENCE
        while True:
            try:
                return ask()
            except Refused as refused:
                # Only what says that nothing was stored, or that the same request is still being answered.
                if (refused.status, refused.code) not in EXPECTED:
                    self.unexpected.append(str(refused))
                self.troubles[f"{refused.status} {refused.code}"] += 1
            except Unanswered:
                self.troubles["no answer"] += 1
            assert time.monotonic() < limit, dict(self.troubles)
            time.sleep(0.1)


@pytest.fixture
def data(tmp_path: Path) -> Iterator[Path]:
    """A data folder on which everything runs, with the invented people and aircraft in it."""
    folder, said = tmp_path / "data", tmp_path / "said"
    variables = {name: value for name, value in os.environ.items() if not name.endswith(("_URL", "_KEY"))}
    variables |= {"TAREBOOK_INSIDE": "run", "TAREBOOK_VENV": sys.prefix, "TAREBOOK_DATA": str(folder)}
    variables |= {"RATE_LIMIT_KNOWN": "0", "RATE_LIMIT_SIGNING": "0"}
    with said.open("wb") as out:
        running = subprocess.Popen(
            [sys.executable, "manage.py", "start", "--port", "0"],
            cwd=ROOT,
            env=variables,
            stdout=out,
            stderr=out,
        )
    try:
        limit = time.monotonic() + PATIENCE
        while "Tarebook serves http" not in said.read_text(errors="replace"):
            assert running.poll() is None, said.read_text()
            assert time.monotonic() < limit, said.read_text()
            time.sleep(0.2)
        yield folder
    finally:
        running.send_signal(signal.SIGTERM)
        running.wait(PATIENCE)


def address_of(data: Path) -> str:
    said = (data.parent / "said").read_text(errors="replace")
    return re.search(r"Tarebook serves (http://127\.0\.0\.1:\d+) ", said)[1]


def is_well(address: str) -> bool:
    try:
        with urllib.request.urlopen(f"{address}/health", timeout=10):  # noqa: S310  # always http
            return True
    except OSError:
        return False


def killed(data: Path, what: str) -> None:
    """Kill with -9: the database's first process, or a whole group with all its workers."""
    if what == "database":
        one = postgres.running(data / "postgres")
        assert one is not None
        os.kill(one.pid, signal.SIGKILL)
        return
    leader = json.loads((data / "pids" / f"{what}.json").read_text())["pid"]
    members = processes.members(leader)
    assert members
    for member in members:
        processes.send(member, signal.SIGKILL)


@pytest.mark.slow
def test_kills_under_load_lose_nothing_that_was_acknowledged(data: Path):
    notes = json.loads((data / "invented-operator.json").read_text())
    address = address_of(data)
    load = Senders(
        Tarebook(address, notes["tokens"][SCHEDULER], patience=ONCE),
        Tarebook(address, notes["tokens"][PILOTS[0]], patience=ONCE),
        notes["password"],
        date.fromisoformat(notes["day"]),
    )
    assert TRIP.pilot[0] == PILOTS[0]
    senders = [threading.Thread(target=load.send, args=(number,), daemon=True) for number in range(3)]
    for sender in senders:
        sender.start()

    for _ in range(CYCLES):
        begun = time.monotonic()
        for what in KILLS:
            before = len(load.acknowledged)
            killed(data, what)
            limit = time.monotonic() + PATIENCE
            while not is_well(address) or len(load.acknowledged) < before + 3:
                assert time.monotonic() < limit, (what, dict(load.troubles))
                time.sleep(0.2)
        time.sleep(max(0.0, SHORTEST_CYCLE - (time.monotonic() - begun)))
    load.stop.set()
    for sender in senders:
        sender.join(PATIENCE)
        assert not sender.is_alive()

    check(data, load)


def check(data: Path, load: Senders) -> None:
    cluster = postgres.find(data / "postgres")
    assert cluster is not None
    with psycopg.connect(cluster.url(roles.SERVICE, roles.DATABASE), autocommit=True) as service:
        stored = dict(
            service.execute(
                "SELECT reference, array_agg(id::text) FROM loads_load "
                "WHERE reference LIKE 'kill-%' GROUP BY 1"
            ).fetchall()
        )
        limit = time.monotonic() + PATIENCE
        while service.execute("SELECT count(*) FROM records_outbox WHERE done_at IS NULL").fetchone() != (0,):
            assert time.monotonic() < limit, "promised work is not done"
            time.sleep(0.5)
        filed = service.execute("SELECT paper_id::text, count(*) FROM loads_filedpaper GROUP BY 1").fetchall()
    # All that was acknowledged is there, under the number that was told, and each once.
    assert stored == {key: [told] for key, told in load.acknowledged.items()}
    assert [load.scheduler.load(told).state for told in load.accepted.values()] == ["accepted"] * len(
        load.accepted
    )
    assert dict.fromkeys(load.accepted.values(), 1).items() <= dict(filed).items()
    assert load.accepted
    assert load.unexpected == []
    assert load.troubles  # the kills were felt, so this was a test of something
    verified = subprocess.run(
        [sys.executable, "manage.py", "verify"], cwd=ROOT, capture_output=True, text=True, check=False,
        env={"PATH": os.environ["PATH"], "TAREBOOK_DATA": str(data)},
    )  # fmt: skip
    assert verified.returncode == 0, verified.stdout + verified.stderr
    print(
        f"{CYCLES} cycles: {len(load.acknowledged)} acknowledged, {len(load.accepted)} accepted, "
        f"felt: {dict(load.troubles)}"
    )
