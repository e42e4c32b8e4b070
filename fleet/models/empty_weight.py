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
            models.UniqueConstraint(fields=["id", "entered_by"], name="empty_weight_has_one_author")
        ]

    def __str__(self) -> str:
        return f"empty weight {self.id}"
