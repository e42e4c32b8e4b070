"""Rechecks: stored loads computed again against a later figure."""

import uuid
from collections.abc import Iterator, Mapping
from dataclasses import dataclass, field
from datetime import datetime
from typing import Any

from service.client.exchange import Exchange
from service.client.problems import AnswerUnusable
from service.client.reading import read

CSV = "text/csv"


@dataclass(frozen=True, slots=True)
class RecheckedFlight:
    """A flight that came out otherwise, or, with `verdict_now` "not computed", could not be computed."""

    load: str
    aircraft: str
    reference: str
    leg: int
    departure: str
    signed_verdict: str
    verdict_now: str
    limit: str
    excess: str


@dataclass(frozen=True, slots=True)
class Recheck:
    """How a recheck stands: `state` is waiting, running or finished; `done` of `loads` are computed."""

    id: str
    state: str
    loads: int
    done: int
    counts: Mapping[str, int] = field(compare=False)
    body: Mapping[str, Any] = field(repr=False, compare=False)


class Rechecks:
    """What is done with rechecks."""

    _exchange: Exchange

    def ask_recheck(
        self,
        aircraft: str = "",
        *,
        empty_weight: str = "",
        loading_basis: str = "",
        standard_weights: str = "",
        since: datetime | None = None,
        before: datetime | None = None,
        reason: str = "",
        key: str = "",
    ) -> Recheck:
        """This function will have an aircraft's loads, or without one the whole operator's, computed again.

        Versions are ids. Raises ValueError for an instant without an offset.
        """
        for instant in (since, before):
            if instant is not None and instant.tzinfo is None:
                raise ValueError("a departure is an instant with its offset from UTC")
        asked = {
            "aircraft": aircraft,
            "empty_weight": empty_weight,
            "loading_basis": loading_basis,
            "standard_weights": standard_weights,
            "from": since.isoformat() if since else "",
            "to": before.isoformat() if before else "",
            "reason": reason,
        }
        document = {name: value for name, value in asked.items() if value}
        answer = self._exchange.post("/rechecks", document, key=key or str(uuid.uuid4()))
        return _recheck(answer.document())

    def recheck(self, number: str) -> Recheck:
        """This function will read how a recheck stands, by its id."""
        return _recheck(self._exchange.get(f"/rechecks/{uuid.UUID(number)}").document())

    def rechecked_flights(self, number: str) -> Iterator[RecheckedFlight]:
        """This function will give the table of a recheck, flights to come first, one page after the other."""
        path = f"/rechecks/{uuid.UUID(number)}"
        while path:
            answer = self._exchange.get(path)
            for row in answer.rows("flights"):
                yield read(_flight, row)
            path = answer.following

    def recheck_table(self, number: str) -> str:
        """This function will fetch the whole table of a recheck as CSV."""
        answer = self._exchange.get(f"/rechecks/{uuid.UUID(number)}.csv", accept=CSV)
        try:
            return answer.body.decode()
        except UnicodeDecodeError as problem:
            raise AnswerUnusable("the table is no UTF-8") from problem


def _recheck(body: Mapping[str, Any]) -> Recheck:
    return read(
        lambda found: Recheck(
            found["id"],
            found["state"],
            found["progress"]["loads"],
            found["progress"]["done"],
            found["counts"],
            found,
        ),
        body,
    )


def _flight(row: Mapping[str, Any]) -> RecheckedFlight:
    return RecheckedFlight(
        row["load"],
        row["aircraft"],
        row["reference"],
        row["leg"],
        row["departure"],
        row["signed_verdict"],
        row["verdict_now"],
        row["limit"],
        row["excess"],
    )
