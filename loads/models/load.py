"""One take-off's submission; a revision is a new load that replaces an earlier one."""

from django.db import models

from fleet.models import Aircraft, Operator
from fleet.models.rows import Uuid7


class Load(models.Model):
    """What identifies a load. Rows are never changed; the state is the last `Step`."""

    id = models.UUIDField(primary_key=True, db_default=Uuid7(), editable=False)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT)
    aircraft = models.ForeignKey(Aircraft, on_delete=models.PROTECT, related_name="loads")
    configuration = models.CharField(max_length=24)
    reference = models.CharField(max_length=40)
    leg = models.PositiveSmallIntegerField(default=1)
    departure = models.DateTimeField()
    # As typed, with its offset: the local date picks the season and is what people read.
    departure_text = models.CharField(max_length=40)
    origin = models.CharField(max_length=12)
    destination = models.CharField(max_length=12)
    operation = models.CharField(max_length=40)
    # The login of the pilot in command is in the declaration; here stands the person's number, or nothing.
    pilot = models.ForeignKey("fleet.Person", on_delete=models.PROTECT, null=True, related_name="+")
    replaces = models.OneToOneField("self", on_delete=models.PROTECT, null=True, related_name="replaced_by")
    submitted_at = models.DateTimeField()

    class Meta:
        indexes = [models.Index(fields=["operator", "departure", "id"], name="load_by_departure")]
