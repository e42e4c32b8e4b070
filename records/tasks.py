"""Work the scheduler starts: looking for promised work that is not done."""

import logging
from uuid import UUID

from celery import shared_task
from django.db.models.functions import Now

from records import access_log, outbox, verified
from records.models.receipt import KEPT_FOR, Receipt
from records.webhooks.deliver import deliver_due, due_webhooks
from records.webhooks.waking import DELIVERING, wake

log = logging.getLogger(__name__)

MOST_AT_ONCE = 200


@shared_task(name="records.tasks.sweep_outbox", ignore_result=True)
def sweep_outbox() -> int:
    """This function will send again what is promised and due, and return how many that was.

    A broker that fails is not asked again in this sweep; each row has its next time already.
    """
    due = outbox.take_due(MOST_AT_ONCE)
    sent = 0
    for task, key in due:
        if not outbox.wake(task, key):
            break
        sent += 1
    if due:
        log.info("promised work: %d due, %d sent", len(due), sent)
    return sent


@shared_task(name="records.tasks.forget_old_answers", ignore_result=True)
def forget_old_answers() -> int:
    """This function will delete the answers kept for repeated requests whose time is over, and count them."""
    deleted, _ = Receipt.objects.filter(answered_at__lte=Now() - KEPT_FOR).delete()
    return deleted


@shared_task(name="records.tasks.seal_access_log", ignore_result=True)
def seal_access_log() -> int:
    """This function will seal the log of sign-ins of every chain where it grew, and count them."""
    return access_log.seal_log()


@shared_task(name=DELIVERING, ignore_result=True)
def deliver_to_webhook(webhook: str) -> int:
    """This function will try what is due to one subscription, and return how many were tried."""
    return deliver_due(UUID(webhook))


@shared_task(name="records.tasks.sweep_webhooks", ignore_result=True)
def sweep_webhooks() -> int:
    """This function will wake a worker for each subscription with something due, and count those woken."""
    return wake(str(webhook) for webhook in due_webhooks(MOST_AT_ONCE))


@shared_task(name="records.tasks.verify_onwards", ignore_result=True)
def verify_onwards() -> int:
    """This function will follow each chain from where it last held, and count the places that do not hold."""
    return len(verified.verify_onwards())


@shared_task(name="records.tasks.verify_everything", ignore_result=True)
def verify_everything() -> int:
    """This function will verify chains, documents, rows and guards, and count the places that do not hold."""
    return len(verified.verify_everything())
