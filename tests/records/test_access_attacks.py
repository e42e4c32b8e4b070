"""Whoever alters the log of sign-ins behind its guards is found out, and the row is named."""

import pytest
from django.db import connections, transaction

from records.access_log import note, seal_log
from records.reconcile import reconcile

pytestmark = pytest.mark.usefixtures("a_log_of_six")
OFF = "ALTER TABLE records_access DISABLE TRIGGER USER"
ON = (
    "ALTER TABLE records_access ENABLE ALWAYS TRIGGER refuse_update, "
    "ENABLE ALWAYS TRIGGER refuse_delete, ENABLE ALWAYS TRIGGER refuse_truncate"
)
# Makes the log anew from one row on, as somebody would who knows how it is built.
ANEW = """
DO $$
DECLARE
    one records_access;
    before text := (SELECT digest FROM records_access WHERE chain = 'kt' AND number = 3);
BEGIN
    FOR one IN SELECT * FROM records_access WHERE chain = 'kt' AND number > 3 ORDER BY number LOOP
        UPDATE records_access SET previous = before, digest = access_digest(
            one.chain, one.number, one.at, one.what, one.key, one.typed, one.origin, one.request, before)
        WHERE chain = 'kt' AND number = one.number RETURNING digest INTO before;
    END LOOP;
END $$
"""


@pytest.fixture(scope="module")
def a_log_of_six(own_database: str) -> None:
    for number in range(1, 7):
        note("sign-in", operator="kt", key=f"person:{number}", address="192.0.2.7")
        if number in {3, 6}:
            seal_log()


def found(*statements: str) -> list[tuple[str, str]]:
    """What verification says after these statements of a superuser, which are then taken back."""
    with transaction.atomic(using="superuser"):
        with connections["superuser"].cursor() as cursor:
            for statement in statements:
                cursor.execute(statement)
        findings = [(one.where, one.what) for one in reconcile("superuser")]
        transaction.set_rollback(True, using="superuser")
    return findings


def test_a_sound_log_is_sound():
    assert found() == []


@pytest.mark.parametrize(
    ("statements", "where", "what"),
    [
        (("UPDATE records_access SET key = 'person:99' WHERE number = 5",), "row 5", "it was changed"),
        (
            ("UPDATE records_access SET at = at - interval '1 hour' WHERE number = 2",),
            "row 2",
            "it was changed",
        ),
        (("DELETE FROM records_access WHERE number = 4",), "row 4", "gone"),
        (("DELETE FROM records_access WHERE number IN (2, 3)",), "rows 2 to 3", "gone"),
        (("DELETE FROM records_access WHERE number = 1",), "row 1", "gone"),
        (("DELETE FROM records_access WHERE number > 4",), "rows 5 to 6", "gone"),
        (("DELETE FROM records_access",), "rows 1 to 6", "gone"),
        (("UPDATE records_access SET what = 'sign-out' WHERE number = 5", ANEW), "rows 4 to 6", "made anew"),
        (
            (
                "UPDATE records_access SET number = 9 WHERE number = 4",
                "UPDATE records_access SET number = 4 WHERE number = 5",
                "UPDATE records_access SET number = 5 WHERE number = 9",
            ),
            "row 4",
            "the link to the row before",
        ),
    ],
)
def test_a_changed_or_missing_row_is_found_and_named(statements, where, what):
    first, *_ = found(OFF, *statements, ON)

    assert first[0] == f"log of sign-ins of kt, {where}"
    assert first[1].startswith(what)


def test_a_seal_that_was_altered_is_found_too():
    seals_off = "ALTER TABLE records_accessseal DISABLE TRIGGER USER"
    findings = found(seals_off, "UPDATE records_accessseal SET digest = repeat('0', 64) WHERE number = 6")

    assert any("of records_accessseal" in where for where, _ in findings)
    assert ("log of sign-ins of kt, rows 4 to 6", "made anew: the digest that was sealed") in findings


def test_a_guard_of_the_log_that_is_switched_off_is_named():
    assert ("guards", "The guard refuse_delete of records_access is not enabled always.") in found(OFF)
