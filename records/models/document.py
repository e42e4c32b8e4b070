"""A filed document, kept under the digest of its bytes."""

from django.db import models


class Document(models.Model):
    """One filed document. `body` can be destroyed when its time comes; the digest and the trail stay.

    No foreign key leads out of this room: the operator is kept as text and `about` names what it belongs to.
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
