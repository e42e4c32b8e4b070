"""No write escapes the trail: every way of writing on every table of the catalogue, in an act and without
one.
"""

import pytest

from tests.databases import connect
from tests.records.matrix import OPERATIONS, REFUSALS, laid_bare, tables, tried

pytestmark = pytest.mark.usefixtures("own_database")


def test_every_table_is_in_the_list_of_guarded_or_of_exempt_tables():
    with connect("superuser") as admin:
        unlisted = admin.execute(
            "SELECT c.relname FROM pg_class c WHERE c.relnamespace = 'public'::regnamespace "
            "AND c.relkind IN ('r', 'p', 'f') "
            "AND NOT EXISTS (SELECT FROM records_guarded_table g WHERE g.name = c.relname)"
        ).fetchall()

    assert unlisted == []


def test_every_exempt_table_says_why():
    with connect("superuser") as admin:
        rows = admin.execute(
            "SELECT name FROM records_guarded_table WHERE mode IN ('exempt', 'trail') AND reason = ''"
        )
        assert rows.fetchall() == []


def test_in_an_act_every_write_is_witnessed_row_for_row_or_refused_with_nothing_changed():
    wrong, cells = [], 0
    for table in tables():
        with laid_bare(table) as cell:
            for operation, does in OPERATIONS.items():
                outcome, witnessed, wrote = tried(cell, operation, in_act=True)
                allowed = does == "insert" or (does == "update" and table.mode == "edit")
                right = (
                    (outcome == "done" and witnessed == wrote > 0)
                    if allowed
                    else (outcome in REFUSALS - {"TB001"} and witnessed == 0)
                )
                cells += 1
                if not right:
                    wrong.append((table.name, table.mode, operation.__name__, outcome, witnessed, wrote))

    assert wrong == []
    assert cells == len(OPERATIONS) * len(tables()) > 200


def test_without_an_act_every_write_is_refused_with_nothing_changed():
    wrong, cells = [], 0
    for table in tables():
        with laid_bare(table) as cell:
            for operation in OPERATIONS:
                outcome, witnessed, _ = tried(cell, operation, in_act=False)
                cells += 1
                if outcome not in REFUSALS or witnessed:
                    wrong.append((table.name, table.mode, operation.__name__, outcome, witnessed))

    assert wrong == []
    assert cells == len(OPERATIONS) * len(tables()) > 200
