"""Entering the invented operator and its day, and the summary at the end."""

import time
from datetime import datetime, timedelta
from pathlib import Path
from uuid import UUID
from zoneinfo import ZoneInfo

from django.utils import timezone
from rich.console import Console

from loads.models import FiledPaper
from service.client import Tarebook
from service.demo.aircraft import enter_aircraft
from service.demo.cast import APPROVER, MAINTENANCE, OPERATOR, PILOTS, SCHEDULER
from service.demo.flights import Flown, fly
from service.demo.notes import Notes
from service.demo.people import enter_people
from service.demo.summary import show_logins, show_remedies, show_summary

# The worker files a manifest in well under a second; after this the request itself makes it.
PATIENCE = timedelta(seconds=30)


def run(address: str, data: Path) -> None:
    """This function will enter the invented operator against the running server, once a data folder, and
    say so.
    """
    notes, console = Notes(data), Console(highlight=False)
    if notes.entered:
        console.print("The invented operator is already entered in this data folder.")
        show_logins(console, address, notes.password)
        return
    console.print(f"Entering the invented operator {OPERATOR.name} and a day of its loads ...")
    tokens = enter_people(notes)
    enter_aircraft(Tarebook(address, tokens[MAINTENANCE]), Tarebook(address, tokens[APPROVER]))
    if notes.get("day") is None:
        today = timezone.now().astimezone(ZoneInfo(OPERATOR.time_zone)).date()
        notes.keep("day", today.isoformat())
    scheduler = Tarebook(address, tokens[SCHEDULER])
    pilots = {login: Tarebook(address, tokens[login]) for login in PILOTS}
    day = datetime.fromisoformat(notes.get("day")).date()
    flown = fly(scheduler, pilots, notes.password, day)
    papers = _papers(flown, scheduler, data / "papers")
    notes.keep("entered", True)
    show_summary(console, flown, papers, day)
    show_remedies(console, flown, scheduler)
    show_logins(console, address, notes.password)


def _papers(flown: list[Flown], client: Tarebook, folder: Path) -> dict[str, Path]:
    """This function will fetch the manifest of every accepted load into `folder`, by flight reference."""
    folder.mkdir(exist_ok=True)
    accepted = [(one, one.last.manifest) for one in flown if one.last.manifest]
    _await_filing([UUID(one.last.id) for one, _ in accepted])
    papers = {}
    for one, manifest in accepted:
        path = folder / f"manifest-{manifest.number:03d}-{one.trip.reference}.pdf"
        path.write_bytes(client.manifest(one.last).pdf)
        papers[one.trip.reference] = path
    return papers


def _await_filing(loads: list[UUID]) -> None:
    until = timezone.now() + PATIENCE
    while FiledPaper.objects.filter(paper__load_id__in=loads).count() < len(loads) and timezone.now() < until:
        time.sleep(0.1)
