"""That the computer proved itself: the reference loads computed, and what came out, filed for good."""

from django.db import models

from fleet.models.rows import Uuid7


class SelfCheck(models.Model):
    """One self-check: `document` is `tarebook.self-check/1`, canonical, with every answer that was compared.

    Of no operator when the service ran it by itself (`chain` is then "house"), else of whoever asked for it.
    """

    id = models.UUIDField(primary_key=True, db_default=Uuid7(), editable=False)
    chain = models.CharField(max_length=40)
    cause = models.CharField(max_length=12)
    engine = models.CharField(max_length=20)
    references = models.CharField(max_length=64)  # the digest of the set of reference loads
    passed = models.BooleanField()
    document = models.TextField()
    checked_at = models.DateTimeField()
    act = models.UUIDField()

    class Meta:
        constraints = [
            models.CheckConstraint(
                condition=models.Q(cause__in=["start", "daily", "asked", "overdue"]),
                name="self_check_cause_is_known",
            ),
            models.CheckConstraint(
                condition=models.Q(references__regex=r"^[0-9a-f]{64}$"),
                name="self_check_names_its_references",
            ),
        ]
        indexes = [models.Index(fields=["chain", "-checked_at"], name="self_check_lately")]

    def __str__(self) -> str:
        return f"self-check {self.id}, {'passed' if self.passed else 'failed'}"
