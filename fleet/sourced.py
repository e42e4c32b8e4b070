"""A figure of the approved data with the page it stands on."""

from dataclasses import dataclass
from fractions import Fraction


@dataclass(frozen=True, slots=True)
class Source:
    """Where a figure stands: document, its revision and the page."""

    document: str
    revision: str
    page: str

    def __str__(self) -> str:
        revision = f" rev {self.revision}" if self.revision else ""
        return f"{self.document}{revision} p. {self.page}"


@dataclass(frozen=True, slots=True)
class Limit:
    """A limit that was entered: a value in the basis's units, or `None` when the source shows there is none.

    A limit that was not entered is the absence of a `Limit`, and makes a verdict `unresolved`.
    """

    value: Fraction | None
    source: Source
