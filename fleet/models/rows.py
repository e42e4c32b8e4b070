"""Database expressions shared by the rows of the house, and identifiers needed before a row is written."""

from functools import partial
from uuid import UUID

from django.db import connection, models

# PostgreSQL 18's own time-ordered identifier (RFC 9562, version 7). A plain Func, so that migrations name
# Django's class and nothing of ours.
Uuid7 = partial(models.Func, function="uuidv7", output_field=models.UUIDField())


def new_uuid() -> UUID:
    """This function will draw an identifier for a row whose act must name it before it is written."""
    with connection.cursor() as cursor:
        cursor.execute("SELECT uuidv7()")
        (drawn,) = cursor.fetchone()
    return UUID(str(drawn))


def new_number(model: type[models.Model]) -> int:
    """This function will draw the next number of a table, for a row whose act must name it beforehand."""
    table = model._meta.db_table  # noqa: SLF001  # Django's documented interface, in spite of the name
    with connection.cursor() as cursor:
        cursor.execute("SELECT nextval(pg_get_serial_sequence(%s, 'id'))", [table])
        (drawn,) = cursor.fetchone()
    return int(drawn)
