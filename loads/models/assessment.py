"""One computation of a load against the versions in force."""

from django.contrib.postgres.fields import ArrayField
from django.db import models

from fleet.models import EmptyWeight, LoadingBasis, Operator
from fleet.models.rows import Uuid7
from loads.models.load import Load


class Assessment(models.Model):
    """The result document (canonical JSON text, no names in it) and the digest of the whole statement.

    In the database besides what stands here: it is of its load's operator, and the versions it used are of
    its load's aircraft. An assessment comes into use by the step to "open" that names it.
    """

    id = models.UUIDField(primary_key=True, db_default=Uuid7(), editable=False)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT, db_index=False)
    # The key of load and number finds these, too.
    load = models.ForeignKey(Load, on_delete=models.PROTECT, related_name="assessments", db_index=False)
    number = models.PositiveIntegerField()
    verdict = models.CharField(max_length=12)
    # Long, and covered by `digest`: the trail holds a salted digest of it, which keeps its entries short.
    result = models.TextField()
    salt = models.BinaryField()
    digest = models.CharField(max_length=64)
    loading_basis = models.ForeignKey(LoadingBasis, on_delete=models.PROTECT, null=True)
    empty_weight = models.ForeignKey(EmptyWeight, on_delete=models.PROTECT, null=True)
    # Of the operator's tables, rules, restrictions and permits those that were used, in the order of the
    # statement; in the database besides: each is of this operator, and of the load's aircraft or of none.
    provisions = ArrayField(models.UUIDField(), default=list, blank=True)
    engine = models.CharField(max_length=20)
    assessed_at = models.DateTimeField()  # also the instant on the "known" clock that was used

    class Meta:
        constraints = [
            models.UniqueConstraint(fields=["load", "number"], name="assessment_number_is_taken_once"),
            models.UniqueConstraint(fields=["id", "load", "operator"], name="assessment_is_of_one_load"),
            # What a signature names, so that a foreign key can hold it to this very document and verdict.
            models.UniqueConstraint(
                fields=["id", "load", "digest", "verdict"], name="assessment_can_be_signed"
            ),
            models.CheckConstraint(
                condition=models.Q(verdict__in=["within", "outside", "unresolved"]),
                name="assessment_verdict_is_known",
            ),
            models.CheckConstraint(
                condition=~models.Q(verdict__in=["within", "outside"])
                | models.Q(loading_basis__isnull=False, empty_weight__isnull=False),
                name="assessment_without_its_versions_is_unresolved",
            ),
            models.CheckConstraint(
                condition=models.Q(digest__regex=r"^[0-9a-f]{64}$"), name="assessment_digest_is_a_digest"
            ),
        ]

    def __str__(self) -> str:
        return f"assessment {self.number} of load {self.load_id}"
