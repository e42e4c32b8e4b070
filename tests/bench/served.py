"""The service as it is served, and the bare endpoints it is measured against: one server program each, on the
same database, asked by the same clients over kept connections.

Needs `TAREBOOK_TEST_SERVER` (libpq address of a superuser of a PostgreSQL 18), or starts an embedded one.
"""

import tests.environment  # noqa: F401  # the settings are read from it

# isort: split
import http.client
import itertools
import json
import os
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
from tests.cast import Cast, actor, cast  # noqa: E402  # as above
from tests.loads.making import DEPARTURE, DEPARTURE_AT, load_document  # noqa: E402  # as above
from tests.makers import q, ready_aircraft  # noqa: E402  # as above

CLIENTS = 8
ROOT = Path(__file__).resolve().parent.parent.parent
PORTS = {"loads": 8713, "bare": 8714, "fresh": 8715}
TITLES = {"loads": "POST /loads", "bare": "bare, same house", "fresh": "bare, fresh project"}
APPLICATIONS = {
    "loads": "service.proven:application",
    "bare": "tests.bench.bare_in_service:application",
    "fresh": "tests.bench.bare_fresh:application",
}
# Each load departs this long after the one before it, as no fleet of one aircraft could otherwise fly them.
APART = timedelta(hours=2)
_flights = itertools.count(1)


@dataclass(frozen=True)
class Served:
    """What is served: the number of each server's process, the body and token of a submission, a session of
    the superuser, and the people of the operator.
    """

    processes: dict[str, int]
    body: str
    token: str
    admin: "psycopg.Connection[Any]"
    people: Cast


@contextmanager
def served(*names: str) -> Iterator[Served]:
    """This function will serve the named applications on one database until the block ends."""
    with _server(), databases.copied("bench") as database, ExitStack() as running:
        people, body, token = _scene()
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
        processes = {name: running.enter_context(_granian(name, APPLICATIONS[name])) for name in names}
        yield Served(processes, body, token, admin, people)


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


def address_of_database() -> str:
    """This function will return the address of the database of now, for the service role."""
    place = connections.settings["default"]
    login = f"{place['USER']}:{place['PASSWORD']}"
    return f"postgresql://{login}@:{place['PORT'] or 5432}/{place['NAME']}?host={place['HOST']}"


def _scene() -> tuple[Cast, str, str]:
    settings.PASSWORD_HASHERS = ["django.contrib.auth.hashers.MD5PasswordHasher"]
    people = cast()
    ready_aircraft(people)
    token = issue_token(
        actor(people.preparer),
        people.preparer,
        label="bench",
        scopes=["submit-load", "read"],
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
    return people, json.dumps(load_document(people, items=items)), token.secret


@contextmanager
def _granian(name: str, application: str) -> Iterator[int]:
    command = (
        sys.executable, "-m", "granian", "--interface", "wsgi", "--host", "127.0.0.1",
        "--port", str(PORTS[name]), "--workers", "2", "--blocking-threads", "4", "--no-ws",
        "--log-level", "error", application,
    )  # fmt: skip
    # One client of many: as many requests as it likes, each of them charged.
    unlimited = {"RATE_LIMIT_KNOWN": "1000000", "RATE_LIMIT_STRANGER": "1000000"}
    environment = {**os.environ, **unlimited, "DATABASE_URL": address_of_database(), "LOG_LEVEL": "ERROR"}
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


def at_its_own_time(body: str) -> str:
    """This function will return the body of a submission with a departure that no other has."""
    return body.replace(DEPARTURE, (DEPARTURE_AT + APART * next(_flights)).isoformat())


def rate(of: Served, name: str, *, seconds: float, clients: int = CLIENTS) -> float:
    """This function will return the requests a second that were answered 201, by so many clients with a kept
    connection each.
    """
    until = time.monotonic() + seconds
    counts = [0] * clients

    def ask(number: int) -> None:
        client = http.client.HTTPConnection("127.0.0.1", PORTS[name], timeout=30)
        headers = {"Content-Type": "application/json", "Authorization": f"Bearer {of.token}"}
        while time.monotonic() < until:
            key = {"Idempotency-Key": str(uuid.uuid4())}
            client.request("POST", "/api/v1/loads", at_its_own_time(of.body), headers | key)
            answer = client.getresponse()
            text = answer.read()
            if answer.status != http.client.CREATED:
                raise SystemExit(f"{name}: {answer.status} {text[:300]!r}")
            counts[number] += 1

    begun = time.monotonic()
    threads = [threading.Thread(target=ask, args=(number,)) for number in range(clients)]
    for thread in threads:
        thread.start()
    for thread in threads:
        thread.join()
    return sum(counts) / (time.monotonic() - begun)
