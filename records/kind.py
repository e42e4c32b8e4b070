"""What an act is called."""

import re
from dataclasses import dataclass

_VERB_AND_OBJECT = re.compile(r"[a-z0-9]+(-[a-z0-9]+)+")


@dataclass(frozen=True, slots=True)
class Kind:
    """The name of an act (kebab case, a verb and its object: `accept-load`) and how people read it
    ("accepted a load").

    The name is at once the permission that allows the act, the word in the trail and the label in logs.
    """

    name: str
    sentence: str

    def __post_init__(self) -> None:
        if not _VERB_AND_OBJECT.fullmatch(self.name):
            raise ValueError(f"an act is named by a verb and its object in kebab case, not {self.name!r}")
        if not self.sentence:
            raise ValueError(f"the act {self.name} needs words for people")
