"""How far the trail was followed by the scheduler, and what came of it."""

from django.db import models


class Verified(models.Model):
    """Where one chain held when it was last followed; the row with no chain's name is for everything at once.

    A note for monitors and for the next round, not evidence: `verify` follows all from the first entry on and
    never reads it. `broken` names the first place that does not hold, "" when all did.
    """

    chain = models.CharField(primary_key=True, max_length=40)
    position = models.BigIntegerField()
    digest = models.CharField(max_length=64, blank=True)
    at = models.DateTimeField()
    broken = models.CharField(max_length=300, blank=True)

    def __str__(self) -> str:
        return f"{self.chain or 'everything'} to {self.position}"
