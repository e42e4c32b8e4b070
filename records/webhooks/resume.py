"""Taking a parked subscription up again, with all that was kept for it."""

from uuid import UUID

from records.act import act
from records.actor import Actor
from records.acts import RESUME_WEBHOOK
from records.models import WebhookDelivery
from records.refusal import StepRefused
from records.webhooks.standing import Standing, one_of_two_racers, refuse_ended, standing_of, take_step
from records.webhooks.waking import wake_after_commit


def resume(by: Actor, webhook: UUID) -> Standing:
    """This function will make a parked subscription live; what was parked is sent, the oldest first.

    Raises NotKnown, NotAllowed, StepRefused (ended, or live already).
    """
    with one_of_two_racers(), act(RESUME_WEBHOOK, by=by, about=f"webhook:{webhook}") as entry:
        standing = standing_of(entry.chain, webhook)
        refuse_ended(standing)
        if standing.state == "live":
            raise StepRefused("webhook-live", "This subscription is not parked.")
        step = take_step(entry, standing.webhook, "live", after=standing.step, because="taken up again")
        parked = WebhookDelivery.objects.filter(webhook=standing.webhook, state="parked")
        parked.update(state="waiting", failed=0, try_at=entry.at)
        wake_after_commit([webhook])
        return Standing(standing.webhook, step)
