"""Work that a commit promised. The list stands in the database; the broker only wakes a worker.

A row is written in the act's own transaction, so work is promised exactly when its cause is committed.
Whatever happens to the broker (down, flushed) or a worker (killed), the row stays undone and the sweeper
sends it again.
"""

from __future__ import annotations

import logging
from dataclasses import dataclass
from datetime import timedelta
from typing import TYPE_CHECKING

from celery import current_app
from django.db import transaction
from django.db.models import Count, F, Max, Min
from django.db.models.functions import Now

from records import broker
from records.models.outbox import Outbox

if TYPE_CHECKING:
    from records.act import Entry

log = logging.getLogger(__name__)

# The first sweep leaves the worker that was woken at commit this much time.
FIRST_LOOK = timedelta(seconds=15)
LONGEST_WAIT = timedelta(hours=1)


@dataclass(frozen=True, slots=True)
class Waiting:
    """Promised work not done: how many pieces, and how long the oldest waits (seconds, 0 for none)."""

    count: int
    oldest_seconds: float


def put(entry: Entry, task: str, key: str) -> None:
    """This function will promise the work `task` (a Celery task's full name) for `key` (its only argument).

    Call it inside the act that causes the work. After commit a worker is woken; a broker that is down costs
    one short try and a line in the log. A task is promised once per key: a second time is refused by the
    database.
    """
    Outbox.objects.create(
        task=task,
        key=key,
        operator_id=entry.chain,
        act=entry.id,
        put_at=entry.at,
        try_after=entry.at + FIRST_LOOK,
    )
    transaction.on_commit(lambda: wake(task, key))


def wake(task: str, key: str, *, after: timedelta = timedelta(0)) -> bool:
    """This function will ask the broker to wake a worker (after a wait, if one is named), and say whether
    that was taken; it never raises.
    """
    problem = "no answer"
    if broker.answers():
        try:
            current_app.send_task(task, args=[key], retry=False, countdown=after.total_seconds() or None)
        except Exception as refused:  # noqa: BLE001  # whatever the broker fails with, the sweeper does it
            problem = type(refused).__name__
        else:
            return True
    log.warning("broker not reached (%s), %s(%s) is left to the sweeper", problem, task, key)
    return False


def done(task: str, key: str) -> None:
    """This function will mark work as done; call it in the transaction that does the work. Twice does
    no harm.
    """
    Outbox.objects.filter(task=task, key=key, done_at__isnull=True).update(done_at=Now(), last_problem="")


def failed(task: str, key: str, problem: BaseException) -> None:
    """This function will note what went wrong (the kind of error, no data); the sweeper tries again."""
    Outbox.objects.filter(task=task, key=key, done_at__isnull=True).update(
        last_problem=type(problem).__name__[:300]
    )


def take_due(most: int) -> list[tuple[str, str]]:
    """This function will return up to `most` due (task, key), oldest first, and set the time of their next
    try.

    The wait doubles with each try from 30 s to an hour. Rows another sweeper holds are left to it.
    """
    with transaction.atomic():
        due = list(
            Outbox.objects.select_for_update(skip_locked=True)
            .filter(done_at__isnull=True, try_after__lte=Now())
            .order_by("put_at", "id")[:most]
        )
        for row in due:
            Outbox.objects.filter(pk=row.pk).update(
                tries=F("tries") + 1, try_after=Now() + wait_after(row.tries)
            )
    return [(row.task, row.key) for row in due]


def wait_after(tries: int) -> timedelta:
    """This function will return how long to wait after the given number of earlier tries."""
    return min(timedelta(seconds=30 << min(tries, 10)), LONGEST_WAIT)


def waiting() -> Waiting:
    """This function will return how much promised work is not done."""
    found = Outbox.objects.filter(done_at__isnull=True).aggregate(
        count=Count("id"), oldest=Min("put_at"), now=Max(Now())
    )
    waits = (found["now"] - found["oldest"]).total_seconds() if found["oldest"] else 0.0
    return Waiting(found["count"], max(0.0, waits))
