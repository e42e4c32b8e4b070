"""`manage.py recheck`: stored loads computed again against a corrected figure; a table of what changed."""

import time
from argparse import ArgumentParser
from pathlib import Path
from typing import Any, Final

from django.core.management.base import BaseCommand, CommandError
from rich import box
from rich.console import Console
from rich.progress import BarColumn, MofNCompleteColumn, Progress, TextColumn, TimeRemainingColumn
from rich.table import Table

from fleet.models import Aircraft, Operator
from loads.actions.ask_recheck import ask_recheck
from loads.actions.work_recheck import work_recheck
from loads.acts import RECHECK_LOADS
from loads.models import Recheck
from loads.queries.recheck_answer import csv_of
from loads.queries.recheck_csv import csv_lines
from loads.queries.rechecks import progress_of, recheck_of, table_page
from records import outbox
from records.actor import Actor
from records.refusal import Refused

MOST_SHOWN: Final = 200
NARROWEST: Final = 140
_WAIT: Final = 0.2
_COULD_NOT_RUN: Final = 2


class Command(BaseCommand):
    """Asks for a recheck and does its work here, sharing it with the workers; Ctrl-C leaves them the rest."""

    help = "Computes stored loads again against a later empty weight, loading basis or table."

    def add_arguments(self, parser: ArgumentParser) -> None:
        """This function will take the aircraft, the versions, the span of departures and a file."""
        parser.add_argument("aircraft", nargs="?", help="the registration; without it the whole operator")
        parser.add_argument("--empty-weight", metavar="ID", help="the empty weight to compute with")
        parser.add_argument("--loading-basis", metavar="ID", help="the loading basis to compute with")
        parser.add_argument("--standard-weights", metavar="ID", help="the table of standard weights")
        parser.add_argument("--from", dest="since", metavar="TIME", help="planned departures from this on")
        parser.add_argument("--to", dest="until", metavar="TIME", help="planned departures before this")
        parser.add_argument("--reason", default="", help="why, in a few words; it stands in the trail")
        parser.add_argument("--operator", metavar="CODE", help="the operator, where there are several")
        parser.add_argument("--csv", type=Path, metavar="FILE", help="write the whole table here, too")

    def handle(self, *_args: Any, **options: Any) -> None:
        """This function will do the recheck, show how far it is, and print the table."""
        console = Console(highlight=False)
        operator = _operator(options["operator"], options["aircraft"])
        try:
            recheck = ask_recheck(_document(options), by=_actor(operator))
            _work(recheck, console)
        except Refused as refusal:
            raise CommandError(
                f"{refusal.detail} {refusal.next_step}".strip(), returncode=_COULD_NOT_RUN
            ) from refusal
        found = recheck_of(operator, recheck.id)
        _show(found, console)
        if options["csv"] is not None:
            with options["csv"].open("w", encoding="utf-8", newline="") as file:
                file.writelines(csv_lines(csv_of(found)))
            console.print(f"The whole table is in {options['csv']}.")


def _document(options: dict[str, Any]) -> dict[str, Any]:
    named = {
        "aircraft": options["aircraft"],
        "empty_weight": options["empty_weight"],
        "loading_basis": options["loading_basis"],
        "standard_weights": options["standard_weights"],
        "from": options["since"],
        "to": options["until"],
        "reason": options["reason"],
    }
    return {name: value for name, value in named.items() if value}


def _operator(code: str | None, aircraft: str | None) -> str:
    """Return the operator meant: the one named, the one that has the aircraft, or the only one there is."""
    if code is not None:
        return code
    rows = Aircraft.objects.filter(registration=aircraft.upper()) if aircraft else None
    codes = sorted(
        set(rows.values_list("operator_id", flat=True))
        if rows is not None
        else Operator.objects.values_list("code", flat=True)
    )
    if len(codes) == 1:
        return codes[0]
    if not codes:
        raise CommandError("No such aircraft is entered.", returncode=_COULD_NOT_RUN)
    raise CommandError(f"Say which operator with --operator: {', '.join(codes)}.", returncode=_COULD_NOT_RUN)


def _actor(operator: str) -> Actor:
    return Actor(
        operator=operator,
        kind="service",
        key="service:command",
        name="",
        capacity="command line",
        may=frozenset({RECHECK_LOADS.name}),
    )


def _work(recheck: Recheck, console: Console) -> None:
    columns = (TextColumn("computing"), BarColumn(), MofNCompleteColumn(), TimeRemainingColumn())
    with Progress(*columns, console=console) as bar:
        task = bar.add_task("loads", total=None)
        while (worked := work_recheck(recheck.id)) != "finished":
            stands = progress_of(recheck)
            bar.update(task, total=stands.loads, completed=stands.done)
            if worked == "busy":
                time.sleep(_WAIT)
        stands = progress_of(recheck)
        bar.update(task, total=stands.loads, completed=stands.done)
    outbox.done("loads.tasks.recheck", str(recheck.id))


def _show(recheck: Recheck, console: Console) -> None:
    stands, page = progress_of(recheck), table_page(recheck, most=MOST_SHOWN)
    table = Table(title=f"Recheck {recheck.id}", box=box.SIMPLE_HEAD, pad_edge=False)
    for name in ("flight", "aircraft", "departure", "signed verdict", "verdict now", "limit", "excess"):
        table.add_column(name, overflow="fold")
    for one in page.rows:
        load = one.load
        leg = f" leg {load.leg}" if load.leg > 1 else ""
        flight = f"{load.reference}{leg}"
        registration, departure = load.aircraft.registration, load.departure_text
        table.add_row(flight, registration, departure, one.verdict, one.now, one.limit, one.excess)
    wide = Console(width=max(console.width, NARROWEST), highlight=False, file=console.file, markup=False)
    if page.rows:
        wide.print(table)
    if page.after is not None:
        wide.print(f"The first {MOST_SHOWN} rows; --csv writes all of them.")
    counts = stands.counts
    wide.print(
        f"{stands.loads} loads: {counts['same']} with the same verdict, {counts['changed']} with another, "
        f"{counts['not_computed']} not computed, {counts['other_fit']} on another base fit, "
        f"{counts['gone']} gone meanwhile; {stands.flagged} flagged. {stands.exactly} were computed one by "
        "one, the rest in bulk."
    )
