"""The rows of the notary."""

from records.models.access import Access, AccessSeal
from records.models.act import Act
from records.models.change import Change
from records.models.document import Document
from records.models.guarded_table import GuardedTable
from records.models.name import Name
from records.models.outbox import Outbox
from records.models.receipt import Receipt
from records.models.seal import Closing, Seal
from records.models.verified import Verified
from records.models.webhook import Webhook, WebhookSecret, WebhookStep
from records.models.webhook_delivery import WebhookAttempt, WebhookDelivery, WebhookEvent

__all__ = [
    "Access",
    "AccessSeal",
    "Act",
    "Change",
    "Closing",
    "Document",
    "GuardedTable",
    "Name",
    "Outbox",
    "Receipt",
    "Seal",
    "Verified",
    "Webhook",
    "WebhookAttempt",
    "WebhookDelivery",
    "WebhookEvent",
    "WebhookSecret",
    "WebhookStep",
]
