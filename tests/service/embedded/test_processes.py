"""A process number is given out again; only the number with the moment of the start is a process."""

import json
import os
import signal
import subprocess
from pathlib import Path

import pytest

from service.embedded import processes


@pytest.fixture
def sleeper():
    child = subprocess.Popen(["sleep", "60"], start_new_session=True)
    processes.remember(child)
    yield child
    child.kill()
    child.wait()


def test_a_living_process_is_known_again_by_its_pid_file(sleeper, tmp_path: Path):
    one = processes.identity_of(sleeper.pid)

    processes.write_pid_file(tmp_path / "one.json", one)

    assert processes.read_pid_file(tmp_path / "one.json") == one
    assert "sleep 60" in processes.command_of(sleeper.pid)


def test_a_stranger_with_a_number_of_ours_is_neither_known_nor_signalled(sleeper, tmp_path: Path):
    ours = processes.Identity(sleeper.pid, "another moment")
    processes.write_pid_file(tmp_path / "one.json", ours)

    processes.send(ours, signal.SIGKILL)

    assert processes.read_pid_file(tmp_path / "one.json") is None
    assert sleeper.poll() is None


@pytest.mark.parametrize("text", ["", "{", "[]", '{"pid": "x", "started": "y"}', "null"])
def test_an_unreadable_pid_file_names_nobody(text: str, tmp_path: Path):
    (tmp_path / "one.json").write_text(text)

    assert processes.read_pid_file(tmp_path / "one.json") is None


def test_a_missing_pid_file_names_nobody(tmp_path: Path):
    assert processes.read_pid_file(tmp_path / "one.json") is None


def test_a_child_that_died_counts_as_gone_before_anyone_waited_for_it(sleeper):
    one = processes.identity_of(sleeper.pid)

    os.kill(sleeper.pid, signal.SIGKILL)

    assert processes.wait_until_gone(one, 5)


def test_waiting_gives_up_on_a_process_that_stays(sleeper):
    one = processes.identity_of(sleeper.pid)

    assert not processes.wait_until_gone(one, 0.1)


def test_the_members_of_a_group_are_found_when_its_leader_is_dead():
    leader = subprocess.Popen(
        ["sh", "-c", "sleep 60 >&- & echo $!; kill -9 $$"],
        stdout=subprocess.PIPE,
        text=True,
        start_new_session=True,
    )
    member = int(leader.communicate()[0])

    found = processes.members(leader.pid)

    assert [one.pid for one in found] == [member]
    processes.send(found[0], signal.SIGKILL)


def test_a_pid_file_holds_number_and_moment(sleeper, tmp_path: Path):
    processes.write_pid_file(tmp_path / "one.json", processes.identity_of(sleeper.pid))

    assert sorted(json.loads((tmp_path / "one.json").read_text())) == ["pid", "started"]
