"""What a load took from a table of standard weights."""

from dataclasses import dataclass


@dataclass(frozen=True, slots=True)
class StandardUse:
    """What a load took from a table: which version, row and season, and for how many.

    `unknown` says why a standard weight is not known, `refused` at which seats a declared weight is one the
    table does not allow; both "" where all is well.
    """

    label: str
    source: str
    row: str
    season: str
    additions: str
    standard: int
    declared: int
    unknown: str = ""
    refused: str = ""

    def as_document(self) -> dict[str, object]:
        """Return what the answer says of it."""
        return {
            "table": self.label,
            "source": self.source,
            "row": self.row or None,
            "season": self.season or None,
            "additions": self.additions or None,
            "standard": self.standard,
            "declared_with_additions": self.declared,
        }
