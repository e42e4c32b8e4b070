"""Loads: submitted, revised, signed, followed to the filed manifest."""

import hashlib
import uuid
from collections.abc import Iterator, Mapping
from datetime import datetime
from typing import Literal
from urllib.parse import urlencode

from service.client.exchange import Exchange
from service.client.problems import AnswerUnusable
from service.client.shapes import Assessment, Load, LoadLine, Paper, assessment_in, line_in, load_in

PDF = "application/pdf"


class Loads:
    """What is done with loads. Whatever moves one takes it as it was last seen: if somebody else moved it
    meanwhile, MovedOn is raised and nothing happens.
    """

    _exchange: Exchange

    def assess(self, document: Mapping[str, object]) -> Assessment:
        """This function will have a load document computed; nothing is stored."""
        return assessment_in(self._exchange.post("/assessments", document))

    def submit(self, document: Mapping[str, object], *, key: str = "") -> Load:
        """This function will submit a load, which is kept whatever its verdict.

        `key` names this intent; the same key with the same document again has no second effect and gets the
        same answer, for seven days. One is made where none is given, and kept while this call tries again. A
        program that may be restarted in the middle gives its own: its number of the flight, say.
        """
        return load_in(self._exchange.post("/loads", document, key=_key(key)))

    def revise(
        self, load: Load | LoadLine, document: Mapping[str, object], reason: str, *, key: str = ""
    ) -> Load:
        """This function will replace a load that has not departed by a whole new one, and return that."""
        return self._moved(load, "revisions", {**document, "reason": reason}, key)

    def assess_again(self, load: Load | LoadLine, *, key: str = "") -> Load:
        """This function will have a stale load assessed against what is in force now; it is signed anew."""
        return self._moved(load, "assessment", None, key)

    def sign(
        self,
        load: Load | LoadLine,
        meaning: Literal["prepared", "loaded", "accepted"],
        password: str,
        *,
        key: str = "",
    ) -> Load:
        """This function will sign the digest that `load` showed. Only a person's token signs, with their
        password; only the pilot in command accepts.
        """
        signature = {"meaning": meaning, "digest": load.digest, "password": password}
        return self._moved(load, "signatures", signature, key)

    def withdraw(self, load: Load | LoadLine, reason: str, *, key: str = "") -> Load:
        """This function will withdraw a load that has not departed."""
        return self._moved(load, "withdrawal", {"reason": reason}, key)

    def depart(self, load: Load | LoadLine, at: datetime, *, key: str = "") -> Load:
        """This function will report when an accepted load departed; nothing changes it afterwards.

        Raises ValueError for an instant without an offset.
        """
        if at.tzinfo is None:
            raise ValueError("a departure is an instant with its offset from UTC")
        return self._moved(load, "departure", {"at": at.isoformat(timespec="seconds")}, key)

    def load(self, number: str) -> Load:
        """This function will read a load as it stands, by its id; `body` also has what was declared."""
        return load_in(self._exchange.get(f"/loads/{uuid.UUID(number)}"))

    def loads(
        self,
        *,
        aircraft: str = "",
        departing_from: datetime | None = None,
        departing_before: datetime | None = None,
        state: str = "",
        verdict: str = "",
        reference: str = "",
        page_rows: int = 50,
    ) -> Iterator[LoadLine]:
        """This function will give every load that fits, by planned departure, reading one page after the
        other as they are asked for.
        """
        asked = {
            "aircraft": aircraft,
            "from": departing_from.isoformat() if departing_from else "",
            "to": departing_before.isoformat() if departing_before else "",
            "state": state,
            "verdict": verdict,
            "reference": reference,
            "limit": str(page_rows),
        }
        path = f"/loads?{urlencode({name: value for name, value in asked.items() if value})}"
        while path:
            answer = self._exchange.get(path)
            yield from (line_in(one) for one in answer.rows("loads"))
            path = answer.following

    def manifest(self, load: Load | LoadLine | str, *, issue: int | None = None) -> Paper:
        """This function will fetch the filed PDF of an accepted load, the last issue unless one is named.

        `load` may be its id alone, as an event names it. Raises AnswerUnusable when the bytes are not those
        the server names.
        """
        asked = f"?issue={issue}" if issue else ""
        number = uuid.UUID(load if isinstance(load, str) else load.id)
        answer = self._exchange.get(f"/loads/{number}/manifest{asked}", accept=PDF)
        digest = hashlib.sha256(answer.body).hexdigest()
        if answer.etag != f'"{digest}"':
            raise AnswerUnusable(f"the manifest's bytes are not those of its ETag {answer.etag}")
        return Paper(answer.body, digest)

    def _moved(
        self, load: Load | LoadLine, step: str, document: Mapping[str, object] | None, key: str
    ) -> Load:
        path = f"/loads/{load.id}/{step}"
        return load_in(self._exchange.post(path, document, key=_key(key), etag=load.etag))


def _key(given: str) -> str:
    return given or str(uuid.uuid4())
