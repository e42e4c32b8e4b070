"""Makes subscriptions and events through the real actions."""

from datetime import timedelta
from uuid import UUID

from django.db.models import F
from standardwebhooks import Webhook as OutsideWebhook

from records.act import act
from records.kind import Kind
from records.models import WebhookDelivery
from records.webhooks.announce import announce
from records.webhooks.subscribe import Subscribed, subscribe
from tests.cast import Cast, actor
from tests.records.webhooks.receiver import Received, ToldReceiver

KIND = Kind("submit-load", "submitted a load")


def subscribed(people: Cast, receiver: ToldReceiver, *events: str) -> Subscribed:
    """This function will subscribe the receiver to events."""
    return subscribe(
        actor(people.manager), address=receiver.address, events=events or ("load.rejected",), label="schedule"
    )


def announced(people: Cast, name: str = "load.rejected", about: str = "load:1") -> int:
    """This function will announce one event in an act of its own."""
    with act(KIND, by=actor(people.preparer), about=about) as entry:
        return announce(entry, name, about, {"verdict": "outside"})


def make_due(webhook: UUID) -> None:
    """This function will let all that waits for a subscription be due, as time would."""
    waiting = WebhookDelivery.objects.filter(webhook_id=webhook, state="waiting")
    waiting.update(try_at=F("try_at") - timedelta(days=30))


def verified(secret: str, request: Received) -> dict[str, object]:
    """This function will have the outside implementation of the standard verify a request as it came."""
    document: dict[str, object] = OutsideWebhook(secret).verify(request.body, request.headers)
    return document
