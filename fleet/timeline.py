"""The place of a newly approved version among those that stand: which spans it ends and which it begins.

A version holds from its `true from` until the next one begins. Times are aware datetimes, spans half-open.

    before   |---- A ----|---- B ---------->        one clock: when a version is held true
    new C          ^
    after    |- A -|- C -|---- B ---------->        A is ended on the other clock, and begun anew, shorter

Two versions with the same beginning: the one approved later stands, which is how a figure is corrected.
"""

from dataclasses import dataclass
from datetime import datetime
from uuid import UUID


@dataclass(frozen=True, slots=True)
class Span:
    """A version held true from `start` until `end`, which is not included; None: until further notice."""

    version: UUID
    start: datetime
    end: datetime | None

    def holds(self, at: datetime) -> bool:
        """This function will say whether the span includes the instant."""
        return self.start <= at and (self.end is None or at < self.end)


@dataclass(frozen=True, slots=True)
class Placing:
    """What placing a version does: `ended` is no longer held true as it was, `begun` is from now on."""

    ended: Span | None
    begun: tuple[Span, ...]


def place(current: tuple[Span, ...], version: UUID, true_from: datetime) -> Placing:
    """This function will place a version among spans that do not overlap and have no gap after the first."""
    cut = next((span for span in current if span.holds(true_from)), None)
    if cut is None:
        later = min((span.start for span in current if span.start > true_from), default=None)
        return Placing(None, (Span(version, true_from, later),))
    new = Span(version, true_from, cut.end)
    if cut.start == true_from:
        return Placing(cut, (new,))
    return Placing(cut, (Span(cut.version, cut.start, true_from), new))
