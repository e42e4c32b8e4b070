"""The certificate holder."""

from django.db import models


class Operator(models.Model):
    """An operator; its code is also the name of its chain in the trail. Rows are never changed."""

    code = models.CharField(primary_key=True, max_length=40)
    name = models.CharField(max_length=120)
    certificate = models.CharField(max_length=60, blank=True)
    base = models.CharField(max_length=80, blank=True)
    time_zone = models.CharField(max_length=60)
    rule_set = models.CharField(max_length=20)
    procedure = models.CharField(max_length=200)
    weight_method = models.CharField(max_length=200)
    # What the operator's own approved procedure says; the strict answer is the default.
    estimates_may_be_signed = models.BooleanField(default=False)
    prepare_and_accept_by_one = models.BooleanField(default=True)
    # True for operators that were made up to show the service; pages and papers then say so.
    invented = models.BooleanField(default=False)

    class Meta:
        constraints = [
            models.CheckConstraint(
                condition=models.Q(code__regex=r"^[a-z0-9][a-z0-9-]{1,39}$"), name="operator_code_is_plain"
            ),
            models.CheckConstraint(
                condition=~models.Q(code="house"), name="operator_code_is_not_the_house_chain"
            ),
            models.CheckConstraint(
                condition=models.Q(rule_set__in=["US", "EU-UK"]), name="operator_rule_set_is_known"
            ),
        ]

    def __str__(self) -> str:
        return self.code
