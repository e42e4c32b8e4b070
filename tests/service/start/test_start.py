"""`manage.py start` with real processes: what a person sees, and what is left after each way to end it.

One data folder is used throughout, as on a real machine, and each test leaves it ready for the next.
"""

import json
import os
import re
import signal
import socket
import subprocess
import sys
import time
import urllib.request
from collections.abc import Callable
from pathlib import Path

import psycopg
import pytest

from service import roles
from service.bootstrap.environment import ROOT
from service.embedded import postgres, processes

PATIENCE = 90.0


class Run:
    """One `manage.py start`, or another command, and what it says."""

    def __init__(self, data: Path, *words: str) -> None:
        self.log = data.with_name(f"said-{time.monotonic_ns()}")
        # The Python of the tests has the packages: nothing is to be made or installed here.
        variables = {
            **os.environ,
            "TAREBOOK_INSIDE": "run",
            "TAREBOOK_VENV": sys.prefix,
            "TAREBOOK_DATA": str(data),
        }
        for name in ("DATABASE_URL", "OWNER_DATABASE_URL", "BROKER_URL", "SECRET_KEY"):
            variables.pop(name, None)
        with self.log.open("wb") as out:
            self.process = subprocess.Popen(
                [sys.executable, "manage.py", *words], cwd=ROOT, env=variables, stdout=out, stderr=out
            )

    @property
    def said(self) -> str:
        return self.log.read_text(errors="replace")

    def wait(self) -> int:
        return self.process.wait(PATIENCE)

    def wait_for(self, pattern: str) -> re.Match[str]:
        limit = time.monotonic() + PATIENCE
        while not (found := re.search(pattern, self.said)):
            assert self.process.poll() is None, f"ended with {self.process.returncode}:\n{self.said}"
            assert time.monotonic() < limit, f"waited in vain for {pattern!r}:\n{self.said}"
            time.sleep(0.05)
        return found

    @property
    def address(self) -> str:
        return self.wait_for(r"Tarebook serves (http://127\.0\.0\.1:\d+) ")[1]

    def end(self, how: signal.Signals) -> int:
        self.process.send_signal(how)
        return self.wait()


@pytest.fixture(scope="module")
def data(tmp_path_factory) -> Path:
    return tmp_path_factory.mktemp("start") / "data"


@pytest.fixture
def start(data: Path):
    runs: list[Run] = []

    def begin(*words: str) -> Run:
        runs.append(Run(data, "start", "--empty", "--port", "0", *words))
        return runs[-1]

    yield begin
    for run in runs:
        if run.process.poll() is None:
            run.end(signal.SIGTERM)


def health(address: str) -> dict[str, object]:
    with urllib.request.urlopen(f"{address}/health", timeout=10) as answer:  # noqa: S310 - always http
        found: dict[str, object] = json.load(answer)
        return found


def eventually(holds: Callable[[], bool]) -> bool:
    limit = time.monotonic() + PATIENCE
    while not holds():
        if time.monotonic() > limit:
            return False
        time.sleep(0.05)
    return True


def left_of(data: Path) -> list[str]:
    """Every living process that has to do with this data folder, but the one that asks."""
    found = []
    for entry in Path("/proc").iterdir():
        if entry.name.isdigit() and int(entry.name) != os.getpid() and processes.identity_of(int(entry.name)):
            try:
                told = (entry / "cmdline").read_bytes() + (entry / "environ").read_bytes()
            except OSError:
                continue
            if os.fsencode(data) in told:
                found.append(processes.command_of(int(entry.name)))
    return found


def test_it_serves_until_ctrl_c_and_leaves_nothing_behind(start, data: Path):
    run = start()

    assert health(run.address)["status"] == "ready"
    run.wait_for(r"(?m)^web +\| ")
    run.wait_for(r"(?m)^worker +\| .*ready")
    assert run.end(signal.SIGINT) == 0
    assert run.said.splitlines()[-1].startswith("Stopped;")
    assert left_of(data) == []


