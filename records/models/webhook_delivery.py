"""What subscribers are told: the event, its delivery to each of them, and every try.

Exempt from the trail, like the outbox: a list of what to send and a log of what was sent. What an event
tells of is witnessed by the act it names.
"""

from django.db import models
from django.db.models import F, Func, Q, UUIDField

from records.models.webhook import Webhook

DELIVERY_STATES = ("waiting", "delivered", "parked", "ended")
# Numbers by time (RFC 9562 version 7, PostgreSQL 18), so that they order a list and are its cursor.
NUMBERED_BY_TIME = Func(function="uuidv7", output_field=UUIDField())


class WebhookEvent(models.Model):
    """One event as it is sent: the bytes are kept, so that every try sends the same ones."""

    id = models.UUIDField(primary_key=True, db_default=NUMBERED_BY_TIME)
    operator_id = models.CharField(max_length=40)
    name = models.CharField(max_length=60)
    about = models.CharField(max_length=120)
    body = models.TextField()
    at = models.DateTimeField()
    act = models.UUIDField()

    def __str__(self) -> str:
        return f"{self.name} {self.about}"


class WebhookDelivery(models.Model):
    """One event on its way to one subscriber.

    `failed` counts the failures of this round (a replay begins a new one). While a worker is at it,
    `held_until` lies ahead; a worker that dies leaves it to pass.
    """

    id = models.UUIDField(primary_key=True, db_default=NUMBERED_BY_TIME)
    operator_id = models.CharField(max_length=40)
    webhook = models.ForeignKey(Webhook, on_delete=models.PROTECT, related_name="deliveries")
    event = models.ForeignKey(WebhookEvent, on_delete=models.PROTECT, related_name="deliveries")
    state = models.CharField(max_length=10, default="waiting")
    failed = models.PositiveSmallIntegerField(default=0)
    try_at = models.DateTimeField(null=True)
    held_until = models.DateTimeField(null=True)

    class Meta:
        constraints = [
            models.UniqueConstraint(fields=["webhook", "event"], name="webhook_event_is_delivered_once"),
            models.CheckConstraint(condition=Q(state__in=DELIVERY_STATES), name="webhook_delivery_state"),
            models.CheckConstraint(
                condition=Q(state="waiting", try_at__isnull=False) | ~Q(state="waiting") & Q(try_at=None),
                name="webhook_delivery_waits_for_a_moment",
            ),
        ]
        indexes = [
            # The sweeper looks only at what waits; a partial index keeps that small for ever.
            models.Index(fields=["try_at"], condition=Q(state="waiting"), name="webhook_delivery_waiting"),
            models.Index(F("webhook"), F("id").desc(), name="webhook_delivery_newest"),
        ]

    def __str__(self) -> str:
        return f"delivery {self.pk}"


class WebhookAttempt(models.Model):
    """One try: when, how long it took, what came of it. Never the answer's text, which is the receiver's."""

    id = models.BigAutoField(primary_key=True)
    operator_id = models.CharField(max_length=40)
    delivery = models.ForeignKey(WebhookDelivery, on_delete=models.PROTECT, related_name="attempts")
    at = models.DateTimeField()
    milliseconds = models.PositiveIntegerField()
    outcome = models.CharField(max_length=30)
    status = models.PositiveSmallIntegerField(null=True)
    detail = models.CharField(max_length=200, blank=True)

    def __str__(self) -> str:
        return f"{self.outcome} {self.at:%Y-%m-%d %H:%M}"
