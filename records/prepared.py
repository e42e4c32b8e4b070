"""Statements that are asked with every request: written out, and planned once a session by the database.

The model layer builds the SQL of a query anew each time it is asked, which costs several times the query. A
page may cost that; what every submission asks may not.
"""

from collections.abc import Sequence
from functools import lru_cache
from typing import Any, TypeVar

from django.db import DEFAULT_DB_ALIAS, connections, models
from psycopg import Cursor

_Row = TypeVar("_Row", bound=models.Model)


def rows(statement: str, values: Sequence[object]) -> list[tuple[Any, ...]]:
    """This function will run one statement, `%s` for each value, and return the rows it gives, some or none.

    The statement is a fixed text, since each text is kept as a plan. It runs in the transaction that is
    open, like a query of the models, and raises Django's errors of the database.
    """
    database = connections[DEFAULT_DB_ALIAS]
    database.close_if_health_check_failed()
    database.ensure_connection()
    database.validate_no_broken_transaction()
    with database.wrap_database_errors, Cursor(database.connection) as cursor:
        return cursor.execute(statement, values, prepare=True).fetchall()


@lru_cache(maxsize=64)
def columns(kind: type[models.Model], alias: str) -> str:
    """This function will return the columns of a model's table under an alias, as `instance` reads them."""
    return ", ".join(f'{alias}."{field.column}"' for field in _fields(kind))


def instance(kind: type[_Row], row: Sequence[Any], start: int = 0) -> _Row:
    """This function will return the model's row whose columns stand in `row` from `start` on.

    For models whose values the driver reads by itself: no JSON, no choices of our own.
    """
    names = [field.attname for field in _fields(kind)]
    return kind.from_db(DEFAULT_DB_ALIAS, names, row[start : start + len(names)])


def width(kind: type[models.Model]) -> int:
    """This function will return how many columns `columns` names."""
    return len(_fields(kind))


def _fields(kind: type[models.Model]) -> Sequence[Any]:
    return kind._meta.concrete_fields  # noqa: SLF001  # Django's public way to ask a model
