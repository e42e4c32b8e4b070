"""Bearer tokens of people and integrations."""

from datetime import timedelta
from typing import Final

from django.contrib.postgres.fields import ArrayField
from django.db import models

from fleet.models.operator import Operator
from fleet.models.person import Person

LONGEST: Final = timedelta(days=365)
LONGEST_OVERLAP: Final = timedelta(days=30)


class Token(models.Model):
    """A bearer token: shown once, kept as a digest. `revoked_at` is set once and never cleared.

    `digest` and `expires_at` are those of its first secret; later ones are rotations. `registrations` are
    the aircraft it is limited to, none when it is not.
    """

    id = models.BigAutoField(primary_key=True)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT)
    person = models.ForeignKey(Person, on_delete=models.PROTECT, related_name="tokens")
    label = models.CharField(max_length=80)
    digest = models.CharField(max_length=64, unique=True)
    scopes = ArrayField(models.CharField(max_length=40))
    registrations = ArrayField(models.CharField(max_length=12), default=list, blank=True)
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
            models.CheckConstraint(
                condition=models.Q(expires_at__lte=models.F("issued_at") + LONGEST),
                name="token_lives_a_year_at_most",
            ),
            # What a rotation of it points at, so that both are of one operator.
            models.UniqueConstraint(fields=["id", "operator"], name="token_is_of_one_operator"),
        ]

    def __str__(self) -> str:
        return f"token {self.pk}"


class Rotation(models.Model):
    """A later secret of a token; the one before ends at `previous_ends_at`, the one before that at once.

    So two serve at a time, at most. Who holds either is the same token to the trail.
    """

    id = models.BigAutoField(primary_key=True)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT)
    token = models.ForeignKey(Token, on_delete=models.PROTECT, related_name="rotations")
    number = models.PositiveIntegerField()  # from 1, without gaps
    digest = models.CharField(max_length=64, unique=True)
    issued_at = models.DateTimeField()
    expires_at = models.DateTimeField()
    previous_ends_at = models.DateTimeField()

    class Meta:
        constraints = [
            models.UniqueConstraint(fields=["token", "number"], name="rotation_number_is_taken_once"),
            models.CheckConstraint(condition=models.Q(number__gte=1), name="rotation_counts_from_one"),
            models.CheckConstraint(
                condition=models.Q(expires_at__gt=models.F("issued_at"))
                & models.Q(expires_at__lte=models.F("issued_at") + LONGEST),
                name="rotation_lives_a_year_at_most",
            ),
            models.CheckConstraint(
                condition=models.Q(previous_ends_at__gte=models.F("issued_at"))
                & models.Q(previous_ends_at__lte=models.F("issued_at") + LONGEST_OVERLAP),
                name="rotation_overlaps_a_month_at_most",
            ),
        ]

    def __str__(self) -> str:
        return f"secret {self.number + 1} of token {self.token_id}"
