"""A derived table: written by nobody but what keeps it, and compared with the rows it follows from."""

import psycopg
import pytest
from django.db import DatabaseError

from records.act import act
from records.chain import Finding
from records.derived import false_rows
from tests import databases
from tests.records.scratch import AMANI, NOTE, put, run

pytestmark = pytest.mark.usefixtures("tallied")
QUERY = "SELECT operator_id, what, count(*) AS n FROM scratch_thing WHERE what NOT LIKE 'old%' GROUP BY 1, 2"


@pytest.fixture(scope="module")
def tallied(scratch_tables):
    """A table that counts things by name, which nothing keeps: the tests do."""
    with databases.connect("owner") as owner:
        owner.execute(
            "CREATE TABLE scratch_tally "
            "(operator_id text, what text, n bigint, PRIMARY KEY (operator_id, what))"
        )
        owner.execute(
            "SELECT derive_table('scratch_tally', '{operator_id,what}', %s, 'counted for quick reading')",
            [QUERY],
        )
    for what in ("bolt", "bolt", "nut", "old nut"):
        with act(NOTE, by=AMANI, about="thing:1"):
            put(what)
    return scratch_tables


def written(*statements: str) -> list[Finding]:
    """What is found after the owner wrote in it, which is taken back."""
    with databases.connect("owner") as owner:
        owner.execute("INSERT INTO scratch_tally VALUES ('kt', 'bolt', 2), ('kt', 'nut', 1)")
        for statement in statements:
            owner.execute(statement)
    try:
        return list(false_rows())
    finally:
        with databases.connect("owner") as owner:
            owner.execute("DELETE FROM scratch_tally")


def test_rows_that_follow_are_sound() -> None:
    assert written() == []


def test_rows_that_are_missing_are_named_with_what_must_stand_there() -> None:
    first, second = false_rows()

    assert (first.where, first.what, first.found) == (
        'row ["kt", "bolt"] of scratch_tally',
        "it is missing",
        "no row",
    )
    assert '"n": 2' in first.expected
    assert second.where == 'row ["kt", "nut"] of scratch_tally'


def test_a_row_that_says_something_else_is_named_with_both() -> None:
    (found,) = written("UPDATE scratch_tally SET n = 3 WHERE what = 'bolt'")

    assert found.what == "it differs in n from the rows it follows from"
    assert '"n": 2' in found.expected
    assert '"n": 3' in found.found


def test_a_row_of_nothing_is_named() -> None:
    (found,) = written("INSERT INTO scratch_tally VALUES ('kt', 'old nut', 1)")

    assert (found.where, found.what) == (
        'row ["kt", "old nut"] of scratch_tally',
        "it follows from no guarded row",
    )


@pytest.mark.parametrize(
    "arguments",
    [
        "'no_such_table', '{id}', 'SELECT 1 AS id', 'because'",
        "'scratch_tally', '{}', 'SELECT 1', 'because'",
        "'scratch_tally', '{nothing}', 'SELECT 1', 'because'",
        "'scratch_tally', '{what}', '', 'because'",
        "'scratch_tally', '{what}', 'SELECT 1', ''",
    ],
)
def test_a_table_is_not_derived_without_a_key_a_query_and_a_reason(arguments: str) -> None:
    with databases.connect("owner") as owner, pytest.raises(psycopg.Error) as refused:
        owner.execute(f"SELECT derive_table({arguments})")

    assert refused.value.sqlstate == "TB006"


def test_the_service_may_not_say_what_is_derived() -> None:
    with pytest.raises(DatabaseError) as refused:
        run("SELECT derive_table('scratch_tally', '{what}', 'SELECT 1', 'because')")

    assert refused.value.__cause__.sqlstate == "42501"


def test_a_table_that_is_gone_is_named() -> None:
    with databases.connect("owner") as owner:
        owner.execute("ALTER TABLE scratch_tally RENAME TO elsewhere")
        try:
            (found,) = false_rows()
        finally:
            owner.execute("ALTER TABLE elsewhere RENAME TO scratch_tally")

    assert (found.where, found.found) == ("table scratch_tally", "no such table")
