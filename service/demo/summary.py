"""The table at the end of the first run."""

from datetime import date
from pathlib import Path

from rich import box
from rich.console import Console
from rich.table import Table

from loads.cautions import INVENTED
from service.client import Tarebook
from service.demo.cast import PEOPLE, SCHEDULER
from service.demo.flights import Flown

# Wide enough for the lines that matter, also when the output goes to a file.
NARROWEST = 150


def show_summary(console: Console, flown: list[Flown], papers: dict[str, Path], day: date) -> None:
    """This function will print one row a flight: load, aircraft, verdict, governing lines, state, paper."""
    table = Table(title=f"{INVENTED}: the loads of {day.isoformat()}", box=box.SIMPLE_HEAD, pad_edge=False)
    for name in ("load", "aircraft", "verdict", "governing: weight, CG", "state", "paper"):
        table.add_column(name, overflow="fold")
    for one in flown:
        governing = one.last.governing
        table.add_row(
            one.trip.reference,
            one.last.body["aircraft"],
            _verdict(one),
            f"{governing['weight']}\n{governing['cg']}",
            one.last.state,
            _shown(papers.get(one.trip.reference)),
        )
    Console(width=max(console.width, NARROWEST), highlight=False, file=console.file).print(table)


def show_remedies(console: Console, flown: list[Flown], client: Tarebook) -> None:
    """This function will print what would bring each reject within, in the words of its page."""
    for one in flown:
        if one.last.verdict != "outside":
            continue
        console.print(f"What would bring {one.trip.reference} within, each alone:")
        for remedy in client.remedies(one.last).remedies:
            console.print(f"  {remedy.sentence}")


def _shown(paper: Path | None) -> str:
    """This function will write a path from the folder the command was typed in, when it lies in there."""
    if paper is None:
        return ""
    here = Path.cwd()
    return str(paper.relative_to(here) if paper.is_relative_to(here) else paper)


def _verdict(one: Flown) -> str:
    if one.first.id == one.last.id:
        return one.last.verdict
    return f"{one.first.verdict}, revised: {one.last.verdict}"


def show_logins(console: Console, address: str, password: str) -> None:
    """This function will print where to sign in and the invented logins."""
    console.print(f"Sign in at {address}/sign-in with an invented login; the password of all is {password}")
    for one in PEOPLE:
        if one.login != SCHEDULER:
            console.print(f"  {one.login:<10} {one.name}, {', '.join(one.roles)}")
