"""Following a chain of a million entries, as they stand in the database, against bare SHA-256 chaining.

    python -m tests.bench.long_chain [entries]

The entries are made here, as the seal writes them, and put in as the superuser; bare chaining hashes the same
texts, each with the digest before it, and does nothing else. Both are of this language and read the same
rows. Wanted: at least half of the bare rate, and the chain found sound.
"""

import hashlib
import json
import sys
import time
from collections.abc import Iterator, Mapping

from tests.bench.ground import database

TARGET = 0.5
CHAIN = "long-chain"
COLUMNS = ("chain", "position", "act_id", "previous", "digest", "entry")


def entries(count: int) -> Iterator[tuple[str, int, str, str | None, str, str]]:
    """This function will make the rows of a chain of that many entries, each with one row's change."""
    from records.chain import SCHEMA, entry_digest

    previous = None
    for position in range(1, count + 1):
        act = f"01a20000-0000-7000-8000-{position:012x}"
        head = {"schema": SCHEMA, "chain": CHAIN, "position": position, "previous": previous}
        text = _written(head | {"act": _act(act), "changes": []}).removesuffix("]}") + _change(act) + "]}"
        digest = entry_digest(text)
        yield CHAIN, position, act, previous, digest, text
        previous = digest


def _act(number: str) -> dict[str, object]:
    return {
        "id": number,
        "at": "2026-12-01T12:00:00.000000Z",
        "kind": "withdraw-load",
        "actor": {"kind": "person", "key": "person:7", "name": f"sha256:{'0' * 64}", "capacity": "pilot"},
        "about": f"load:{number}",
        "reason": "not flown",
        "caused_by": None,
        "request": number,
    }


def _change(number: str) -> str:
    """This function will write the change of one step, its image spaced as the database spaces it."""
    image = {
        "id": 7,
        "at": "2026-12-01T12:00:00+00:00",
        "act": number,
        "after": "withdrawn",
        "before": "open",
        "number": 2,
        "reason": "not flown",
        "load_id": number,
        "operator_id": CHAIN,
        "assessment_id": number,
    }
    change = {"table": "loads_step", "key": number, "operation": "insert"}
    return f'{_written(change)[:-1]},"image":{json.dumps(image)}}}'


def _written(document: Mapping[str, object]) -> str:
    return json.dumps(document, separators=(",", ":"))


def put_in(count: int) -> None:
    """This function will write the chain past every guard, as only a superuser can."""
    from tests import databases

    with databases.connect("superuser") as admin, admin.cursor() as cursor:
        cursor.execute("SET session_replication_role = replica")
        cursor.execute(
            "SELECT tgname FROM pg_trigger WHERE tgrelid = 'records_seal'::regclass AND tgenabled = 'A'"
        )
        for (trigger,) in cursor.fetchall():
            cursor.execute(f'ALTER TABLE records_seal DISABLE TRIGGER "{trigger}"')
        with cursor.copy(f"COPY records_seal ({', '.join(COLUMNS)}) FROM STDIN") as copy:
            for row in entries(count):
                copy.write_row(row)
        cursor.execute("ANALYZE records_seal")


def bare(chain: str) -> int:
    """This function will read the same rows and hash them into a chain, and do nothing else."""
    from tests import databases

    read, digest = 0, b""
    with databases.connect("superuser") as admin, admin.transaction(), admin.cursor(name="bare") as cursor:
        cursor.itersize = 2000
        cursor.execute(
            "SELECT chain, position, previous, digest, entry FROM records_seal "
            "WHERE chain = %s ORDER BY position",
            [chain],
        )
        for row in cursor:
            digest = hashlib.sha256(digest + row[4].encode("utf-8")).digest()
            read += 1
    return read


def main(count: int) -> int:
    """Print the table; 1 when the chain was not found sound, or following it was too slow."""
    with database():
        from django.db import transaction

        from records.verify import follow_chains

        put_in(count)
        took: dict[str, list[float]] = {"bare": [], "verify": []}
        for _ in range(3):
            begun = time.perf_counter()
            read = bare(CHAIN)
            took["bare"].append(time.perf_counter() - begun)
            begun = time.perf_counter()
            with transaction.atomic(using="superuser"):
                found = follow_chains("superuser")
            took["verify"].append(time.perf_counter() - begun)
    head = next(one for one in found.heads if one.chain == CHAIN)
    rate = {name: count / min(times) for name, times in took.items()}
    share = rate["verify"] / rate["bare"]
    sound = not found.broken and head.position == read == count
    print(f"{'entries followed':<40}{head.position:>12,}")
    print(f"{'found sound':<40}{'yes' if sound else 'no':>12}")
    print(f"{'entries a second, verify':<40}{rate['verify']:>12,.0f}")
    print(f"{'entries a second, bare chaining':<40}{rate['bare']:>12,.0f}")
    print(f"{'verify / bare':<40}{share:>12.2f}    (target {TARGET} or more)")
    return 0 if sound and share >= TARGET else 1


if __name__ == "__main__":
    sys.exit(main(int((sys.argv[1:] or ["1000000"])[0])))
