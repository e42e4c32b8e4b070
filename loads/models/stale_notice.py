"""That an accepted load went stale before its departure, told once for each pair of versions."""

from django.contrib.postgres.fields import ArrayField
from django.db import models

from fleet.models import EmptyWeight, LoadingBasis, Operator
from fleet.models.rows import Uuid7
from loads.models.assessment import Assessment
from loads.models.load import Load


class StaleNotice(models.Model):
    """What was told: the accepted assessment, the versions in force instead, and how many addresses mail went
    to.

    In the database besides what stands here: the assessment is the load's, and the load was accepted on it.
    """

    id = models.UUIDField(primary_key=True, db_default=Uuid7(), editable=False)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT)
    load = models.ForeignKey(Load, on_delete=models.PROTECT, related_name="stale_notices")
    assessment = models.ForeignKey(Assessment, on_delete=models.PROTECT, related_name="+")
    loading_basis = models.ForeignKey(LoadingBasis, on_delete=models.PROTECT, null=True, related_name="+")
    empty_weight = models.ForeignKey(EmptyWeight, on_delete=models.PROTECT, null=True, related_name="+")
    provisions = ArrayField(models.UUIDField(), default=list, blank=True)  # those that hold now
    changed = models.CharField(max_length=120)  # "loading basis", "empty weight" ..., with a comma between
    mail_addresses = models.PositiveSmallIntegerField()
    told_at = models.DateTimeField()
    act = models.UUIDField()

    class Meta:
        constraints = [
            models.UniqueConstraint(
                fields=["load", "loading_basis", "empty_weight", "provisions"],
                name="stale_notice_is_given_once",
                nulls_distinct=False,
            ),
            models.CheckConstraint(condition=~models.Q(changed=""), name="stale_notice_says_what_changed"),
        ]

    def __str__(self) -> str:
        return f"load {self.load_id} is stale: {self.changed}"
