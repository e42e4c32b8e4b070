"""The chain under load: 16 clients on one chain for 30 s, with 20 ms of application time inside each
transaction.

    python -m tests.bench.acts_under_load [seconds] [clients]

Every client holds a random one of twenty parent rows, opens an act, writes a child of it (foreign key
checked at commit), waits 20 ms, seals and commits. The same without guards, act and seal is what it is
measured against, in turns of the same length. Wanted: no gap, the order of commits, no deadlock, at least
0.9 of the throughput without sealing.
"""

import random
import sys
import threading
import time
from dataclasses import dataclass, field
from uuid import UUID

import psycopg

from tests.bench.ground import database

APPLICATION_TIME = 0.020
PARENTS = 20
SHARE, TARGET = "throughput sealed / not sealed", 0.9
MUST_BE_NONE = (
    "gaps",
    "links out of the order of commits",
    "errors",
    "deadlocks",
    "broken places found by verify",
)
TABLES = """
CREATE TABLE load_{0}_parent (id bigint PRIMARY KEY, operator_id text, n bigint);
CREATE TABLE load_{0}_child (id uuid PRIMARY KEY DEFAULT uuidv7(), operator_id text, what text,
    parent_id bigint REFERENCES load_{0}_parent DEFERRABLE INITIALLY DEFERRED);
"""


@dataclass
class Tally:
    """What one run saw: commits, the moments around each commit by the number of its act, and every error."""

    commits: int = 0
    around: dict[UUID, tuple[float, float]] = field(default_factory=dict)
    errors: list[str] = field(default_factory=list)


def _client(seed: int, until: float, tally: Tally, *, sealed: bool) -> None:
    from tests import databases

    draw, kind = random.Random(seed), "guarded" if sealed else "bare"
    with databases.connect("default") as connection:
        while time.monotonic() < until:
            try:
                act, before = _turn(connection, kind, draw.randrange(PARENTS))
                tally.commits += 1
                if act is not None:
                    tally.around[act] = (before, time.monotonic())
            except psycopg.Error as error:
                tally.errors.append(f"{error.sqlstate} {str(error).splitlines()[0]}")


def _turn(connection: psycopg.Connection, kind: str, parent: int) -> tuple[UUID | None, float]:
    from records.act import _SEAL

    with connection.transaction():
        connection.execute(f"SELECT FROM load_{kind}_parent WHERE id = %s FOR UPDATE", [parent])
        number = None
        if kind == "guarded":
            opened = connection.execute(
                "SELECT act_id FROM act_open('load', 'add-child', 'service', 'service:x', '', '', 'load:1')"
            )
            number = opened.fetchone()[0]
        connection.execute(
            f"INSERT INTO load_{kind}_child (operator_id, what, parent_id) VALUES ('load', 'x', %s)", [parent]
        )
        time.sleep(APPLICATION_TIME)
        if kind == "guarded":
            connection.execute(_SEAL)
        return number, time.monotonic()


def run(clients: int, seconds: float, *, sealed: bool) -> Tally:
    """This function will let the clients work for that long and return what they saw."""
    tally, until = Tally(), time.monotonic() + seconds
    workers = [
        threading.Thread(target=_client, args=(number, until, tally), kwargs={"sealed": sealed})
        for number in range(clients)
    ]
    for worker in workers:
        worker.start()
    for worker in workers:
        worker.join()
    return tally


def make_tables() -> None:
    """This function will make the guarded tables and the bare ones."""
    from tests import databases

    with databases.connect("owner") as owner:
        owner.execute(TABLES.format("guarded") + TABLES.format("bare"))
        owner.execute(
            "SELECT "
            "guard_table('load_guarded_parent', key => '{id}', mode => 'edit', operator => 'operator_id'), "
            "guard_table('load_guarded_child', key => '{id}', mode => 'append', operator => 'operator_id')"
        )
        for table in ("load_bare_parent", "load_bare_child"):
            owner.execute(
                "SELECT exempt_table(%s, 'it is what the guarded one is measured against')", [table]
            )
        owner.execute(
            "BEGIN; SELECT act_open('load', 'add-parents', 'service', 'service:x', '', '', 'load:0')"
        )
        for kind in ("guarded", "bare"):
            owner.execute(
                f"INSERT INTO load_{kind}_parent SELECT i, 'load', 0 FROM generate_series(0, {PARENTS}) i"
            )
        owner.execute("COMMIT")


def out_of_order(around: list[tuple[float, float]]) -> int:
    """This function will count the links that were surely committed before one that stands earlier in the
    chain.
    """
    wrong, latest_begin = 0, 0.0
    for begin, end in around:
        wrong += latest_begin > end
        latest_begin = max(latest_begin, begin)
    return wrong


def measure(seconds: float, clients: int) -> dict[str, object]:
    """This function will run both kinds in turns and return what was seen."""
    from records.reconcile import reconcile
    from records.verify import follow_chains
    from tests import databases

    make_tables()
    turns = 3
    bare, sealed = [], []
    for _ in range(turns):
        bare.append(run(clients, seconds / turns, sealed=False))
        sealed.append(run(clients, seconds / turns, sealed=True))
    commits = sum(one.commits for one in sealed)
    with databases.connect("superuser") as admin:
        gaps = admin.execute(
            "SELECT max(position) - count(*), count(*) FROM records_seal WHERE chain = 'load'"
        ).fetchone()
        order = admin.execute(
            "SELECT act_id FROM records_seal WHERE chain = 'load' ORDER BY position"
        ).fetchall()
    errors = [error for one in (*bare, *sealed) for error in one.errors]
    seen = {act: moments for one in sealed for act, moments in one.around.items()}
    around = [seen[act] for (act,) in order if act in seen]
    return {
        "clients": clients,
        "sealed commits": commits,
        "links in the chain": gaps[1],
        "gaps": gaps[0],
        "links out of the order of commits": out_of_order(around),
        "errors": len(errors),
        "deadlocks": sum(error.startswith("40P01") for error in errors),
        SHARE: round(commits / sum(one.commits for one in bare), 3),
        "broken places found by verify": len(follow_chains().broken) + len(reconcile()),
    }


if __name__ == "__main__":
    words = sys.argv[1:]
    with database():
        seen = measure(float((words or ["30"])[0]), int((words[1:] or ["16"])[0]))
    for what, figure in seen.items():
        print(f"{what:<45} {figure}")
    wrong = [seen[what] for what in MUST_BE_NONE if seen[what]]
    sys.exit(1 if wrong or float(str(seen[SHARE])) < TARGET else 0)
