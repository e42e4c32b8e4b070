"""The trail: who did what, in sentences, and one entry exactly as it was sealed."""

import hashlib
from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from datetime import datetime
from typing import Any
from urllib.parse import urlencode
from uuid import UUID

from service.client.exchange import Exchange
from service.client.problems import AnswerUnusable
from service.client.reading import read

LEAF = b"\x00"  # what stands before an entry when it is hashed (RFC 6962)


@dataclass(frozen=True, slots=True)
class Act:
    """One act, newest first in the list. `position` counts from 1 in the operator's chain, without gaps."""

    act: str
    at: str
    kind: str
    sentence: str
    actor: str
    about: str
    reason: str
    position: int
    digest: str


@dataclass(frozen=True, slots=True)
class Entry:
    """One act with its sealed text; that its digest is the text's was checked."""

    line: Act
    previous: str | None
    text: str


class Trail:
    """What is read of the trail."""

    _exchange: Exchange

    def trail(
        self,
        *,
        about: str = "",
        actor: str = "",
        kind: str = "",
        since: datetime | None = None,
        before: datetime | None = None,
        page_rows: int = 50,
    ) -> Iterator[Act]:
        """This function will give every act that fits, the newest first, reading one page after the other.

        `about` is like `load:<id>` or `aircraft:<id>`, `actor` like `person:7`, `kind` like `accept-load`.
        """
        asked = {
            "about": about,
            "actor": actor,
            "kind": kind,
            "from": since.isoformat() if since else "",
            "to": before.isoformat() if before else "",
            "limit": str(page_rows),
        }
        path = f"/trail?{urlencode({name: value for name, value in asked.items() if value})}"
        while path:
            answer = self._exchange.get(path)
            yield from (_act_in(one) for one in answer.rows("acts"))
            path = answer.following

    def entry(self, act: Act | str) -> Entry:
        """This function will read one act with its entry; raises AnswerUnusable when text and digest do not
        belong together.
        """
        number = UUID(act if isinstance(act, str) else act.act)
        body = self._exchange.get(f"/trail/{number}").document()
        found = read(lambda one: Entry(_act_in(one), one["previous"], one["entry"]), body)
        if hashlib.sha256(LEAF + found.text.encode()).hexdigest() != found.line.digest:
            raise AnswerUnusable("the entry's text is not that of its digest")
        return found


def _act_in(body: Mapping[str, Any]) -> Act:
    named = ("act", "at", "kind", "sentence", "actor", "about", "reason", "position", "digest")
    return read(lambda one: Act(**{name: one[name] for name in named}), body)
