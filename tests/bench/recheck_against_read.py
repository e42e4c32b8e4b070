"""Stored loads computed again end to end, against reading the same rows out of PostgreSQL.

    python -m tests.bench.recheck_against_read [loads]

One aircraft's loads, each with its own weights and fuel, against an empty weight 30 lb heavier: from the act
that asks to the act that files what came of it, in one process and shared by two, as the worker has hands.
Read are the same columns of the same rows, in one statement through a cursor of the server, and thrown away.
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
_READ = """
SELECT p.load_id, p.assessment_id, p.verdict, s.engine, convert_from(d.body, 'UTF8'),
       p.aircraft_id, (p.departure AT TIME ZONE 'UTC')::text || '+00:00', s.loading_basis_id,
       s.empty_weight_id, s.provisions, (s.assessed_at AT TIME ZONE 'UTC')::text || '+00:00'
FROM loads_present p JOIN loads_assessment s ON s.id = p.assessment_id
JOIN loads_declaration d ON d.load_id = p.load_id WHERE p.state NOT IN ('superseded', 'withdrawn')
"""
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


def read_all() -> tuple[float, int]:
    """Return the seconds it takes to read the rows, and how many there are."""
    from django.db import connection, transaction

    begun, count = time.monotonic(), 0
    with transaction.atomic(), connection.chunked_cursor() as cursor:
        cursor.execute(_READ)
        while rows := cursor.fetchmany(500):
            count += len(rows)
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
        document = empty_weight_document(weight=q("5244", "lb"), moment=q("644600", "lb in"), report="W-2")
        weight = enter_empty_weight(actor(people.maintenance), aircraft, document)
        read_all()
        reading, rows = read_all()
        alone, stands = rechecked(people, weight, 1)
        memory = peak_mb()
        shared, _ = rechecked(people, weight, 2)
        again, _ = read_all()
    reading = min(reading, again)
    print(json.dumps(stands.counts), f"{stands.exactly} computed one by one, {stands.flagged} flagged")
    for name, seconds in (("read", reading), ("rechecked by one process", alone), ("by two", shared)):
        rate, ratio = rows / seconds, seconds / reading
        print(f"{rows:,} loads {name:<26}{seconds:8.2f} s {rate:9,.0f}/s {ratio:6.2f} times")
    print(f"target for two: {AT_MOST:.0f} times or less; most memory of the one process: {memory:.0f} MB")
    return 1 if shared / reading > AT_MOST else 0


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
