"""What the system lacks is said in one sentence, and installed only where and when we may."""

import os
import subprocess

import pytest

from service.bootstrap import system
from service.embedded.stopped import Stopped


@pytest.fixture
def machine(monkeypatch):
    """A machine to set up at will: what it lacks, who we are, and what was run on it."""

    class Machine:
        def __init__(self):
            self.lacks = [*system.LIBRARIES, system.VENV]
            self.installs = True
            self.ran: list[tuple[str, ...]] = []

        def run(self, command, **_):
            self.ran.append(tuple(command))
            if self.installs and "install" in command:
                self.lacks = [piece for piece in self.lacks if piece.package not in command]
            return subprocess.CompletedProcess(command, 0 if self.installs else 100)

    one = Machine()
    monkeypatch.setattr(system, "missing", lambda **_: tuple(one.lacks))
    monkeypatch.setattr(system, "_is_debian", lambda: True)
    monkeypatch.setattr(system.subprocess, "run", one.run)
    monkeypatch.setattr(os, "geteuid", lambda: 0)
    return one


def test_nothing_is_run_on_a_machine_that_lacks_nothing(machine):
    machine.lacks = []

    system.make_ready(tests=False, may_install=True)

    assert machine.ran == []


def test_root_on_debian_is_told_what_is_installed_before_it_is(machine, capsys):
    system.make_ready(tests=False, may_install=True)

    said = capsys.readouterr().out
    assert machine.lacks == []
    assert "lacks libpango-1.0-0, which lays out the text of the PDF" in said
    assert (
        said.index("lacks python3-venv")
        < said.index("Installing with apt-get")
        < said.index("apt-get install")
    )


def test_root_can_refuse(machine):
    with pytest.raises(Stopped, match=r"libpango-1\.0-0 .*python3-venv"):
        system.make_ready(tests=False, may_install=False)

    assert machine.ran == []


def test_anyone_else_gets_the_line_with_sudo_and_nothing_is_changed(machine, monkeypatch):
    monkeypatch.setattr(os, "geteuid", lambda: 1000)

    with pytest.raises(Stopped) as stopped:
        system.make_ready(tests=False, may_install=True)

    line = str(stopped.value).splitlines()[-1]
    assert line.strip() == (
        "sudo apt-get install --no-install-recommends -y "
        "libpango-1.0-0 libpangoft2-1.0-0 libharfbuzz-subset0 python3-venv"
    )
    assert machine.ran == []


def test_an_installation_that_fails_ends_in_the_same_sentence(machine):
    machine.installs = False

    with pytest.raises(Stopped, match="Run this line, then the same command again"):
        system.make_ready(tests=False, may_install=True)


def test_without_an_optional_piece_it_goes_on_and_says_so(machine, monkeypatch, capsys):
    monkeypatch.setattr(os, "geteuid", lambda: 1000)
    machine.lacks = [system.LIBRARIES[2]]

    system.make_ready(tests=False, may_install=True)

    assert "Going on without libharfbuzz-subset0" in capsys.readouterr().out


def test_a_release_without_an_optional_piece_still_gets_the_others(machine):
    system.make_ready(tests=False, may_install=True)

    installs = [command for command in machine.ran if "install" in command]
    assert ["libharfbuzz-subset0" in command for command in installs] == [False, True]


def test_this_machine_is_seen_as_it_is():
    lacking = {piece.package for piece in system.missing(tests=False)}

    assert "libpango-1.0-0" not in lacking  # or no paper could be made in these tests


def test_a_library_that_is_not_there_is_missed():
    assert not system._loads("libthat-is-not-there.so.0")
