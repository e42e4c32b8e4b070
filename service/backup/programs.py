"""Running the programs of PostgreSQL that dump and restore, of the same major version as the server."""

import os
import subprocess
from collections.abc import Mapping
from typing import Any, Final

from service.backup.manifest import BackupRefused
from service.embedded import postgres_binaries

# By what the library calls it, what the programs call it.
_VARIABLES: Final = {"host": "PGHOST", "port": "PGPORT", "user": "PGUSER", "password": "PGPASSWORD"}


def run(program: str, place: Mapping[str, Any], *words: str) -> None:
    """This function will run `pg_dump` or `pg_restore` against a place: host, port, user, password, dbname.

    Where and as whom goes by the environment: the words of a command are for everybody here to read.
    Raises BackupRefused with what the program said.
    """
    path = postgres_binaries.folder() / program
    ours = {"PATH": os.environ.get("PATH", "/usr/bin:/bin"), "LC_ALL": "C", "TZ": "UTC"}
    ours |= {_VARIABLES[name]: str(place[name]) for name in _VARIABLES if place.get(name)}
    ours["PGDATABASE"] = str(place["dbname"])
    try:
        done = subprocess.run(
            (str(path), "--no-password", *words), env=ours, capture_output=True, text=True, check=False
        )
    except OSError as problem:
        raise BackupRefused(f"{path} cannot be run ({problem.strerror}).") from problem
    if done.returncode != 0:
        raise BackupRefused(f"{program} failed: {done.stderr.strip()[:1500]}")


def refuse_other_major(server: str) -> None:
    """This function will do nothing when the server's version (like "18.6") is that of our programs."""
    if server.partition(".")[0] != postgres_binaries.MAJOR:
        raise BackupRefused(
            f"The server is PostgreSQL {server}, the programs here are of {postgres_binaries.MAJOR}; "
            "set TAREBOOK_POSTGRES_BIN to programs of the server's version."
        )
