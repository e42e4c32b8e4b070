"""The acts of this room: the permission, the word in the trail and the label in logs, at once."""

from records.kind import Kind

# Done by guard_table() and exempt_table() in migrations, on the chain of the house; nobody else may.
GUARD_TABLE = Kind("guard-table", "put a table under guard")
EXEMPT_TABLE = Kind("exempt-table", "exempted a table from guard")

# Done each minute by the scheduler: the last digest of the log of sign-ins goes into the chain.
SEAL_ACCESS_LOG = Kind("seal-access-log", "sealed the log of sign-ins")

KINDS = (GUARD_TABLE, EXEMPT_TABLE, SEAL_ACCESS_LOG)
