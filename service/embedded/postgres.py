"""The embedded PostgreSQL 18: one cluster in one folder, reached over a socket only.

The programs come from a package that is never imported (its own Python layer opens homes and makes users);
`TAREBOOK_POSTGRES_BIN` may name the `bin` folder of another PostgreSQL 18.
"""

import os
import shutil
import signal
import subprocess
import time
from collections.abc import Callable
from dataclasses import dataclass, field
from pathlib import Path
from urllib.parse import quote

from service.embedded import postgres_binaries, processes
from service.embedded.passwords import passwords_of, write_private
from service.embedded.sockets import socket_folder
from service.embedded.stopped import Stopped
from service.embedded.unprivileged import Account, account, hand_over, reachable, state_folder

_PORT = 5432  # part of the socket's name; no TCP port is opened
_QUICK = ("fsync=off", "synchronous_commit=off", "full_page_writes=off")
_LEFTOVERS = ("pre-existing shared memory block", "lock file")
_PATIENCE = 60.0
_STATUS_LINE = 7  # of postmaster.pid, counted from 0: "ready" once recovery is over and connections are taken


@dataclass(frozen=True)
class Cluster:
    """A running cluster: its data folder and the folder its socket stands in."""

    data: Path
    socket_dir: Path
    passwords: dict[str, str] = field(default_factory=dict, repr=False)

    def url(self, role: str, database: str) -> str:
        """Return a libpq address over the socket, with the generated password of the three roles we make."""
        password = f":{quote(self.passwords[role], safe='')}" if role in self.passwords else ""
        where = f"host={quote(str(self.socket_dir), safe='')}&port={_PORT}"
        return f"postgresql://{quote(role, safe='')}{password}@/{quote(database, safe='')}?{where}"


def start(
    data: Path, *, durable: bool = True, log: Path | None = None, say: Callable[[str], None] = print
) -> Cluster:
    """Start the cluster in this folder, made if need be, or adopt the one that already runs there.

    `durable=False` gives up safety against a crash for speed, for tests only. The server's log goes to `log`,
    by default beside the data. Raises `Stopped` when it cannot start.
    """
    wanted, to = data.absolute(), account()
    wanted.parent.mkdir(parents=True, exist_ok=True)
    place, programs = _place(wanted, to)
    cluster = Cluster(place, socket_folder(place.parent / "run", to), passwords_of(wanted))
    if running(place) is None:
        if not (place / "PG_VERSION").exists():
            _make(place, programs, to, cluster.passwords["postgres"], say)
        written = log or wanted.with_name(f"{wanted.name}.log")
        _start(cluster, written, programs, to, durable=durable, say=say)
    return cluster


def stop(cluster: Cluster) -> None:
    """Stop the cluster: open transactions are rolled back, nothing committed is lost."""
    one = running(cluster.data)
    if one is None:
        return
    for how, seconds in ((signal.SIGINT, 60.0), (signal.SIGQUIT, 20.0)):
        processes.send(one, how)
        if processes.wait_until_gone(one, seconds):
            return
    raise Stopped(f"PostgreSQL (process {one.pid}) does not end; its log is beside {cluster.data}.")


def running(data: Path) -> processes.Identity | None:
    """Return the server process that holds this data folder, None when there is none or the number is a
    stranger's.
    """
    lines = _postmaster_lines(data)
    if not lines or not lines[0].strip().isdigit():
        return None
    one = processes.identity_of(int(lines[0]))
    return one if one and str(data) in processes.command_of(one.pid) else None


def find(data: Path) -> Cluster | None:
    """Return the cluster of this folder if it runs, without starting anything."""
    wanted, to = data.absolute(), account()
    if not wanted.with_name(f"{wanted.name}.passwords").exists():
        return None
    place, _ = _place(wanted, to)
    return (
        Cluster(place, socket_folder(place.parent / "run", to), passwords_of(wanted))
        if running(place)
        else None
    )


def _place(wanted: Path, to: Account) -> tuple[Path, Path]:
    """Where data and programs really stand: here, or under the system's state when the server cannot get
    here.
    """
    programs = postgres_binaries.folder()
    stand_in = state_folder(str(wanted))
    moved = stand_in / wanted.name
    if (
        not (moved / "PG_VERSION").exists()
        and reachable(wanted.parent, to)
        and reachable(programs / "postgres", to)
    ):
        return wanted, programs
    if (wanted / "PG_VERSION").exists():
        raise Stopped(
            f"The account nobody cannot reach the data in {wanted}; open the folders above it to passing."
        )
    stand_in.mkdir(parents=True, exist_ok=True, mode=0o755)
    return moved, postgres_binaries.copied(programs, stand_in)


