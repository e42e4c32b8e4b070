"""Having one event delivered again, whatever became of it."""

from uuid import UUID

from django.db.models import Q

from records.act import act
from records.actor import Actor
from records.acts import REPLAY_WEBHOOK
from records.models import WebhookDelivery
from records.refusal import StepRefused
from records.webhooks.deliveries import delivery_of
from records.webhooks.standing import refuse_ended, standing_of
from records.webhooks.waking import wake_after_commit


def replay(by: Actor, webhook: UUID, delivery: UUID) -> WebhookDelivery:
    """This function will begin a new round of tries for one event, at once, with the same message number.

    Raises NotKnown, NotAllowed, StepRefused (the subscription is ended, or a worker is at it right now).
    """
    with act(REPLAY_WEBHOOK, by=by, about=f"webhook:{webhook}", reason=f"delivery {delivery}") as entry:
        standing = standing_of(entry.chain, webhook)
        refuse_ended(standing)
        found = delivery_of(standing.webhook, delivery)
        free = Q(held_until=None) | Q(held_until__lte=entry.at)
        renewed = WebhookDelivery.objects.filter(free, pk=found.pk).update(
            state="waiting", failed=0, try_at=entry.at, held_until=None
        )
        if not renewed:
            raise StepRefused(
                "delivery-in-progress",
                "A worker is sending this right now.",
                next_step="Look at its tries in a minute.",
            )
        wake_after_commit([webhook])
        return delivery_of(standing.webhook, delivery)
