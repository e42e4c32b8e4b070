"""Whether the rows of today are what the trail last saw of them, and whether the trail agrees with itself.

This is the only detector of a trigger that was switched off, used behind the trail's back, and switched on
again.
"""

import json
from collections.abc import Iterator
from datetime import UTC
from typing import Any

from django.db import connections

from records.access_log import broken_rows
from records.chain import Finding
from records.derived import false_rows
from records.guard import missing_guards

_BATCH = 500
_AT_MOST = 20  # findings a table, so that one loss does not bury the rest
# The images were made under these settings; so must what they are compared with.
_SETTINGS = (
    "SELECT set_config('TimeZone', 'UTC', true), set_config('DateStyle', 'ISO, YMD', true), "
    "set_config('IntervalStyle', 'iso_8601', true), set_config('bytea_output', 'hex', true), "
    "set_config('extra_float_digits', '1', true)"
)
_ACTS = """
SELECT s.chain, s.position, s.entry, a.id, a.at, a.kind, a.actor_kind, a.actor_key, a.name_digest, a.capacity,
    a.about, a.reason, a.caused_by, a.request, a.chain,
    (SELECT coalesce(string_agg('{"table":' || to_json(c.table_name)::text
            || ',"key":' || to_json(c.row_key)::text
            || ',"operation":' || to_json(c.operation)::text
            || ',"image":' || c.image || '}', ',' ORDER BY c.id), '')
     FROM records_change c WHERE c.act_id = s.act_id)
FROM records_seal s LEFT JOIN records_act a ON a.id = s.act_id ORDER BY s.chain COLLATE "C", s.position
"""
_UNSEALED = """
SELECT 'act ' || a.id, 'its seal' FROM records_act a
WHERE NOT EXISTS (SELECT FROM records_seal s WHERE s.act_id = a.id)
UNION ALL
SELECT 'change ' || c.id || ' of ' || c.table_name || ' ' || c.row_key, 'its act' FROM records_change c
WHERE NOT EXISTS (SELECT FROM records_seal s WHERE s.act_id = c.act_id)
"""
_NAMES = """
SELECT n.id, n.digest, 'sha256:' || encode(sha256(n.salt || n.name), 'hex') FROM records_name n
WHERE n.digest <> 'sha256:' || encode(sha256(n.salt || n.name), 'hex')
"""
_ROWS = """
WITH today AS (
    SELECT row_key(s.r, %(key)s::text[]) AS k,
        row_image(s.r, %(personal)s::text[], %(binary_personal)s::text[], %(hidden)s::text[]) AS image
    FROM (SELECT to_jsonb(t.*) AS r FROM public.{table} t) s
), witnessed AS (
    SELECT DISTINCT ON (row_key) row_key AS k, image::jsonb - %(hidden)s::text[] AS image, act_id
    FROM records_change
    WHERE table_name = %(name)s ORDER BY row_key, id DESC
)
SELECT coalesce(t.k, w.k), s.chain, s.position, t.k IS NULL, w.k IS NULL,
    (SELECT string_agg(e.key, ', ' ORDER BY e.key) FROM jsonb_each(w.image) e
     WHERE (t.image -> e.key)::text IS DISTINCT FROM e.value::text),
    w.image::text, t.image::text
FROM today t FULL JOIN witnessed w USING (k) LEFT JOIN records_seal s ON s.act_id = w.act_id
WHERE t.k IS NULL OR w.k IS NULL
   OR EXISTS (SELECT FROM jsonb_each(w.image) e WHERE (t.image -> e.key)::text IS DISTINCT FROM e.value::text)
ORDER BY s.chain, s.position, 1 LIMIT %(at_most)s
"""


def reconcile(using: str = "default") -> tuple[Finding, ...]:
    """This function will compare the whole trail with itself, with the rows of every guarded table, the
    derived tables with the rows they follow from, the log of sign-ins with what was sealed of it, and the
    guards with their definitions.

    It returns what does not fit, in that order. Runs inside a transaction of the caller.
    """
    with connections[using].cursor() as cursor:
        cursor.execute(_SETTINGS)
    return (
        *_entries_and_their_rows(using),
        *_loose_ends(using),
        *_rows_of_today(using),
        *false_rows(using),
        *broken_rows(using),
        *(Finding("guards", sentence, "as defined", "not so") for sentence in missing_guards(using)),
    )


