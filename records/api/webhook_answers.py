"""Writes subscriptions and deliveries as the API answers them, and reads what it is sent about them."""

from typing import Any

from records.models import WebhookDelivery, WebhookSecret
from records.refusal import Fault, Invalid
from records.strict_json import JSON
from records.webhooks.standing import Standing

MOST_EVENTS = 50


def subscription_answer(standing: Standing) -> dict[str, Any]:
    """This function will write one subscription as it stands, without any secret."""
    webhook, step = standing.webhook, standing.step
    secrets = WebhookSecret.objects.filter(webhook=webhook).order_by("-id")
    counted = WebhookDelivery.objects.filter(webhook=webhook)
    return {
        "id": webhook.pk,
        "address": webhook.address,
        "events": list(webhook.events),
        "label": webhook.label,
        "state": step.after,
        "because": step.because,
        "since": step.at,
        "subscribed_at": webhook.subscribed_at,
        "secrets": [{"made_at": one.made_at, "ends_at": one.ends_at} for one in secrets[:2]],
        "waiting": counted.filter(state="waiting").count(),
        "parked": counted.filter(state="parked").count(),
    }


def delivery_answer(delivery: WebhookDelivery) -> dict[str, Any]:
    """This function will write one delivery with its tries."""
    event = delivery.event
    fields = ("at", "milliseconds", "outcome", "status", "detail")
    return {
        "id": delivery.pk,
        "message": event.pk.hex,
        "event": event.name,
        "about": event.about,
        "at": event.at,
        "state": delivery.state,
        "next_try": delivery.try_at,
        "tries": [{field: getattr(one, field) for field in fields} for one in delivery.attempts.all()],
    }


def subscription_asked(document: dict[str, JSON]) -> tuple[str, list[str], str]:
    """This function will return address, events and label of a request; raises Invalid with every fault of
    form.
    """
    faults = [
        Fault(f"/{_escaped(name)}", "unknown-field", "the fields here are address, events, label")
        for name in document
        if name not in {"address", "events", "label"}
    ]
    address, label, events = document.get("address"), document.get("label", ""), document.get("events")
    if not isinstance(address, str):
        faults.append(Fault("/address", _form("address", document), "an address is a text"))
    if not isinstance(label, str):
        faults.append(Fault("/label", "text-form", "a label is a text"))
    if not isinstance(events, list) or len(events) > MOST_EVENTS:
        faults.append(
            Fault("/events", _form("events", document), f"a list of up to {MOST_EVENTS} names of events")
        )
    else:
        faults += [
            Fault(f"/events/{place}", "text-form", "the name of an event is a text")
            for place, name in enumerate(events)
            if not isinstance(name, str)
        ]
    if faults or not (isinstance(address, str) and isinstance(label, str) and isinstance(events, list)):
        raise Invalid(*faults[:20])
    return address, [name for name in events if isinstance(name, str)], label


def _form(name: str, document: dict[str, JSON]) -> str:
    return f"{name}-form" if name in document else "missing"


def _escaped(name: str) -> str:
    return name.replace("~", "~0").replace("/", "~1")
