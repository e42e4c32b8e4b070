"""One supervised process: started in a group of its own, stopped with everything it started."""

import contextlib
import os
import signal
import subprocess
import time
from collections.abc import Mapping, Sequence
from dataclasses import dataclass, field
from pathlib import Path

from service.bootstrap.environment import ROOT
from service.embedded import processes
from service.start.data_folder import DataFolder


@dataclass
class Child:
    """What runs, with which words and environment, and how long it may take to end."""

    name: str
    command: Sequence[str]
    environment: Mapping[str, str]
    patience: float = 20.0
    deaths: list[float] = field(default_factory=list)
    _process: "subprocess.Popen[bytes] | None" = None

    def start(self, folder: DataFolder) -> None:
        """Start the process, with its log and its pid file in the data folder."""
        with folder.log(self.name).open("ab") as log:
            self._process = subprocess.Popen(
                self.command, env=dict(self.environment), cwd=ROOT,
                stdin=subprocess.DEVNULL, stdout=log, stderr=log,
                # Ctrl-C at the terminal reaches the supervisor alone, who ends the others in order.
                start_new_session=True,
            )  # fmt: skip
        one = processes.identity_of(self._process.pid)
        if one is not None:
            processes.write_pid_file(folder.pid_file(self.name), one)

    def ended(self) -> int | None:
        """Return the exit code if the process has ended (negative: the signal that ended it), else None."""
        return self._process.poll() if self._process else None

    def ask_to_end(self) -> None:
        """Ask the process to finish what it does and end."""
        if self._process and self._process.poll() is None:
            self._process.send_signal(signal.SIGTERM)

    def stop(self, folder: DataFolder, *, at_once: bool = False) -> None:
        """End the process and all it started: by asking, then, after its patience or at once, by force."""
        if self._process is None:
            return
        if not at_once:
            self.ask_to_end()
            with contextlib.suppress(subprocess.TimeoutExpired):
                self._process.wait(self.patience)
        _force(self._process.pid)
        self._process.wait()
        folder.pid_file(self.name).unlink(missing_ok=True)
        self._process = None


def stop_leftover(name: str, folder: DataFolder) -> bool:
    """End what a killed supervisor left of this name; return whether there was anything. A stranger's process
    is not touched.
    """
    noted = folder.pid_file(name)
    leader = processes.noted_in(noted)
    if leader is None:
        return False
    found = processes.is_alive(leader)
    if found:
        processes.send(leader, signal.SIGTERM)
        processes.wait_until_gone(leader, 20.0)
    for one in processes.members(leader.pid):
        # The number of a group that has died out may be a stranger's by now: our own carry the name of this
        # folder.
        if one == leader or _carries(one.pid, folder.path):
            found = True
            processes.send(one, signal.SIGKILL)
            processes.wait_until_gone(one, 5.0)
    noted.unlink(missing_ok=True)
    return found


def _carries(pid: int, data: Path) -> bool:
    try:
        words = Path(f"/proc/{pid}/environ").read_bytes().split(b"\0")
    except OSError:
        return False
    return b"TAREBOOK_DATA=" + os.fsencode(data) in words


def _force(group: int) -> None:
    """Kill every member of a group that is certainly ours: its leader is or was our own child."""
    limit = time.monotonic() + 5
    while (left := processes.members(group)) and time.monotonic() < limit:
        for one in left:
            processes.send(one, signal.SIGKILL)
        time.sleep(0.02)
