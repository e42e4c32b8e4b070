"""The manifest: numbered when the load is accepted, filed when it is printed."""

from django.db import models

from fleet.models import Operator
from loads.models.load import Load


class Paper(models.Model):
    """A manifest number, taken in the act of acceptance. Without gaps per operator: `previous` is number - 1.

    In the database besides what stands here: (operator, previous) is a number that exists, so there is no
    gap; the load is accepted when the act ends, and no load is accepted without a number.
    """

    load = models.OneToOneField(Load, primary_key=True, on_delete=models.PROTECT, related_name="paper")
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT, db_index=False)
    number = models.PositiveIntegerField()
    previous = models.PositiveIntegerField(null=True)
    act = models.UUIDField()  # the act of acceptance; its seal is what the paper prints

    class Meta:
        constraints = [
            models.UniqueConstraint(fields=["operator", "number"], name="paper_number_is_taken_once"),
            models.UniqueConstraint(fields=["load", "operator"], name="paper_is_of_one_operator"),
            models.CheckConstraint(
                condition=models.Q(number=1, previous__isnull=True)
                | models.Q(number__gt=1, previous__isnull=False, previous=models.F("number") - 1),
                name="paper_numbers_have_no_gaps",
            ),
        ]

    def __str__(self) -> str:
        return f"manifest {self.number} of {self.operator_id}"


class FiledPaper(models.Model):
    """The one filed document of a manifest: the archive knows it by its digest."""

    paper = models.OneToOneField(Paper, primary_key=True, on_delete=models.PROTECT, related_name="filed")
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT, db_index=False)
    document = models.ForeignKey("records.Document", on_delete=models.PROTECT)
    filed_at = models.DateTimeField()

    def __str__(self) -> str:
        return f"the filed paper of load {self.paper_id}"
