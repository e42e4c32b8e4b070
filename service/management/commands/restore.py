"""`manage.py restore BACKUP --into ADDRESS`: somewhere empty, verified before anybody may use it."""

import sys
from argparse import ArgumentParser
from pathlib import Path
from typing import Any

from django.core.management.base import BaseCommand, CommandError

from service import env, roles
from service.backup.manifest import BackupRefused
from service.backup.restore import fits_key, restore


class Command(BaseCommand):
    """Restores a backup, makes roles and grants again, and verifies chains, documents, rows and guards."""

    help = (
        "Restore the backup in the folder BACKUP into an empty database. Without --into, SUPERUSER_URL says "
        "where; OWNER_PASSWORD and SERVICE_PASSWORD are given to the two roles. Exit 0: restored and sound. "
        "Exit 1: restored, does not hold, and closed to the service. Exit 2: nothing was restored."
    )
    # It works on another database than the one of the settings, which need not be there.
    requires_system_checks: list[str] = []

    def add_arguments(self, parser: ArgumentParser) -> None:
        """This function will add the folder and the address."""
        parser.add_argument("backup", type=Path, help="a folder that `backup` made")
        parser.add_argument("--into", default="", help="postgresql:// address of a superuser and a database")

    def handle(self, *_args: Any, backup: Path, into: str = "", **_options: Any) -> None:
        """This function will restore and verify, and end with the exit code that says what came of it."""
        passwords = roles.Passwords(
            env.text("OWNER_PASSWORD", "") or None, env.text("SERVICE_PASSWORD", "") or None
        )
        try:
            made, findings = restore(
                backup, into or env.text("SUPERUSER_URL"), passwords=passwords, say=self.stdout.write
            )
        except BackupRefused as why:
            raise CommandError(f"Nothing was restored. {why}", returncode=2) from why
        for finding in findings:
            self.stdout.write(f"BROKEN  {finding.where}: {finding.what}")
            self.stdout.write(f"        expected {finding.expected}")
            self.stdout.write(f"        found    {finding.found}")
        if findings:
            self.stderr.write("Restored, but it does not hold; the service role may not connect to it.")
            sys.exit(1)
        for chain, position, head in made.heads:
            self.stdout.write(f"chain {chain}: {position} entries hold, head {head or 'none'}")
        if not fits_key(made):
            self.stdout.write(
                "The secret key here is another than when the backup was made: answers kept for repeated "
                "requests and secrets of webhooks need the one of then."
            )
        self.stdout.write("Restored and sound: chains, filed documents, rows and guards all hold.")
