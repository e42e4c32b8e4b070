"""Subscribing an address to events."""

import uuid
from collections.abc import Collection
from dataclasses import dataclass
from typing import Final

from django.conf import settings

from records.act import act
from records.actor import Actor
from records.acts import SUBSCRIBE_WEBHOOK
from records.models import Webhook
from records.refusal import Fault, Invalid, NotAllowed, StepRefused
from records.webhooks.addresses import AddressRefused, read_receiver
from records.webhooks.keeping_secrets import make_secret
from records.webhooks.standing import Standing, standings, take_step

MOST_AT_ONCE: Final = 20
LONGEST_LABEL: Final = 80


@dataclass(frozen=True, slots=True)
class Subscribed:
    """A subscription and, this once, the secret its messages are signed with."""

    standing: Standing
    secret: str


def subscribe(by: Actor, *, address: str, events: Collection[str], label: str) -> Subscribed:
    """This function will have these events of the actor's operator sent to the address from now on.

    Raises Invalid (/address, /events, /label), StepRefused (twenty subscriptions already), NotAllowed.
    """
    if by.operator is None:
        raise NotAllowed("no-operator", "This needs somebody who belongs to an operator.")
    _refuse_wrong(address, events, label)
    number = uuid.uuid4()
    with act(SUBSCRIBE_WEBHOOK, by=by, about=f"webhook:{number}", reason=label) as entry:
        if len(standings(entry.chain)) >= MOST_AT_ONCE:
            raise StepRefused(
                "too-many-webhooks",
                f"An operator has at most {MOST_AT_ONCE} subscriptions at once.",
                next_step="End one that is not needed.",
            )
        webhook = Webhook.objects.create(
            id=number,
            operator_id=entry.chain,
            address=address,
            events=sorted(set(events)),
            label=label,
            subscribed_at=entry.at,
            act=entry.id,
        )
        step = take_step(entry, webhook, "live", after=None, because="subscribed")
        return Subscribed(Standing(webhook, step), make_secret(entry, webhook))


def _refuse_wrong(address: str, events: Collection[str], label: str) -> None:
    faults = []
    try:
        read_receiver(address, trusted=settings.WEBHOOK_TRUSTED_RECEIVERS)
    except AddressRefused as refused:
        faults.append(Fault("/address", refused.code, refused.detail))
    if not events:
        faults.append(Fault("/events", "events-missing", "name at least one event"))
    known = ", ".join(settings.WEBHOOK_EVENTS)
    faults += [
        Fault(f"/events/{place}", "event-unknown", f"there is no such event; known: {known}")
        for place, name in enumerate(events)
        if name not in settings.WEBHOOK_EVENTS
    ]
    if len(label) > LONGEST_LABEL or not label.isprintable():
        words = f"a label has up to {LONGEST_LABEL} printable characters"
        faults.append(Fault("/label", "label-malformed", words))
    if faults:
        raise Invalid(*faults[:20])
