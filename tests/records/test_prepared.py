"""Statements kept as plans: they see the open transaction, and their errors are Django's."""

import pytest
from django.db import IntegrityError, connection, transaction
from django.db.transaction import TransactionManagementError

from records.models import Receipt
from records.prepared import columns, instance, rows, width

pytestmark = pytest.mark.django_db

PUT = (
    "INSERT INTO records_receipt (actor, key, request_digest, status, headers, body, answered_at) "
    "VALUES (%s, %s, 'x', %s, '{}', %s, statement_timestamp()) RETURNING key"
)


def test_a_statement_runs_in_the_open_transaction_and_gives_its_rows():
    assert rows(PUT, ["person:1", "k", 201, b"\x00 body"]) == [("k",)]
    with pytest.raises(ZeroDivisionError), transaction.atomic():
        rows(PUT, ["person:1", "taken back", 201, b""])
        raise ZeroDivisionError

    found = rows("SELECT key, status, body FROM records_receipt WHERE actor = %s", ["person:1"])
    assert [(key, status, bytes(body)) for key, status, body in found] == [("k", 201, b"\x00 body")]


def test_an_error_of_the_database_is_one_of_djangos_and_the_transaction_is_broken_then():
    with transaction.atomic():
        with pytest.raises(IntegrityError, match="receipt_is_of_a_success"), transaction.atomic():
            rows(PUT, ["person:1", "k", 500, b""])
        assert rows("SELECT 1", []) == [(1,)]
        connection.needs_rollback = True
        with pytest.raises(TransactionManagementError):
            rows("SELECT 1", [])
        connection.needs_rollback = False


def test_a_row_becomes_the_instance_the_model_layer_would_give():
    rows(PUT, ["person:1", "k", 201, b"body"])
    statement = f"SELECT 7, {columns(Receipt, 'r')} FROM records_receipt r WHERE actor = %s"

    (row,) = rows(statement, ["person:1"])
    made, read = instance(Receipt, row, 1), Receipt.objects.get(actor="person:1")

    assert (made, made.answered_at, len(row)) == (read, read.answered_at, 1 + width(Receipt))
    made.delete()
    assert not Receipt.objects.exists()
