"""The life of a load: its state is the `after` of its last step."""

from django.db import models

from fleet.models import Operator, Person
from loads.models.assessment import Assessment
from loads.models.load import Load


class AllowedStep(models.Model):
    """A pair of states a load may pass between; the same pairs as `loads.lifecycle`, held by the database."""

    id = models.BigAutoField(primary_key=True)
    before = models.CharField(max_length=12)
    after = models.CharField(max_length=12)

    class Meta:
        constraints = [models.UniqueConstraint(fields=["before", "after"], name="allowed_step_is_listed_once")]


class Step(models.Model):
    """One step. The first goes from "" to "open".

    Foreign keys in the database: (before, after) is an allowed pair; (load, number - 1, before) is the step before.
    (load, number) is unique, so of two racers one is refused.
    """

    id = models.BigAutoField(primary_key=True)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT)
    load = models.ForeignKey(Load, on_delete=models.PROTECT, related_name="steps")
    number = models.PositiveIntegerField()
    before = models.CharField(max_length=12, blank=True)
    after = models.CharField(max_length=12)
    # The number of the step before; null for the first. A column of its own so that a foreign key can use it.
    previous = models.PositiveIntegerField(null=True)
    assessment = models.ForeignKey(Assessment, on_delete=models.PROTECT, null=True)
    person = models.ForeignKey(Person, on_delete=models.PROTECT, null=True)
    reason = models.CharField(max_length=500, blank=True)
    at = models.DateTimeField()
    act = models.UUIDField()

    class Meta:
        constraints = [
            models.UniqueConstraint(fields=["load", "number"], name="step_number_is_taken_once"),
            models.UniqueConstraint(fields=["load", "number", "after"], name="step_can_be_followed"),
            models.CheckConstraint(
                condition=models.Q(number=1, previous__isnull=True, before="", after="open")
                | models.Q(number__gt=1, previous=models.F("number") - 1),
                name="step_follows_the_one_before",
            ),
        ]
