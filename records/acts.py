"""The acts of this room: the permission, the word in the trail and the label in logs, at once."""

from records.kind import Kind

# Done by guard_table(), exempt_table() and derive_table() in migrations, on the chain of the house; nobody
# else may.
GUARD_TABLE = Kind("guard-table", "put a table under guard")
EXEMPT_TABLE = Kind("exempt-table", "exempted a table from guard")
DERIVE_TABLE = Kind("derive-table", "said what must stand in a derived table")

# Done each minute by the scheduler: the last digest of the log of sign-ins goes into the chain.
SEAL_ACCESS_LOG = Kind("seal-access-log", "sealed the log of sign-ins")
# Looking at that log is no act and leaves nothing in the trail; it needs leave all the same.
READ_ACCESS_LOG = "read-access-log"

# Told of events: who subscribes, and what becomes of it.
SUBSCRIBE_WEBHOOK = Kind("subscribe-webhook", "subscribed an address to events")
ROTATE_WEBHOOK_SECRET = Kind("rotate-webhook-secret", "made a new secret for a subscription")
RESUME_WEBHOOK = Kind("resume-webhook", "took a parked subscription up again")
REPLAY_WEBHOOK = Kind("replay-webhook", "had an event delivered again")
END_WEBHOOK = Kind("end-webhook", "ended a subscription")
# Done by the worker, when a receiver was not reached for as long as the schedule lasts.
PARK_WEBHOOK = Kind("park-webhook", "parked a subscription whose receiver cannot be reached")
# What a person or an integration does; the worker ends one whose receiver says it is gone.
WEBHOOK_KINDS = (SUBSCRIBE_WEBHOOK, ROTATE_WEBHOOK_SECRET, RESUME_WEBHOOK, REPLAY_WEBHOOK, END_WEBHOOK)

KINDS = (GUARD_TABLE, EXEMPT_TABLE, DERIVE_TABLE, SEAL_ACCESS_LOG, PARK_WEBHOOK, *WEBHOOK_KINDS)
