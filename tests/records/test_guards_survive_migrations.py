"""Guards stand after every migration, forward and back."""

import pytest
from django.core.management import call_command
from django.db import connections
from django.db.migrations.executor import MigrationExecutor

from records.guard import missing_guards
from tests import databases

ROOMS = ("fleet", "loads", "records", "service")


def plan_of(app: str) -> list[str]:
    """The migrations of a room, oldest first."""
    graph = MigrationExecutor(connections["owner"]).loader.graph
    return [name for room, name in graph.forwards_plan(graph.leaf_nodes(app)[0]) if room == app]


def unexpected(sentences: tuple[str, ...], unfinished: str = "") -> list[str]:
    """What is wrong besides the tables of a room whose guards come with a later migration of that same
    room.
    """
    return [one for one in sentences if not unfinished or f" {unfinished}_" not in one]


def test_every_guard_stands_after_all_migrations(own_database):
    assert missing_guards() == ()


def test_every_guard_stands_after_each_step_back_and_forward(fresh_database):
    steps = 0
    for app in ("service", "loads", "fleet"):
        names = plan_of(app)
        for target in [*reversed(names[:-1]), "zero"]:
            call_command("migrate", app, target, database="owner", verbosity=0)
            assert unexpected(missing_guards()) == [], (app, target)
            steps += 1
    for app in ("fleet", "loads", "service"):
        for target in plan_of(app):
            call_command("migrate", app, target, database="owner", verbosity=0)
            unfinished = "" if target == plan_of(app)[-1] else app
            assert unexpected(missing_guards(), unfinished) == [], (app, target)
            steps += 1

    assert missing_guards() == ()
    assert steps >= 2 * len(ROOMS) - 2


def test_a_database_that_is_not_migrated_has_no_guards_and_says_so(fresh_database):
    with databases.connect("superuser") as admin:
        admin.execute("ALTER TABLE records_guarded_table RENAME TO elsewhere")

    assert missing_guards() == ("The trail's own tables are missing: the database is not migrated.",)


@pytest.mark.parametrize(
    ("statement", "sentence"),
    [
        (
            "ALTER TABLE fleet_aircraft DISABLE TRIGGER witness_insert",
            "The guard witness_insert of fleet_aircraft is not enabled always.",
        ),
        (
            "ALTER TABLE fleet_aircraft ENABLE TRIGGER witness_insert",
            "The guard witness_insert of fleet_aircraft is not enabled always.",
        ),
        (
            "DROP TRIGGER refuse_truncate ON loads_step",
            "The guard refuse_truncate of loads_step is missing or was changed.",
        ),
        (
            "DROP TRIGGER records_act_closes ON records_act",
            "The guard records_act_closes of records_act is missing or was changed.",
        ),
        ("DROP FUNCTION row_key(jsonb, text[])", "The function row_key() is missing."),
        (
            "GRANT UPDATE ON records_seal TO tarebook_service",
            "The role tarebook_service may UPDATE on records_seal.",
        ),
        (
            "GRANT CREATE ON SCHEMA public TO tarebook_service",
            "The role tarebook_service may make objects in the schema public.",
        ),
        (
            "ALTER TABLE loads_load OWNER TO tarebook_service",
            "The table loads_load belongs to tarebook_service.",
        ),
        (
            "ALTER FUNCTION act_open OWNER TO postgres",
            "The function act_open() belongs to another role than the trail.",
        ),
    ],
)
def test_a_guard_that_is_missing_is_named(own_database, statement, sentence):
    with connections["superuser"].cursor() as cursor:
        cursor.execute("BEGIN")
        try:
            cursor.execute(statement)
            found = missing_guards("superuser")
        finally:
            cursor.execute("ROLLBACK")

    assert sentence in found
