"""Memory of every process over 10,000 requests: submissions, lists and readings of loads, by eight clients,
while loads are accepted, manifests filed, subscribers told and loads rechecked beside them.

    python -m tests.bench.memory_over_requests [requests]

What each process has to itself (RssAnon of /proc, Linux, a database on this machine): the server program with
its two workers, the worker with its two children, the scheduler, and the database's sessions. A child of the
worker gives way to a fresh one after 200 pieces of work, so of these the largest that was seen counts, looked
at every half second. Wanted: from the first two thousand requests on, none of them grows by ten megabytes or
more.
"""

import http.client
import json
import sys
import threading
import uuid
from collections.abc import Iterator
from contextlib import contextmanager
from pathlib import Path

from tests.bench.served import PORTS, Served, at_its_own_time, served
from tests.bench.served_work import AtWork, at_work

CLIENTS, STEP, TARGET = 8, 2_000, 10.0


def main(requests: int) -> int:
    """This function will print the memory of each process as the requests go by; 1 when one grew too much."""
    seen: dict[str, list[float]] = {}
    with served("loads") as of, at_work(of) as work:
        print(f"{'requests':>10}  megabytes of each process")
        _ask(of, 200)  # every worker and session is there
        work.wait_for_manifests(20)  # and every child has printed
        for done in range(STEP, requests + 1, STEP):
            with _largest_child(work.processes["worker"]) as child:
                _ask(of, STEP)
            now = {**_megabytes(of, work), "largest child of the worker": max(child)}
            for name, size in now.items():
                seen.setdefault(name, []).append(size)
            told = ", ".join(f"{name} {size:.1f}" for name, size in now.items() if "session" not in name)
            sessions = [size for name, size in now.items() if "session" in name]
            print(f"{done:>10}  {told}, largest of {len(sessions)} sessions {max(sessions):.1f}", flush=True)
            if work.failures:
                raise SystemExit(f"the work beside failed: {work.failures[0]!r}")
        print(", ".join(f"{what}: {count:,}" for what, count in work.counted().items()))
    steps = requests // STEP
    grown = {name: sizes[-1] - sizes[0] for name, sizes in seen.items() if len(sizes) == steps}
    for name, size in sorted(grown.items(), key=lambda one: -one[1])[:6]:
        print(f"grown since request {STEP:,}: {name}, {size:.1f} MB")
    most = max(grown.values())
    print(f"most grown: {most:.1f} MB (target: under {TARGET:.0f} MB)")
    return 0 if most < TARGET else 1


@contextmanager
def _largest_child(process: int) -> Iterator[list[float]]:
    """This function will look for the largest child of a process until the block ends, time and again."""
    sizes, ended = [0.0], threading.Event()

    def look() -> None:
        while not ended.wait(0.5):
            sizes.append(max((_own(child) for child in _children(process)), default=0.0))

    looking = threading.Thread(target=look)
    looking.start()
    try:
        yield sizes
    finally:
        ended.set()
        looking.join()


def _ask(of: Served, count: int) -> None:
    """This function will ask so many times: of five requests one submits, two list, two read what stands."""
    failed: list[str] = []

    def ask() -> None:
        client = http.client.HTTPConnection("127.0.0.1", PORTS["loads"], timeout=60)
        headers = {"Content-Type": "application/json", "Authorization": f"Bearer {of.token}"}
        load = ""
        for number in range(count // CLIENTS):
            if number % 5 == 0:
                key = {"Idempotency-Key": str(uuid.uuid4())}
                client.request("POST", "/api/v1/loads", at_its_own_time(of.body), headers | key)
            else:
                path = f"/api/v1/loads/{load}" if number % 2 else "/api/v1/loads?limit=20"
                client.request("GET", path, headers=headers)
            answer = client.getresponse()
            text = answer.read()
            if answer.status not in {http.client.OK, http.client.CREATED}:
                failed.append(f"{answer.status} {text[:200]!r}")
                return
            if number % 5 == 0:
                load = json.loads(text)["id"]

    threads = [threading.Thread(target=ask) for _ in range(CLIENTS)]
    for thread in threads:
        thread.start()
    for thread in threads:
        thread.join()
    if failed:
        raise SystemExit(failed[0])


def _megabytes(of: Served, work: AtWork) -> dict[str, float]:
    server = of.processes["loads"]
    sessions = of.admin.execute(
        "SELECT pid FROM pg_stat_activity WHERE datname = current_database() AND pid <> pg_backend_pid()"
    ).fetchall()
    named = {"server": server} | {f"server's worker {at}": one for at, one in enumerate(_children(server), 1)}
    named |= work.processes | {f"session {pid}": pid for (pid,) in sessions}
    return {name: _own(process) for name, process in named.items()}


def _children(process: int) -> list[int]:
    return sorted(map(int, Path(f"/proc/{process}/task/{process}/children").read_text().split()))


def _own(process: int) -> float:
    """Megabytes that a process has to itself; 0 for one that has just ended."""
    try:
        lines = Path(f"/proc/{process}/status").read_text().splitlines()
    except OSError:
        return 0.0
    return next((int(line.split()[1]) / 1024 for line in lines if line.startswith("RssAnon")), 0.0)


if __name__ == "__main__":
    sys.exit(main(int((sys.argv[1:] or ["10000"])[0])))
