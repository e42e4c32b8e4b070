"""Who is told of what: a subscription, where it stands, and the secrets its messages are signed with."""

from django.contrib.postgres.fields import ArrayField
from django.db import models
from django.db.models import F, Q

STATES = ("live", "parked", "ended")
# From which state to which: begun, given up on, taken up again, ended.
_PAIRS = Q(before="", after="live") | Q(before="live", after="parked") | Q(before="parked", after="live")
_ENDS = Q(before__in=("live", "parked"), after="ended")


class Webhook(models.Model):
    """One subscription: these events of its operator are sent to this address. It never changes; a new
    address is a new subscription.
    """

    id = models.UUIDField(primary_key=True)
    operator_id = models.CharField(max_length=40)
    address = models.CharField(max_length=500)
    events = ArrayField(models.CharField(max_length=60))
    label = models.CharField(max_length=80)
    subscribed_at = models.DateTimeField()
    act = models.UUIDField()

    class Meta:
        constraints = [
            models.CheckConstraint(condition=Q(events__len__gt=0), name="webhook_is_told_of_something"),
        ]
        indexes = [models.Index(fields=["operator_id"], name="webhook_by_operator")]

    def __str__(self) -> str:
        return f"webhook {self.pk}"


class WebhookStep(models.Model):
    """Where a subscription stands is its last step. `ended` has no way out."""

    id = models.BigAutoField(primary_key=True)
    operator_id = models.CharField(max_length=40)
    webhook = models.ForeignKey(Webhook, on_delete=models.PROTECT, related_name="steps")
    number = models.PositiveIntegerField()
    previous = models.PositiveIntegerField(null=True)
    before = models.CharField(max_length=10, blank=True)
    after = models.CharField(max_length=10)
    because = models.CharField(max_length=200)
    at = models.DateTimeField()
    act = models.UUIDField()

    class Meta:
        constraints = [
            models.UniqueConstraint(fields=["webhook", "number"], name="webhook_step_is_taken_once"),
            # What the next step names as where it comes from.
            models.UniqueConstraint(fields=["webhook", "number", "after"], name="webhook_step_leads_on"),
            models.CheckConstraint(condition=_PAIRS | _ENDS, name="webhook_step_is_allowed"),
            models.CheckConstraint(
                condition=Q(number=1, previous=None, before="") | Q(number=F("previous") + 1) & ~Q(before=""),
                name="webhook_steps_follow_each_other",
            ),
        ]

    def __str__(self) -> str:
        return f"{self.before or 'begun'} -> {self.after}"


class WebhookSecret(models.Model):
    """One signing secret, encrypted with a key that is not in the database. Never shown after it was made."""

    id = models.BigAutoField(primary_key=True)
    operator_id = models.CharField(max_length=40)
    webhook = models.ForeignKey(Webhook, on_delete=models.PROTECT, related_name="secrets")
    sealed = models.BinaryField()
    made_at = models.DateTimeField()
    ends_at = models.DateTimeField(null=True)

    class Meta:
        constraints = [
            models.CheckConstraint(
                condition=Q(ends_at=None) | Q(ends_at__gte=F("made_at")),
                name="webhook_secret_ends_after_it_is_made",
            ),
            models.UniqueConstraint(
                fields=["webhook"], condition=Q(ends_at=None), name="webhook_has_one_secret_without_end"
            ),
        ]

    def __str__(self) -> str:
        return f"secret of webhook {self.webhook_id}"
