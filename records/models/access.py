"""The log of sign-ins and of the use of tokens, and the digests of it that acts have sealed."""

from typing import Final

from django.db import models

WHATS: Final = (
    "sign-in",
    "sign-in-failed",
    "sign-out",
    "password-wrong",
    "locked-out",
    "token-used",
    "token-refused",
    "more-not-listed",
)


class Access(models.Model):
    """One event. Written by the function access_note() alone, never changed, and outside acts.

    `key` is a person ("person:7"), a token ("token:3") or empty; `typed` a keyed digest of what somebody
    unknown typed or sent; `origin` a keyed digest of the address it came from. `digest` is that of the row
    with `previous`, the digest of the row before.
    """

    pk = models.CompositePrimaryKey("chain", "number")
    chain = models.TextField()
    number = models.BigIntegerField()  # from 1, without gaps, one count a chain
    at = models.DateTimeField()
    what = models.TextField()
    key = models.TextField(blank=True)
    typed = models.TextField(blank=True)
    origin = models.TextField(blank=True)
    request = models.TextField(blank=True)
    previous = models.TextField(null=True)  # noqa: DJ001 - NULL is "the first", and is hashed as null
    digest = models.TextField()

    class Meta:
        constraints = [
            models.CheckConstraint(condition=models.Q(what__in=WHATS), name="access_what_is_known"),
            models.CheckConstraint(
                condition=models.Q(key__regex=r"^((person|token):[0-9]{1,19})?$"),
                name="access_key_is_a_person_or_a_token",
            ),
            models.CheckConstraint(
                condition=models.Q(typed__regex=r"^([0-9a-f]{32})?$")
                & models.Q(origin__regex=r"^([0-9a-f]{32})?$"),
                name="access_tells_digests_only",
            ),
            models.CheckConstraint(
                condition=models.Q(request__regex=r"^[A-Za-z0-9._-]{0,64}$"), name="access_request_is_plain"
            ),
            models.CheckConstraint(
                condition=models.Q(number=1, previous__isnull=True)
                | models.Q(number__gt=1, previous__isnull=False),
                name="access_links_to_the_one_before",
            ),
        ]
        # Counting what one bearer wrote lately, which is asked before each row.
        indexes = [models.Index(fields=["chain", "key", "-at"], name="access_lately")]

    def __str__(self) -> str:
        return f"{self.chain} {self.number}: {self.what}"


class AccessSeal(models.Model):
    """How far the log of a chain went, and the digest there; written in an act, so sealed with it."""

    id = models.BigAutoField(primary_key=True)
    operator_id = models.CharField(max_length=40)  # the chain, "house" among them
    number = models.BigIntegerField()
    digest = models.CharField(max_length=64)

    class Meta:
        constraints = [
            models.UniqueConstraint(fields=["operator_id", "number"], name="access_place_is_sealed_once"),
        ]

    def __str__(self) -> str:
        return f"{self.operator_id} up to {self.number}"
