"""One take-off's submission; a revision is a new load that replaces an earlier one."""

from django.db import models

from fleet.models import Aircraft, Operator
from fleet.models.rows import Uuid7


class Load(models.Model):
    """What identifies a load. Rows are never changed; the state is the last `Step`.

    In the database besides what stands here: aircraft, pilot and the load it replaces are of its operator; it
    is complete (declaration, first step) when its act ends; what it replaces is superseded in the same act.
    """

    id = models.UUIDField(primary_key=True, db_default=Uuid7(), editable=False)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT, db_index=False)
    aircraft = models.ForeignKey(Aircraft, on_delete=models.PROTECT, related_name="loads")
    configuration = models.CharField(max_length=64)
    reference = models.CharField(max_length=64)
    leg = models.PositiveSmallIntegerField(default=1)
    departure = models.DateTimeField()
    # As typed, with its offset: the local date picks the season and is what people read.
    departure_text = models.CharField(max_length=64)
    origin = models.CharField(max_length=80)
    destination = models.CharField(max_length=80)
    operation = models.CharField(max_length=80)
    # The login of the pilot in command is in the declaration; here stands the person's number, or nothing.
    pilot = models.ForeignKey(
        "fleet.Person", on_delete=models.PROTECT, null=True, related_name="+", db_index=False
    )
    replaces = models.OneToOneField("self", on_delete=models.PROTECT, null=True, related_name="replaced_by")
    submitted_at = models.DateTimeField()

    class Meta:
        constraints = [
            models.UniqueConstraint(fields=["id", "operator"], name="load_is_of_one_operator"),
            models.UniqueConstraint(fields=["id", "pilot"], name="load_has_one_pilot"),
            models.CheckConstraint(
                condition=~models.Q(replaces=models.F("id")), name="load_does_not_replace_itself"
            ),
        ]
        indexes = [
            models.Index(fields=["operator", "departure", "id"], name="load_by_departure"),
            # Programs look for one flight among years of them. Migration 0010 has one more, in SQL: by the
            # beginning of the reference in any case, as people type it.
            models.Index(fields=["operator", "reference", "departure", "id"], name="load_by_reference"),
        ]

    def __str__(self) -> str:
        return f"load {self.id}"
