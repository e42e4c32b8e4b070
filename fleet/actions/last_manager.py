"""An operator keeps somebody who can enter people and grant duties: nobody outside could put one back."""

from datetime import datetime

from django.db import connection

from fleet.queries.people import has_manager
from records.act import Entry
from records.refusal import StepRefused


def one_at_a_time(entry: Entry) -> None:
    """This function will hold the operator's people until the act commits, so that of two managers who take
    each other's duty the second is refused.
    """
    with connection.cursor() as cursor:
        cursor.execute("SELECT pg_advisory_xact_lock(hashtextextended(%s, 4203))", [entry.chain])


def refuse_without_manager(entry: Entry, at: datetime) -> None:
    """This function will do nothing while a manager is left at `at`; raises StepRefused, which undoes the
    act.
    """
    if not has_manager(entry.chain, at):
        raise StepRefused(
            "last-manager",
            "Nobody would be left who may enter people and grant duties.",
            next_step="Grant somebody else the duty operations manager first.",
        )
