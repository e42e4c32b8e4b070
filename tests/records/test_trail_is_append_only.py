"""The trail and the papers are only ever added to, and only by the door."""

import psycopg
import pytest

from records.act import act
from tests import databases
from tests.records.scratch import AMANI, NOTE, put

pytestmark = pytest.mark.usefixtures("scratch_tables")

TRAIL = ("records_act", "records_change", "records_seal", "records_name")
FORBIDDEN = "42501"  # insufficient privilege
GUARDED = "TB004"


@pytest.fixture(scope="module", autouse=True)
def one_entry(scratch_tables: str) -> None:
    with act(NOTE, by=AMANI, about="thing:1"):
        put()


def outcome_of(statement: str, alias: str) -> str:
    with databases.connect(alias) as connection:
        connection.execute("BEGIN")
        try:
            connection.execute(statement)
        except psycopg.Error as error:
            return error.sqlstate or "?"
        finally:
            connection.execute("ROLLBACK")
    return "done"


@pytest.mark.parametrize("table", [*TRAIL, "records_document", "scratch_thing"])
@pytest.mark.parametrize("statement", ["UPDATE {0} SET {1} = {1}", "DELETE FROM {0}", "TRUNCATE {0} CASCADE"])
def test_the_service_role_and_the_owner_alike_change_nothing(table, statement):
    column = {
        "records_seal": "entry",
        "records_act": "about",
        "records_change": "image",
        "records_name": "name",
    }
    words = statement.format(table, column.get(table, "operator_id"))

    assert outcome_of(words, "default") == FORBIDDEN
    assert outcome_of(words, "owner") == GUARDED
    assert outcome_of(words, "superuser") == GUARDED


@pytest.mark.parametrize("table", [*TRAIL, "records_closing", "records_guarded_table"])
def test_the_service_role_forges_no_row_of_the_trail(table):
    assert (
        outcome_of(f"INSERT INTO {table} OVERRIDING SYSTEM VALUE SELECT * FROM {table}", "default")
        == FORBIDDEN
    )
    assert outcome_of(f"INSERT INTO {table} DEFAULT VALUES", "default") == FORBIDDEN


@pytest.mark.parametrize(
    "statement",
    [
        "CREATE TABLE mine (id int)",
        "CREATE TEMPORARY TABLE mine (id int)",
        "CREATE SCHEMA mine",
        "CREATE FUNCTION public.row_image(jsonb) RETURNS jsonb LANGUAGE sql AS 'SELECT NULL::jsonb'",
        "ALTER TABLE scratch_thing DISABLE TRIGGER ALL",
        "ALTER TABLE records_seal DISABLE TRIGGER ALL",
        "DROP TRIGGER witness_insert ON scratch_thing",
        "CREATE TRIGGER mine AFTER INSERT ON scratch_thing FOR EACH ROW EXECUTE FUNCTION refuse_write()",
        "CREATE RULE mine AS ON INSERT TO scratch_thing DO INSTEAD NOTHING",
        "SET session_replication_role = replica",
        "SELECT guard_table('scratch_free', key => '{id}', mode => 'append', operator => 'id')",
        "SELECT exempt_table('scratch_thing', 'because')",
        "SELECT name_kept('kt', 'person:7', 'Somebody Else')",
        "SELECT check_operator('a', 'b', 'c')",
        "SET ROLE tarebook_owner",
        "SET SESSION AUTHORIZATION tarebook_owner",
        "ALTER ROLE tarebook_service SUPERUSER",
    ],
)
def test_the_service_role_may_not_loosen_a_guard(statement):
    # A rule, a trigger or a table of another owner is "must be owner" (42501) as well.
    assert outcome_of(statement, "default") == FORBIDDEN


def test_the_closing_table_is_empty_between_transactions_and_not_logged():
    with databases.connect("superuser") as admin:
        assert admin.execute("SELECT count(*) FROM records_closing").fetchone() == (0,)
        assert admin.execute(
            "SELECT relpersistence FROM pg_class WHERE oid = 'records_closing'::regclass"
        ).fetchone() == ("u",)


def test_a_function_of_the_door_runs_with_its_own_search_path():
    with databases.connect("superuser") as admin:
        loose = admin.execute(
            "SELECT proname FROM pg_proc WHERE pronamespace = 'public'::regnamespace AND prosecdef "
            "AND NOT coalesce(proconfig, '{}') @> ARRAY['search_path=public, pg_temp']"
        ).fetchall()

    assert loose == []
