"""Every way of writing, tried on every guarded table of the catalogue.

For each table a transaction of the superuser takes away what is not a guard (checks, foreign keys, unique
keys and triggers of other purpose), so that nothing but the guards can refuse; then it writes as the service
role. All of it is rolled back.
"""

import datetime as dt
import decimal
import uuid
from collections.abc import Callable, Iterator
from contextlib import contextmanager
from dataclasses import dataclass
from typing import Any

import psycopg
from django.apps import apps
from django.contrib.postgres.fields import ArrayField, DateTimeRangeField
from django.db import DatabaseError, connections, models, transaction
from django.db.backends.postgresql.psycopg_any import DateTimeTZRange

from records.act import _SEAL
from tests.databases import connect

ALIAS = "superuser"
OPERATOR = "matrix"
# What a refusal may be: one of the guards (class TB), or no right to do that at all.
REFUSALS = {"TB001", "TB004", "TB005", "42501"}
OPEN = "SELECT act_open('{chain}', 'try-cell', 'service', 'service:matrix', '', '', 'matrix:1')"


@dataclass(frozen=True)
class Table:
    """A guarded table as the register has it, with its Django model."""

    name: str
    mode: str
    key: tuple[str, ...]
    operator_column: str
    model: type[models.Model]

    @property
    def keyed_by_operator(self) -> bool:
        """Whether a row is an operator: only the house may add one."""
        return self.key == (self.operator_column,)

    @property
    def opening(self) -> str:
        """The statement that opens an act which may write here."""
        return OPEN.format(chain="house" if self.keyed_by_operator else OPERATOR)


def tables() -> list[Table]:
    """This function will return every guarded table, in the order of their names."""
    by_table = {model._meta.db_table: model for model in apps.get_models()}
    with connect("superuser") as admin:
        rows = admin.execute(
            "SELECT name, mode, key, operator_column FROM records_guarded_table "
            "WHERE mode IN ('append', 'close-once', 'edit') AND name <> 'records_guarded_table' ORDER BY name"
        ).fetchall()
    return [Table(name, mode, tuple(key), operator, by_table[name]) for name, mode, key, operator in rows]


@dataclass
class Cell:
    """One way of writing at work on one table: the row that is there and rows that could be added."""

    table: Table
    row: models.Model

    @property
    def rows(self) -> models.QuerySet:
        return self.table.model._default_manager.using(ALIAS)

    def new(self) -> models.Model:
        return made(self.table)

    def run(self, statement: str) -> None:
        with connections[ALIAS].cursor() as cursor:
            cursor.execute(statement)


def _columns(table: Table) -> str:
    return ", ".join(
        f'"{field.column}"' for field in table.model._meta.concrete_fields if not field.generated
    )


def create(cell: Cell) -> int:
    cell.new().save(using=ALIAS, force_insert=True)
    return 1


def bulk_create(cell: Cell) -> int:
    cell.rows.bulk_create([cell.new(), cell.new(), cell.new()])
    return 3


def update(cell: Cell) -> int:
    return cell.rows.filter(pk=cell.row.pk).update(**{cell.table.operator_column: OPERATOR})


def bulk_update(cell: Cell) -> int:
    fields = [
        field.name
        for field in cell.row._meta.concrete_fields
        if not field.primary_key and not field.generated
    ]
    return cell.rows.bulk_update([cell.row], fields[:2]) if fields else update(cell)


def save_again(cell: Cell) -> int:
    cell.row.save(using=ALIAS, force_update=True)
    return 1


def upsert(cell: Cell) -> int:
    fields = [
        field.name
        for field in cell.row._meta.concrete_fields
        if not field.primary_key and not field.generated
    ]
    unique = [cell.row._meta.pk.name]
    cell.rows.bulk_create([cell.row], update_conflicts=True, update_fields=fields, unique_fields=unique)
    return 1


def delete(cell: Cell) -> int:
    cell.rows.filter(pk=cell.row.pk)._raw_delete(ALIAS)
    return 1


def raw_insert(cell: Cell) -> int:
    columns = _columns(cell.table)
    cell.run(f"INSERT INTO {cell.table.name} ({columns}) SELECT {columns} FROM matrix_rows")
    return 2


