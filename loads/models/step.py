"""The life of a load: its state is the `after` of its last step."""

from django.db import models
from django.db.models import Case, F, Q, When

from fleet.models import Operator, Person
from loads.models.assessment import Assessment
from loads.models.load import Load


class AllowedStep(models.Model):
    """A pair of states a load may pass between; the same pairs as `loads.lifecycle`, held by the database."""

    id = models.BigAutoField(primary_key=True)
    before = models.CharField(max_length=12)
    after = models.CharField(max_length=12)

    class Meta:
        constraints = [
            models.UniqueConstraint(fields=["before", "after"], name="allowed_step_is_listed_once")
        ]

    def __str__(self) -> str:
        return f"{self.before or 'nothing'} to {self.after}"


class Step(models.Model):
    """One step. The first goes from "" to "open".

    Foreign keys in the database: (before, after) is an allowed pair; (load, previous, before) is the step
    before; (load, previous, carried) too, so only a step to "open", or a last-minute change ("accepted" to
    "accepted"), brings another assessment; (load, acceptor) is the load's pilot in command. (load, number)
    is unique, so of two racers one is refused.
    """

    id = models.BigAutoField(primary_key=True)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT, db_index=False)
    # The key of load and number finds these, too.
    load = models.ForeignKey(Load, on_delete=models.PROTECT, related_name="steps", db_index=False)
    number = models.PositiveIntegerField()
    before = models.CharField(max_length=12, blank=True)
    after = models.CharField(max_length=12)
    # The number of the step before; null for the first. A column of its own so that a foreign key can use it.
    previous = models.PositiveIntegerField(null=True)
    assessment = models.ForeignKey(Assessment, on_delete=models.PROTECT)
    person = models.ForeignKey(Person, on_delete=models.PROTECT, null=True, db_index=False)
    reason = models.CharField(max_length=500, blank=True)
    at = models.DateTimeField()
    # When the aircraft left, as reported; only with the step to "departed".
    departed_at = models.DateTimeField(null=True)
    act = models.UUIDField()
    carried = models.GeneratedField(
        expression=Case(
            When(~Q(after="open") & ~Q(before="accepted", after="accepted"), then=F("assessment"))
        ),
        output_field=models.UUIDField(null=True),
        db_persist=True,
    )
    acceptor = models.GeneratedField(
        expression=Case(When(after="accepted", then=F("person"))),
        output_field=models.BigIntegerField(null=True),
        db_persist=True,
    )

    class Meta:
        constraints = [
            models.UniqueConstraint(fields=["load", "number"], name="step_number_is_taken_once"),
            models.UniqueConstraint(fields=["load", "number", "after"], name="step_can_be_followed"),
            models.UniqueConstraint(fields=["load", "number", "assessment"], name="step_has_one_assessment"),
            models.UniqueConstraint(
                fields=["id", "load", "assessment", "person", "operator", "after"], name="step_can_be_signed"
            ),
            models.UniqueConstraint(
                fields=["assessment"], condition=Q(after="open"), name="step_brings_an_assessment_once"
            ),
            models.UniqueConstraint(
                fields=["assessment"],
                condition=Q(before="accepted", after="accepted"),
                name="step_of_a_late_change_brings_an_assessment_once",
            ),
            models.CheckConstraint(
                condition=Q(number=1, previous__isnull=True, before="", after="open")
                | Q(number__gt=1, previous__isnull=False, previous=F("number") - 1),
                name="step_follows_the_one_before",
            ),
            models.CheckConstraint(
                condition=~Q(after__in=["prepared", "loaded", "accepted"]) | Q(person__isnull=False),
                name="step_that_is_signed_has_a_person",
            ),
            models.CheckConstraint(
                condition=~Q(after="withdrawn") | ~Q(reason=""), name="step_of_withdrawal_has_a_reason"
            ),
            models.CheckConstraint(
                condition=Q(after="departed", departed_at__isnull=False)
                | (~Q(after="departed") & Q(departed_at__isnull=True)),
                name="step_of_departure_has_a_time",
            ),
        ]

    def __str__(self) -> str:
        return f"step {self.number} of load {self.load_id}, to {self.after}"
