"""The acts of this room: the permission, the word in the trail and the label in logs, at once."""

from records.kind import Kind

# Done by guard_table() and exempt_table() in migrations, on the chain of the house; nobody else may.
GUARD_TABLE = Kind("guard-table", "put a table under guard")
EXEMPT_TABLE = Kind("exempt-table", "exempted a table from guard")

KINDS = (GUARD_TABLE, EXEMPT_TABLE)