def raw_update(cell: Cell) -> int:
    column = cell.table.operator_column
    cell.run(f"UPDATE {cell.table.name} SET {column} = {column}")
    return 1


def raw_delete(cell: Cell) -> int:
    cell.run(f"DELETE FROM {cell.table.name}")
    return 1


def truncate(cell: Cell) -> int:
    cell.run(f"TRUNCATE {cell.table.name} CASCADE")
    return 1


def copy_in(cell: Cell) -> int:
    columns = _columns(cell.table)
    with connections[ALIAS].cursor() as cursor:
        with cursor.copy(f"COPY matrix_rows ({columns}) TO STDOUT") as out:
            lines = b"".join(out)
        with cursor.copy(f"COPY {cell.table.name} ({columns}) FROM STDIN") as into:
            into.write(lines)
    return 2


def merge_insert(cell: Cell) -> int:
    columns = _columns(cell.table)
    values = ", ".join(f"s.{column}" for column in columns.split(", "))
    cell.run(
        f"MERGE INTO {cell.table.name} t USING matrix_rows s ON false "
        f"WHEN NOT MATCHED THEN INSERT ({columns}) VALUES ({values})"
    )
    return 2


def merge_update(cell: Cell) -> int:
    column = cell.table.operator_column
    cell.run(
        f"MERGE INTO {cell.table.name} t USING (VALUES (1)) s (i) ON true "
        f"WHEN MATCHED THEN UPDATE SET {column} = t.{column}"
    )
    return 1


def cascade(cell: Cell) -> int:
    cell.run("DELETE FROM matrix_parent")
    return 1


# Each way of writing with what it does to a row.
OPERATIONS: dict[Callable[[Cell], int], str] = {
    create: "insert",
    bulk_create: "insert",
    raw_insert: "insert",
    copy_in: "insert",
    merge_insert: "insert",
    update: "update",
    save_again: "update",
    bulk_update: "update",
    upsert: "update",
    raw_update: "update",
    merge_update: "update",
    delete: "delete",
    raw_delete: "delete",
    truncate: "delete",
    cascade: "delete",
}


def made(table: Table) -> models.Model:
    """This function will make a row of the table with some value in every column that needs one."""
    row = table.model()
    for field in table.model._meta.concrete_fields:
        if field.generated:
            continue
        filled = field.null or field.has_default() or field.db_default is not models.NOT_PROVIDED
        if table.operator_column in {field.attname, field.column}:
            setattr(row, field.attname, f"m-{uuid.uuid4().hex[:12]}" if table.keyed_by_operator else OPERATOR)
        elif (field.primary_key or not filled) and not isinstance(field, models.AutoField):
            setattr(row, field.attname, _value(field))
    return row


_numbers = iter(range(900_000, 10_000_000))


_MOMENT = dt.datetime(2026, 12, 1, tzinfo=dt.UTC)
# A value for each kind of column, the narrower kinds first.
_VALUES: tuple[tuple[type, Callable[[Any], object]], ...] = (
    (models.DateTimeField, lambda _: _MOMENT),
    (models.DateField, lambda _: _MOMENT.date()),
    (DateTimeRangeField, lambda _: DateTimeTZRange(_MOMENT, None)),
    (models.UUIDField, lambda _: uuid.uuid4()),
    (models.BooleanField, lambda _: True),
    (models.SmallIntegerField, lambda _: next(_numbers) % 30_000),
    (models.IntegerField, lambda _: next(_numbers)),
    (models.DecimalField, lambda _: decimal.Decimal(1)),
    (models.BinaryField, lambda _: uuid.uuid4().bytes * 2),
    (ArrayField, lambda _: []),
    (models.JSONField, lambda _: {}),
    (models.CharField, lambda field: uuid.uuid4().hex[: field.max_length or 32]),
    (models.TextField, lambda _: uuid.uuid4().hex),
)


def _value(field: Any) -> object:
    while isinstance(field, models.ForeignKey):
        field = field.target_field
    for kind, make in _VALUES:
        if isinstance(field, kind):
            return make(field)
    raise AssertionError(f"no value is known for {field}: say here what one looks like")


