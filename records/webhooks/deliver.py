"""Delivering what is due to one subscriber, one event after the other, and settling what came of each try.

One worker at a time serves a subscription, so that a receiver that stalls holds up one of them at most. What
is held while a try runs is a moment in the row, not a lock: a worker that dies leaves it to pass.
"""

import logging
import random
import time
from collections.abc import Callable, Mapping
from datetime import timedelta
from typing import Final, TypeAlias
from uuid import UUID

from django.conf import settings
from django.db import connection, transaction
from django.db.models import Exists, OuterRef
from django.db.models.functions import Now
from django.utils import timezone

from records.act import act
from records.actor import Actor
from records.acts import END_WEBHOOK, PARK_WEBHOOK
from records.models import WebhookAttempt, WebhookDelivery
from records.refusal import StepRefused
from records.sealing import SealBroken
from records.webhooks.addresses import AddressRefused, Receiver, read_receiver
from records.webhooks.end_subscription import end_subscription
from records.webhooks.keeping_secrets import secrets_at
from records.webhooks.schedule import next_try
from records.webhooks.sending import Outcome, send
from records.webhooks.signing import headers
from records.webhooks.standing import one_of_two_racers, standing_of, take_step
from records.webhooks.waking import wake_in

log = logging.getLogger(__name__)

# Longer than any try takes; after this a delivery whose worker died is taken up by another.
HELD_FOR: Final = timedelta(seconds=90)
LONGEST_TURN_SECONDS: Final = 60.0
GONE: Final = "its receiver answered 410, gone"
EXHAUSTED: Final = "its receiver could not be reached for as long as is tried"
ACTS_OF_THE_WORKER: Final = frozenset({PARK_WEBHOOK.name, END_WEBHOOK.name})

Send: TypeAlias = Callable[[Receiver, bytes, Mapping[str, str], bool], Outcome]


def send_plainly(receiver: Receiver, body: bytes, signed: Mapping[str, str], trusted: bool) -> Outcome:
    """This function will send over the network, as `sending` does."""
    return send(receiver, body, signed, trusted=trusted)


def deliver_due(webhook: UUID, *, sending: Send = send_plainly) -> int:
    """This function will try what is due to a subscription, and return how many were tried.

    It ends at the first failure (whoever is not well is not asked again at once), after a minute, and at once
    while another worker serves this subscription.
    """
    ends, tried = time.monotonic() + LONGEST_TURN_SECONDS, 0
    while time.monotonic() < ends and (delivery := _taken(webhook)) is not None:
        begun, at = time.monotonic(), timezone.now()
        outcome = _try(delivery, sending)
        took = round(1000 * (time.monotonic() - begun))
        _settle(delivery, outcome, WebhookAttempt(at=at, milliseconds=took))
        tried += 1
        log.info("webhook %s, delivery %s: %s", webhook, delivery.pk, outcome.name)
        if not outcome.delivered:
            break
    return tried


def due_webhooks(most: int) -> list[UUID]:
    """This function will return up to `most` subscriptions that have something due and no worker at it."""
    held = WebhookDelivery.objects.filter(webhook=OuterRef("webhook"), held_until__gt=Now())
    due = WebhookDelivery.objects.filter(~Exists(held), state="waiting", try_at__lte=Now())
    return list(due.order_by("webhook_id").values_list("webhook_id", flat=True).distinct()[:most])


def _taken(webhook: UUID) -> WebhookDelivery | None:
    """Take the delivery that has been due longest, unless a worker is at one of this subscription's."""
    with transaction.atomic():
        with connection.cursor() as cursor:
            cursor.execute("SELECT pg_advisory_xact_lock(hashtextextended(%s, 0))", [f"webhook\n{webhook}"])
        waiting = WebhookDelivery.objects.filter(webhook_id=webhook, state="waiting")
        if waiting.filter(held_until__gt=Now()).exists():
            return None
        due = waiting.filter(try_at__lte=Now()).select_related("webhook", "event")
        delivery = due.order_by("try_at", "id").first()
        if delivery is not None:
            # By the database's clock, against which it is looked at.
            WebhookDelivery.objects.filter(pk=delivery.pk).update(held_until=Now() + HELD_FOR)
            delivery.refresh_from_db(fields=["held_until"])
        return delivery


def _try(delivery: WebhookDelivery, sending: Send) -> Outcome:
    trusted = settings.WEBHOOK_TRUSTED_RECEIVERS
    body, now = delivery.event.body.encode(), timezone.now()
    try:
        receiver = read_receiver(delivery.webhook.address, trusted=trusted)
        signed = headers(delivery.event_id.hex, now, body, secrets_at(delivery.webhook, now))
    except AddressRefused as refused:
        return Outcome("address-refused", detail=refused.detail)
    except SealBroken:
        return Outcome(
            "secret-lost", detail="the secret does not open with SECRET_KEY of now; make a new one"
        )
    return sending(receiver, body, signed, receiver.place in trusted)


def _settle(delivery: WebhookDelivery, outcome: Outcome, attempt: WebhookAttempt) -> None:
    """Write what came of a try. The log and the list first, then, as an act, what it means for the
    subscription: a worker that dies between leaves that to the next try.
    """
    failed = delivery.failed + (not outcome.delivered)
    chance = random.random()  # noqa: S311  # jitter, no secret
    again = next_try(failed, timezone.now(), chance=chance, asked=outcome.asked)
    state = {"delivered": "delivered", "gone": "ended"}.get(outcome.name, "waiting" if again else "parked")
    attempt.operator_id, attempt.delivery = delivery.operator_id, delivery
    attempt.outcome, attempt.status, attempt.detail = outcome.name, outcome.status, outcome.detail
    with transaction.atomic():
        attempt.save(force_insert=True)
        # Only as it was taken: meanwhile the subscription may have ended, or another worker taken over.
        as_taken = WebhookDelivery.objects.filter(
            pk=delivery.pk, state="waiting", held_until=delivery.held_until
        )
        try_at = again if state == "waiting" else None
        as_taken.update(state=state, failed=failed, try_at=try_at, held_until=None)
    if state == "waiting" and again is not None:
        wake_in(delivery.webhook_id, again - timezone.now())
    worker = _worker_for(delivery)
    try:
        if state == "ended":
            end_subscription(worker, delivery.webhook_id, because=GONE)
        elif state == "parked":
            _park(worker, delivery.webhook_id)
    except StepRefused:
        log.info("webhook %s was moved by somebody else at the same moment", delivery.webhook_id)


def _park(worker: Actor, webhook: UUID) -> None:
    if standing_of(worker.chain, webhook).state != "live":
        return
    with one_of_two_racers(), act(PARK_WEBHOOK, by=worker, about=f"webhook:{webhook}") as entry:
        standing = standing_of(entry.chain, webhook)
        if standing.state == "live":
            take_step(entry, standing.webhook, "parked", after=standing.step, because=EXHAUSTED)
            left = WebhookDelivery.objects.filter(webhook_id=webhook, state="waiting")
            left.update(state="parked", try_at=None)


def _worker_for(delivery: WebhookDelivery) -> Actor:
    """The service itself, acting because of the act the event tells of."""
    return Actor(
        operator=delivery.operator_id,
        kind="service",
        key="service:worker",
        name="",
        capacity="worker",
        may=ACTS_OF_THE_WORKER,
        caused_by=delivery.event.act,
    )
