"""One airframe and the registration it carries."""

from django.db import models

from fleet.models.operator import Operator
from fleet.models.rows import Uuid7


class Aircraft(models.Model):
    """An airframe (serial number) and its registration; unique per operator."""

    id = models.UUIDField(primary_key=True, db_default=Uuid7(), editable=False)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT, related_name="aircraft")
    registration = models.CharField(max_length=12)
    serial_number = models.CharField(max_length=40)
    type = models.CharField(max_length=80)
    category = models.CharField(max_length=20)
    engines = models.PositiveSmallIntegerField()
    passenger_seats = models.PositiveSmallIntegerField()

    class Meta:
        constraints = [
            models.UniqueConstraint(
                fields=["operator", "registration"], name="aircraft_registration_is_taken_once"
            ),
            models.UniqueConstraint(
                fields=["operator", "type", "serial_number"], name="aircraft_serial_is_taken_once"
            ),
            models.UniqueConstraint(fields=["id", "operator"], name="aircraft_is_of_one_operator"),
            models.CheckConstraint(
                condition=models.Q(registration__regex=r"^[A-Z0-9][A-Z0-9-]{1,11}$"),
                name="aircraft_registration_is_plain",
            ),
            models.CheckConstraint(
                condition=models.Q(category__in=["aeroplane", "helicopter"]),
                name="aircraft_category_is_known",
            ),
        ]

    def __str__(self) -> str:
        return self.registration
