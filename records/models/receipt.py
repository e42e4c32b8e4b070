"""Answers kept for repeated requests (Idempotency-Key)."""

from datetime import timedelta
from typing import Final

from django.db import models

KEPT_FOR: Final = timedelta(days=7)


class Receipt(models.Model):
    """The stored answer to one request; written in the act's own transaction, kept seven days.

    Exempt from the trail: it repeats an answer, it changes nothing. Only successes are kept.
    """

    id = models.BigAutoField(primary_key=True)
    actor = models.CharField(max_length=60)
    key = models.CharField(max_length=120)
    request_digest = models.CharField(max_length=64)  # keyed SHA-256 over method, path and body
    status = models.PositiveSmallIntegerField()
    headers = models.JSONField()
    body = models.BinaryField()
    answered_at = models.DateTimeField()

    class Meta:
        constraints = [
            models.UniqueConstraint(fields=["actor", "key"], name="receipt_key_is_used_once_per_actor"),
            models.CheckConstraint(
                condition=models.Q(status__gte=200, status__lt=300), name="receipt_is_of_a_success"
            ),
        ]
        indexes = [models.Index(fields=["answered_at"], name="receipt_by_age")]

    def __str__(self) -> str:
        return f"{self.actor} {self.answered_at:%Y-%m-%d}"
