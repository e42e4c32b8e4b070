"""Stored loads computed again end to end, against reading the same rows out of PostgreSQL.

    python -m tests.bench.recheck_against_read [loads]

One aircraft's loads, each with its own weights and fuel, against an empty weight 30 lb heavier: from the act
that asks to the act that files what came of it, in one process and shared by two, as the worker has hands.
Then against one so heavy that one load in a hundred comes outside: each is computed exactly, listed and
flagged.
Read are the columns that the recheck reads of every load, of the same rows and as many at a time, in one
statement through a cursor of the server, and thrown away: documents as text, and parsed as JSON, as nobody
can do without who has anything to do with a load.
Wanted: 3 times that or less, and memory that does not grow with the loads.
"""

import json
import multiprocessing
import resource
import sys
import time
from typing import Any

from tests.bench.ground import database
from tests.bench.stored_loads_copies import AIRCRAFT, copy_loads

AT_MOST = 3.0
# Each copy gets weights and fuel of its own, so that nothing is computed from memory.
_VARIED = """
UPDATE loads_declaration d SET body = convert_to(replace(replace(replace(convert_from(d.body, 'UTF8'),
    '"value":"181"', '"value":"' || (150 + m.i %% 61) || '"'),
    '"value":"120"', '"value":"' || (40 + m.i %% 121) || '.' || m.i %% 10 || '"'),
    '"value":"100"', '"value":"' || (85 + m.i %% 31) || '"'), 'UTF8')
FROM (SELECT load_id, row_number() OVER (ORDER BY load_id) AS i FROM loads_declaration) m
WHERE m.load_id = d.load_id
"""


def peak_mb() -> float:
    """Return the most memory this process has held, in MB."""
    return resource.getrusage(resource.RUSAGE_SELF).ru_maxrss / 1024


def vary() -> None:
    """Give each declaration figures of its own, past the guards as the copies were made."""
    from tests import databases

    with databases.connect("superuser") as admin, admin.cursor() as cursor:
        cursor.execute("SET session_replication_role = replica")
        cursor.execute("ALTER TABLE loads_declaration DISABLE TRIGGER ALL")
        cursor.execute(_VARIED, ())
        cursor.execute("VACUUM ANALYZE loads_declaration")


def read_all(*, parsed: bool = False) -> tuple[float, int]:
    """Return the seconds it takes to read the rows, documents as text or parsed, and how many there are."""
    from django.db import connection, transaction

    from loads.queries.stored_loads import AT_ONCE, BULK_COLUMNS, BULK_ROWS

    begun, count = time.monotonic(), 0
    with transaction.atomic(), connection.chunked_cursor() as cursor:
        cursor.execute(f"SELECT {BULK_COLUMNS} {BULK_ROWS}")
        while rows := cursor.fetchmany(AT_ONCE):
            count += len(rows)
            if parsed:
                for row in rows:
                    json.loads(row[1])
    return time.monotonic() - begun, count


def hand(number: str) -> None:
    """Do the work of a recheck until there is none left, as one worker."""
    from uuid import UUID

    from loads.actions.work_recheck import work_recheck

    while work_recheck(UUID(number)) != "finished":
        pass


def rechecked(people: Any, weight: Any, hands: int) -> tuple[float, Any]:
    """Return the seconds of a whole recheck, and how it stands at its end."""
    from django.db import connections

    from loads.actions.ask_recheck import ask_recheck
    from loads.queries.rechecks import progress_of
    from tests.cast import actor

    begun = time.monotonic()
    asked = {"aircraft": AIRCRAFT[0], "empty_weight": str(weight.id)}
    recheck = ask_recheck(asked, by=actor(people.manager))
    if hands == 1:
        hand(str(recheck.id))
    else:
        connections.close_all()
        forked = multiprocessing.get_context("fork")
        workers = [forked.Process(target=hand, args=(str(recheck.id),)) for _ in range(hands)]
        for one in workers:
            one.start()
        for one in workers:
            one.join()
    took = time.monotonic() - begun
    return took, progress_of(recheck)


def main(words: list[str]) -> int:
    """Print the table; 1 when a target is missed."""
    count = int((words or ["100000"])[0])
    with database():
        from django.conf import settings

        from fleet.actions.enter_empty_weight import enter_empty_weight
        from fleet.models import Aircraft
        from tests.cast import actor, cast
        from tests.makers import empty_weight_document, q, ready_aircraft

        settings.PASSWORD_HASHERS = ["django.contrib.auth.hashers.MD5PasswordHasher"]
        people = cast("bench-air")
        ready_aircraft(people, AIRCRAFT[0])
        copy_loads(people, count)
        vary()
        aircraft = Aircraft.objects.get(registration=AIRCRAFT[0])
        weight, heavy = (
            enter_empty_weight(
                actor(people.maintenance),
                aircraft,
                empty_weight_document(weight=q(pounds, "lb"), moment=q(moment, "lb in"), report=report),
            )
            for pounds, moment, report in (("5244", "644600", "W-2"), ("6544", "804500", "W-3"))
        )
        rows = read_all()[1]
        before = read_all()[0], read_all(parsed=True)[0]
        alone, stands = rechecked(people, weight, 1)
        memory = peak_mb()
        shared, _ = rechecked(people, weight, 2)
        flagging, flagged = rechecked(people, heavy, 2)
        after = read_all()[0], read_all(parsed=True)[0]
    reading, parsing = map(min, before, after)
    for each in (stands, flagged):
        print(json.dumps(each.counts), f"{each.exactly} computed one by one, {each.flagged} flagged")
    took = {
        "read, documents as text": reading,
        "read, documents parsed": parsing,
        "rechecked by one process": alone,
        "rechecked by two": shared,
        "by two, some outside": flagging,
    }
    for name, seconds in took.items():
        told = f"{rows / seconds:9,.0f}/s {seconds / reading:6.2f} times, {seconds / parsing:6.2f} of parsed"
        print(f"{rows:,} loads {name:<26}{seconds:8.2f} s {told}")
    print(f"target for two: {AT_MOST:.0f} times or less; most memory of the one process: {memory:.0f} MB")
    return 1 if shared / reading > AT_MOST else 0


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
