"""One version of an aircraft's empty weight, per base fit."""

from django.db import models

from fleet.models.aircraft import Aircraft
from fleet.models.operator import Operator
from fleet.models.person import Person
from fleet.models.rows import Uuid7


class EmptyWeight(models.Model):
    """One version: the document `tarebook.empty-weight/1` as canonical JSON text, and its SHA-256.

    The document names who signed the report, so the trail holds a salted digest of it only.
    """

    id = models.UUIDField(primary_key=True, db_default=Uuid7(), editable=False)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT)
    aircraft = models.ForeignKey(Aircraft, on_delete=models.PROTECT, related_name="empty_weights")
    fit = models.CharField(max_length=120)
    document = models.TextField()
    salt = models.BinaryField()
    digest = models.CharField(max_length=64)
    true_from = models.DateTimeField()
    entered_by = models.ForeignKey(Person, on_delete=models.PROTECT)
    entered_at = models.DateTimeField()

    class Meta:
        constraints = [
            models.UniqueConstraint(fields=["id", "entered_by"], name="empty_weight_has_one_author"),
            models.UniqueConstraint(fields=["id", "true_from"], name="empty_weight_has_one_beginning"),
            models.UniqueConstraint(fields=["id", "aircraft", "fit"], name="empty_weight_is_of_one_fit"),
            models.UniqueConstraint(fields=["id", "aircraft"], name="empty_weight_is_of_one_aircraft"),
            models.CheckConstraint(
                condition=models.Q(digest__regex=r"^[0-9a-f]{64}$"), name="empty_weight_digest_is_sha256"
            ),
            models.CheckConstraint(condition=~models.Q(fit=""), name="empty_weight_names_its_fit"),
        ]

    def __str__(self) -> str:
        return f"empty weight {self.id}"
