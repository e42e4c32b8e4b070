"""POST /api/v1/loads (20 items, computed, audited, sealed, its answer kept) against a bare endpoint that
inserts one row.

    python -m tests.bench.post_loads_throughput

The judge is an endpoint of the same framework in the same server program (granian, two workers), on the same
database, with the service's own settings and middleware: who asks is found out by token and the body is read
strictly there, too, so that only the endpoint differs. A second judge is the same endpoint as a fresh project
without any of that. All are asked in turns by the same clients, so that only ratios count. The target is at
least half the first judge's requests a second. CPU is that of the server's processes, and of the database's
sessions beside it, both as /proc tells them (Linux, a database on this machine). Needs
`TAREBOOK_TEST_SERVER` (libpq address of a superuser of a PostgreSQL 18), or starts an embedded one.
"""

import tests.environment  # noqa: F401  # the settings are read from it

# isort: split
import http.client
import itertools
import json
import os
import statistics
import subprocess
import sys
import tempfile
import threading
import time
import uuid
from collections.abc import Iterator
from contextlib import ExitStack, contextmanager
from dataclasses import dataclass
from datetime import timedelta
from pathlib import Path
from typing import Any

import django
import psycopg
from django.conf import settings
from django.db import connections

os.environ.setdefault("DJANGO_SETTINGS_MODULE", "service.settings")
django.setup()

from fleet.actions.issue_token import issue_token  # noqa: E402  # needs the settings above
from service import roles  # noqa: E402  # as above
from service.allowed import grantable  # noqa: E402  # as above
from service.embedded import postgres, valkey  # noqa: E402  # as above
from tests import databases  # noqa: E402  # as above
from tests.cast import actor, cast  # noqa: E402  # as above
from tests.loads.making import DEPARTURE, DEPARTURE_AT, load_document  # noqa: E402  # as above
from tests.makers import q, ready_aircraft  # noqa: E402  # as above

CLIENTS, ROUNDS, SECONDS = 8, 5, 4.0
ROOT = Path(__file__).resolve().parent.parent.parent
PORTS = {"loads": 8713, "bare": 8714, "fresh": 8715}
TITLES = {"loads": "POST /loads", "bare": "bare, same house", "fresh": "bare, fresh project"}
APPLICATIONS = {
    "loads": "service.wsgi:application",
    "bare": "tests.bench.bare_in_service:application",
    "fresh": "tests.bench.bare_fresh:application",
}
# Each load departs this long after the one before it, as no fleet of one aircraft could otherwise fly them.
APART = timedelta(hours=2)
_flights = itertools.count(1)
_TICK = 1000 / os.sysconf("SC_CLK_TCK")  # milliseconds


@dataclass(frozen=True)
class Turn:
    """What one turn saw: requests a second, and CPU milliseconds a request of server and database."""

    rate: float
    server: float
    database: float


def main() -> int:
    """This function will print the rates round by round, their ratios, and the CPU a request took."""
    with _server(), databases.copied("bench") as database, ExitStack() as running:
        body, token = _scene()
        admin = running.enter_context(psycopg.connect(databases.server(), dbname=database, autocommit=True))
        admin.execute(
            "CREATE TABLE bench_row "
            "(id bigserial PRIMARY KEY, reference varchar(80) NOT NULL, document jsonb NOT NULL)"
        )
        admin.execute(f"GRANT ALL ON bench_row, bench_row_id_seq TO {roles.SERVICE}")
        connections.close_all()
        broker = valkey.start(Path(running.enter_context(tempfile.TemporaryDirectory())))
        running.callback(valkey.stop, broker)
        os.environ["BROKER_URL"] = broker.url
        servers = {name: running.enter_context(_granian(name, APPLICATIONS[name])) for name in PORTS}
        turns: dict[str, list[Turn]] = {name: [] for name in PORTS}
        for name in PORTS:
            _rate(name, body, token, seconds=2.0)  # warm
        for _ in range(ROUNDS):
            for name in PORTS:
                turns[name].append(_turn(name, body, token, servers[name], admin))
    _print(turns)
    return 0


def _turn(name: str, body: str, token: str, server: int, admin: "psycopg.Connection[Any]") -> Turn:
    before, begun = (_cpu_below(server), _cpu_of_sessions(admin)), time.monotonic()
    rate = _rate(name, body, token, seconds=SECONDS)
    requests = rate * (time.monotonic() - begun)
    after = (_cpu_below(server), _cpu_of_sessions(admin))
    return Turn(rate, (after[0] - before[0]) / requests, (after[1] - before[1]) / requests)


def _print(turns: dict[str, list[Turn]]) -> None:
    print(f"{'round':>6} " + " ".join(f"{TITLES[name]:>20}" for name in turns))
    for number, row in enumerate(zip(*turns.values(), strict=True), 1):
        print(f"{number:>6} " + " ".join(f"{turn.rate:>18.0f}/s" for turn in row))
    for what in ("server", "database"):
        means = [statistics.median(getattr(turn, what) for turn in turns[name]) for name in turns]
        print(f"CPU ms a request, {what:<9}" + " ".join(f"{mean:>8.2f}" for mean in means))
    for judge, wanted in (("bare", "target: 0.50 or more"), ("fresh", "no target")):
        pairs = zip(turns["loads"], turns[judge], strict=True)
        ratio = statistics.median(loads.rate / bare.rate for loads, bare in pairs)
        print(f"median ratio to {TITLES[judge]}: {ratio:.2f} ({wanted})")


