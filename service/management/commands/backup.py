"""`manage.py backup FOLDER`: everything that is kept, as of one moment, in a new folder."""

from argparse import ArgumentParser
from datetime import UTC, datetime
from pathlib import Path
from typing import Any

from django.core.management.base import BaseCommand, CommandError

from service.backup.dump import make
from service.backup.manifest import BackupRefused


class Command(BaseCommand):
    """Dumps the database with all filed documents in it, and writes down what must be found in the dump."""

    help = (
        "Back up the database, documents and trail in it, to a new folder under FOLDER. The secret key and "
        "the passwords are never in it; --keys puts the key into another folder. Exit 1: made, but the trail "
        "it holds is broken. Exit 2: not made."
    )

    def add_arguments(self, parser: ArgumentParser) -> None:
        """This function will add the folders."""
        parser.add_argument("folder", type=Path, help="where the new folder is made")
        parser.add_argument("--keys", type=Path, default=None, help="a folder elsewhere, for the secret key")

    def handle(self, *_args: Any, folder: Path, keys: Path | None = None, **_options: Any) -> None:
        """This function will make the backup and say where it is and what its manifest's digest is."""
        try:
            place, digest, made = make(folder, keys=keys, at=datetime.now(UTC))
        except BackupRefused as why:
            raise CommandError(f"No backup was made. {why}", returncode=2) from why
        for chain, position, head in made.heads:
            self.stdout.write(f"chain {chain}: {position} entries, head {head or 'none'}")
        self.stdout.write(f"{sum(made.rows.values())} rows of {len(made.rows)} tables in {place}")
        self.stdout.write(f"Digest of the manifest, to be kept elsewhere: {digest}")
        if keys is None:
            self.stdout.write("The secret key is not in it: keep that apart (--keys FOLDER).")
        if not made.sound:
            raise CommandError("The backup is made, but its trail does not hold: run `verify`.", returncode=1)
