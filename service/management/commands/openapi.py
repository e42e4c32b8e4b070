"""`manage.py openapi` writes service/openapi.json; `--check` compares and exits 1 with a diff when it
differs.
"""

import difflib
from argparse import ArgumentParser
from typing import Any

from django.core.management.base import BaseCommand, CommandError

from service.openapi import COMMITTED, document


class Command(BaseCommand):
    """Write or compare the committed OpenAPI document."""

    help = "Write service/openapi.json as it follows from the endpoints, or compare it (--check)."

    def add_arguments(self, parser: ArgumentParser) -> None:
        """This function will declare the one switch."""
        parser.add_argument("--check", action="store_true", help="compare only; exit 1 with a diff")

    def handle(self, *_: Any, **options: Any) -> None:
        """This function will write or compare; raises CommandError on a difference or an incomplete
        endpoint.
        """
        text, complaints = document()
        for complaint in complaints:
            self.stderr.write(complaint)
        if complaints:
            raise CommandError(f"{len(complaints)} endpoints are not fully described.")
        if not options["check"]:
            COMMITTED.write_text(text, encoding="utf-8")
            self.stdout.write(f"Written: {COMMITTED.name}")
            return
        committed = COMMITTED.read_text(encoding="utf-8") if COMMITTED.exists() else ""
        if committed != text:
            lines = (committed.splitlines(), text.splitlines())
            for line in difflib.unified_diff(*lines, "committed", "endpoints", lineterm="", n=2):
                self.stdout.write(line)
            raise CommandError("service/openapi.json differs from the endpoints: run manage.py openapi.")
        self.stdout.write("service/openapi.json fits the endpoints.")