def _cpu_below(process: int) -> float:
    """CPU milliseconds of a process and its children until now."""
    children = Path(f"/proc/{process}/task/{process}/children").read_text().split()
    return _cpu_of(process) + sum(_cpu_below(int(child)) for child in children)


def _cpu_of_sessions(admin: "psycopg.Connection[Any]") -> float:
    """CPU milliseconds of all sessions of this database until now; every server keeps its own."""
    sessions = admin.execute("SELECT pid FROM pg_stat_activity WHERE datname = current_database()").fetchall()
    return sum(_cpu_of(pid) for (pid,) in sessions)


def _cpu_of(process: int) -> float:
    words = Path(f"/proc/{process}/stat").read_text().rpartition(")")[2].split()
    return (int(words[11]) + int(words[12])) * _TICK  # utime and stime, proc(5)


@contextmanager
def _server() -> Iterator[None]:
    if "TAREBOOK_TEST_SERVER" in os.environ:
        yield
        return
    with tempfile.TemporaryDirectory() as folder:
        cluster = postgres.start(Path(folder) / "postgres", durable=True, say=lambda _line: None)
        os.environ["TAREBOOK_TEST_SERVER"] = cluster.url("postgres", "postgres")
        try:
            yield
        finally:
            postgres.stop(cluster)


def _scene() -> tuple[str, str]:
    settings.PASSWORD_HASHERS = ["django.contrib.auth.hashers.MD5PasswordHasher"]
    people = cast()
    ready_aircraft(people)
    token = issue_token(
        actor(people.preparer),
        people.preparer,
        label="bench",
        scopes=["submit-load"],
        grantable=grantable(["load preparer"], integration=False),
        valid_for=timedelta(days=1),
    )
    items = [
        {
            "kind": "cargo",
            "what": f"box {number}",
            "place": "NOSE-HOLD" if number % 2 else "AFT-HOLD",
            "weight": q(f"{4 + number / 10}", "lb"),
            "how": "weighed",
        }
        for number in range(20)
    ]
    return json.dumps(load_document(people, items=items)), token.secret


@contextmanager
def _granian(name: str, application: str) -> Iterator[int]:
    place = connections.settings["default"]
    login = f"{place['USER']}:{place['PASSWORD']}"
    address = f"postgresql://{login}@:{place['PORT'] or 5432}/{place['NAME']}?host={place['HOST']}"
    command = (
        sys.executable, "-m", "granian", "--interface", "wsgi", "--host", "127.0.0.1",
        "--port", str(PORTS[name]), "--workers", "2", "--blocking-threads", "4", "--no-ws",
        "--log-level", "error", application,
    )  # fmt: skip
    # One client of many: as many requests as it likes, each of them charged.
    unlimited = {"RATE_LIMIT_KNOWN": "1000000", "RATE_LIMIT_STRANGER": "1000000"}
    environment = {**os.environ, **unlimited, "DATABASE_URL": address, "LOG_LEVEL": "ERROR"}
    environment.pop("OWNER_DATABASE_URL", None)
    process = subprocess.Popen(command, cwd=ROOT, env=environment)
    try:
        _wait_for(PORTS[name])
        yield process.pid
    finally:
        process.terminate()
        process.wait(20)


def _wait_for(port: int) -> None:
    for _ in range(200):
        try:
            http.client.HTTPConnection("127.0.0.1", port, timeout=5).connect()
        except OSError:
            time.sleep(0.1)
        else:
            return
    raise SystemExit(f"nothing answers on port {port}")


def _rate(name: str, body: str, token: str, *, seconds: float) -> float:
    """Requests a second that were answered 201, by `CLIENTS` clients with a kept connection each."""
    until = time.monotonic() + seconds
    before, _, after = body.partition(DEPARTURE)
    counts = [0] * CLIENTS

    def ask(number: int) -> None:
        client = http.client.HTTPConnection("127.0.0.1", PORTS[name], timeout=30)
        headers = {"Content-Type": "application/json", "Authorization": f"Bearer {token}"}
        while time.monotonic() < until:
            departure = (DEPARTURE_AT + APART * next(_flights)).isoformat()
            key = {"Idempotency-Key": str(uuid.uuid4())}
            client.request("POST", "/api/v1/loads", before + departure + after, headers | key)
            answer = client.getresponse()
            text = answer.read()
            if answer.status != http.client.CREATED:
                raise SystemExit(f"{name}: {answer.status} {text[:300]!r}")
            counts[number] += 1

    begun = time.monotonic()
    threads = [threading.Thread(target=ask, args=(number,)) for number in range(CLIENTS)]
    for thread in threads:
        thread.start()
    for thread in threads:
        thread.join()
    return sum(counts) / (time.monotonic() - begun)


if __name__ == "__main__":
    sys.exit(main())
