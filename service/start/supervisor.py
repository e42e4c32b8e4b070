"""The six processes of a local Tarebook, from the first to the last: database, queue, web, worker, scheduler,
and this one.
"""

import os
import shutil
import subprocess
import sys
import threading
import time
import urllib.error
import urllib.request

from service import roles
from service.bootstrap.environment import ROOT
from service.bootstrap.speech import say
from service.embedded import postgres, processes, valkey
from service.embedded.stopped import Stopped
from service.start.child import Child
from service.start.data_folder import DataFolder
from service.start.log_follower import LogFollower

NAMES = ("web", "worker", "scheduler")
_TRIES, _WINDOW = 5, 60.0
_PATIENCE = 90.0


class Supervisor:
    """Start everything on one data folder, keep it running, and end it in order."""

    def __init__(self, folder: DataFolder, port: int, stopping: threading.Event) -> None:
        self.folder, self.port, self.stopping = folder, port, stopping
        self.address = f"http://127.0.0.1:{port}"
        self._logs = LogFollower()
        self._cluster: postgres.Cluster | None = None
        self._broker: valkey.Broker | None = None
        self._children: list[Child] = []

    def start(self) -> None:
        """Start all, up to a web server that says it is well. Raises `Stopped` when something does not come
        up.
        """
        self._logs.start()
        # What is counted is counted from this start on; each process has its own file there.
        shutil.rmtree(self.folder.figures, ignore_errors=True)
        self._logs.follow("database", self.folder.log("postgres"))
        self._cluster = postgres.start(self.folder.postgres, log=self.folder.log("postgres"), say=say)
        self._broker = valkey.start(self.folder.valkey, log=self.folder.log("valkey"))
        self._logs.follow("broker", self.folder.log("valkey"))
        passwords = self._cluster.passwords
        roles.make(
            self._cluster.url("postgres", "postgres"),
            passwords=roles.Passwords(passwords[roles.OWNER], passwords[roles.SERVICE]),
        )
        say("Database and queue are up; bringing the tables up to date")
        self._migrate()
        self._children = [Child(name, _command(name, self), self.environment()) for name in NAMES]
        for child in self._children:
            if self.stopping.is_set():
                return
            self._logs.follow(child.name, self.folder.log(child.name))
            child.start(self.folder)
        self._wait_until_well()

    def environment(self, *, owner: bool = False) -> dict[str, str]:
        """Return the environment of a process on this database and queue."""
        if self._cluster is None or self._broker is None:
            raise Stopped("Database and queue are not started.")
        return self.folder.environment(self._cluster, self._broker.url, owner=owner)

    def watch(self) -> int:
        """Keep all running until asked to stop; return the exit code. Raises `Stopped` when a process cannot
        be kept up.
        """
        while not self.stopping.wait(0.25):
            self.mend()
        return 0

    def mend(self) -> None:
        """Start again whatever has ended by itself. Raises `Stopped` when it has ended too often."""
        if self._cluster and postgres.running(self._cluster.data) is None:
            say("database  | ended by itself; starting it again")
            postgres.start(self.folder.postgres, log=self.folder.log("postgres"), say=say)
        if self._broker and not processes.is_alive(self._broker.process):
            say("broker    | ended by itself; starting it again")
            self._broker = valkey.start(self.folder.valkey, log=self.folder.log("valkey"))
        for child in self._children:
            code = child.ended()
            if code is None:
                continue
            self._logs.show_new()
            now = time.monotonic()
            child.deaths = [moment for moment in child.deaths if now - moment < _WINDOW] + [now]
            if len(child.deaths) > _TRIES:
                raise Stopped(
                    f"{child.name} ended {len(child.deaths)} times in a minute (last with {_told(code)}); "
                    f"what it said is in {self.folder.log(child.name)}."
                )
            say(f"{child.name:<9} | ended by itself ({_told(code)}); starting it again")
            child.stop(self.folder, at_once=True)
            child.start(self.folder)

    def stop(self) -> None:
        """End all in order: no new work is planned, no request taken, work in hand finished; then queue and
        database.
        """
        self._logs.stop()  # what follows is expected, and stands in the log files
        for child in reversed(self._children):
            child.ask_to_end()  # all at once, so that the waits overlap
        for child in reversed(self._children):
            child.stop(self.folder)
        if self._broker:
            valkey.stop(self._broker)
        if self._cluster:
            postgres.stop(self._cluster)
        say(f"Stopped; the logs are in {self.folder.path / 'log'}.")

    def _migrate(self) -> None:
        command = (
            sys.executable,
            "manage.py",
            "migrate",
            "--no-input",
            "--database",
            "owner",
            "--verbosity",
            "0",
        )
        done = subprocess.run(
            command, env=self.environment(owner=True), cwd=ROOT, check=False, start_new_session=True
        )
        if done.returncode != 0 and not self.stopping.is_set():
            raise Stopped("The tables could not be brought up to date (see above).")

    def _wait_until_well(self) -> None:
        limit, last = time.monotonic() + _PATIENCE, "no answer"
        while not self.stopping.wait(0.1):
            self.mend()
            try:
                # Any answer but a 2xx is raised as an HTTPError below.
                with urllib.request.urlopen(f"{self.address}/health", timeout=5):  # noqa: S310 - always http
                    return
            except urllib.error.HTTPError as answer:
                last = f"{answer.code} {answer.read(500).decode(errors='replace')}"
            except OSError as problem:
                last = str(problem)
            if time.monotonic() > limit:
                raise Stopped(
                    f"The web server is not well after {_PATIENCE:.0f} s ({last}); its log is above."
                )


def _command(name: str, supervisor: Supervisor) -> tuple[str, ...]:
    here = sys.executable
    # As root celery warns of pickled messages; ours are JSON (CELERY_ACCEPT_CONTENT).
    quiet = ("-W", "ignore:You're running the worker with superuser")
    celery = (here, *quiet, "-m", "celery", "--quiet", "-A", "service.worker")
    if name == "web":
        return (
            here, "-m", "granian", "--interface", "wsgi", "--host", "127.0.0.1",
            "--port", str(supervisor.port), "--workers", "2", "--blocking-threads", "4", "--no-ws",
            "--respawn-failed-workers", "--workers-kill-timeout", "10s", "service.proven:application",
        )  # fmt: skip
    if name == "worker":
        hands = ("--concurrency", str(min(2, os.cpu_count() or 1)))
        if sys.platform == "linux" and not os.access("/dev/shm", os.W_OK):  # noqa: S108 - only looked at
            say("worker    | /dev/shm cannot be written here, so one worker process does without children")
            hands = ("--pool", "solo")
        return (*celery, "worker", *hands, "--without-gossip", "--without-mingle", "--loglevel", "INFO")
    schedule = supervisor.folder.path / "scheduler"
    return (*celery, "beat", "--schedule", str(schedule), "--pidfile=", "--loglevel", "INFO")


def _told(code: int) -> str:
    return f"signal {-code}" if code < 0 else f"exit code {code}"
