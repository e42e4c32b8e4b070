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
            models.UniqueConstraint(
                fields=["aircraft", "revision"], name="loading_basis_revision_is_taken_once"
            ),
            models.UniqueConstraint(fields=["id", "entered_by"], name="loading_basis_has_one_author"),
            models.UniqueConstraint(fields=["id", "aircraft"], name="loading_basis_is_of_one_aircraft"),
            models.CheckConstraint(
                condition=models.Q(digest__regex=r"^[0-9a-f]{64}$"), name="loading_basis_digest_is_sha256"
            ),
            models.CheckConstraint(condition=models.Q(revision__gte=1), name="loading_basis_counts_from_one"),
        ]

    def __str__(self) -> str:
        return f"loading basis {self.id}, revision {self.revision}"
