"""POST /api/v1/loads (20 items, computed, audited, sealed, its answer kept) against a bare DRF insert of one
row.

    python -m tests.bench.post_loads_throughput

Both run on granian with two workers, on one database, and are asked in turns by the same clients, so that
only the ratio of the two counts. The target is at least half the bare endpoint's requests a second. Needs
`TAREBOOK_TEST_SERVER` (libpq address of a superuser of a PostgreSQL 18), or starts an embedded one.
"""

import tests.environment  # noqa: F401  # the settings are read from it

# isort: split
import http.client
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
from contextlib import contextmanager
from datetime import timedelta
from pathlib import Path

import django
import psycopg
from django.conf import settings
from django.db import connections

os.environ.setdefault("DJANGO_SETTINGS_MODULE", "service.settings")
django.setup()

from fleet.actions.issue_token import issue_token  # noqa: E402  # needs the settings above
from service import roles  # noqa: E402  # as above
from service.allowed import grantable  # noqa: E402  # as above
from service.embedded import postgres  # noqa: E402  # as above
from tests import databases  # noqa: E402  # as above
from tests.cast import actor, cast  # noqa: E402  # as above
from tests.loads.making import load_document  # noqa: E402  # as above
from tests.makers import q, ready_aircraft  # noqa: E402  # as above

CLIENTS, ROUNDS, SECONDS = 8, 5, 4.0
ROOT = Path(__file__).resolve().parent.parent.parent
PORTS = {"loads": 8713, "bare": 8714}


def main() -> int:
    """This function will print both rates, round by round, and their ratio."""
    with _server(), databases.copied("bench") as database:
        body, token = _scene()
        with psycopg.connect(databases.server(), dbname=database, autocommit=True) as admin:
            admin.execute(
                "CREATE TABLE bench_row "
                "(id bigserial PRIMARY KEY, reference varchar(80) NOT NULL, document jsonb NOT NULL)"
            )
            admin.execute(f"GRANT ALL ON bench_row, bench_row_id_seq TO {roles.SERVICE}")
        connections.close_all()
        with (
            _granian("loads", "service.wsgi:application"),
            _granian("bare", "tests.bench.bare_endpoint:application"),
        ):
            rates = {name: [] for name in PORTS}
            for name in PORTS:
                _rate(name, body, token, seconds=2.0)  # warm
            for _ in range(ROUNDS):
                for name in PORTS:
                    rates[name].append(_rate(name, body, token, seconds=SECONDS))
    ratios = [loads / bare for loads, bare in zip(rates["loads"], rates["bare"], strict=True)]
    print(f"{'round':>6} {'POST /loads':>12} {'bare insert':>12} {'ratio':>6}")
    for number, (loads, bare) in enumerate(zip(rates["loads"], rates["bare"], strict=True), 1):
        print(f"{number:>6} {loads:>10.0f}/s {bare:>10.0f}/s {loads / bare:>6.2f}")
    print(f"median ratio {statistics.median(ratios):.2f} (target: 0.50 or more)")
    return 0


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
def _granian(name: str, application: str) -> Iterator[None]:
    place = connections.settings["default"]
    login = f"{place['USER']}:{place['PASSWORD']}"
    address = f"postgresql://{login}@:{place['PORT'] or 5432}/{place['NAME']}?host={place['HOST']}"
    command = (
        sys.executable, "-m", "granian", "--interface", "wsgi", "--host", "127.0.0.1",
        "--port", str(PORTS[name]), "--workers", "2", "--blocking-threads", "4", "--no-ws",
        "--log-level", "error", application,
    )  # fmt: skip
    environment = {**os.environ, "DATABASE_URL": address, "LOG_LEVEL": "ERROR"}
    environment.pop("OWNER_DATABASE_URL", None)
    process = subprocess.Popen(command, cwd=ROOT, env=environment)
    try:
        _wait_for(PORTS[name])
        yield
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
    counts = [0] * CLIENTS

    def ask(number: int) -> None:
        client = http.client.HTTPConnection("127.0.0.1", PORTS[name], timeout=30)
        headers = {"Content-Type": "application/json", "Authorization": f"Bearer {token}"}
        while time.monotonic() < until:
            client.request("POST", "/api/v1/loads", body, headers | {"Idempotency-Key": str(uuid.uuid4())})
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
