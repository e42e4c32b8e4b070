"""The links of the chains."""

from django.db import models

from records.models.act import Act


class Seal(models.Model):
    """A sealed entry: one JSON text (`tarebook.entry/1`), its place in the chain of one operator, and its
    digest.

    `digest` is the lower-case hex SHA-256 over one zero byte and `entry` exactly as stored (the leaf hash of
    RFC 6962); `previous` is the digest one place before, null at the first.
    """

    act = models.OneToOneField(
        Act, primary_key=True, on_delete=models.DO_NOTHING, db_constraint=False, related_name="seal"
    )
    chain = models.TextField()
    position = models.BigIntegerField()
    previous = models.TextField(null=True)  # noqa: DJ001  # NULL, sealed as null: the first
    digest = models.TextField()
    entry = models.TextField()

    class Meta:
        constraints = [
            models.UniqueConstraint(fields=["chain", "position"], name="seal_place_is_taken_once"),
            models.CheckConstraint(
                condition=models.Q(position=1, previous__isnull=True)
                | models.Q(position__gt=1, previous__isnull=False),
                name="seal_links_to_the_one_before",
            ),
        ]
        indexes = [models.Index(fields=["digest"], name="seal_by_digest")]

    def __str__(self) -> str:
        return f"{self.chain} {self.position}"


class Closing(models.Model):
    """An act that is about to be sealed: the second stage of the seal hangs on this table. Empty between
    transactions.
    """

    act = models.OneToOneField(
        Act, primary_key=True, on_delete=models.DO_NOTHING, db_constraint=False, related_name="+"
    )

    def __str__(self) -> str:
        return f"closing of {self.act_id}"
