"""What an operator's own approved procedures say, as versions: each row is the whole of it, from an instant
on.
"""

from django.contrib.postgres.fields import ArrayField
from django.db import models
from django.db.models import Q

from fleet.models.operator import Operator
from fleet.models.person import Person


class OperatorSettings(models.Model):
    """One version. Rows are only added; the one with the latest `true_from` that has begun counts, of equals
    the one with the higher number.

    Figures are kept as typed. `operations_mail` may name people: the trail holds a salted digest of it only.
    """

    id = models.BigAutoField(primary_key=True)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT, related_name="settings")
    # 1, 2, 3 ...: of two people who change the settings at once, one is refused by its unique key.
    number = models.PositiveIntegerField()
    true_from = models.DateTimeField()
    known_from = models.DateTimeField()
    entered_by = models.ForeignKey(Person, on_delete=models.PROTECT, related_name="+")
    reason = models.CharField(max_length=400)
    # How much may change at the last minute, summed over a load; all three, or none: no such change at all.
    last_minute_weight = models.CharField(max_length=12, blank=True)
    last_minute_unit = models.CharField(max_length=2, blank=True)
    last_minute_persons = models.PositiveSmallIntegerField(null=True)
    # A change of empty weight beyond this, in percent of the landing weight limit, needs a cause; "": not
    # set.
    weighing_threshold_percent = models.CharField(max_length=8, blank=True)
    operations_mail = ArrayField(models.CharField(max_length=254), blank=True)
    salt = models.BinaryField()
    prepare_and_accept_by_one = models.BooleanField()
    estimates_may_be_signed = models.BooleanField()
    rule_set = models.CharField(max_length=20)
    procedure = models.CharField(max_length=200)
    weight_method = models.CharField(max_length=200)

    class Meta:
        constraints = [
            models.UniqueConstraint(fields=["operator", "number"], name="settings_number_is_taken_once"),
            models.CheckConstraint(condition=Q(number__gte=1), name="settings_count_from_one"),
            models.CheckConstraint(condition=~Q(reason=""), name="settings_say_why"),
            models.CheckConstraint(
                condition=Q(last_minute_weight="", last_minute_unit="", last_minute_persons__isnull=True)
                | Q(
                    last_minute_weight__regex=r"^(0|[1-9][0-9]{0,5})(\.[0-9]{1,3})?$",
                    last_minute_unit__in=["kg", "lb"],
                    last_minute_persons__isnull=False,
                ),
                name="settings_bound_has_weight_unit_and_persons",
            ),
            models.CheckConstraint(
                condition=Q(weighing_threshold_percent__regex=r"^$|^(0|[1-9][0-9]?)(\.[0-9]{1,3})?$"),
                name="settings_threshold_is_a_percentage",
            ),
            models.CheckConstraint(
                condition=Q(rule_set__in=["US", "EU-UK"]), name="settings_rule_set_is_known"
            ),
            models.CheckConstraint(
                condition=~Q(procedure="") & ~Q(weight_method=""), name="settings_name_procedure_and_method"
            ),
        ]
        indexes = [models.Index(fields=["operator", "-true_from", "-number"], name="settings_by_beginning")]

    def __str__(self) -> str:
        return f"settings {self.number} of {self.operator_id}"
