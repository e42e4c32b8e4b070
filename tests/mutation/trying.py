"""A pytest plugin that tries mutants: each in a process of its own, forked once everything is imported.

First the tests run once, in a process of their own too, to see which of them reach which function and how
long each takes. Then each mutant meets those tests, the quick ones first, until one fails. Nothing is kept
from one mutant to the next, for a value some cache remembers would hide a fault.
"""

import contextlib
import json
import os
import signal
import time
from collections.abc import Sequence
from pathlib import Path

import pytest

KILLED, SURVIVED, TIMEOUT, UNREACHED = 1, 0, 3, 5
WORDS = {KILLED: "killed", SURVIVED: "survived", TIMEOUT: "timeout", UNREACHED: "no test reaches it"}
STEP = 4.0  # how much longer than usual the tests of a mutant may take, besides ten seconds


@pytest.hookimpl(tryfirst=True)
def pytest_runtestloop(session: pytest.Session) -> bool:
    """This function will try every mutant drawn instead of running the tests."""
    folder = Path.cwd()
    asked = json.loads((folder / "asked.json").read_text())
    drawn: list[str] = asked["drawn"]
    if _forked(lambda: _reach(session.items, folder / "reach.json")) != SURVIVED:
        failed = (folder / "reach.failed").read_text()
        raise pytest.UsageError(f"the tests do not pass without a mutant: {failed}")
    reach = json.loads((folder / "reach.json").read_text())
    tries: dict[str, str] = {}
    running: dict[int, str] = {}
    waiting = list(drawn)
    while waiting or running:
        while waiting and len(running) < asked["jobs"]:
            name = waiting.pop()
            running[_start(name, session.items, reach)] = name
        pid, status = os.wait()
        tries[running.pop(pid)] = WORDS.get(os.waitstatus_to_exitcode(status), "killed")
        # Each time: a run that is cut short tells what it found.
        (folder / "tries.json").write_text(json.dumps(tries))
        if len(tries) % 25 == 0:
            print(f"{len(tries)} of {len(drawn)} tried", flush=True)
    return True


def _start(name: str, items: Sequence[pytest.Item], reach: dict[str, dict[str, float]]) -> int:
    pid = os.fork()
    if pid == 0:
        _quiet()
        os._exit(_try(name, items, reach))
    return pid


def _forked(work: object) -> int:
    pid = os.fork()
    if pid == 0:
        _quiet()
        os._exit(work())  # type: ignore[operator]  # a function without arguments
    return os.waitstatus_to_exitcode(os.waitpid(pid, 0)[1])


def _try(name: str, items: Sequence[pytest.Item], reach: dict[str, dict[str, float]]) -> int:
    times = reach.get(name.rpartition("__mutmut_")[0], {})
    mine = sorted((item for item in items if item.nodeid in times), key=lambda item: times[item.nodeid])
    if not mine:
        return UNREACHED
    from mutmut.mutation.trampoline import set_mutant_under_test  # noqa: PLC0415  # only in the copy

    set_mutant_under_test(name)
    signal.signal(signal.SIGALRM, lambda *_: os._exit(TIMEOUT))
    signal.alarm(int(10 + STEP * sum(times.values())))
    return KILLED if any(_fails(item) for item in mine) else SURVIVED


def _reach(items: Sequence[pytest.Item], into: Path) -> int:
    from mutmut.mutation.trampoline import set_mutant_under_test  # noqa: PLC0415  # only in the copy
    from mutmut.state import state  # noqa: PLC0415  # only in the copy

    set_mutant_under_test("stats")
    reach: dict[str, dict[str, float]] = {}
    for item in items:
        state()._stats.clear()
        begun = time.perf_counter()
        if failure := _fails(item):
            into.with_suffix(".failed").write_text(f"{item.nodeid}\n{failure}")
            return KILLED
        for function in state()._stats:
            reach.setdefault(function, {})[item.nodeid] = time.perf_counter() - begun
    into.write_text(json.dumps(reach))
    return SURVIVED


def _fails(item: pytest.Item) -> str:
    """Run a test; return what it failed with, nothing when it passes."""
    from _pytest.runner import runtestprotocol  # noqa: PLC0415  # pytest's own way to run one test

    reports = runtestprotocol(item, log=False, nextitem=None)
    return "\n".join(report.longreprtext or "failed" for report in reports if report.failed)


def _quiet() -> None:
    with contextlib.suppress(OSError), Path(os.devnull).open("w") as nowhere:
        os.dup2(nowhere.fileno(), 1)
        os.dup2(nowhere.fileno(), 2)
