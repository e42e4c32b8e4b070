"""`manage.py verify`: does the trail hold?"""

import sys
from argparse import ArgumentParser
from typing import Any

from django.core.management.base import BaseCommand
from django.db import DatabaseError, connections, transaction

from records.chain import Finding
from records.reconcile import reconcile
from records.verify import Chains, altered_documents, follow_chains

SOUND, BROKEN, COULD_NOT_RUN = 0, 1, 2


class Command(BaseCommand):
    """Follows every chain, hashes every filed document again, and compares all rows and guards with the
    trail.
    """

    help = (
        "Verify the trail, the filed documents, the rows and the guards. "
        "Exit 0: sound. Exit 1: broken (names each broken place). Exit 2: could not run."
    )
    requires_system_checks: list[
        str
    ] = []  # a missing guard is for this command to report, not to stumble over

    def add_arguments(self, parser: ArgumentParser) -> None:
        """This function will add the name of the database to verify."""
        parser.add_argument(
            "--database", default="default", choices=list(connections), help="alias to read through"
        )

    def handle(self, *_args: Any, database: str = "default", **_options: Any) -> None:
        """This function will verify, print what it found, and end the process with the exit code."""
        try:
            with transaction.atomic(using=database):
                self._one_moment(database)
                chains, documents, rows = (
                    follow_chains(database),
                    altered_documents(database),
                    reconcile(database),
                )
        except DatabaseError as problem:
            self.stderr.write(f"Could not verify: {problem}")
            sys.exit(COULD_NOT_RUN)
        self._print(chains, documents, rows)
        sys.exit(BROKEN if chains.broken or documents or rows else SOUND)

    @staticmethod
    def _one_moment(database: str) -> None:
        """Everything is read as of one moment, so that acts sealed meanwhile raise no false alarm."""
        connection = connections[database]
        if len(connection.savepoint_ids) == 0:
            with connection.cursor() as cursor:
                cursor.execute("SET TRANSACTION ISOLATION LEVEL REPEATABLE READ, READ ONLY")

    def _print(self, chains: Chains, documents: tuple[Finding, ...], rows: tuple[Finding, ...]) -> None:
        for head in chains.heads:
            self.stdout.write(
                f"chain {head.chain}: {head.position} entries hold, head {head.digest or 'none'}"
            )
        findings = (*chains.broken, *documents, *rows)
        for finding in findings:
            self.stdout.write(f"BROKEN  {finding.where}: {finding.what}")
            self.stdout.write(f"        expected {finding.expected}")
            self.stdout.write(f"        found    {finding.found}")
        self.stdout.write(
            f"Broken in {len(findings)} places; the first is {findings[0].where}."
            if findings
            else "Sound: chains, filed documents, rows and guards all hold."
        )
