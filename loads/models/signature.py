"""A named person's signature under one exact assessment."""

from django.db import models

from fleet.models import Operator, Person
from fleet.models.rows import Uuid7
from loads.models.assessment import Assessment
from loads.models.load import Load
from loads.models.step import Step


class Signature(models.Model):
    """Who signed what, meaning what, when. The printed name can be destroyed; the number stays.

    In the database besides what stands here, as foreign keys: (assessment, load, digest, signable) is that
    assessment with that digest and the verdict "within"; (step, load, assessment, person, operator, meaning)
    is the step that was taken, by that person, into the state the signature means.
    """

    id = models.UUIDField(primary_key=True, db_default=Uuid7(), editable=False)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT, db_index=False)
    load = models.ForeignKey(Load, on_delete=models.PROTECT, related_name="signatures")
    assessment = models.ForeignKey(Assessment, on_delete=models.PROTECT)
    step = models.OneToOneField(Step, on_delete=models.PROTECT)
    person = models.ForeignKey(Person, on_delete=models.PROTECT, db_index=False)
    meaning = models.CharField(max_length=20)  # "prepared", "loaded", "accepted"
    capacity = models.CharField(max_length=60)
    statement = models.TextField()  # the words that were shown and signed, no names in them
    digest = models.CharField(max_length=64)  # the statement digest that was shown and posted back
    name = models.BinaryField()  # as printed, UTF-8
    salt = models.BinaryField()
    signed_at = models.DateTimeField()
    # The client's address as the server saw it. AMC1 SPO.POL.115 (f): when and where it was entered is kept.
    signed_from = models.CharField(max_length=60, blank=True)
    # Signed by password at a session or with a person's token.
    means = models.CharField(max_length=20)
    # Always the word "within": a column of its own so that a foreign key can demand that verdict.
    signable = models.GeneratedField(
        expression=models.Value("within"), output_field=models.CharField(max_length=12), db_persist=True
    )

    class Meta:
        constraints = [
            models.CheckConstraint(
                condition=models.Q(meaning__in=["prepared", "loaded", "accepted"]),
                name="signature_meaning_is_known",
            ),
            models.CheckConstraint(
                condition=models.Q(means__in=["session", "token"]), name="signature_means_is_known"
            ),
            models.CheckConstraint(condition=~models.Q(statement=""), name="signature_says_what_was_signed"),
        ]

    def __str__(self) -> str:
        return f"{self.meaning}, load {self.load_id}"
