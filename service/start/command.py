"""`manage.py start`: what is asked for on the command line, and the order of things."""

import argparse
import contextlib
import os
import signal
import socket
import subprocess
import sys
import threading
from collections.abc import Iterator
from dataclasses import dataclass
from pathlib import Path
from types import FrameType

from service.bootstrap.environment import ROOT
from service.bootstrap.speech import say
from service.embedded.stopped import Stopped
from service.start.child import stop_leftover
from service.start.data_folder import DataFolder, default_path
from service.start.supervisor import NAMES, Supervisor

_LAST_PORT = 65535


@dataclass(frozen=True)
class Wishes:
    """What the command line asks for."""

    port: int
    data: Path
    empty: bool
    exit_after_demo: bool


def start(words: list[str]) -> int:
    """Serve Tarebook on this machine until Ctrl-C, or until the summary with --exit-after-demo; return the
    exit code.
    """
    wishes = _read(words)
    folder = DataFolder(wishes.data)
    folder.make()
    if any(name in os.environ for name in ("DATABASE_URL", "BROKER_URL")):
        say("DATABASE_URL or BROKER_URL is set, but `start` uses its own in the data folder.")
    address = f"http://127.0.0.1:{wishes.port}"
    with folder.held("manage.py start", address), _stopping() as stop:
        for name in reversed(NAMES):
            if stop_leftover(name, folder):
                say(f"Ended the {name} process that an earlier, killed run left behind")
        port = _free_port(wishes.port)
        supervisor = Supervisor(folder, port, stop)
        try:
            supervisor.start()
            if not wishes.empty:
                _enter_demo(supervisor)
            if wishes.exit_after_demo or stop.is_set():
                return 0
            say(f"Tarebook serves {supervisor.address} (data in {folder.path}). Ctrl-C stops it.")
            return supervisor.watch()
        finally:
            supervisor.stop()


def _enter_demo(supervisor: Supervisor) -> None:
    """Run the invented day in a process of its own, which knows by its mark in the data folder what is
    already entered.
    """
    command = (
        sys.executable,
        "-m",
        "service.start.first_run",
        supervisor.address,
        str(supervisor.folder.path),
    )
    with subprocess.Popen(command, env=supervisor.environment(), cwd=ROOT, start_new_session=True) as running:
        while running.poll() is None and not supervisor.stopping.wait(0.1):
            supervisor.mend()
        if running.poll() is None:
            running.terminate()
    if running.returncode != 0 and not supervisor.stopping.is_set():
        raise Stopped(
            f"The invented operator could not be entered (see above). `{_again()} --empty` starts without it."
        )


def _again() -> str:
    return "python3 manage.py start"


def _read(words: list[str]) -> Wishes:
    parser = argparse.ArgumentParser(prog="manage.py start", description=__doc__)
    parser.add_argument("--port", type=int, default=8000, help="port on 127.0.0.1 (0: any free one)")
    parser.add_argument("--data", type=Path, default=default_path(), metavar="DIR", help="the data folder")
    parser.add_argument("--empty", action="store_true", help="enter no invented operator")
    parser.add_argument("--exit-after-demo", action="store_true", help="stop after the summary")
    parser.add_argument("--no-system-libraries", action="store_true", help="never install system packages")
    found = parser.parse_args(words)
    if not 0 <= found.port <= _LAST_PORT:
        parser.error(f"--port must be between 0 and {_LAST_PORT}")
    return Wishes(found.port, found.data.absolute(), found.empty, found.exit_after_demo)


def _free_port(wanted: int) -> int:
    with socket.socket(socket.AF_INET, socket.SOCK_STREAM) as probe:
        # A port that a closed connection still lingers on is free; one that somebody listens on is not.
        probe.setsockopt(socket.SOL_SOCKET, socket.SO_REUSEADDR, 1)
        try:
            probe.bind(("127.0.0.1", wanted))
        except PermissionError:
            raise Stopped(f"Port {wanted} is not for this account; try `{_again()} --port 8000`.") from None
        except OSError:
            other = wanted + 1 if wanted < _LAST_PORT else 8000
            raise Stopped(
                f"Port {wanted} is taken by another program; try `{_again()} --port {other}`."
            ) from None
        port: int = probe.getsockname()[1]
        return port


@contextlib.contextmanager
def _stopping() -> Iterator[threading.Event]:
    """Give an event that Ctrl-C and the stop signals set; the second Ctrl-C ends the program at once."""
    stop = threading.Event()

    def asked(number: int, frame: FrameType | None) -> None:
        del frame
        if stop.is_set() and number == signal.SIGINT:
            raise KeyboardInterrupt
        say("Stopping" if not stop.is_set() else "Still stopping")
        stop.set()

    before = {
        number: signal.signal(number, asked) for number in (signal.SIGINT, signal.SIGTERM, signal.SIGHUP)
    }
    try:
        yield stop
    finally:
        for number, handler in before.items():
            signal.signal(number, handler)
