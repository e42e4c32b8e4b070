"""A pytest plugin that tries mutants: each in a process of its own, forked once everything is imported.

First the tests run once, in a process of their own too, to see which of them reach which function and how
long each takes; those that take longest are left out. Then each mutant, put in the place of the code of its
function, meets the tests that reach it until one fails or they have taken enough: first those that found
other mutants of the same function, then the quick ones. Nothing is kept from one mutant to the next, for a
value some cache remembers would hide a fault.
"""

import contextlib
import cProfile
import gc
import json
import os
import resource
import signal
import time
from collections.abc import Callable, Sequence
from functools import partial
from pathlib import Path
from typing import Any, Final

import pytest
from hypothesis import Phase, settings

from tests.mutation.placing import is_ours, key_of, put_in_place

KILLED, SURVIVED, TIMEOUT, UNREACHED = 1, 0, 3, 5
WORDS: Final = {KILLED: "killed", SURVIVED: "survived", TIMEOUT: "timeout", UNREACHED: "no test reaches it"}
LONGEST: Final = 2.0  # seconds: a test that takes longer is left out
ENOUGH: Final = 15.0  # seconds of tests: a mutant that stands that long has survived
PATIENCE, STEP = 5.0, 10.0  # seconds of processor time, and how much longer than usual a test may take
MOST_MEMORY: Final = 4 << 30  # bytes: a fault may fill the memory, too

# A failure is enough: nothing is shrunk or explained, and a run can be repeated.
settings.register_profile(
    "mutants", phases=(Phase.explicit, Phase.generate), database=None, deadline=None, derandomize=True
)
settings.load_profile("mutants")

Mutant = dict[str, Any]
Reach = dict[str, dict[str, float]]


@pytest.hookimpl(tryfirst=True)
def pytest_runtestloop(session: pytest.Session) -> bool:
    """This function will try every mutant drawn instead of running the tests."""
    folder = Path(os.environ["TAREBOOK_MUTANTS"])
    asked = json.loads((folder / "asked.json").read_text())
    reach = _reached(session.items, folder, asked["jobs"])
    drawn: list[Mutant] = asked["drawn"]
    tries: dict[str, str] = {}
    finders: dict[str, list[str]] = {}
    running: dict[int, Mutant] = {}
    waiting = list(drawn)
    gc.freeze()
    while waiting or running:
        while waiting and len(running) < asked["jobs"]:
            mutant = waiting.pop()
            key = key_of(mutant)
            tests = _in_order(session.items, reach.get(key, {}), finders.get(key, ()))
            running[_forked(partial(_try, mutant, tests, folder))] = mutant
        pid, status = os.wait()
        mutant = running.pop(pid)
        tries[mutant["name"]] = WORDS.get(os.waitstatus_to_exitcode(status), "killed")
        with contextlib.suppress(FileNotFoundError):
            finders.setdefault(key_of(mutant), []).insert(0, (folder / f"{pid}.finder").read_text())
        # Each time: a run that is cut short tells what it found.
        (folder / "tries.json").write_text(json.dumps(tries))
        if len(tries) % 50 == 0:
            print(f"{len(tries)} of {len(drawn)} tried", flush=True)
    return True


def _reached(items: Sequence[pytest.Item], folder: Path, jobs: int) -> Reach:
    """Return which tests reach each function and how long each takes (seconds); what is known is not run."""
    kept, failed = folder / "reach.json", folder / "reach.failed"
    reach: Reach = json.loads(kept.read_text()) if kept.exists() else {"": {}}
    new = [item for item in items if item.nodeid not in reach[""]]
    failed.unlink(missing_ok=True)
    shares = {folder / f"reach.{number}.json": new[number::jobs] for number in range(jobs)}
    running = [_forked(partial(_reach, share, into, failed)) for into, share in shares.items()]
    for pid in running:
        os.waitpid(pid, 0)
    if failed.exists():
        raise pytest.UsageError(f"the tests do not pass without a mutant: {failed.read_text()}")
    for into in shares:
        for function, times in json.loads(into.read_text()).items():
            reach.setdefault(function, {}).update(times)
    kept.write_text(json.dumps(reach))
    return reach


def _in_order(
    items: Sequence[pytest.Item], times: dict[str, float], finders: Sequence[str]
) -> list[tuple[pytest.Item, float]]:
    """Return the tests that reach a function with their times: finders first, then the quick."""
    last = {name: place for place, name in enumerate(reversed(finders))}
    mine = [(item, times[item.nodeid]) for item in items if times.get(item.nodeid, LONGEST) < LONGEST]
    return sorted(mine, key=lambda one: (-last.get(one[0].nodeid, -1), one[1]))


def _forked(work: Callable[[], int]) -> int:
    pid = os.fork()
    if pid == 0:
        with contextlib.suppress(OSError), Path(os.devnull).open("w") as nowhere:
            os.dup2(nowhere.fileno(), 1)
            os.dup2(nowhere.fileno(), 2)
        os._exit(work())
    return pid


def _try(mutant: Mutant, tests: Sequence[tuple[pytest.Item, float]], folder: Path) -> int:
    if not tests:
        return UNREACHED
    resource.setrlimit(resource.RLIMIT_AS, (MOST_MEMORY, MOST_MEMORY))
    put_in_place(mutant)
    signal.signal(signal.SIGPROF, lambda *_: os._exit(TIMEOUT))
    left = ENOUGH
    for item, took in tests:
        left -= took
        if left < 0:
            break
        signal.setitimer(signal.ITIMER_PROF, PATIENCE + STEP * took)
        if _fails(item):
            (folder / f"{os.getpid()}.finder").write_text(item.nodeid)
            return KILLED
    return SURVIVED


def _reach(items: Sequence[pytest.Item], into: Path, failed: Path) -> int:
    reach: Reach = {"": {}}
    for item in items:
        seen = cProfile.Profile(builtins=False)
        begun = time.process_time()
        seen.enable()
        failure = _fails(item)
        seen.disable()
        if failure:
            failed.write_text(f"{item.nodeid}\n{failure}")
            return KILLED
        took = reach[""][item.nodeid] = time.process_time() - begun
        for entry in seen.getstats():
            if not isinstance(entry.code, str) and is_ours(entry.code):
                reach.setdefault(key_of(entry.code), {})[item.nodeid] = took
    into.write_text(json.dumps(reach))
    return SURVIVED


def _fails(item: pytest.Item) -> str:
    """Run a test; return what it failed with, nothing when it passes."""
    from _pytest.runner import runtestprotocol  # noqa: PLC0415  # pytest's own way to run one test

    reports = runtestprotocol(item, log=False, nextitem=None)
    return "\n".join(report.longreprtext or "failed" for report in reports if report.failed)
