"""That something of an aircraft falls due, told once for each thing, its date and each threshold."""

from django.db import models

from fleet.models.aircraft import Aircraft
from fleet.models.operator import Operator
from fleet.models.rows import Uuid7


class DueNotice(models.Model):
    """What was told: the thing, when it lapses, and how many days before at most (0: it has lapsed)."""

    id = models.UUIDField(primary_key=True, db_default=Uuid7(), editable=False)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT, related_name="+")
    aircraft = models.ForeignKey(Aircraft, on_delete=models.PROTECT, related_name="due_notices")
    about = models.CharField(max_length=400)
    what = models.CharField(max_length=400)
    lapses = models.DateTimeField()
    threshold_days = models.PositiveSmallIntegerField()
    mail_addresses = models.PositiveSmallIntegerField()
    told_at = models.DateTimeField()
    act = models.UUIDField()

    class Meta:
        constraints = [
            models.UniqueConstraint(
                fields=["aircraft", "about", "lapses", "threshold_days"], name="due_notice_is_given_once"
            ),
        ]

    def __str__(self) -> str:
        return f"{self.what} lapses {self.lapses}"
