"""An act: who did what, about what, why, and in which transaction. Rows are made by the SQL function
act_open() alone.
"""

from django.db import models


class Act(models.Model):
    """One act. The actor's name stands in `Name` only; here is its salted digest.

    The table has one more column, `txid` (the 64-bit transaction number), which only the database's own
    functions use.
    """

    id = models.UUIDField(primary_key=True)
    at = models.DateTimeField()
    chain = models.TextField()
    kind = models.TextField()
    actor_kind = models.TextField()
    actor_key = models.TextField()
    name_digest = models.TextField(null=True)  # noqa: DJ001  # NULL, sealed as null: no name
    capacity = models.TextField(blank=True)
    about = models.TextField()
    reason = models.TextField(blank=True)
    caused_by = models.UUIDField(null=True)
    request = models.TextField(blank=True)

    class Meta:
        constraints = [
            models.CheckConstraint(
                condition=models.Q(kind__regex=r"^[a-z0-9]+(-[a-z0-9]+)+$"),
                name="act_kind_is_a_verb_and_object",
            ),
            models.CheckConstraint(
                condition=~models.Q(chain="") & ~models.Q(about="") & ~models.Q(actor_key=""),
                name="act_says_whose_by_whom_and_about_what",
            ),
            models.CheckConstraint(
                condition=models.Q(actor_kind__in=["person", "token", "service", "stranger"]),
                name="act_actor_kind_is_known",
            ),
        ]
        indexes = [
            models.Index(fields=["about", "id"], name="act_by_about"),
            # The trail is read newest first: whole, by who acted, by what was done.
            models.Index(fields=["chain", "id"], name="act_by_chain"),
            models.Index(fields=["chain", "actor_key", "id"], name="act_by_actor"),
            models.Index(fields=["chain", "kind", "id"], name="act_by_kind"),
        ]

    def __str__(self) -> str:
        return f"{self.kind} about {self.about}"
