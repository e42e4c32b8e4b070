"""A named person's signature under one exact assessment."""

from django.db import models

from fleet.models import Operator, Person
from fleet.models.rows import Uuid7
from loads.models.assessment import Assessment
from loads.models.load import Load
from loads.models.step import Step


class Signature(models.Model):
    """Who signed what, meaning what, when. The printed name is personal and can be destroyed; the number stays."""

    id = models.UUIDField(primary_key=True, db_default=Uuid7(), editable=False)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT)
    load = models.ForeignKey(Load, on_delete=models.PROTECT, related_name="signatures")
    assessment = models.ForeignKey(Assessment, on_delete=models.PROTECT)
    step = models.OneToOneField(Step, on_delete=models.PROTECT)
    person = models.ForeignKey(Person, on_delete=models.PROTECT)
    meaning = models.CharField(max_length=20)  # "prepared", "loaded", "accepted"
    capacity = models.CharField(max_length=60)
    statement = models.TextField()  # the words that were shown and signed, no names in them
    digest = models.CharField(max_length=64)  # the statement digest that was shown and posted back
    name = models.BinaryField()  # as printed, UTF-8
    salt = models.BinaryField()
    signed_at = models.DateTimeField()
    # Where it was entered from (address of the client as the server saw it): AMC1 SPO.POL.115, when and where logged.
    signed_from = models.CharField(max_length=60, blank=True)
    # Signed by password at a session or with a person's token.
    means = models.CharField(max_length=20)
