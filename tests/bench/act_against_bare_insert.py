"""One act with one row against the same bare insert and commit, one client: 2.5 times or less.

    python -m tests.bench.act_against_bare_insert

Both go through Django and end in a commit that waits for the disk; they take turns in short rounds, and the
median of the rounds' ratios counts. The 20,000 rows are one statement (target: 4 times the same unguarded, or
less).
"""

import statistics
import time
from collections.abc import Callable

from tests.bench.ground import database

ROUNDS, TURNS = 15, 100
ROW = "INSERT INTO {} (operator_id, what, n, t) VALUES ('kt', 'a spanner and a hammer', 12.50, now())"
MANY = (
    "INSERT INTO {} (operator_id, what, n, t) "
    "SELECT 'kt', 'row ' || i, i, now() FROM generate_series(1, 20000) i"
)
TABLES = """
CREATE TABLE {0} (
    id uuid PRIMARY KEY DEFAULT uuidv7(), operator_id text, what text, n numeric, t timestamptz);
"""


def _seconds(work: Callable[[], None], turns: int) -> float:
    begun = time.perf_counter()
    for _ in range(turns):
        work()
    return time.perf_counter() - begun


def measure() -> dict[str, float]:
    """This function will return the two ratios and the times they are made of (milliseconds)."""
    from django.db import connection, transaction

    from records.act import act
    from tests import databases
    from tests.records.scratch import AMANI, NOTE

    with databases.connect("owner") as owner:
        owner.execute(TABLES.format("bench_guarded") + TABLES.format("bench_bare"))
        owner.execute(
            "SELECT guard_table('bench_guarded', key => '{id}', mode => 'append', operator => 'operator_id')"
        )
        owner.execute("SELECT exempt_table('bench_bare', 'it is what the guarded one is measured against')")

    def bare(statement: str = ROW) -> None:
        with transaction.atomic(), connection.cursor() as cursor:
            cursor.execute(statement.format("bench_bare"))

    def guarded(statement: str = ROW) -> None:
        with act(NOTE, by=AMANI, about="thing:1"), connection.cursor() as cursor:
            cursor.execute(statement.format("bench_guarded"))

    _seconds(bare, TURNS), _seconds(guarded, TURNS)
    ones = [(_seconds(guarded, TURNS), _seconds(bare, TURNS)) for _ in range(ROUNDS)]
    many = [(_seconds(lambda: guarded(MANY), 1), _seconds(lambda: bare(MANY), 1)) for _ in range(5)]
    return {
        "one act / one bare insert": statistics.median(a / b for a, b in ones),
        "one act, ms": statistics.median(a for a, _ in ones) / TURNS * 1000,
        "one bare insert, ms": statistics.median(b for _, b in ones) / TURNS * 1000,
        "20,000 rows in one act / the same bare": statistics.median(a / b for a, b in many),
        "20,000 rows in one act, ms": statistics.median(a for a, _ in many) * 1000,
    }


if __name__ == "__main__":
    with database():
        for what, figure in measure().items():
            print(f"{what:<45} {figure:8.2f}")
