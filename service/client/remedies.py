"""What would bring a load within, and the room in one that is."""

import uuid
from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Any

from service.client.exchange import Answer, Exchange
from service.client.reading import read
from service.client.shapes import Load, LoadLine


@dataclass(frozen=True, slots=True)
class Remedy:
    """One change that brings a load within: in a sentence, and as a JSON Patch of the load document.

    `found` says whether it was proved the smallest of its kind. Where people would have to stay behind,
    `change` is empty.
    """

    kind: str
    sentence: str
    found: str
    change: tuple[Mapping[str, Any], ...] = field(compare=False)


@dataclass(frozen=True, slots=True)
class Remedies:
    """The remedies of a load outside its limits, or, within, how much more can go where (`more`) and how
    wrong its weights may be (`error`); `said` is what there is to say besides.
    """

    verdict: str
    remedies: tuple[Remedy, ...]
    more: tuple[Mapping[str, Any], ...]
    error: tuple[Mapping[str, Any], ...]
    said: str
    body: Mapping[str, Any] = field(repr=False, compare=False)


class RemediesOfLoads:
    """What is asked about loads without changing them."""

    _exchange: Exchange

    def remedies(self, load: Load | LoadLine | str) -> Remedies:
        """This function will have computed what would bring a stored load within, or the room in it; `load`
        may be its id alone. Nothing is stored.
        """
        number = uuid.UUID(load if isinstance(load, str) else load.id)
        return remedies_in(self._exchange.get(f"/loads/{number}/remedies"))


def remedies_in(answer: Answer) -> Remedies:
    """This function will read the remedies of a load."""

    def all_of_it(body: Mapping[str, Any]) -> Remedies:
        remedies = tuple(
            Remedy(one["kind"], one["sentence"], one["found"], tuple(one["change"]))
            for one in body["remedies"]
        )
        return Remedies(
            verdict=body["verdict"],
            remedies=remedies,
            more=tuple(body["more"]),
            error=tuple(body["error"]),
            said=body["said"],
            body=body,
        )

    return read(all_of_it, answer.document())
