"""Where subscriptions stand, and the step each change of that leaves."""

from collections.abc import Iterator
from contextlib import contextmanager
from dataclasses import dataclass
from uuid import UUID

from django.db import IntegrityError
from django.db.models import Exists, OuterRef

from records.act import Entry
from records.models import Webhook, WebhookStep
from records.refusal import NotKnown, StepRefused


@dataclass(frozen=True, slots=True)
class Standing:
    """A subscription and its last step."""

    webhook: Webhook
    step: WebhookStep

    @property
    def state(self) -> str:
        """Live, parked or ended."""
        return self.step.after


def standing_of(operator: str, webhook: UUID) -> Standing:
    """This function will return an operator's subscription as it stands; raises NotKnown."""
    steps = WebhookStep.objects.select_related("webhook").filter(webhook_id=webhook, operator_id=operator)
    last = steps.order_by("-number").first()
    if last is None:
        raise NotKnown("webhook-not-known", "There is no subscription of this number.")
    return Standing(last.webhook, last)


def standings(operator: str, event: str = "") -> list[Standing]:
    """This function will return the operator's subscriptions that are not ended (to `event`, if one is
    named), the oldest first, in one query.
    """
    later = WebhookStep.objects.filter(webhook=OuterRef("webhook"), number__gt=OuterRef("number"))
    found = WebhookStep.objects.select_related("webhook").filter(
        ~Exists(later), webhook__operator_id=operator
    )
    if event:
        found = found.filter(webhook__events__contains=[event])
    ordered = found.exclude(after="ended").order_by("webhook__subscribed_at", "webhook_id")
    return [Standing(last.webhook, last) for last in ordered]


def take_step(
    entry: Entry, webhook: Webhook, to: str, *, after: WebhookStep | None, because: str
) -> WebhookStep:
    """This function will write the step to the state `to`; the database refuses one that is not allowed."""
    return WebhookStep.objects.create(
        operator_id=entry.chain,
        webhook=webhook,
        number=after.number + 1 if after else 1,
        previous=after.number if after else None,
        before=after.after if after else "",
        after=to,
        because=because[:200],
        at=entry.at,
        act=entry.id,
    )


@contextmanager
def one_of_two_racers() -> Iterator[None]:
    """This function will refuse whoever moves a subscription at the same time as another and comes second.

    It goes around the act.
    """
    try:
        yield
    except IntegrityError as problem:
        if "webhook_step_is_taken_once" not in str(problem):
            raise
        raise StepRefused(
            "step-taken",
            "Somebody else changed this subscription at the same moment.",
            next_step="Read it again and look at what changed.",
        ) from None


def refuse_ended(standing: Standing) -> None:
    """This function will do nothing for a subscription that is not ended; raises StepRefused."""
    if standing.state == "ended":
        raise StepRefused(
            "webhook-ended",
            f"This subscription is ended: {standing.step.because}.",
            next_step="Subscribe the address again.",
        )
