"""What this room tells subscribers: the name of each event, and its meaning in words."""

from typing import Final

FALLING_DUE: Final = "falling.due"

# Work promised with every approval, under the number of the approval. A room above takes it up by this name,
# because what rests on a version is not known here.
VERSIONS_CHANGED: Final = "fleet.versions_changed"
# The same for what an operator lays down, under its number and "held" or "ended".
PROVISIONS_CHANGED: Final = "fleet.provisions_changed"

EVENTS: Final = {
    FALLING_DUE: "a weighing, a calibration, a permit or a self-check lapses soon or has lapsed",
}
