"""The two programs of the README's guide for integrators run as they stand, and print what stands there."""

import os
import re
import socket
import subprocess
import sys
import time
from collections.abc import Iterator
from contextlib import closing
from pathlib import Path
from uuid import UUID

import pytest
from django.conf import settings
from pytest_django.live_server_helper import LiveServer

from fleet.actions.enter_person import enter_person
from fleet.actions.grant_duty import grant_duty
from loads.models import Load
from loads.tasks import file_manifest
from records.webhooks.deliver import deliver_due
from service.client import Tarebook
from tests.cast import PASSWORD, Cast, actor
from tests.journeys.twins import enter_twins, token_of

ROOT = Path(__file__).parents[2]
README = (ROOT / "README.md").read_text(encoding="utf-8")
GUIDE = README.split("\n## Writing an integration\n")[1].split("\n## ")[0]
BLOCKS = re.findall(r"```(\w*)\n(.*?)```", GUIDE, re.DOTALL)
PATIENCE_SECONDS = 60


def program_and_output(name: str) -> tuple[str, str]:
    """The Python program that has the word in it, and the block of output that follows it."""
    (place,) = [i for i, (kind, text) in enumerate(BLOCKS) if kind == "python" and name in text]
    assert BLOCKS[place + 1][0] == ""
    return BLOCKS[place][1], BLOCKS[place + 1][1]


@pytest.fixture
def server(own_database: str) -> Iterator[LiveServer]:
    running = LiveServer("127.0.0.1")
    yield running
    running.stop()


@pytest.mark.slow
@pytest.mark.django_db(transaction=True)
def test_both_programs_do_what_the_guide_says(
    people: Cast, server: LiveServer, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    enter_twins(people, "Q9-LVN")
    by = actor(people.manager)
    pilot = enter_person(by, people.operator, login="j.corvane", name="J. Corvane", password=PASSWORD)
    grant_duty(by, pilot, "pilot")
    scheduler = enter_person(by, people.operator, login="scheduling", name="Scheduling", password=PASSWORD)
    grant_duty(by, scheduler, "integration")
    scopes = re.findall(r"--scope (\S+)", BLOCKS[0][1])
    token = token_of(people, scheduler, "integration", *(scope.rstrip(");") for scope in scopes))
    (tmp_path / "load.json").write_text(re.findall(r"<<'LOAD'\n(.*?)LOAD\n", README, re.DOTALL)[0], "utf-8")
    with closing(socket.create_server(("127.0.0.1", 0))) as free:
        port = free.getsockname()[1]
    monkeypatch.setattr(settings, "WEBHOOK_TRUSTED_RECEIVERS", frozenset({f"127.0.0.1:{port}"}))
    environment = {**os.environ, "TOKEN": token, "PYTHONPATH": str(ROOT)}

    def started(program: str) -> "subprocess.Popen[str]":
        here = program.replace("http://127.0.0.1:8000", server.url).replace("9010", str(port))
        words = [sys.executable, "-c", here]
        return subprocess.Popen(
            words, cwd=tmp_path, env=environment, text=True, stdout=subprocess.PIPE, stderr=subprocess.PIPE
        )

    receiving, told = program_and_output("HTTPServer")
    integrating, printed = program_and_output("flight-4711")
    receiver = started(receiving)
    try:
        wait_for(port)
        said, complaints = started(integrating).communicate(timeout=PATIENCE_SECONDS)
        assert (said, complaints) == (printed, "")

        at_work = Tarebook(
            server.url, token_of(people, pilot, "pilot", "read", "sign", "prepare-load", "accept-load")
        )
        (line,) = at_work.loads(reference="LV-213", state="open")
        at_work.sign(at_work.sign(line, "prepared", PASSWORD), "accepted", PASSWORD)
        file_manifest(line.id)  # the worker's part, and its other part
        (subscription,) = Tarebook(server.url, token).webhooks()
        assert deliver_due(UUID(subscription.id)) == 3
        paper = tmp_path / "manifest-1.pdf"
        end = time.monotonic() + PATIENCE_SECONDS
        while not paper.exists() and time.monotonic() < end:
            time.sleep(0.05)
    finally:
        receiver.kill()
    heard, complaints = receiver.communicate()

    assert heard == told, complaints
    assert paper.read_bytes() == at_work.manifest(line).pdf
    assert Load.objects.count() == 2


def wait_for(port: int) -> None:
    end = time.monotonic() + PATIENCE_SECONDS
    while time.monotonic() < end:
        try:
            socket.create_connection(("127.0.0.1", port), timeout=1).close()
        except OSError:
            time.sleep(0.05)
        else:
            return
