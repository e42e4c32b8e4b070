"""What was declared, as typed; holds names, so it can be destroyed when its time comes."""

from django.db import models

from fleet.models import Operator
from loads.models.load import Load


class Declaration(models.Model):
    """The document `tarebook.load/1` as canonical JSON bytes. Witnessed by salted digest only."""

    load = models.OneToOneField(Load, primary_key=True, on_delete=models.PROTECT, related_name="declaration")
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT, db_index=False)
    body = models.BinaryField()
    salt = models.BinaryField()

    def __str__(self) -> str:
        return f"declaration of load {self.load_id}"
