"""What stands now, one row a load: so that lists need not look for the last step of every load there is."""

from django.db import models
from django.db.models import Q

from fleet.models import Aircraft, Operator
from loads.models.assessment import Assessment
from loads.models.load import Load
from loads.models.step import Step


class Present(models.Model):
    """Where a load stands: its last step, the assessment in use, and what it is looked for by.

    Derived from load, steps and assessments by a trigger on steps (migrations/present.sql); the service has
    no right to write it, and `verify` compares it with what it is derived from. `rejected` tells whether any
    of its assessments ever was outside or unresolved.
    """

    load = models.OneToOneField(
        Load, primary_key=True, on_delete=models.PROTECT, related_name="present", db_constraint=False
    )
    operator = models.ForeignKey(
        Operator, on_delete=models.PROTECT, related_name="+", db_constraint=False, db_index=False
    )
    aircraft = models.ForeignKey(
        Aircraft, on_delete=models.PROTECT, related_name="+", db_constraint=False, db_index=False
    )
    departure = models.DateTimeField()
    # Each row is of another step, which the steps' own keys hold: no second index of a million numbers.
    step = models.ForeignKey(
        Step, on_delete=models.PROTECT, related_name="+", db_constraint=False, db_index=False
    )
    number = models.PositiveIntegerField()  # the step's, and so the entity tag
    state = models.CharField(max_length=12)
    assessment = models.ForeignKey(
        Assessment, on_delete=models.PROTECT, related_name="+", db_constraint=False, db_index=False
    )
    verdict = models.CharField(max_length=12)
    rejected = models.BooleanField()

    class Meta:
        indexes = [
            models.Index(fields=["operator", "departure", "load"], name="present_by_departure"),
            models.Index(fields=["aircraft", "departure", "load"], name="present_by_aircraft"),
            models.Index(fields=["operator", "state", "departure", "load"], name="present_by_state"),
            # Of all there ever were, few.
            models.Index(
                fields=["operator", "verdict", "departure", "load"],
                condition=Q(verdict__in=["outside", "unresolved"]),
                name="present_outside",
            ),
            models.Index(
                fields=["operator", "departure", "load"], condition=Q(rejected=True), name="present_rejected"
            ),
        ]

    def __str__(self) -> str:
        return f"load {self.load_id} is {self.state}"
