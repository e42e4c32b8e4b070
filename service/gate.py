"""The gate: everything that must hold before a change goes in, in one command, and the same one everywhere.

With arguments, pytest alone runs with them. The last line is always pytest's closing line.
"""

import os
import subprocess
import sys
import time
from collections.abc import Callable
from dataclasses import dataclass
from pathlib import Path

from service.bootstrap.environment import ROOT, clean_environment
from service.bootstrap.speech import say

# Tools that only read the program must be able to load its settings; none of them reaches a database or a
# queue.
_STAND_INS = {
    "SECRET_KEY": "only-for-tools-that-read-the-program",
    "DATABASE_URL": "postgresql://nobody@/nothing?host=/nonexistent",
    "BROKER_URL": "redis+socket:///nonexistent/valkey.sock",
}


@dataclass(frozen=True)
class Step:
    """One part of the gate: what it is called, and what does it (true when it passes)."""

    name: str
    passes: Callable[[], bool]


def gate(words: list[str]) -> int:
    """Run the whole gate, or with arguments pytest alone, and return the exit code: 0 only when all of it
    passed.
    """
    if words:
        return _pytest(words)
    failed = [step.name for step in _steps() if not _timed(step)]
    if failed:
        say(f"\nRED before the tests: {', '.join(failed)}. The tests run all the same.")
    # By file, so that what a file of tests sets up once is set up once.
    code = _pytest(["-n", "2", "--dist", "loadfile"])
    # Exit code 5, no test was run, is as red as a test that failed: only 0 is green.
    return code or (1 if failed else 0)


def _steps() -> tuple[Step, ...]:
    here = sys.executable
    migrations = ("manage.py", "makemigrations", "--check", "--dry-run")
    return (
        Step("format", lambda: _run(here, "-m", "ruff", "format", "--check", ".")),
        Step("lint", lambda: _run(here, "-m", "ruff", "check", ".")),
        Step("types", lambda: _run(here, "-m", "mypy")),
        Step("imports", lambda: _run(str(Path(here).with_name("lint-imports")))),
        # The history in a database is not compared, for there is none; the tests migrate a real one.
        Step("migrations", lambda: _run(here, "-W", "ignore::RuntimeWarning", *migrations)),
        Step("openapi", lambda: _run(here, "manage.py", "openapi", "--check")),
    )


def _timed(step: Step) -> bool:
    say(f"\n=== {step.name}")
    begun = time.monotonic()
    passed = step.passes()
    say(f"=== {step.name}: {'passed' if passed else 'RED'} in {time.monotonic() - begun:.1f} s")
    return passed


def _run(*command: str) -> bool:
    environment = {**clean_environment(), **_STAND_INS}
    return subprocess.run(command, cwd=ROOT, env=environment, check=False).returncode == 0


def _pytest(words: list[str]) -> int:
    say("\n=== tests")
    environment = clean_environment()
    for name in ("DATABASE_URL", "OWNER_DATABASE_URL", "BROKER_URL"):
        environment.pop(name, None)  # tests never touch a database that somebody uses
    os.chdir(ROOT)
    return subprocess.run((sys.executable, "-m", "pytest", *words), env=environment, check=False).returncode
