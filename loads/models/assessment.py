"""One computation of a load against the versions in force."""

from django.db import models

from fleet.models import EmptyWeight, LoadingBasis, Operator
from fleet.models.rows import Uuid7
from loads.models.load import Load


class Assessment(models.Model):
    """The result document (canonical JSON text, no names in it) and the digest of the whole statement."""

    id = models.UUIDField(primary_key=True, db_default=Uuid7(), editable=False)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT)
    load = models.ForeignKey(Load, on_delete=models.PROTECT, related_name="assessments")
    number = models.PositiveIntegerField()
    verdict = models.CharField(max_length=12)
    result = models.TextField()
    digest = models.CharField(max_length=64)
    loading_basis = models.ForeignKey(LoadingBasis, on_delete=models.PROTECT, null=True)
    empty_weight = models.ForeignKey(EmptyWeight, on_delete=models.PROTECT, null=True)
    engine = models.CharField(max_length=20)
    assessed_at = models.DateTimeField()  # also the instant on the "known" clock that was used

    class Meta:
        constraints = [
            models.UniqueConstraint(fields=["load", "number"], name="assessment_number_is_taken_once"),
            models.UniqueConstraint(fields=["id", "load"], name="assessment_is_of_one_load"),
            models.CheckConstraint(
                condition=models.Q(verdict__in=["within", "outside", "unresolved"]), name="assessment_verdict_is_known"
            ),
        ]
