"""Leftovers of a killed run: our own are ended with all they started, a stranger is never touched."""

import os
import subprocess
import time
from pathlib import Path

import pytest

from service.embedded import processes
from service.start.child import Child, stop_leftover
from service.start.data_folder import DataFolder


@pytest.fixture
def folder(tmp_path: Path) -> DataFolder:
    one = DataFolder(tmp_path / "data")
    one.make()
    return one


def test_one_that_will_not_end_is_ended_by_force_with_all_it_started(folder: DataFolder):
    stubborn = ("sh", "-c", "trap '' TERM; sleep 60 & sleep 60 & wait; wait")
    child = Child("web", stubborn, os.environ, patience=0.3)
    child.start(folder)
    pid = processes.noted_in(folder.pid_file("web")).pid
    while len(processes.members(pid)) < 3:
        time.sleep(0.01)

    child.stop(folder)

    assert processes.members(pid) == ()
    assert not folder.pid_file("web").exists()


def test_leftovers_are_ended_even_when_their_leader_is_dead(folder: DataFolder):
    variables = {**os.environ, "TAREBOOK_DATA": str(folder.path)}
    leader = subprocess.Popen(["sh", "-c", "sleep 60 & wait"], env=variables, start_new_session=True)
    processes.write_pid_file(folder.pid_file("web"), processes.identity_of(leader.pid))
    while len(processes.members(leader.pid)) < 2:
        time.sleep(0.01)
    leader.kill()
    leader.wait()

    assert stop_leftover("web", folder)

    assert processes.members(leader.pid) == ()


def test_a_stranger_that_has_the_number_now_is_not_touched(folder: DataFolder):
    with subprocess.Popen(["sleep", "60"], start_new_session=True) as stranger:
        processes.write_pid_file(folder.pid_file("web"), processes.Identity(stranger.pid, "long ago"))

        assert not stop_leftover("web", folder)

        assert stranger.poll() is None
        stranger.kill()
    assert not folder.pid_file("web").exists()


def test_without_a_pid_file_there_is_nothing_to_end(folder: DataFolder):
    assert not stop_leftover("web", folder)
