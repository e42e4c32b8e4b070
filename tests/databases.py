"""The databases of a test run: one template, migrated as the owner, and copies of it.

A template carries the digest of everything that made it in its name, so that the next run need not migrate.
Rows that migrations put in (the register of guards and the acts that wrote it) are kept in a schema of their
own, from which an emptied database gets them back.
"""

import copy
import hashlib
import os
from collections.abc import Iterator
from contextlib import contextmanager
from importlib.metadata import version
from pathlib import Path

import psycopg
from django.conf import settings
from django.core.management import call_command
from django.db import connections
from psycopg import sql

from service import roles

ROOT = Path(__file__).resolve().parent.parent
ROLE_OF_ALIAS = {"default": roles.SERVICE, "owner": roles.OWNER, "superuser": ""}
_PASSWORD = "for-tests-only"
_BUILDING = 7205201  # the advisory lock under which a template is made


def server() -> str:
    """This function will return the libpq address of the superuser of the cluster of this run."""
    return os.environ["TAREBOOK_TEST_SERVER"]


def name(suffix: str) -> str:
    """This function will return the name of a database of this run."""
    return f"{os.environ.get('TAREBOOK_TEST_DB', 'tarebook_test')}_{suffix}"


def point_at(database: str) -> None:
    """This function will point every alias at this database: the service role, the owner, the superuser."""
    superuser = psycopg.conninfo.conninfo_to_dict(server())
    if "superuser" not in connections.settings:
        connections.settings["superuser"] = copy.deepcopy(connections.settings["owner"])
        settings.DATABASES["superuser"] = connections.settings["superuser"]
    for alias, role in ROLE_OF_ALIAS.items():
        connections[alias].close()
        place = {
            "NAME": database,
            "USER": role or superuser["user"],
            "PASSWORD": _PASSWORD if role else superuser.get("password", ""),
            "HOST": superuser.get("host", ""),
            "PORT": superuser.get("port", ""),
        }
        connections.settings[alias].update(place)
        connections[alias].settings_dict.update(place)


def template() -> str:
    """This function will return the name of the migrated template, made now unless an earlier run left it."""
    wanted = name(f"template_{_digest_of_what_makes_it()}")
    with psycopg.connect(server(), autocommit=True) as admin:
        admin.execute("SELECT pg_advisory_lock(%s)", [_BUILDING])
        found = [str(row[0]) for row in admin.execute("SELECT datname FROM pg_database")]
        for left in found:
            if left.startswith(name("")) and left.rpartition("_")[2].isdigit() and _is_gone(left):
                _drop(admin, left)
        if wanted not in found:
            for old in found:
                if old.startswith(name("template_")):
                    _drop(admin, old)
            _make_template(admin, wanted)
    return wanted


@contextmanager
def copied(suffix: str) -> Iterator[str]:
    """This function will make a copy of the template, point every alias at it, and drop it at the end."""
    before, fresh = connections.settings["default"]["NAME"], name(f"{suffix}_{os.getpid()}")
    source = template()
    with psycopg.connect(server(), autocommit=True) as admin:
        _drop(admin, fresh)
        admin.execute(
            sql.SQL("CREATE DATABASE {} TEMPLATE {} OWNER {}").format(
                sql.Identifier(fresh), sql.Identifier(source), sql.Identifier(roles.OWNER)
            )
        )
    roles.make_database(server(), fresh)  # what is granted on a database does not come with a copy
    point_at(fresh)
    try:
        yield fresh
    finally:
        point_at(before)
        with psycopg.connect(server(), autocommit=True) as admin:
            _drop(admin, fresh)


def emptied() -> None:
    """This function will take out every row that was not in the template.

    Our own triggers refuse a TRUNCATE, so they are switched off and on again. Only here, and only as the
    superuser.
    """
    database = connections.settings["default"]["NAME"]
    with psycopg.connect(server(), dbname=database) as connection:
        connection.execute("SET LOCAL lock_timeout = '20s'")
        connection.execute(_EMPTY)


def _is_gone(database: str) -> bool:
    """Whether the run whose process number ends this name is over: it was killed and left its copy."""
    number = database.rpartition("_")[2]
    return not database.startswith(name("template_")) and not Path(f"/proc/{number}").exists()


