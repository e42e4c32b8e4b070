"""Showing what the processes write to their log files, each line with the name of its process before it.

The processes write to files and not into pipes of ours: so they, and what they said, survive a supervisor
that is killed.
"""

import threading
from pathlib import Path
from typing import BinaryIO

from service.bootstrap.speech import say

_WIDTH = 9
_LARGE = 20_000_000


class LogFollower:
    """Follow log files from where they end now, in one thread, until it is stopped."""

    def __init__(self) -> None:
        self._files: dict[str, BinaryIO] = {}
        self._rest: dict[str, bytes] = {}
        self._lock = threading.Lock()
        self._ending = threading.Event()
        self._thread = threading.Thread(target=self._run, name="logs", daemon=True)

    def start(self) -> None:
        """Begin to show lines."""
        self._thread.start()

    def follow(self, name: str, path: Path) -> None:
        """Show what is written to this file from now on; one that has grown large is put aside first."""
        with self._lock:
            if name in self._files:
                return
            if path.exists() and path.stat().st_size > _LARGE:
                path.replace(path.with_suffix(".old.log"))
            path.touch(mode=0o600)
            file = path.open("rb")
            file.seek(0, 2)
            self._files[name], self._rest[name] = file, b""

    def stop(self) -> None:
        """Show what is left and end."""
        self._ending.set()
        if self._thread.is_alive():
            self._thread.join(5)
        self.show_new()
        for file in self._files.values():
            file.close()

    def show_new(self) -> None:
        """Print every whole line that has come since the last look."""
        with self._lock:
            for name, file in self._files.items():
                *lines, self._rest[name] = (self._rest[name] + file.read()).split(b"\n")
                for line in lines:
                    say(f"{name:<{_WIDTH}} | {line.decode(errors='replace').rstrip()}")

    def _run(self) -> None:
        while not self._ending.wait(0.1):
            self.show_new()
