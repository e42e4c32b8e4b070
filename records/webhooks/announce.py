"""Announcing an event, inside the act that makes it happen."""

from collections.abc import Mapping

from records.act import Entry
from records.models import WebhookDelivery, WebhookEvent
from records.webhooks.message import body_of
from records.webhooks.standing import standings
from records.webhooks.waking import wake_after_commit


def announce(entry: Entry, name: str, about: str, payload: Mapping[str, object]) -> int:
    """This function will have an event sent to everybody subscribed to it, and say how many that are.

    `payload` is a small JSON object without the name of any person. Where nobody subscribes it costs one
    query. Sent is only what is committed; a parked subscription has it kept.
    """
    subscribed = standings(entry.chain, event=name)
    if not subscribed:
        return 0
    event = WebhookEvent.objects.create(
        operator_id=entry.chain,
        name=name,
        about=about,
        body=body_of(name, entry.at, about, payload).decode(),
        at=entry.at,
        act=entry.id,
    )
    WebhookDelivery.objects.bulk_create(
        WebhookDelivery(
            operator_id=entry.chain,
            webhook=one.webhook,
            event=event,
            state="waiting" if one.state == "live" else "parked",
            try_at=entry.at if one.state == "live" else None,
        )
        for one in subscribed
    )
    wake_after_commit(one.webhook.pk for one in subscribed if one.state == "live")
    return len(subscribed)
