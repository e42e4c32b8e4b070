"""Which leg a load follows: the load of the flight before, of the same aircraft."""

from django.db import models

from fleet.models import Operator
from loads.models.load import Load


class Leg(models.Model):
    """A load that names the leg before it; a load that names none has no row. Rows are never changed.

    In the database besides what stands here: both loads are of the row's operator and of one aircraft, the
    earlier one ends where the later one begins, and departs before it.
    """

    load = models.OneToOneField(Load, primary_key=True, on_delete=models.PROTECT, related_name="before")
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT, db_index=False)
    follows = models.ForeignKey(Load, on_delete=models.PROTECT, related_name="next_legs")

    class Meta:
        constraints = [
            models.CheckConstraint(
                condition=~models.Q(follows=models.F("load")), name="leg_does_not_follow_itself"
            ),
        ]

    def __str__(self) -> str:
        return f"leg {self.load_id} after {self.follows_id}"
