"""The approved loading data of one aircraft, one immutable revision a row."""

from django.db import models

from fleet.models.aircraft import Aircraft
from fleet.models.operator import Operator
from fleet.models.person import Person
from fleet.models.rows import Uuid7


class LoadingBasis(models.Model):
    """One revision: the document `tarebook.loading-basis/1` as canonical JSON text, and its SHA-256."""

    id = models.UUIDField(primary_key=True, db_default=Uuid7(), editable=False)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT)
    aircraft = models.ForeignKey(Aircraft, on_delete=models.PROTECT, related_name="loading_bases")
    revision = models.PositiveIntegerField()
    document = models.TextField()
    digest = models.CharField(max_length=64)
    entered_by = models.ForeignKey(Person, on_delete=models.PROTECT)
    entered_at = models.DateTimeField()

    class Meta:
        constraints = [
            models.UniqueConstraint(fields=["aircraft", "revision"], name="loading_basis_revision_is_taken_once"),
            models.UniqueConstraint(fields=["id", "entered_by"], name="loading_basis_has_one_author"),
        ]
