"""The rows of the notary."""

from records.models.act import Act
from records.models.change import Change
from records.models.document import Document
from records.models.guarded_table import GuardedTable
from records.models.name import Name
from records.models.outbox import Outbox
from records.models.receipt import Receipt
from records.models.seal import Closing, Seal

__all__ = ["Act", "Change", "Closing", "Document", "GuardedTable", "Name", "Outbox", "Receipt", "Seal"]