@contextmanager
def laid_bare(table: Table) -> Iterator[Cell]:
    """This function will hold one row of the table with nothing but the guards on it, and take it all
    back.
    """
    with transaction.atomic(using=ALIAS):
        with connections[ALIAS].cursor() as cursor:
            cursor.execute(_STRIP.format(table=table.name))
            cursor.execute(table.opening)
            row, *others = made(table), made(table), made(table)
            lines = _lines_of(table, others)
            cursor.execute(f"CREATE TABLE matrix_rows (LIKE {table.name} INCLUDING GENERATED)")
            with cursor.copy(f"COPY matrix_rows ({_columns(table)}) FROM STDIN") as into:
                into.write(lines)
            row.save(using=ALIAS, force_insert=True)
            cursor.execute(_SEAL)
            cursor.execute(_PARENT.format(table=table.name))
        yield Cell(table, row)
        transaction.set_rollback(True, using=ALIAS)


def _lines_of(table: Table, rows: list[models.Model]) -> bytes:
    """The rows as COPY writes them; the table itself is left as it was."""
    state = transaction.savepoint(using=ALIAS)
    for row in rows:
        row.save(using=ALIAS, force_insert=True)
    # Only these: a table may have a row from the start.
    key, columns = table.model._meta.pk.column, _columns(table)
    query = f"COPY (SELECT {columns} FROM {table.name} WHERE {key}::text = ANY(%s)) TO STDOUT"
    with (
        connections[ALIAS].cursor() as cursor,
        cursor.copy(query, [[str(row.pk) for row in rows]]) as out,
    ):
        lines = b"".join(out)
    transaction.savepoint_rollback(state, using=ALIAS)
    return lines


def tried(cell: Cell, operation: Callable[[Cell], int], *, in_act: bool) -> tuple[str, int, int]:
    """This function will do one cell as the service role and take it back.

    Returns the outcome ("done" or an SQLSTATE), the changes witnessed of this table, and the rows written.
    """
    count = f"SELECT (SELECT count(*) FROM records_change WHERE table_name = '{cell.table.name}')"
    outcome, wrote, state = "done", 0, transaction.savepoint(using=ALIAS)
    with connections[ALIAS].cursor() as cursor:
        cursor.execute("SET LOCAL ROLE tarebook_service")
        if in_act:
            cursor.execute(cell.table.opening)
        cursor.execute(count)
        before = cursor.fetchone()[0]
        try:
            with transaction.atomic(using=ALIAS):
                wrote = operation(cell)
        except (DatabaseError, psycopg.Error) as error:  # a COPY goes past Django's own wrapping
            outcome = getattr(error, "sqlstate", None) or error.__cause__.sqlstate
        cursor.execute(count)
        witnessed = cursor.fetchone()[0] - before
    transaction.savepoint_rollback(state, using=ALIAS)
    return outcome, witnessed, wrote


_STRIP = """
DO $$
DECLARE
    one record;
BEGIN
    FOR one IN SELECT conname AS called FROM pg_constraint
               WHERE conrelid = '{table}'::regclass AND contype IN ('c', 'f', 'u', 'x') LOOP
        EXECUTE format('ALTER TABLE {table} DROP CONSTRAINT IF EXISTS %I CASCADE', one.called);
    END LOOP;
    FOR one IN SELECT indexrelid::regclass AS called FROM pg_index
               WHERE indrelid = '{table}'::regclass AND indisunique AND NOT indisprimary LOOP
        EXECUTE format('DROP INDEX %s CASCADE', one.called);
    END LOOP;
    FOR one IN SELECT tgname AS called FROM pg_trigger
               WHERE tgrelid = '{table}'::regclass AND NOT tgisinternal
               AND tgname NOT LIKE 'witness\\_%' AND tgname NOT LIKE 'refuse\\_%' LOOP
        EXECUTE format('DROP TRIGGER %I ON {table}', one.called);
    END LOOP;
END $$;
"""

_PARENT = """
CREATE TABLE matrix_parent (id int PRIMARY KEY);
INSERT INTO matrix_parent VALUES (1);
ALTER TABLE {table} ADD COLUMN matrix_parent int DEFAULT 1 REFERENCES matrix_parent ON DELETE CASCADE;
GRANT SELECT, DELETE ON matrix_parent TO tarebook_service;
GRANT SELECT ON matrix_rows TO tarebook_service;
"""
