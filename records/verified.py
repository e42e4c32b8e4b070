"""Following the trail again and again, in the background, and keeping how far it held.

Onwards, every few minutes: each chain from where it last held; that entry must still be there as it was, so a
tail that was cut off or made anew is found. Everything, once a night: what `manage.py verify` does.
"""

import logging
from collections.abc import Iterator
from dataclasses import dataclass
from datetime import datetime
from typing import Any, Final

from django.db import connection, transaction
from django.db.models.functions import Now

from records.chain import ChainBroken, Finding, Head, Link, follow_one
from records.models.verified import Verified
from records.reconcile import reconcile
from records.verify import altered_documents, follow_chains

log = logging.getLogger(__name__)

EVERYTHING: Final = ""  # the row that stands for chains, documents, rows and guards together
_BATCH: Final = 500
_LENGTHS: Final = "SELECT chain, max(position) FROM records_seal GROUP BY chain"
_LINKS: Final = """
SELECT chain, position, previous, digest, entry FROM records_seal
WHERE chain = %s AND position >= %s ORDER BY position
"""


@dataclass(frozen=True, slots=True)
class LastVerified:
    """What a monitor is told: entries up to the verified places, entries since, the oldest time, and whether
    all held. `at` is None when some chain was never followed, `whole_at` when everything never was.
    """

    entries: int
    waiting: int
    at: datetime | None
    whole_at: datetime | None
    sound: bool


def verify_onwards() -> tuple[Finding, ...]:
    """This function will follow every chain from where it last held, keep how far it holds, and return what
    does not.
    """
    before = {row.chain: row for row in Verified.objects.exclude(chain=EVERYTHING)}
    with connection.cursor() as cursor:
        cursor.execute(_LENGTHS)
        lengths = dict(cursor.fetchall())
    found = []
    for chain in sorted(lengths.keys() | before.keys()):
        row = before.get(chain)
        # What does not hold keeps its last sound place, so it is told again each round until it is put back.
        start = Head(chain, row.position, row.digest or None) if row else Head(chain)
        head, finding = _onwards(start)
        _keep(head, finding)
        if finding:
            found.append(finding)
    return _told(found)


def verify_everything() -> tuple[Finding, ...]:
    """This function will verify chains, documents, rows and guards as of one moment, keep it, and return what
    does not hold.
    """
    outermost = not connection.in_atomic_block
    with transaction.atomic():
        if outermost:
            with connection.cursor() as cursor:
                cursor.execute("SET TRANSACTION ISOLATION LEVEL REPEATABLE READ, READ ONLY")
        chains = follow_chains()
        findings = (*chains.broken, *altered_documents(), *reconcile())
    entries = sum(head.position for head in chains.heads)
    _keep(Head(EVERYTHING, entries), findings[0] if findings else None)
    return _told(findings)


def last_verified() -> LastVerified:
    """This function will return how far the trail was verified, and when."""
    rows = {row.chain: row for row in Verified.objects.all()}
    whole = rows.pop(EVERYTHING, None)
    with connection.cursor() as cursor:
        cursor.execute(_LENGTHS)
        lengths = dict(cursor.fetchall())
    entries = sum(row.position for row in rows.values())
    followed = bool(rows) and lengths.keys() <= rows.keys()
    return LastVerified(
        entries=entries,
        waiting=max(0, sum(lengths.values()) - entries),
        at=min(row.at for row in rows.values()) if followed else None,
        whole_at=whole.at if whole else None,
        sound=not any(row.broken for row in (*rows.values(), *((whole,) if whole else ()))),
    )


def _onwards(start: Head) -> tuple[Head, Finding | None]:
    head, first = start, start.position > 0
    with transaction.atomic(), connection.chunked_cursor() as cursor:
        cursor.execute(_LINKS, [start.chain, start.position])
        for row in _rows(cursor):
            link = Link(*row)
            if first:
                first = False
                if (link.position, link.digest) != (start.position, start.digest):
                    return start, _changed(start, f"entry {link.position}, {link.digest}")
                # The entry itself is hashed again; what is before it held when it was last followed.
                head = Head(start.chain, start.position - 1, link.previous)
            try:
                head = follow_one(link, head)
            except ChainBroken as at:
                where = f"chain {at.chain}, entry {at.position}"
                return head, Finding(where, at.what, str(at.expected), str(at.found))
    return (start, _changed(start, "no such entry")) if first else (head, None)


def _changed(start: Head, found: str) -> Finding:
    where = f"chain {start.chain}, entry {start.position}"
    return Finding(where, "the entry that held when last followed", str(start.digest), found)


def _keep(head: Head, finding: Finding | None) -> None:
    Verified.objects.update_or_create(
        chain=head.chain,
        defaults={
            "position": head.position,
            "digest": head.digest or "",
            "at": Now(),
            "broken": f"{finding.where}: {finding.what}"[:300] if finding else "",
        },
    )


def _told(findings: list[Finding] | tuple[Finding, ...]) -> tuple[Finding, ...]:
    for finding in findings:
        # Both values are for `manage.py verify`: rows may hold what does not belong in a log.
        log.error("the trail does not hold: %s: %s", finding.where, finding.what)
    return tuple(findings)


def _rows(cursor: Any) -> Iterator[tuple[Any, ...]]:
    while rows := cursor.fetchmany(_BATCH):
        yield from rows
