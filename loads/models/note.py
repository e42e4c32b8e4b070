"""Notes after flight: what was wrong on a manifest that nothing changes any more."""

from django.db import models

from fleet.models import Operator, Person
from fleet.models.rows import Uuid7
from loads.models.load import Load


class Note(models.Model):
    """A dated note by a person on a departed load. Rows are only added; the text may name people.

    In the database besides what stands here: load and person are of its operator, and the load has departed.
    """

    id = models.UUIDField(primary_key=True, db_default=Uuid7(), editable=False)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT)
    load = models.ForeignKey(Load, on_delete=models.PROTECT, related_name="notes")
    person = models.ForeignKey(Person, on_delete=models.PROTECT, related_name="+")
    text = models.TextField()
    salt = models.BinaryField()
    written_at = models.DateTimeField()
    act = models.UUIDField()

    class Meta:
        constraints = [models.CheckConstraint(condition=~models.Q(text=""), name="note_says_something")]

    def __str__(self) -> str:
        return f"note on load {self.load_id}"