def _make(place: Path, programs: Path, to: Account, password: str, say: Callable[[str], None]) -> None:
    say(f"Making a PostgreSQL cluster in {place}")
    half = place.with_name(f"{place.name}.making")
    shutil.rmtree(half, ignore_errors=True)  # what a killed run left half-made
    hand_over(half, to)
    secret = half.with_name(f"{half.name}.password")
    write_private(secret, password)
    if to.uid is not None:
        os.chown(secret, to.uid, -1)
    words = ("--locale=C", "--locale-provider=builtin", "--builtin-locale=C.UTF-8", "--encoding=UTF8")
    login = ("--username=postgres", "--auth=scram-sha-256", f"--pwfile={secret}")
    try:
        made = subprocess.run(
            (*to.prefix, str(programs / "initdb"), f"--pgdata={half}", *words, *login),
            capture_output=True, text=True, check=False, cwd="/", env=_environment(),
        )  # fmt: skip
    finally:
        secret.unlink(missing_ok=True)
    if made.returncode != 0:
        raise Stopped(f"PostgreSQL could not make its data folder {place}:\n{made.stdout}{made.stderr}")
    half.rename(place)


def _start(
    cluster: Cluster, log: Path, programs: Path, to: Account, *, durable: bool, say: Callable[[str], None]
) -> None:
    limit, told = time.monotonic() + _PATIENCE, False
    while True:
        failure = _try(cluster, log, programs, to, durable=durable)
        if failure is None:
            return
        if not any(word in failure for word in _LEFTOVERS) or time.monotonic() > limit:
            raise Stopped(f"PostgreSQL does not start on {cluster.data}; its log ends:\n{failure}")
        if not told:
            say("PostgreSQL was killed and some of its processes are still ending; waiting up to a minute")
            told = True
        time.sleep(0.5)
        # One of our own that had not quite ended when it was looked for is reaped by being looked for again:
        # as long as it is not, its number counts as taken, and the server refuses to start beside it.
        running(cluster.data)


def _try(cluster: Cluster, log: Path, programs: Path, to: Account, *, durable: bool) -> str | None:
    """Start the server once; return None when it is ready, else what it wrote to its log."""
    given = [
        "listen_addresses=",
        f"unix_socket_directories={cluster.socket_dir}",
        "timezone=UTC",
        "log_timezone=UTC",
    ]
    given += [
        "max_connections=200",
        "unix_socket_permissions=0700",
        "log_checkpoints=off",
        # A failed statement and the row it failed on hold names and stored passwords: no log is given them.
        "log_min_error_statement=panic",
        "log_error_verbosity=terse",
        *(() if durable else _QUICK),
    ]
    options = [word for setting in given for word in ("-c", setting)]
    with log.open("ab") as out:
        before = out.tell()
        child = subprocess.Popen(
            (*to.prefix, str(programs / "postgres"), "-D", str(cluster.data), "-p", str(_PORT), *options),
            stdin=subprocess.DEVNULL, stdout=out, stderr=out, cwd="/", env=_environment(),
            # Ctrl-C at the terminal is for the supervisor, who stops the database last.
            start_new_session=True,
        )  # fmt: skip
    processes.remember(child)
    limit = time.monotonic() + _PATIENCE
    while child.poll() is None and time.monotonic() < limit:
        lines = _postmaster_lines(cluster.data)
        if lines[:1] == [str(child.pid)] and [line.strip() for line in lines[_STATUS_LINE:]] == ["ready"]:
            return None
        time.sleep(0.01)
    if child.poll() is None:
        return f"(not ready after {_PATIENCE:.0f} s; process {child.pid} still runs)"
    with log.open("rb") as written:
        written.seek(before)
        return written.read()[-2000:].decode(errors="replace")


def _postmaster_lines(data: Path) -> list[str]:
    try:
        return (data / "postmaster.pid").read_text().splitlines()
    except OSError:
        return []


def _environment() -> dict[str, str]:
    return {"PATH": os.environ.get("PATH", "/usr/bin:/bin"), "LC_ALL": "C", "TZ": "UTC"}
