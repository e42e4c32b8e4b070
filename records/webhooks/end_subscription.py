"""Ending a subscription: by somebody, or because the receiver says it is gone."""

from uuid import UUID

from records.act import Entry, act
from records.actor import Actor
from records.acts import END_WEBHOOK
from records.models import WebhookDelivery
from records.webhooks.standing import Standing, one_of_two_racers, standing_of, take_step

ON_REQUEST = "ended on request"


def end_subscription(by: Actor, webhook: UUID, *, because: str = ON_REQUEST) -> Standing:
    """This function will end a subscription and what still waits for it; one that is ended stays as it is.

    Raises NotKnown, NotAllowed, StepRefused (two at the same moment).
    """
    with one_of_two_racers(), act(END_WEBHOOK, by=by, about=f"webhook:{webhook}") as entry:
        return end_in(entry, standing_of(entry.chain, webhook), because=because)


def end_in(entry: Entry, standing: Standing, *, because: str) -> Standing:
    """This function will do that inside an act that is open."""
    if standing.state == "ended":
        return standing
    step = take_step(entry, standing.webhook, "ended", after=standing.step, because=because)
    left = WebhookDelivery.objects.filter(webhook=standing.webhook, state__in=("waiting", "parked"))
    left.update(state="ended", try_at=None)
    return Standing(standing.webhook, step)
