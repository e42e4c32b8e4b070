"""Which version holds when, on two clocks: the one projection that carries the exclusion constraint."""

from django.contrib.postgres.constraints import ExclusionConstraint
from django.contrib.postgres.fields import DateTimeRangeField, RangeOperators
from django.db import models

from fleet.models.aircraft import Aircraft
from fleet.models.operator import Operator

LOADING_BASIS = "loading basis"
EMPTY_WEIGHT = "empty weight"


class Standing(models.Model):
    """A version of `kind` (and base fit) held true over `valid`, as known over `known`; both half-open.

    A row may be updated once, to close `known`. At any instant of both clocks at most one version stands.
    """

    id = models.BigAutoField(primary_key=True)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT)
    aircraft = models.ForeignKey(Aircraft, on_delete=models.PROTECT)
    kind = models.CharField(max_length=20)
    fit = models.CharField(max_length=120, blank=True)
    version = models.UUIDField()
    valid = DateTimeRangeField()
    known = DateTimeRangeField()

    class Meta:
        constraints = [
            models.CheckConstraint(
                condition=models.Q(kind__in=["loading basis", "empty weight"]), name="standing_kind_is_known"
            ),
            models.CheckConstraint(
                condition=models.Q(kind="loading basis", fit="")
                | (models.Q(kind="empty weight") & ~models.Q(fit="")),
                name="standing_names_a_fit_for_empty_weights_only",
            ),
            models.CheckConstraint(
                condition=models.Q(valid__isempty=False, valid__lower_inf=False),
                name="standing_is_valid_for_some_time",
            ),
            models.CheckConstraint(
                condition=models.Q(known__isempty=False, known__lower_inf=False),
                name="standing_is_known_for_some_time",
            ),
            ExclusionConstraint(
                name="standing_has_one_version_at_any_moment",
                expressions=[
                    ("aircraft", RangeOperators.EQUAL),
                    ("kind", RangeOperators.EQUAL),
                    ("fit", RangeOperators.EQUAL),
                    ("valid", RangeOperators.OVERLAPS),
                    ("known", RangeOperators.OVERLAPS),
                ],
            ),
        ]

    def __str__(self) -> str:
        return f"{self.kind} {self.version}"
