"""Reading what is on its way to a subscriber, and what came of each try."""

from uuid import UUID

from django.db.models import Prefetch, QuerySet

from records.models import Webhook, WebhookAttempt, WebhookDelivery
from records.refusal import NotKnown


def delivery_of(webhook: Webhook, delivery: UUID) -> WebhookDelivery:
    """This function will return one delivery of a subscription with its tries; raises NotKnown."""
    found = _with_tries().filter(webhook=webhook, pk=delivery).first()
    if found is None:
        raise NotKnown("delivery-not-known", "There is no delivery of this number to this subscription.")
    return found


def deliveries_of(
    webhook: Webhook, *, state: str, before: UUID | None, most: int
) -> tuple[list[WebhookDelivery], UUID | None]:
    """This function will return up to `most` deliveries, the newest first, and where the next page begins.

    `state` "" is every state; `before` is the delivery the page comes after.
    """
    found = _with_tries().filter(webhook=webhook)
    if state:
        found = found.filter(state=state)
    if before is not None:
        found = found.filter(pk__lt=before)
    rows = list(found.order_by("-pk")[: most + 1])
    return rows[:most], rows[most - 1].pk if len(rows) > most else None


def _with_tries() -> "QuerySet[WebhookDelivery]":
    tries = WebhookAttempt.objects.order_by("id")
    return WebhookDelivery.objects.select_related("event").prefetch_related(Prefetch("attempts", tries))
