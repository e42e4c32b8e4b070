"""Who acts: a plain value, filled by the switchboard for every request and by a worker for itself."""

from dataclasses import dataclass
from typing import Final, Literal
from uuid import UUID

from records.refusal import NotAllowed

HOUSE = "house"  # the chain of what belongs to no operator
# Looking is no act and leaves nothing in the trail, but somebody without any duty sees nothing.
READ: Final = "read"


@dataclass(frozen=True, slots=True)
class Actor:
    """Who acts, for which operator, and the names of the acts this one may do.

    `key` stands in the trail ("person:7", "token:3", "service:worker") and never holds a name; `name` is the
    name as printed, which is kept where it can be destroyed. `caused_by` is the act that made a worker act.
    """

    operator: str | None
    kind: Literal["person", "token", "service", "stranger"]
    key: str
    name: str
    capacity: str
    may: frozenset[str]
    person: int | None = None
    caused_by: UUID | None = None
    # What a token is limited to, by the names the rooms above use (registrations); None: to nothing.
    reach: frozenset[str] | None = None

    def __post_init__(self) -> None:
        if self.operator in {"", HOUSE}:
            raise ValueError(f"{self.operator!r} is the code of no operator")
        if not self.key:
            raise ValueError("an actor needs a key")

    @property
    def chain(self) -> str:
        """The chain this one's acts are sealed on: the operator's, or that of the house."""
        return self.operator or HOUSE


def refuse_without_leave(actor: Actor, leave: str) -> None:
    """This function will do nothing for an actor who may do or look at what `leave` names; raises
    NotAllowed.
    """
    if leave not in actor.may:
        raise NotAllowed(
            "leave-missing",
            f"{actor.key} ({actor.capacity}) may not do this: {leave}.",
            next_step="Ask somebody who holds the duty, or have it granted.",
        )
