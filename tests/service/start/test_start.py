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


class OneRun:
    """The one run on a data folder, started when there is none: a start takes seconds."""

    def __init__(self, data: Path) -> None:
        self.data, self.run = data, None

    def running(self) -> Run:
        if self.run is None or self.run.process.poll() is not None:
            self.run = Run(self.data, "start", "--empty", "--port", "0")
        return self.run

    def ended(self) -> None:
        if self.run is None:
            assert self.running().address
        if self.run.process.poll() is None:
            self.run.end(signal.SIGTERM)


@pytest.fixture(scope="module")
def one(data: Path):
    found = OneRun(data)
    yield found
    if found.run is not None:
        found.ended()


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


def test_it_serves_and_shows_what_each_process_says_under_its_name(one, data: Path):
    run = one.running()

    assert health(run.address)["status"] == "ready"
    for name in ("web", "worker", "scheduler", "database"):
        run.wait_for(rf"(?m)^{name} +\| ")
    for name in ("secret-key", "postgres.passwords"):
        assert (data / name).stat().st_mode & 0o777 == 0o600


def test_a_second_start_on_the_same_data_is_refused_in_one_sentence_that_names_the_first(one, data: Path):
    first = one.running()
    address = first.address

    second = Run(data, "start", "--empty", "--port", "0")

    assert second.wait() == 2
    (sentence,) = second.said.splitlines()
    assert f"is in use by `manage.py start` (process {first.process.pid}" in sentence
    assert sentence.endswith("stop that, or name another with --data.")
    assert health(address)["status"] == "ready"


def test_another_command_uses_the_running_database_and_leaves_it_running(one, data: Path):
    address = one.running().address

    command = Run(data, "showmigrations", "records")

    assert command.wait() == 0
    assert "[X] 0001" in command.said
    assert health(address)["status"] == "ready"


def test_whatever_dies_is_started_again(one, data: Path):
    run = one.running()
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


def test_killed_with_everything_running_it_starts_again_on_the_same_data_and_ends_with_ctrl_c(
    one, data: Path
):
    first = one.running()
    assert health(first.address)
    cluster = postgres.find(data / "postgres")
    with psycopg.connect(cluster.url(roles.OWNER, roles.DATABASE)) as owner:
        owner.execute("CREATE SCHEMA kept")
        owner.execute("CREATE TABLE kept.answer AS SELECT 42 AS value")
    web = json.loads((data / "pids" / "web.json").read_text())["pid"]

    first.end(signal.SIGKILL)
    second = one.running()

    assert health(second.address)["status"] == "ready"
    assert "Ended the web process that an earlier, killed run left behind" in second.said
    assert processes.members(web) == ()
    with psycopg.connect(cluster.url(roles.OWNER, roles.DATABASE)) as owner:
        assert owner.execute("SELECT value FROM kept.answer").fetchone() == (42,)
    assert second.end(signal.SIGINT) == 0
    assert second.said.splitlines()[-1].startswith("Stopped;")
    assert left_of(data) == []


def test_another_command_starts_the_database_for_its_own_length(one, data: Path):
    one.ended()

    command = Run(data, "showmigrations", "records")

    assert command.wait() == 0
    assert "[X] 0001" in command.said
    assert left_of(data) == []


def test_before_the_first_start_another_command_says_what_to_do(tmp_path: Path):
    run = Run(tmp_path / "none", "showmigrations", "records")

    assert run.wait() == 2
    assert "run `python3 manage.py start` first" in run.said


def test_a_busy_port_is_refused_in_one_sentence_with_the_next_step(tmp_path: Path):
    with socket.create_server(("127.0.0.1", 0)) as other:
        port = other.getsockname()[1]

        run = Run(tmp_path / "data", "start", "--empty", "--port", str(port))

        assert run.wait() == 2
    assert run.said.startswith(f"Tarebook: Port {port} is taken by another program; try")
    assert len(run.said.splitlines()) == 1
    assert left_of(tmp_path / "data") == []


@pytest.mark.parametrize("words", [["--port", "70000"], ["--port", "x"], ["--nonsense"]])
def test_nonsense_on_the_command_line_is_refused(words: list[str], tmp_path: Path):
    run = Run(tmp_path / "data", "start", *words)

    assert run.wait() == 2
    assert "error:" in run.said
