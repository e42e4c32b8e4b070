"""A filed document, kept under the digest of its bytes."""

from django.db import models
from django.db.models import F, Func, Q, Value
from django.db.models.functions import Length

# PostgreSQL's own SHA-256 of a `bytea`, as lower-case hex. Written as a plain expression, so that migrations
# do not import it from here.
HEX_SHA256 = "encode(sha256(%(expressions)s), 'hex')"
DESTROYED = Q(body=Value(b"", models.BinaryField()))


class Document(models.Model):
    """One filed document. `body` can be destroyed when its time comes; the digest and the trail stay.

    No foreign key leads out of this room: the operator is kept as text and `about` names what it belongs to.
    A destroyed document has an empty body.
    """

    digest = models.CharField(primary_key=True, max_length=64)  # lower-case hex SHA-256 of `body`
    operator_id = models.CharField(max_length=40)
    about = models.CharField(max_length=120)
    title = models.CharField(max_length=200)
    media_type = models.CharField(max_length=60)
    size = models.PositiveIntegerField()
    renderer = models.CharField(max_length=300)  # versions of what made it
    body = models.BinaryField()
    salt = models.BinaryField()
    filed_at = models.DateTimeField()

    class Meta:
        constraints = [
            models.CheckConstraint(
                condition=DESTROYED
                | Q(digest=Func(F("body"), template=HEX_SHA256, output_field=models.CharField())),
                name="document_digest_fits_its_body",
            ),
            models.CheckConstraint(
                condition=DESTROYED | Q(size=Length("body")),
                name="document_size_fits_its_body",
            ),
        ]
        indexes = [models.Index(fields=["about"], name="document_by_about")]

    def __str__(self) -> str:
        return f"{self.title}, {self.digest[:12]}"
