"""Derived tables: does each hold what the guarded rows say, no more, no less, nothing else?"""

from collections.abc import Iterator
from typing import Any, Final

from django.db import connections

from records.chain import Finding

_AT_MOST: Final = 20  # findings a table, so that one loss does not bury the rest
_TABLES: Final = """
SELECT name, key, derived_by, to_regclass('public.' || quote_ident(name)) IS NULL
FROM records_guarded_table WHERE mode = 'derived' ORDER BY name
"""
# Rows that are alike on both sides drop out first; only what is left is looked at column by column.
_ROWS: Final = """
WITH asked AS MATERIALIZED (SELECT to_jsonb(s.*) AS r FROM ({derived_by}) s),
held AS MATERIALIZED (SELECT to_jsonb(t.*) AS r FROM public.{table} t),
wrong AS (SELECT r FROM held EXCEPT ALL SELECT r FROM asked),
lacking AS (SELECT r FROM asked EXCEPT ALL SELECT r FROM held)
SELECT row_key(coalesce(l.r, w.r), %(key)s::text[]), l.r::text, w.r::text,
    (SELECT string_agg(e.key, ', ' ORDER BY e.key) FROM jsonb_each(l.r) e
     WHERE w.r -> e.key IS DISTINCT FROM e.value)
FROM wrong w FULL JOIN lacking l ON row_key(w.r, %(key)s::text[]) = row_key(l.r, %(key)s::text[])
ORDER BY 1 LIMIT %(at_most)s
"""


def false_rows(using: str = "default") -> Iterator[Finding]:
    """This function will return each row of a derived table that is false, missing or of nothing.

    What must stand there is asked of the query in the register, which is itself under guard.
    """
    with connections[using].cursor() as cursor:
        cursor.execute(_TABLES)
        for name, key, derived_by, gone in cursor.fetchall():
            if gone:
                yield Finding(f"table {name}", "the table", "rows derived from guarded ones", "no such table")
                continue
            table = connections[using].ops.quote_name(name)
            # The query is a text of our own migrations; a per cent sign in it is not a place for a value.
            statement = _ROWS.format(table=table, derived_by=derived_by.replace("%", "%%"))
            cursor.execute(statement, {"key": key, "at_most": _AT_MOST})
            for row in cursor.fetchall():
                yield _finding(name, *row)


def _finding(table: str, key: str, derived: str | None, held: str | None, columns: Any) -> Finding:
    where = f"row {key} of {table}"
    if derived is None:
        return Finding(where, "it follows from no guarded row", "no row", (held or "")[:400])
    if held is None:
        return Finding(where, "it is missing", derived[:400], "no row")
    return Finding(where, f"it differs in {columns} from the rows it follows from", derived[:400], held[:400])
