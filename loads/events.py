"""What this room tells subscribers: the name of each event, and its meaning in words."""

from typing import Final

LOAD_REJECTED: Final = "load.rejected"
LOAD_ACCEPTED: Final = "load.accepted"
LOAD_STALE: Final = "load.stale"
MANIFEST_FILED: Final = "manifest.filed"

EVENTS: Final = {
    LOAD_REJECTED: "a load came out outside its limits, or something of it could not be checked",
    LOAD_ACCEPTED: "the pilot in command signed a load",
    LOAD_STALE: "what an accepted load rests on has changed before its departure",
    MANIFEST_FILED: "the manifest of an accepted load is filed and can be fetched",
}
