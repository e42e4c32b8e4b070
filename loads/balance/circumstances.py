"""What bears on a load besides its own figures: the operator's rules and procedures, and the restrictions and
permits that hold at its departure. None of it is declared; whoever assesses a load gives it.
"""

from dataclasses import dataclass
from datetime import datetime


@dataclass(frozen=True, slots=True)
class Applied:
    """One restriction or permit that holds at the departure, in words.

    `lines` say what it does, each a sentence; `number` is its own, as printed on it; `authority` who gave a
    permit. `until` None: until it is lifted.
    """

    kind: str  # "restriction" or "permit"
    number: str
    what: str
    authority: str
    lines: tuple[str, ...]
    since: datetime
    until: datetime | None
    source: str

    def as_document(self) -> dict[str, object]:
        """Return what the answer says of it."""
        return {
            "kind": self.kind,
            "number": self.number,
            "what": self.what,
            "authority": self.authority or None,
            "lines": list(self.lines),
            "from": self.since.isoformat(),
            "until": None if self.until is None else self.until.isoformat(),
            "source": self.source,
        }


@dataclass(frozen=True, slots=True)
class WeighingDue:
    """When the aircraft's last weighing lapses by the rule that binds this operation.

    `lapses` is the last day on which it still serves, None where no weighing is known; `rule` says what the
    rule asks; `overdue` is told at the local date of the departure.
    """

    weighed_on: str
    lapses: str | None
    overdue: bool
    rule: str
    source: str


@dataclass(frozen=True, slots=True)
class Circumstances:
    """`estimates` names the settings by which estimated weights of people may be signed; "": none does.

    `unmet` is what restrictions or permits name and the loading basis does not have.
    """

    estimates: str = ""
    applied: tuple[Applied, ...] = ()
    unmet: tuple[str, ...] = ()
    weighing: WeighingDue | None = None


PLAIN = Circumstances()
