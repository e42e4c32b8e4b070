"""What this room tells subscribers: the name of each event, and its meaning in words."""

from typing import Final

FALLING_DUE: Final = "falling.due"

EVENTS: Final = {
    FALLING_DUE: "a weighing, a calibration, a permit or a self-check lapses soon or has lapsed",
}
