"""Processes of ours: who they are, whether they live, and how they end.

A process number alone proves nothing, because numbers are given out again. An `Identity` therefore carries
the moment the process was started, as the kernel tells it; only a process with the same number and the same
moment is the same process.
"""

import contextlib
import functools
import json
import os
import signal
import subprocess
import time
from dataclasses import asdict, dataclass
from pathlib import Path

from service.embedded.stopped import Stopped

_PROC = Path("/proc/self/stat")
# Child processes stay referenced until they are reaped: a forgotten Popen warns when it is collected.
_children: dict[int, "subprocess.Popen[bytes]"] = {}


@dataclass(frozen=True)
class Identity:
    """One process: its number and the moment it was started (an opaque text, compared only for equality)."""

    pid: int
    started: str


def remember(child: "subprocess.Popen[bytes]") -> None:
    """Keep a child that outlives its starter's interest in it, so that it can be reaped when it ends."""
    _children[child.pid] = child


def identity_of(pid: int) -> Identity | None:
    """Return the identity of a living process; None when there is none, or only a dead one nobody reaped."""
    found = _look(pid)
    if found is None:
        _reap(pid)  # ours, or it would stay a zombie, and its Popen would warn of it when it is collected
    return found


def is_alive(identity: Identity) -> bool:
    """Return whether this very process still runs."""
    return identity_of(identity.pid) == identity


def command_of(pid: int) -> str:
    """Return the command line of a process as one text, empty when it cannot be read."""
    if _PROC.exists():
        try:
            return (
                Path(f"/proc/{pid}/cmdline")
                .read_bytes()
                .replace(b"\0", b" ")
                .decode(errors="replace")
                .strip()
            )
        except OSError:
            return ""
    return _ps("command=", pid).stdout.strip()


def write_pid_file(path: Path, identity: Identity) -> None:
    """Write the identity of a started process where the next start will look for leftovers."""
    fresh = path.with_name(path.name + ".new")
    fresh.write_text(json.dumps(asdict(identity)))
    fresh.replace(path)


def noted_in(path: Path) -> Identity | None:
    """Return the process a pid file names, running or not; None when there is no such file or it cannot be
    read.
    """
    try:
        noted = json.loads(path.read_text())
        return Identity(int(noted["pid"]), str(noted["started"]))
    except (OSError, ValueError, KeyError, TypeError):
        return None


def read_pid_file(path: Path) -> Identity | None:
    """Return the process a pid file names if it still runs, else None; an unreadable file counts as none."""
    identity = noted_in(path)
    return identity if identity and is_alive(identity) else None


def members(group: int) -> tuple[Identity, ...]:
    """Return the living processes of a process group (Linux; elsewhere only its leader)."""
    if not _PROC.exists():
        leader = identity_of(group)
        return (leader,) if leader else ()
    found = []
    for entry in Path("/proc").iterdir():
        if not entry.name.isdigit():
            continue
        with contextlib.suppress(OSError):
            if os.getpgid(int(entry.name)) == group and (one := identity_of(int(entry.name))):
                found.append(one)
    return tuple(found)


def send(identity: Identity, number: signal.Signals) -> None:
    """Send a signal to this very process; do nothing when it is gone."""
    if is_alive(identity):
        with contextlib.suppress(ProcessLookupError):
            os.kill(identity.pid, number)


def wait_until_gone(identity: Identity, seconds: float) -> bool:
    """Wait for a process to end; return whether it did within so many seconds."""
    limit = time.monotonic() + seconds
    while is_alive(identity):
        if time.monotonic() > limit:
            return False
        time.sleep(0.02)
    return True


def _look(pid: int) -> Identity | None:
    if _PROC.exists():
        try:
            fields = Path(f"/proc/{pid}/stat").read_text(errors="replace").rpartition(")")[2].split()
        except OSError:
            return None
        # Fields 3 (state) and 22 (start time in clock ticks after boot) of proc(5).
        return None if fields[0] in "ZX" else Identity(pid, f"{_boot()}/{fields[19]}")
    state, _, started = _ps("stat=,lstart=", pid).stdout.strip().partition(" ")
    return Identity(pid, started.strip()) if started and not state.startswith("Z") else None


def _reap(pid: int) -> None:
    child = _children.get(pid)
    if child is not None and child.poll() is not None:
        del _children[pid]


def _ps(columns: str, pid: int) -> "subprocess.CompletedProcess[str]":
    try:
        return subprocess.run(
            ["ps", "-o", columns, "-p", str(pid)], capture_output=True, text=True, check=False
        )
    except FileNotFoundError:
        raise Stopped(
            "Neither /proc nor the program ps is here to tell processes apart; mount /proc."
        ) from None


@functools.cache
def _boot() -> str:
    """Process numbers and start moments begin again at each boot; this tells boots apart."""
    try:
        return Path("/proc/sys/kernel/random/boot_id").read_text().strip()
    except OSError:
        return ""
