"""The folder a running Tarebook keeps everything in: database, queue, logs, secrets, and who uses it now."""

import contextlib
import fcntl
import json
import os
import secrets
from collections.abc import Iterator
from dataclasses import dataclass
from pathlib import Path

from service.bootstrap.environment import ROOT, clean_environment
from service.embedded.passwords import write_private
from service.embedded.postgres import Cluster
from service.embedded.stopped import Stopped
from service.roles import DATABASE, OWNER, SERVICE


@dataclass(frozen=True)
class DataFolder:
    """One data folder; every path in it is asked of this class."""

    path: Path

    @property
    def postgres(self) -> Path:
        """The data of the embedded cluster."""
        return self.path / "postgres"

    @property
    def valkey(self) -> Path:
        """The folder of the embedded broker."""
        return self.path / "valkey"

    @property
    def figures(self) -> Path:
        """The folder where the processes count together what a monitor is told."""
        return self.path / "figures"

    def log(self, name: str) -> Path:
        """Return where a process of this name writes what it says."""
        return self.path / "log" / f"{name}.log"

    def pid_file(self, name: str) -> Path:
        """Return where the identity of a process of this name is noted."""
        return self.path / "pids" / f"{name}.json"

    def make(self) -> None:
        """Make the folder and its own folders, private to this account."""
        # As root the database runs as nobody, who must pass this folder (not list it) to its own folder in
        # it.
        private = 0o711 if os.geteuid() == 0 else 0o700
        try:
            self.path.mkdir(parents=True, exist_ok=True)
            self.path.chmod(private)
            for name in ("log", "pids"):
                (self.path / name).mkdir(exist_ok=True, mode=0o700)
        except OSError as problem:
            raise Stopped(
                f"{self.path} cannot be used as data folder ({problem.strerror}); name another with --data."
            ) from problem

    @contextlib.contextmanager
    def held(self, purpose: str, address: str = "") -> Iterator[None]:
        """Hold the folder against a second user until the block ends. Raises `Stopped`, naming the one who
        holds it.
        """
        note = self.path / "in-use.json"
        handle = os.open(self.path / "in-use.lock", os.O_RDWR | os.O_CREAT, 0o600)
        try:
            try:
                fcntl.flock(handle, fcntl.LOCK_EX | fcntl.LOCK_NB)
            except BlockingIOError:
                raise Stopped(
                    f"{self.path} is in use by {_who(note)}; stop that, or name another with --data."
                ) from None
            write_private(note, json.dumps({"pid": os.getpid(), "purpose": purpose, "address": address}))
            yield
        finally:
            os.close(handle)

    def secret_key(self) -> str:
        """Return the key that signs sessions, made at the first call."""
        path = self.path / "secret-key"
        if not path.exists():
            write_private(path, secrets.token_urlsafe(48))
        return path.read_text().strip()

    def environment(self, cluster: Cluster, broker_url: str, *, owner: bool = False) -> dict[str, str]:
        """Return the environment of a process of ours; only what migrates is given the owner's address."""
        kept = {name: value for name, value in clean_environment().items() if not name.startswith("GRANIAN_")}
        kept.pop("OWNER_DATABASE_URL", None)
        ours = {
            "DJANGO_SETTINGS_MODULE": "service.settings",
            "DATABASE_URL": cluster.url(SERVICE, DATABASE),
            "BROKER_URL": broker_url,
            "SECRET_KEY": self.secret_key(),
            "HTTPS": "false",
            "TAREBOOK_DATA": str(self.path),
            "PROMETHEUS_MULTIPROC_DIR": str(self.figures),
            "PYTHONUNBUFFERED": "1",
        }
        self.figures.mkdir(exist_ok=True, mode=0o700)
        if owner:
            ours["OWNER_DATABASE_URL"] = cluster.url(OWNER, DATABASE)
        return {**kept, **ours}


def default_path() -> Path:
    """Return the data folder when none is named: TAREBOOK_DATA, else `.tarebook` beside `manage.py`."""
    return Path(os.environ.get("TAREBOOK_DATA") or ROOT / ".tarebook").absolute()


def _who(note: Path) -> str:
    try:
        told = json.loads(note.read_text())
        at = f", {told['address']}" if told["address"] else ""
        return f"`{told['purpose']}` (process {told['pid']}{at})"
    except (OSError, ValueError, KeyError, TypeError):
        return "another process"
