"""Restoring a backup somewhere empty, and believing nothing of it before it was verified there.

manifest and parts as written -> place empty -> roles -> data, all or nothing -> grants -> tables brought up
to date -> chains, heads, documents, rows, guards -> only then may the service role connect
"""

from collections.abc import Callable, Iterator
from contextlib import contextmanager
from pathlib import Path
from typing import Any, Final

import psycopg
from django.core.management import call_command
from django.db import connections
from django.db.migrations.loader import MigrationLoader
from psycopg import sql
from psycopg.conninfo import conninfo_to_dict, make_conninfo

from records.chain import Finding
from records.reconcile import reconcile
from records.verify import altered_documents, follow_chains
from service import roles
from service.backup import manifest, programs
from service.backup.dump import counted, key_check, migrations
from service.backup.manifest import BackupRefused, Manifest

ALIAS: Final = "restored"
_OBJECTS: Final = """
SELECT count(*) FROM pg_class c JOIN pg_namespace n ON n.oid = c.relnamespace
WHERE n.nspname NOT IN ('pg_catalog', 'information_schema') AND n.nspname NOT LIKE 'pg\\_toast%'
"""


def restore(
    folder: Path, into: str, *, passwords: roles.Passwords, say: Callable[[str], None]
) -> tuple[Manifest, tuple[Finding, ...]]:
    """This function will restore a backup into the empty database of the libpq address `into`, made if need
    be, and return what of it does not hold (nothing, when it is sound).

    `into` is of a superuser. Raises BackupRefused before anything was written, or when nothing was kept.
    """
    made = manifest.read(folder)
    _refuse_newer(made)
    say(f"The backup of {made.made_at} is as it was written, with {len(made.heads)} chains.")
    place = conninfo_to_dict(into)
    database = place.get("dbname")
    if not isinstance(database, str) or not database:
        raise BackupRefused("The address names no database to restore into.")
    try:
        _make_ready(place, database, passwords)
        programs.run(
            "pg_restore", place, "--exit-on-error", "--single-transaction", f"--dbname={database}",
            str(folder / manifest.DUMP),
        )  # fmt: skip
        roles.make_database(_on(place, "postgres"), database)
        _open_to_service(place, database, opened=False)
    except psycopg.Error as problem:
        raise BackupRefused(f"The server refused: {str(problem).splitlines()[0]}") from problem
    say("Restored; now verifying what was restored.")
    findings = _verified(made, place)
    if not findings:
        _open_to_service(place, database, opened=True)
    return made, findings


def _refuse_newer(made: Manifest) -> None:
    known = {(app, name) for app, name in MigrationLoader(None, ignore_no_migrations=True).disk_migrations}
    unknown = [f"{app} {last}" for app, last in made.migrations if (app, last) not in known]
    if unknown:
        raise BackupRefused(
            f"The backup has tables this program does not know ({', '.join(unknown)}): restore it with the "
            "program that made it, or a newer one."
        )


def _make_ready(place: dict[str, Any], database: str, passwords: roles.Passwords) -> None:
    with psycopg.connect(_on(place, "postgres"), autocommit=True) as admin:
        row = admin.execute(
            "SELECT current_setting('server_version'), current_setting('is_superuser')"
        ).fetchone()
        version, superuser = row or ("", "")
        programs.refuse_other_major(str(version).split()[0])
        if superuser != "on":
            raise BackupRefused(
                "The address is not that of a superuser, who alone can make roles and restore."
            )
        there = admin.execute("SELECT 1 FROM pg_database WHERE datname = %s", [database]).fetchone()
    if there:
        with psycopg.connect(_on(place, database)) as target:
            held = target.execute(_OBJECTS).fetchone()
        if held != (0,):
            raise BackupRefused(f"The database {database} is not empty; name another, which will be made.")
    # Roles are of the cluster and in no dump of a database; what they may do on the database is not, either.
    roles.make(_on(place, "postgres"), database=database, passwords=passwords)


def _verified(made: Manifest, place: dict[str, Any]) -> tuple[Finding, ...]:
    with _as_owner(place):
        findings = [*_as_noted(made)]
        if not findings:
            call_command("migrate", database=ALIAS, verbosity=0, interactive=False)
            findings += reconcile(ALIAS)
        return tuple(findings)


def _as_noted(made: Manifest) -> Iterator[Finding]:
    """Chains and documents in themselves, and chains and rows as the manifest says they were."""
    chains = follow_chains(ALIAS)
    yield from chains.broken
    yield from altered_documents(ALIAS)
    heads = {head.chain: (head.position, head.digest) for head in chains.heads}
    noted = {chain: (position, digest) for chain, position, digest in made.heads}
    for chain in sorted(heads.keys() | noted.keys()):
        if heads.get(chain) != noted.get(chain):
            yield Finding(f"chain {chain}", "its head", str(noted.get(chain)), str(heads.get(chain)))
    rows = counted(ALIAS)
    for table in sorted(rows.keys() | made.rows.keys()):
        if rows.get(table) != made.rows.get(table):
            wanted, found = made.rows.get(table), rows.get(table)
            yield Finding(f"table {table}", "the number of its rows", str(wanted), str(found))
    if migrations(ALIAS) != made.migrations:
        yield Finding("the migrations", "the last of each", str(made.migrations), str(migrations(ALIAS)))


@contextmanager
def _as_owner(place: dict[str, Any]) -> Iterator[None]:
    """An alias for the restored database, in which whatever is made belongs to the owner."""
    connections.settings[ALIAS] = {
        **connections.settings["default"],
        "NAME": place["dbname"],
        "USER": place.get("user", ""),
        "PASSWORD": place.get("password", ""),
        "HOST": place.get("host", ""),
        "PORT": place.get("port", ""),
        "OPTIONS": {"options": f"-c role={roles.OWNER}"},
    }
    try:
        yield
    finally:
        connections[ALIAS].close()
        del connections[ALIAS]
        del connections.settings[ALIAS]


def _open_to_service(place: dict[str, Any], database: str, *, opened: bool) -> None:
    words = "GRANT CONNECT ON DATABASE {} TO {}" if opened else "REVOKE CONNECT ON DATABASE {} FROM {}"
    with psycopg.connect(_on(place, "postgres"), autocommit=True) as admin:
        admin.execute(sql.SQL(words).format(sql.Identifier(database), sql.Identifier(roles.SERVICE)))


def _on(place: dict[str, Any], database: str) -> str:
    return make_conninfo("", **{**place, "dbname": database})


def fits_key(made: Manifest) -> bool:
    """This function will say whether the secret key of now is the one the backup was made under."""
    return made.key_check == key_check()
