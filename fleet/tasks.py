"""Work the scheduler starts once a day, and mail promised by it."""

from uuid import UUID

from celery import shared_task

from fleet.actions.tell_falling_due import MAILING, mail_falling_due, tell_all_falling_due
from records import outbox


@shared_task(name="fleet.tasks.tell_falling_due", ignore_result=True)
def tell_falling_due() -> int:
    """This function will tell of everything that falls due, and return how many were told."""
    return tell_all_falling_due()


@shared_task(name=MAILING, ignore_result=True)
def mail_what_falls_due(notice: str) -> None:
    """This function will mail one notice. A failure is noted and tried again later."""
    try:
        mail_falling_due(UUID(notice))
        outbox.done(MAILING, notice)
    except Exception as problem:
        outbox.failed(MAILING, notice, problem)
        raise
