"""The secrets of a subscription: made, kept encrypted, and opened to sign with."""

import secrets
from datetime import datetime, timedelta
from typing import Final

from django.db.models import Q

from records.act import Entry
from records.models import Webhook, WebhookSecret
from records.sealing import opened, sealed
from records.webhooks.signing import SECRET_BYTES, secret_text

# How long messages are signed with the old secret besides the new one.
OLD_ONE_SERVES: Final = timedelta(hours=24)
MOST_AT_ONCE: Final = 2
_PURPOSE: Final = "webhook secret"


def make_secret(entry: Entry, webhook: Webhook) -> str:
    """This function will make the newest secret of a subscription, inside an act, and return it this once.

    The one before it signs besides for a day.
    """
    secret = secrets.token_bytes(SECRET_BYTES)
    WebhookSecret.objects.filter(webhook=webhook, ends_at=None).update(ends_at=entry.at + OLD_ONE_SERVES)
    WebhookSecret.objects.create(
        operator_id=entry.chain, webhook=webhook, sealed=sealed(secret, _PURPOSE), made_at=entry.at
    )
    return secret_text(secret)


def secrets_at(webhook: Webhook, at: datetime) -> tuple[bytes, ...]:
    """This function will return the secrets that sign at `at`, the newest first, two at most; raises
    SealBroken.
    """
    live = WebhookSecret.objects.filter(Q(ends_at=None) | Q(ends_at__gt=at), webhook=webhook)
    return tuple(opened(bytes(one.sealed), _PURPOSE) for one in live.order_by("-id")[:MOST_AT_ONCE])
