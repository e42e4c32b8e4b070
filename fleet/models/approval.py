"""The second person's approval of a version that moves a limit."""

from django.db import models

from fleet.models.aircraft import Aircraft
from fleet.models.empty_weight import EmptyWeight
from fleet.models.loading_basis import LoadingBasis
from fleet.models.operator import Operator
from fleet.models.person import Person
from fleet.models.rows import Uuid7


class Approval(models.Model):
    """One approval. The approver is never who entered the version; the database checks it as well.

    `entered_by` repeats the version's author so that a foreign key and a check can hold the two apart.
    """

    id = models.UUIDField(primary_key=True, db_default=Uuid7(), editable=False)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT)
    aircraft = models.ForeignKey(Aircraft, on_delete=models.PROTECT)
    loading_basis = models.OneToOneField(
        LoadingBasis, on_delete=models.PROTECT, null=True, related_name="approval"
    )
    empty_weight = models.OneToOneField(
        EmptyWeight, on_delete=models.PROTECT, null=True, related_name="approval"
    )
    entered_by = models.ForeignKey(Person, on_delete=models.PROTECT, related_name="+")
    approved_by = models.ForeignKey(Person, on_delete=models.PROTECT, related_name="+")
    true_from = models.DateTimeField()
    known_from = models.DateTimeField()

    class Meta:
        constraints = [
            models.CheckConstraint(
                condition=~models.Q(approved_by=models.F("entered_by")), name="approval_is_by_a_second_person"
            ),
            models.CheckConstraint(
                condition=models.Q(loading_basis__isnull=False, empty_weight__isnull=True)
                | models.Q(loading_basis__isnull=True, empty_weight__isnull=False),
                name="approval_is_of_one_version",
            ),
        ]

    def __str__(self) -> str:
        return f"approval {self.id}"
