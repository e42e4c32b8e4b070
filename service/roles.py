"""The two database roles and the database: made by set-up, never by a migration.

`tarebook_owner` owns the database and migrates. `tarebook_service` is what web and workers are: it may
connect, and has what migrations grant it table by table; it may create nothing, not even a temporary table,
and owns nothing.
"""

import os
import sys
from dataclasses import dataclass
from pathlib import Path

import psycopg
from psycopg import sql

OWNER = "tarebook_owner"
SERVICE = "tarebook_service"
DATABASE = "tarebook"
_POWERLESS = sql.SQL("LOGIN NOSUPERUSER NOCREATEDB NOCREATEROLE NOREPLICATION NOBYPASSRLS NOINHERIT")

_MEMBERSHIPS = """
SELECT held.rolname FROM pg_auth_members m JOIN pg_roles held ON held.oid = m.roleid
JOIN pg_roles holder ON holder.oid = m.member WHERE holder.rolname = %s
"""


@dataclass(frozen=True)
class Passwords:
    """The passwords the two roles are given; None leaves the one a role has (or none)."""

    owner: str | None = None
    service: str | None = None


def make(superuser: str, *, database: str = DATABASE, passwords: Passwords | None = None) -> None:
    """Make, or bring back to their definition, the two roles and the database. Safe to run again at any time.

    `superuser` is the libpq address of a role that may do this, on any database of the cluster.
    """
    make_roles(superuser, passwords or Passwords())
    make_database(superuser, database)


def make_roles(superuser: str, passwords: Passwords) -> None:
    """Make the two roles, or take from them whatever they should not have.

    No request has the database start helper processes for itself: pages are short, and what starting them
    takes was most of the time of a page far into a million loads (`tests/bench/stored_loads.py`).
    """
    with psycopg.connect(superuser, autocommit=True) as connection:
        for role, password in ((OWNER, passwords.owner), (SERVICE, passwords.service)):
            known = connection.execute("SELECT 1 FROM pg_roles WHERE rolname = %s", [role]).fetchone()
            verb = sql.SQL("ALTER" if known else "CREATE")
            words = sql.SQL("{} ROLE {} WITH {}").format(verb, sql.Identifier(role), _POWERLESS)
            if password is not None:
                words += sql.SQL(" PASSWORD {}").format(sql.Literal(password))
            connection.execute(words)
            for (group,) in connection.execute(_MEMBERSHIPS, [role]).fetchall():
                connection.execute(
                    sql.SQL("REVOKE {} FROM {}").format(sql.Identifier(group), sql.Identifier(role))
                )
        connection.execute(
            sql.SQL("ALTER ROLE {} SET max_parallel_workers_per_gather = 0").format(sql.Identifier(SERVICE))
        )


def make_database(superuser: str, database: str) -> None:
    """Make the database if need be and close it to everybody but the two roles.

    Grants of a database do not survive a copy from a template or a plain dump, so they are given every time.
    """
    name, owner, service = sql.Identifier(database), sql.Identifier(OWNER), sql.Identifier(SERVICE)
    with psycopg.connect(superuser, autocommit=True) as connection:
        if not connection.execute("SELECT 1 FROM pg_database WHERE datname = %s", [database]).fetchone():
            connection.execute(sql.SQL("CREATE DATABASE {} OWNER {}").format(name, owner))
        connection.execute(sql.SQL("ALTER DATABASE {} OWNER TO {}").format(name, owner))
        connection.execute(sql.SQL("REVOKE ALL ON DATABASE {} FROM PUBLIC, {}").format(name, service))
        connection.execute(sql.SQL("GRANT CONNECT ON DATABASE {} TO {}").format(name, service))
    with psycopg.connect(superuser, dbname=database, autocommit=True) as connection:
        connection.execute(sql.SQL("ALTER SCHEMA public OWNER TO {}").format(owner))
        connection.execute(sql.SQL("REVOKE ALL ON SCHEMA public FROM PUBLIC, {}").format(service))
        connection.execute(sql.SQL("GRANT USAGE ON SCHEMA public TO {}").format(service))


def _main() -> int:
    """Make roles and database from SUPERUSER_URL, with passwords from the files OWNER_PASSWORD_FILE and
    SERVICE_PASSWORD_FILE.
    """
    try:
        superuser = _read("SUPERUSER_URL")
        make(superuser, passwords=Passwords(_read("OWNER_PASSWORD"), _read("SERVICE_PASSWORD")))
    except (KeyError, OSError, psycopg.Error) as problem:
        print(f"roles: {problem}", file=sys.stderr)
        return 2
    print(f"The roles {OWNER} and {SERVICE} and the database {DATABASE} are as they should be.")
    return 0


def _read(name: str) -> str:
    path = os.environ.get(f"{name}_FILE")
    if path is None:
        return os.environ[name]
    return Path(path).read_text(encoding="utf-8").strip()


if __name__ == "__main__":
    sys.exit(_main())