def test_a_second_start_on_the_same_data_is_refused_in_one_sentence_that_names_the_first(start, data: Path):
    first = start()
    address = first.address

    second = start()

    assert second.wait() == 2
    (sentence,) = second.said.splitlines()
    assert f"is in use by `manage.py start` (process {first.process.pid}" in sentence
    assert sentence.endswith("stop that, or name another with --data.")
    assert health(address)["status"] == "ready"


def test_a_busy_port_is_refused_in_one_sentence_with_the_next_step(data: Path):
    with socket.create_server(("127.0.0.1", 0)) as other:
        port = other.getsockname()[1]

        run = Run(data, "start", "--empty", "--port", str(port))

        assert run.wait() == 2
    assert run.said.startswith(f"Tarebook: Port {port} is taken by another program; try")
    assert len(run.said.splitlines()) == 1
    assert left_of(data) == []


def test_killed_with_everything_running_it_starts_again_on_the_same_data(start, data: Path):
    first = start()
    assert health(first.address)
    cluster = postgres.find(data / "postgres")
    with psycopg.connect(cluster.url(roles.OWNER, roles.DATABASE)) as owner:
        owner.execute("CREATE SCHEMA kept CREATE TABLE answer AS SELECT 42 AS value")
    before = json.loads((data / "pids" / "web.json").read_text())["pid"]

    first.end(signal.SIGKILL)
    second = start()

    assert health(second.address)["status"] == "ready"
    assert "Ended the web process that an earlier, killed run left behind" in second.said
    assert processes.members(before) == ()
    with psycopg.connect(cluster.url(roles.OWNER, roles.DATABASE)) as owner:
        assert owner.execute("SELECT value FROM kept.answer").fetchone() == (42,)
        owner.execute("DROP SCHEMA kept CASCADE")
    assert second.end(signal.SIGTERM) == 0
    assert left_of(data) == []


def test_whatever_dies_is_started_again(start, data: Path):
    run = start()
    address = run.address

    for name in ("web", "worker", "scheduler"):
        os.kill(json.loads((data / "pids" / f"{name}.json").read_text())["pid"], signal.SIGKILL)
        run.wait_for(rf"(?m)^{name} +\| ended by itself \(signal 9\); starting it again")
    os.kill(postgres.running(data / "postgres").pid, signal.SIGKILL)
    run.wait_for(r"(?m)^database +\| ended by itself")
    os.kill(json.loads((data / "valkey" / "valkey.pid").read_text())["pid"], signal.SIGKILL)
    run.wait_for(r"(?m)^broker +\| ended by itself")

    def well() -> bool:
        try:
            return health(address)["status"] == "ready"
        except OSError:
            return False

    assert eventually(well)


def test_another_command_starts_the_database_for_its_own_length(data: Path):
    run = Run(data, "showmigrations", "records")

    assert run.wait() == 0
    assert "[X] 0001" in run.said
    assert left_of(data) == []


def test_another_command_uses_the_running_database_and_leaves_it_running(start, data: Path):
    first = start()
    address = first.address

    run = Run(data, "showmigrations", "records")

    assert run.wait() == 0
    assert "[X] 0001" in run.said
    assert health(address)["status"] == "ready"


def test_before_the_first_start_another_command_says_what_to_do(tmp_path: Path):
    run = Run(tmp_path / "none", "showmigrations", "records")

    assert run.wait() == 2
    assert "run `python3 manage.py start` first" in run.said


def test_secrets_are_readable_by_this_account_only(data: Path):
    for name in ("secret-key", "postgres.passwords"):
        assert (data / name).stat().st_mode & 0o777 == 0o600


@pytest.mark.parametrize("words", [["--port", "70000"], ["--port", "x"], ["--nonsense"]])
def test_nonsense_on_the_command_line_is_refused(words: list[str], data: Path):
    run = Run(data, "start", *words)

    assert run.wait() == 2
    assert "error:" in run.said
