"""`manage.py selfcheck`: the computer proves itself on its reference loads, and what came out is filed."""

import json
from argparse import ArgumentParser
from typing import Any

from django.core.management.base import BaseCommand
from django.db import DatabaseError
from rich import box
from rich.console import Console
from rich.table import Table

from loads.actions.self_check import run_self_check

PASSED, FAILED, COULD_NOT_RUN = 0, 1, 2


class Command(BaseCommand):
    """Exit 0: every answer came out; 1: one did not, and nothing can be signed; 2: it could not be run."""

    help = "Computes the built-in reference loads, compares the published answers, and files the result."

    def add_arguments(self, parser: ArgumentParser) -> None:
        """This function will take `--quiet`: the last line alone."""
        parser.add_argument("--quiet", action="store_true", help="print the last line alone")

    def handle(self, *_args: Any, **options: Any) -> None:
        """This function will run the self-check, print it, and end with its exit code."""
        console = Console(highlight=False)
        try:
            check = run_self_check("asked")
        except DatabaseError as problem:
            console.print(f"The self-check could not be filed: {type(problem).__name__}")
            raise SystemExit(COULD_NOT_RUN) from problem
        document = json.loads(check.document)
        if not options["quiet"]:
            console.print(_table(document))
        wrong = sum(not one["right"] for one in document["loads"])
        told = "every published answer came out" if check.passed else f"{wrong} came out wrong: do not sign"
        console.print(
            f"{len(document['loads'])} reference loads, engine {check.engine}: {told}. "
            f"Reference set {check.references[:16]}, filed {check.checked_at:%Y-%m-%d %H:%M} UTC."
        )
        raise SystemExit(PASSED if check.passed else FAILED)


def _table(document: dict[str, Any]) -> Table:
    table = Table(box=box.SIMPLE_HEAD, pad_edge=False)
    for name in ("reference load", "figures are", "answer", "wanted", "found", ""):
        table.add_column(name, overflow="fold")
    for one in document["loads"]:
        for place, each in enumerate(one["findings"]):
            head = (one["id"], one["figures_are"]) if place == 0 else ("", "")
            mark = "" if each["right"] else "WRONG"
            table.add_row(*head, each["what"], each["wanted"], each["found"], mark)
    return table
