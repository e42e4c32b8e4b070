"""Memory of every process over 10,000 requests: submissions, lists and readings of loads, by eight clients.

    python -m tests.bench.memory_over_requests [requests]

What each process has to itself (RssAnon of /proc, Linux, a database on this machine): the server program with
its two workers, and the database's sessions. Wanted: from the first two thousand requests on, none of them
grows by ten megabytes or more.
"""

import http.client
import json
import sys
import threading
import uuid
from pathlib import Path

from tests.bench.served import PORTS, Served, at_its_own_time, served

CLIENTS, STEP, TARGET = 8, 2_000, 10.0


def main(requests: int) -> int:
    """This function will print the memory of each process as the requests go by; 1 when one grew too much."""
    with served("loads") as of:
        print(f"{'requests':>10}  megabytes of each process")
        _ask(of, 200)  # every worker and session is there
        seen: dict[str, list[float]] = {}
        for done in range(STEP, requests + 1, STEP):
            _ask(of, STEP)
            now = _megabytes(of)
            for name, size in now.items():
                seen.setdefault(name, []).append(size)
            print(f"{done:>10}  " + "  ".join(f"{name} {size:.1f}" for name, size in now.items()), flush=True)
    grown = {name: sizes[-1] - sizes[0] for name, sizes in seen.items()}
    most = max(grown, key=lambda name: grown[name])
    print(f"most grown since request {STEP:,}: {most}, {grown[most]:.1f} MB (target: under {TARGET:.0f} MB)")
    return 0 if grown[most] < TARGET else 1


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


def _megabytes(of: Served) -> dict[str, float]:
    server = of.processes["loads"]
    workers = Path(f"/proc/{server}/task/{server}/children").read_text().split()
    sessions = of.admin.execute(
        "SELECT pid FROM pg_stat_activity WHERE datname = current_database() AND pid <> pg_backend_pid() "
        "ORDER BY backend_start"
    ).fetchall()
    named = {"server": server} | {f"worker {at}": int(pid) for at, pid in enumerate(sorted(workers), 1)}
    named |= {f"session {at}": pid for at, (pid,) in enumerate(sessions, 1)}
    return {name: _own(process) for name, process in named.items()}


def _own(process: int) -> float:
    lines = Path(f"/proc/{process}/status").read_text().splitlines()
    return next(int(line.split()[1]) / 1024 for line in lines if line.startswith("RssAnon"))


if __name__ == "__main__":
    sys.exit(main(int((sys.argv[1:] or ["10000"])[0])))
