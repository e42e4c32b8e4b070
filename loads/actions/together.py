"""Writing rows of several tables in one statement.

A submission writes four rows. One statement instead of four saves three round trips and most of the time the
model layer takes; the witnesses and the foreign keys see each row just the same.
"""

from collections.abc import Sequence
from functools import lru_cache
from typing import TypeAlias

from django.db import connection, models

from records import prepared

_Field: TypeAlias = "models.Field[object, object]"


def insert_together(rows: Sequence[models.Model]) -> int:
    """This function will insert the rows, the last of which is given its number by the database; returns that
    number.

    Every other row brings its key. Rows may name each other, in any order. Values go to the driver as they
    are: texts, whole numbers, instants, identifiers, bytes; for JSON a model would have more to do.
    """
    plan = _plan(tuple(type(row) for row in rows))
    values = [getattr(row, name) for row, names in zip(rows, plan[1], strict=True) for name in names]
    ((number,),) = prepared.rows(plan[0], values)
    for row in rows:
        row._state.adding = False  # noqa: SLF001  # the mark by which the model layer knows a stored row
        row._state.db = connection.alias  # noqa: SLF001  # as above
    return int(number)


@lru_cache(maxsize=64)
def _plan(kinds: tuple[type[models.Model], ...]) -> tuple[str, tuple[tuple[str, ...], ...]]:
    """Return the statement for rows of these tables, and the names of the values it takes, row by row."""
    columns = tuple(_fields(kind, numbered=place == len(kinds) - 1) for place, kind in enumerate(kinds))
    inserts = [_insert(kind, fields) for kind, fields in zip(kinds, columns, strict=True)]
    before = ", ".join(f"row_{place} AS ({insert})" for place, insert in enumerate(inserts[:-1]))
    return f"{f'WITH {before} ' if before else ''}{inserts[-1]} RETURNING id", tuple(
        tuple(field.attname for field in fields) for fields in columns
    )


def _fields(kind: type[models.Model], *, numbered: bool) -> tuple[_Field, ...]:
    return tuple(
        field
        for field in kind._meta.concrete_fields  # noqa: SLF001  # Django's public way to ask a model
        if not field.generated and not (numbered and field.primary_key)
    )


def _insert(kind: type[models.Model], fields: Sequence[_Field]) -> str:
    quote = connection.ops.quote_name
    names = ", ".join(quote(str(field.column)) for field in fields)
    places = ", ".join(["%s"] * len(fields))
    table = quote(kind._meta.db_table)  # noqa: SLF001  # as above
    return f"INSERT INTO {table} ({names}) VALUES ({places})"  # noqa: S608  # names of our own models only
