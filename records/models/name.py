"""Names of actors as printed: one of the three places whose content can be destroyed."""

from django.db import models


class Name(models.Model):
    """A name as it was when its bearer acted. Acts hold `digest` (SHA-256 over salt and name) and never the
    name.
    """

    id = models.BigAutoField(primary_key=True)
    chain = models.TextField()
    actor_key = models.TextField()
    name = models.BinaryField()
    salt = models.BinaryField()
    digest = models.TextField()

    class Meta:
        indexes = [models.Index(fields=["actor_key", "chain"], name="name_by_bearer")]

    def __str__(self) -> str:
        return f"{self.digest} of {self.actor_key}"
