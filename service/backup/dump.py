"""Making a backup: one dump, as of one moment, with a manifest that says what must be found in it."""

import os
import secrets
import shutil
from datetime import datetime
from pathlib import Path
from typing import Any, Final

from django.conf import settings
from django.db import connections, transaction
from django.utils.crypto import salted_hmac
from psycopg import sql

from loads.balance.engine import ENGINE_VERSION
from records.verify import altered_documents, follow_chains
from service.backup import manifest, programs
from service.backup.manifest import BackupRefused, Manifest

# Who is signed in is no record: after a restore everybody signs in again.
LEFT_OUT: Final = frozenset({"django_session"})
_TABLES: Final = "SELECT tablename FROM pg_tables WHERE schemaname = 'public' ORDER BY tablename"
_MIGRATIONS: Final = "SELECT app, max(name) FROM django_migrations GROUP BY app ORDER BY app"


def make(into: Path, *, keys: Path | None, at: datetime) -> tuple[Path, str, Manifest]:
    """This function will make a backup in a new folder under `into`, and return that folder, the digest of
    the manifest and the manifest.

    `keys`, a folder elsewhere, is given the secret key besides. Raises BackupRefused.
    """
    if "owner" not in settings.DATABASES:
        raise BackupRefused("Only the owner may read every table: set OWNER_DATABASE_URL.")
    into = into.absolute()
    if keys is not None:
        _refuse_together(into, keys.absolute())
    name = f"tarebook-{at:%Y%m%dT%H%M%SZ}"
    into.mkdir(parents=True, exist_ok=True, mode=0o700)
    if (into / name).exists():
        raise BackupRefused(f"{into / name} is there already.")
    making = into / f".making-{secrets.token_hex(4)}"
    making.mkdir(mode=0o700)
    try:
        made = _dump(making, at)
        digest = manifest.write(making, made)
        making.rename(into / name)
    finally:
        shutil.rmtree(making, ignore_errors=True)
    if keys is not None:
        _keep_key(keys.absolute() / f"{name}.secret-key")
    return into / name, digest, made


def key_check() -> str:
    """This function will return a word that tells whether a key is this one, and nothing else about it."""
    return salted_hmac("service.backup.key", "check", algorithm="sha256").hexdigest()[:16]


def counted(using: str) -> dict[str, int]:
    """This function will return the number of rows of every table that is in a backup."""
    found = {}
    with connections[using].cursor() as cursor:
        cursor.execute(_TABLES)
        for (table,) in cursor.fetchall():
            if table not in LEFT_OUT:
                cursor.execute(sql.SQL("SELECT count(*) FROM public.{}").format(sql.Identifier(table)))
                found[table] = int(cursor.fetchone()[0])
    return found


def migrations(using: str) -> tuple[tuple[str, str], ...]:
    """This function will return the last migration of every application, as the database has it."""
    with connections[using].cursor() as cursor:
        cursor.execute(_MIGRATIONS)
        return tuple((app, last) for app, last in cursor.fetchall())


def _dump(folder: Path, at: datetime) -> Manifest:
    connection = connections["owner"]
    with transaction.atomic(using="owner"):
        with connection.cursor() as cursor:
            cursor.execute("SET TRANSACTION ISOLATION LEVEL REPEATABLE READ, READ ONLY")
            cursor.execute("SELECT current_setting('server_version'), pg_export_snapshot()")
            server, snapshot = cursor.fetchone()
        server = server.split()[0]
        programs.refuse_other_major(server)
        dump = folder / manifest.DUMP
        os.close(os.open(dump, os.O_WRONLY | os.O_CREAT, 0o600))
        programs.run(
            "pg_dump",
            _place(connection.settings_dict),
            "--format=custom",
            f"--snapshot={snapshot}",
            f"--file={dump}",
            *(f"--exclude-table-data=public.{table}" for table in sorted(LEFT_OUT)),
        )
        # In the transaction whose snapshot was dumped: just what stands in the dump.
        chains, altered = follow_chains("owner"), altered_documents("owner")
        return Manifest(
            made_at=f"{at:%Y-%m-%dT%H:%M:%SZ}",
            server=server,
            engine=ENGINE_VERSION,
            key_check=key_check(),
            sound=not (chains.broken or altered),
            heads=tuple((head.chain, head.position, head.digest) for head in chains.heads),
            rows=counted("owner"),
            migrations=migrations("owner"),
            parts=(manifest.part(dump),),
        )


def _place(entry: dict[str, Any]) -> dict[str, Any]:
    names = {"host": "HOST", "port": "PORT", "user": "USER", "password": "PASSWORD", "dbname": "NAME"}
    return {ours: entry[theirs] for ours, theirs in names.items()}


def _refuse_together(into: Path, keys: Path) -> None:
    into, keys = into.resolve(), keys.resolve()
    if keys.is_relative_to(into) or into.is_relative_to(keys):
        raise BackupRefused(
            "The key belongs elsewhere than the backup: name a folder apart from it for --keys."
        )


def _keep_key(path: Path) -> None:
    path.parent.mkdir(parents=True, exist_ok=True, mode=0o700)
    with os.fdopen(os.open(path, os.O_WRONLY | os.O_CREAT | os.O_EXCL, 0o600), "w") as file:
        file.write(f"{settings.SECRET_KEY}\n")
