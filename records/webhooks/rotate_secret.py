"""Making a new secret for a subscription; the old one signs besides for a day."""

from uuid import UUID

from django.db import IntegrityError

from records.act import act
from records.actor import Actor
from records.acts import ROTATE_WEBHOOK_SECRET
from records.refusal import StepRefused
from records.webhooks.keeping_secrets import make_secret
from records.webhooks.standing import refuse_ended, standing_of
from records.webhooks.subscribe import Subscribed


def rotate_secret(by: Actor, webhook: UUID) -> Subscribed:
    """This function will make a new secret and return it this once; messages carry two signatures for a day.

    Raises NotKnown, NotAllowed, StepRefused (ended; another made one at the same moment).
    """
    try:
        with act(ROTATE_WEBHOOK_SECRET, by=by, about=f"webhook:{webhook}") as entry:
            standing = standing_of(entry.chain, webhook)
            refuse_ended(standing)
            return Subscribed(standing, make_secret(entry, standing.webhook))
    except IntegrityError as problem:
        if "webhook_has_one_secret_without_end" not in str(problem):
            raise
        raise StepRefused(
            "step-taken",
            "Somebody else made a new secret at the same moment.",
            next_step="Ask again if you need one of your own.",
        ) from None
