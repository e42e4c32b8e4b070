"""What people say about a rejected load, and who has it."""

from django.db import models
from django.db.models import Q

from fleet.models import Operator, Person
from fleet.models.rows import Uuid7
from loads.models.load import Load


class Remark(models.Model):
    """One remark. Rows are only added; `holder`, if named, has the reject from then on.

    The text may name people: the trail holds a salted digest of it only. In the database besides what stands
    here: load, author and holder are of the row's operator.
    """

    id = models.UUIDField(primary_key=True, db_default=Uuid7(), editable=False)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT)
    load = models.ForeignKey(Load, on_delete=models.PROTECT, related_name="remarks")
    number = models.PositiveIntegerField()
    person = models.ForeignKey(Person, on_delete=models.PROTECT, related_name="+")
    holder = models.ForeignKey(Person, on_delete=models.PROTECT, null=True, related_name="+")
    words = models.CharField(max_length=500)
    salt = models.BinaryField()
    at = models.DateTimeField()

    class Meta:
        constraints = [
            models.UniqueConstraint(fields=["load", "number"], name="remark_number_is_taken_once"),
            models.CheckConstraint(condition=~Q(words=""), name="remark_says_something"),
            models.CheckConstraint(condition=Q(number__gte=1), name="remark_counts_from_one"),
        ]

    def __str__(self) -> str:
        return f"remark {self.number} on load {self.load_id}"