def _entries_and_their_rows(using: str) -> Iterator[Finding]:
    """Each sealed entry against the act and the changes it was made of."""
    with connections[using].chunked_cursor() as cursor:
        cursor.execute(_ACTS)
        while rows := cursor.fetchmany(_BATCH):
            for chain, position, entry, *act, changes in rows:
                yield from _entry_and_its_rows(f"chain {chain}, entry {position}", entry, act, changes)


def _entry_and_its_rows(where: str, entry: str, act: list[Any], changes: str) -> Iterator[Finding]:
    if act[0] is None:
        yield Finding(where, "the act it seals", "a row in records_act", "none")
        return
    try:
        inside = json.loads(entry)
        sealed = {**inside["act"], "chain": inside["chain"]}
    except (ValueError, TypeError, KeyError):
        yield Finding(where, "the entry", "a readable act", entry[:80])
        return
    stored = _act_as_sealed(act)
    for name in stored:
        if stored[name] != sealed.get(name):
            yield Finding(where, f"{name} of the act", str(sealed.get(name)), str(stored[name]))
    if not entry.endswith(f'}},"changes":[{changes}]}}'):
        yield Finding(
            where, "the changes of the act", json.dumps(inside.get("changes"))[:400], f"[{changes}]"[:400]
        )


def _act_as_sealed(act: list[Any]) -> dict[str, object]:
    number, at, kind, actor_kind, actor_key, name, capacity, about, reason, caused_by, request, chain = act
    return {
        "id": str(number),
        "at": f"{at.astimezone(UTC):%Y-%m-%dT%H:%M:%S.%f}Z",
        "kind": kind,
        "actor": {"kind": actor_kind, "key": actor_key, "name": name, "capacity": capacity},
        "about": about,
        "reason": reason,
        "caused_by": None if caused_by is None else str(caused_by),
        "request": request,
        "chain": chain,
    }


def _loose_ends(using: str) -> Iterator[Finding]:
    with connections[using].cursor() as cursor:
        cursor.execute(_UNSEALED)
        for where, missing in cursor.fetchall():
            yield Finding(where, missing, "a sealed entry", "none")
        cursor.execute(_NAMES)
        for number, digest, found in cursor.fetchall():
            yield Finding(f"name {number}", "the digest of a name", digest, found)


def _rows_of_today(using: str) -> Iterator[Finding]:
    """Every row of every guarded table against its last witnessed image: only the keys of the image, since a
    later migration adds columns.
    """
    with connections[using].cursor() as cursor:
        cursor.execute(
            "SELECT name, key, personal, binary_personal, hidden, "
            "to_regclass('public.' || quote_ident(name)) IS NULL, "
            "EXISTS (SELECT FROM records_change c WHERE c.table_name = g.name) "
            "FROM records_guarded_table g WHERE mode IN ('append', 'close-once', 'edit') ORDER BY name"
        )
        for name, key, personal, binary_personal, hidden, gone, witnessed in cursor.fetchall():
            if gone:
                if witnessed:
                    yield Finding(f"table {name}", "the table", "rows that were witnessed", "no such table")
                continue
            lists = {"key": key, "personal": personal, "binary_personal": binary_personal, "hidden": hidden}
            values = {**lists, "name": name, "at_most": _AT_MOST}
            cursor.execute(_ROWS.format(table=connections[using].ops.quote_name(name)), values)
            for row in cursor.fetchall():
                yield _row_finding(name, row)


def _row_finding(table: str, row: tuple[Any, ...]) -> Finding:
    key, chain, position, gone, unseen, columns, witnessed, today = row
    where = f"row {key} of {table}"
    if unseen:
        return Finding(where, "it was never witnessed", "no row", today[:400])
    where += f", last witnessed by chain {chain}, entry {position}"
    if gone:
        return Finding(where, "it is gone", witnessed[:400], "no row")
    return Finding(where, f"it differs in {columns}", witnessed[:400], today[:400])
