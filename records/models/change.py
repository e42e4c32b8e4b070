"""What an act did to one row, as its witness saw it."""

from django.db import models

from records.models.act import Act


class Change(models.Model):
    """One row written: `image` is the row after it, as the text that goes into the sealed entry."""

    # One index serves as key and as the way to the changes of an act, in the order they were made.
    pk = models.CompositePrimaryKey("act_id", "id")
    # No constraint in the database: one check a row would cost more than it guards; nobody but a witness may
    # insert here, and reconciliation compares every change with its sealed entry.
    act = models.ForeignKey(
        Act, on_delete=models.DO_NOTHING, db_constraint=False, db_index=False, related_name="changes"
    )
    # Filled by the database. Numbers of changes to the same row rise in the order these were made, since a
    # writer holds the row.
    id = models.BigIntegerField()
    table_name = models.TextField()
    row_key = models.TextField()
    operation = models.TextField()
    image = models.TextField()

    class Meta:
        constraints = [
            models.CheckConstraint(
                condition=models.Q(operation__in=["insert", "update"]), name="change_operation_is_known"
            )
        ]
        indexes = [models.Index(fields=["table_name", "row_key", "id"], name="change_by_row")]

    def __str__(self) -> str:
        return f"{self.operation} of {self.table_name} {self.row_key}"
