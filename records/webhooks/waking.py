"""Waking a worker for subscriptions that have something waiting; the list itself is in the database."""

from collections.abc import Iterable
from datetime import timedelta
from typing import Final
from uuid import UUID

from django.db import transaction

from records import outbox

DELIVERING: Final = "records.tasks.deliver_to_webhook"
# The first wait of the schedule is shorter than the sweeper's round.
SHORT_WAIT: Final = timedelta(seconds=20)


def wake_after_commit(webhooks: Iterable[UUID]) -> None:
    """This function will wake a worker for each of these subscriptions once the transaction is committed."""
    keys = [str(webhook) for webhook in webhooks]
    transaction.on_commit(lambda: wake(keys))


def wake(webhooks: Iterable[str]) -> int:
    """This function will wake a worker for each, and stop at a broker that does not answer; returns how
    many.
    """
    woken = 0
    for webhook in webhooks:
        if not outbox.wake(DELIVERING, webhook):
            break
        woken += 1
    return woken


def wake_in(webhook: UUID, wait: timedelta) -> None:
    """This function will wake a worker after a short wait; after a longer one the sweeper does it."""
    if wait <= SHORT_WAIT:
        outbox.wake(DELIVERING, str(webhook), after=wait)
