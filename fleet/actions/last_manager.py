"""An operator keeps somebody who can enter people and grant duties: nobody outside could put one back."""

from datetime import datetime

from django.db import connection

from fleet.models import Duty
from fleet.queries.people import MANAGER, has_manager
from records.act import Entry
from records.refusal import StepRefused


def one_at_a_time(entry: Entry) -> None:
    """This function will hold the operator's people until the act commits, so that of two managers who take
    each other's duty the second is refused.
    """
    with connection.cursor() as cursor:
        cursor.execute("SELECT pg_advisory_xact_lock(hashtextextended(%s, 4203))", [entry.chain])


def refuse_without_manager(entry: Entry, at: datetime) -> None:
    """This function will do nothing while a manager is left at `at` and ever after; raises StepRefused, which
    undoes the act.

    Ever after: an ending may be dated later, by days when it is planned and by a moment when two race and the
    act that was opened first comes second.
    """
    changes = Duty.objects.filter(operator=entry.chain, role=MANAGER, since__gt=at)
    if not all(has_manager(entry.chain, then) for then in (at, *changes.values_list("since", flat=True))):
        raise StepRefused(
            "last-manager",
            "Nobody would be left who may enter people and grant duties.",
            next_step="Grant somebody else the duty operations manager first.",
        )
