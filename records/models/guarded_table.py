"""The register of tables: how each is guarded, or why it is not."""

from django.contrib.postgres.fields import ArrayField
from django.db import models


class GuardedTable(models.Model):
    """One table. Written by guard_table(), exempt_table() and derive_table() in migrations, and itself under
    guard.
    """

    name = models.TextField(primary_key=True)
    mode = models.TextField()
    key = ArrayField(models.TextField())
    personal = ArrayField(models.TextField())
    binary_personal = ArrayField(models.TextField())
    hidden = ArrayField(models.TextField())
    closes = ArrayField(models.TextField())
    operator_column = models.TextField(blank=True)
    reason = models.TextField(blank=True)
    triggers = ArrayField(models.TextField())
    chain = models.TextField()
    # Of a derived table: the query that says what must stand there. Reconciliation asks it.
    derived_by = models.TextField(blank=True, db_default="")

    class Meta:
        db_table = "records_guarded_table"
        constraints = [
            models.CheckConstraint(
                condition=models.Q(mode__in=["append", "close-once", "edit", "exempt", "trail", "derived"]),
                name="guarded_table_mode_is_known",
            )
        ]

    def __str__(self) -> str:
        return f"{self.name}: {self.mode}"
