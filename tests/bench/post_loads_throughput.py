"""POST /api/v1/loads (20 items, computed, audited, sealed, its answer kept) against a bare endpoint that
inserts one row.

    python -m tests.bench.post_loads_throughput

The judge is an endpoint of the same framework in the same server program (granian, two workers), on the same
database, with the service's own settings and middleware: who asks is found out by token and the body is read
strictly there, too, so that only the endpoint differs. A second judge is the same endpoint as a fresh project
without any of that. All are asked in turns by the same clients, so that only ratios count. The target is at
least half the first judge's requests a second. CPU is that of the server's processes, and of the database's
sessions beside it, both as /proc tells them (Linux, a database on this machine).
"""

import os
import statistics
import sys
import time
from dataclasses import dataclass
from pathlib import Path
from typing import Any

import psycopg

from tests.bench.served import PORTS, TITLES, Served, rate, served

ROUNDS, SECONDS = 5, 4.0
_TICK = 1000 / os.sysconf("SC_CLK_TCK")  # milliseconds


@dataclass(frozen=True)
class Turn:
    """What one turn saw: requests a second, and CPU milliseconds a request of server and database."""

    rate: float
    server: float
    database: float


def main() -> int:
    """This function will print the rates round by round, their ratios, and the CPU a request took."""
    with served(*PORTS) as of:
        turns: dict[str, list[Turn]] = {name: [] for name in PORTS}
        for name in PORTS:
            rate(of, name, seconds=2.0)  # warm
        for _ in range(ROUNDS):
            for name in PORTS:
                turns[name].append(_turn(of, name))
    _print(turns)
    return 0


def _turn(of: Served, name: str) -> Turn:
    server = of.processes[name]
    before, begun = (_cpu_below(server), _cpu_of_sessions(of.admin)), time.monotonic()
    answered = rate(of, name, seconds=SECONDS)
    requests = answered * (time.monotonic() - begun)
    after = (_cpu_below(server), _cpu_of_sessions(of.admin))
    return Turn(answered, (after[0] - before[0]) / requests, (after[1] - before[1]) / requests)


def _print(turns: dict[str, list[Turn]]) -> None:
    print(f"{'round':>6} " + " ".join(f"{TITLES[name]:>20}" for name in turns))
    for number, row in enumerate(zip(*turns.values(), strict=True), 1):
        print(f"{number:>6} " + " ".join(f"{turn.rate:>18.0f}/s" for turn in row))
    for what in ("server", "database"):
        means = [statistics.median(getattr(turn, what) for turn in turns[name]) for name in turns]
        print(f"CPU ms a request, {what:<9}" + " ".join(f"{mean:>8.2f}" for mean in means))
    for judge, wanted in (("bare", "target: 0.50 or more"), ("fresh", "no target")):
        pairs = zip(turns["loads"], turns[judge], strict=True)
        ratio = statistics.median(loads.rate / bare.rate for loads, bare in pairs)
        print(f"median ratio to {TITLES[judge]}: {ratio:.2f} ({wanted})")


def _cpu_below(process: int) -> float:
    """CPU milliseconds of a process and its children until now."""
    children = Path(f"/proc/{process}/task/{process}/children").read_text().split()
    return _cpu_of(process) + sum(_cpu_below(int(child)) for child in children)


def _cpu_of_sessions(admin: "psycopg.Connection[Any]") -> float:
    """CPU milliseconds of all sessions of this database until now; every server keeps its own."""
    sessions = admin.execute("SELECT pid FROM pg_stat_activity WHERE datname = current_database()").fetchall()
    return sum(_cpu_of(pid) for (pid,) in sessions)


def _cpu_of(process: int) -> float:
    words = Path(f"/proc/{process}/stat").read_text().rpartition(")")[2].split()
    return (int(words[11]) + int(words[12])) * _TICK  # utime and stime, proc(5)


if __name__ == "__main__":
    sys.exit(main())
