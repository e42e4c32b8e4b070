"""Bearer tokens of people and integrations."""

from django.contrib.postgres.fields import ArrayField
from django.db import models

from fleet.models.operator import Operator
from fleet.models.person import Person


class Token(models.Model):
    """A bearer token: shown once, kept as a digest. `revoked_at` is set once and never cleared."""

    id = models.BigAutoField(primary_key=True)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT)
    person = models.ForeignKey(Person, on_delete=models.PROTECT, related_name="tokens")
    label = models.CharField(max_length=80)
    digest = models.CharField(max_length=64, unique=True)
    scopes = ArrayField(models.CharField(max_length=40))
    integration = models.BooleanField(default=False)
    issued_at = models.DateTimeField()
    expires_at = models.DateTimeField()
    revoked_at = models.DateTimeField(null=True)

    class Meta:
        constraints = [
            models.CheckConstraint(
                condition=models.Q(expires_at__gt=models.F("issued_at")),
                name="token_expires_after_it_is_issued",
            ),
        ]

    def __str__(self) -> str:
        return f"token {self.pk}"