def _digest_of_what_makes_it() -> str:
    files = sorted(
        path
        for room in ("records", "fleet", "loads", "service")
        for path in (ROOT / room).rglob("*")
        if path.suffix == ".sql" or (path.suffix == ".py" and path.parent.name == "migrations")
    )
    # The self-check that is filed in it counts for this engine and these references only.
    files += sorted(
        path for path in (ROOT / "loads" / "selfcheck").rglob("*") if path.suffix in {".py", ".json"}
    )
    files.append(ROOT / "loads" / "balance" / "engine.py")
    whole = hashlib.sha256()
    for made_by in (*(version(package) for package in ("django", "django-axes")), *settings.INSTALLED_APPS):
        whole.update(made_by.encode())
    for path in (*files, Path(__file__), Path(roles.__file__)):
        whole.update(str(path).encode() + b"\0" + path.read_bytes())
    return whole.hexdigest()[:12]


def _make_template(admin: psycopg.Connection[tuple[object, ...]], wanted: str) -> None:
    building = f"{wanted}_building"
    _drop(admin, building)
    roles.make(server(), database=building, passwords=roles.Passwords(_PASSWORD, _PASSWORD))
    point_at(building)
    call_command("migrate", database="owner", verbosity=0)
    _prove()
    for alias in ROLE_OF_ALIAS:
        connections[alias].close()
    with psycopg.connect(server(), dbname=building) as connection:
        connection.execute(_KEEP_SEED)
    admin.execute(
        sql.SQL("ALTER DATABASE {} RENAME TO {}").format(sql.Identifier(building), sql.Identifier(wanted))
    )


def _prove() -> None:
    """File a self-check, as the service does daily, so that none is overdue when somebody signs."""
    from loads.actions.self_check import run_self_check  # noqa: PLC0415  # its models need the rooms loaded

    run_self_check("daily")


def _drop(admin: psycopg.Connection[tuple[object, ...]], database: str) -> None:
    admin.execute(sql.SQL("DROP DATABASE IF EXISTS {} WITH (FORCE)").format(sql.Identifier(database)))


_KEEP_SEED = """
CREATE SCHEMA seed;
DO $$
DECLARE
    t name;
    filled boolean;
BEGIN
    FOR t IN SELECT tablename FROM pg_tables WHERE schemaname = 'public' LOOP
        EXECUTE format('SELECT EXISTS (SELECT FROM public.%I)', t) INTO filled;
        IF filled THEN
            EXECUTE format('CREATE TABLE seed.%I AS TABLE public.%I', t, t);
        END IF;
    END LOOP;
END $$;
"""

_EMPTY = """
DO $$
DECLARE
    guard record;
    t record;
BEGIN
    CREATE TEMPORARY TABLE always ON COMMIT DROP AS
        SELECT tgrelid::regclass::text AS tab, quote_ident(tgname) AS called FROM pg_trigger
        WHERE tgenabled = 'A' AND NOT tgisinternal;
    FOR guard IN SELECT * FROM always LOOP
        EXECUTE format('ALTER TABLE %s DISABLE TRIGGER %s', guard.tab, guard.called);
    END LOOP;
    EXECUTE (SELECT 'TRUNCATE ' || string_agg(format('public.%I', tablename), ', ')
             FROM pg_tables WHERE schemaname = 'public');
    FOR t IN SELECT c.table_name AS called, string_agg(quote_ident(c.column_name), ', ') AS columns
             FROM information_schema.columns c
             JOIN pg_tables s ON s.schemaname = 'seed' AND s.tablename = c.table_name
             WHERE c.table_schema = 'public' AND c.is_generated = 'NEVER' GROUP BY 1 LOOP
        EXECUTE format('INSERT INTO public.%I (%s) OVERRIDING SYSTEM VALUE SELECT %s FROM seed.%I',
                       t.called, t.columns, t.columns, t.called);
    END LOOP;
    SET CONSTRAINTS ALL IMMEDIATE;
    FOR guard IN SELECT * FROM always LOOP
        EXECUTE format('ALTER TABLE %s ENABLE ALWAYS TRIGGER %s', guard.tab, guard.called);
    END LOOP;
END $$;
"""


def connect(alias: str = "owner") -> psycopg.Connection[tuple[object, ...]]:
    """This function will connect to the database of now past Django, in the role of that alias."""
    place = connections.settings[alias]
    return psycopg.connect(
        dbname=place["NAME"],
        user=place["USER"],
        password=place["PASSWORD"],
        host=place["HOST"],
        port=place["PORT"],
        autocommit=True,
    )
