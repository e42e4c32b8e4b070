"""Telling once a day what falls due: an event to subscribers, and mail to operations."""

from datetime import datetime, timedelta
from typing import Final
from uuid import UUID

from django.conf import settings
from django.core.mail import EmailMessage
from django.utils import timezone

from fleet.actions.announcing import announce_falling_due
from fleet.actions.constraint_refusals import refused_as
from fleet.acts import TELL_FALLING_DUE
from fleet.duties import scheduler_at_work
from fleet.models import Aircraft, DueNotice
from fleet.queries.falling_due import Due, falling_due
from fleet.queries.settings import settings_at
from records import outbox
from records.act import act
from records.refusal import StepRefused

MAILING: Final = "fleet.tasks.mail_falling_due"
# Days before something lapses on which it is told of, the last of them when it has.
THRESHOLDS: Final = (60, 30, 7, 0)

_BODY = """\
{registration}: {what} {lapses}.

As stated in {source}.

The aircraft: /aircraft/{registration}
"""


def tell_all_falling_due(now: datetime | None = None) -> int:
    """This function will tell of everything that falls due with any operator, and return how many were told.

    Run twice, it tells nothing twice: each thing is told once for each threshold it has passed.
    """
    at = now or timezone.now()
    told = 0
    for aircraft in Aircraft.objects.select_related("operator").order_by("operator_id", "registration"):
        for due in falling_due(aircraft, at):
            threshold = threshold_passed(due.lapses - at)
            if threshold is not None and not _told(aircraft, due, threshold):
                told += _tell(aircraft, due, threshold)
    return told


def threshold_passed(left: timedelta) -> int | None:
    """This function will return the least threshold that has been reached, None before the first."""
    reached = [days for days in THRESHOLDS if left <= timedelta(days=days)]
    return min(reached, default=None)


def _told(aircraft: Aircraft, due: Due, threshold: int) -> bool:
    return DueNotice.objects.filter(
        aircraft=aircraft, about=due.about, lapses=due.lapses, threshold_days=threshold
    ).exists()


def _tell(aircraft: Aircraft, due: Due, threshold: int) -> bool:
    try:
        with (
            refused_as({"due_notice_is_given_once": lambda: StepRefused("told", "It was told already.")}),
            act(
                TELL_FALLING_DUE,
                by=scheduler_at_work(aircraft.operator_id),
                about=f"aircraft:{aircraft.id}",
            ) as entry,
        ):
            addresses = _addresses(aircraft)
            notice = DueNotice.objects.create(
                operator_id=entry.chain,
                aircraft=aircraft,
                about=due.about,
                what=due.what,
                lapses=due.lapses,
                threshold_days=threshold,
                mail_addresses=len(addresses),
                told_at=entry.at,
                act=entry.id,
            )
            announce_falling_due(
                entry,
                f"aircraft:{aircraft.id}",
                what=due.what,
                due=due.lapses,
                registration=aircraft.registration,
            )
            if addresses:
                outbox.put(entry, MAILING, str(notice.id))
    except StepRefused:  # another scheduler told it meanwhile; its act is undone
        return False
    return True


def mail_falling_due(notice: UUID) -> int:
    """This function will mail one notice to operations, as their addresses are now; returns to how many."""
    row = DueNotice.objects.select_related("aircraft__operator").get(id=notice)
    addresses = _addresses(row.aircraft)
    if not addresses:
        return 0
    lapses = f"{'lapsed' if row.threshold_days == 0 else 'lapses'} at {row.lapses.isoformat()}"
    registration = row.aircraft.registration
    source = next(
        (one.source for one in falling_due(row.aircraft, row.told_at) if one.about == row.about),
        "what stood then",
    )
    message = EmailMessage(
        subject=f"Falling due: {registration}, {row.what}",
        body=_BODY.format(registration=registration, what=row.what, lapses=lapses, source=source),
        to=list(addresses),
        headers={"Message-ID": f"<due-{row.id}@{settings.DEFAULT_FROM_EMAIL.rpartition('@')[2]}>"},
    )
    message.send()
    return len(addresses)


def _addresses(aircraft: Aircraft) -> tuple[str, ...]:
    if not settings.EMAIL_HOST:
        return ()
    now = timezone.now()
    return settings_at(aircraft.operator_id, now, now).operations_mail
