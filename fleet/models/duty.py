"""What a person may do, from and until when."""

from django.db import models

from fleet.duties import ROLES
from fleet.models.operator import Operator
from fleet.models.person import Person


class Duty(models.Model):
    """One role given to a person, or taken back: the newest row per person and role that has begun counts."""

    id = models.BigAutoField(primary_key=True)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT)
    person = models.ForeignKey(Person, on_delete=models.PROTECT, related_name="duties")
    role = models.CharField(max_length=40)
    granted = models.BooleanField()
    since = models.DateTimeField()

    class Meta:
        constraints = [
            models.CheckConstraint(condition=models.Q(role__in=ROLES), name="duty_role_is_known"),
        ]
        indexes = [models.Index(fields=["person", "role", "-since"], name="duty_newest_per_role")]

    def __str__(self) -> str:
        return f"{self.role}, {'granted' if self.granted else 'ended'}"
