"""The log of sign-ins, followed from stored data alone: each row's digest, its number, its link, and the
digests that acts have sealed.

The database builds it (records/sql/access.sql); this module only judges it.
"""

import hashlib
import json
from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass
from datetime import UTC, datetime
from typing import Final

from records.chain import Finding

SCHEMA: Final = "tarebook.access/1"


@dataclass(frozen=True, slots=True)
class AccessRow:
    """One row of the log as stored; `at` with its offset."""

    chain: str
    number: int
    at: datetime
    what: str
    key: str
    typed: str
    origin: str
    request: str
    previous: str | None
    digest: str


def digest_of_row(row: AccessRow) -> str:
    """This function will return the digest the row must carry: lower-case hex SHA-256 of its JSON text."""
    whole = {
        "schema": SCHEMA,
        "chain": row.chain,
        "number": row.number,
        "previous": row.previous,
        "at": f"{row.at.astimezone(UTC):%Y-%m-%dT%H:%M:%S.%f}Z",
        "what": row.what,
        "key": row.key,
        "typed": row.typed,
        "origin": row.origin,
        "request": row.request,
    }
    text = json.dumps(whole, ensure_ascii=False, separators=(",", ":"))
    return hashlib.sha256(text.encode("utf-8")).hexdigest()


def faults_of_log(chain: str, rows: Iterable[AccessRow], sealed: Mapping[int, str]) -> Iterator[Finding]:
    """This function will name every row of one chain's log that was changed, put in, or is gone.

    `rows` come by number; `sealed` holds the sealed digest of some numbers. A log made anew from some row
    on, links and all, is sound in itself: then the rows since the last seal that fits are named.
    """
    expected, last, fits = 1, None, 0
    for row in rows:
        where = f"log of sign-ins of {chain}, row {row.number}"
        if row.number != expected:
            yield Finding(
                f"log of sign-ins of {chain}, {_span(expected, row.number - 1)}", "gone", "a row", "none"
            )
        elif row.previous != last:
            yield Finding(where, "the link to the row before", str(last), str(row.previous))
        made = digest_of_row(row)
        if made != row.digest:
            yield Finding(where, "it was changed: its digest", row.digest, made)
        if row.number in sealed:
            if sealed[row.number] == row.digest:
                fits = row.number
            else:
                span = _span(fits + 1, row.number)
                words = "made anew: the digest that was sealed"
                yield Finding(f"log of sign-ins of {chain}, {span}", words, sealed[row.number], row.digest)
        expected, last = row.number + 1, row.digest
    furthest = max(sealed, default=0)
    if furthest >= expected:
        yield Finding(
            f"log of sign-ins of {chain}, {_span(expected, furthest)}", "gone", "a sealed row", "none"
        )


def _span(first: int, last: int) -> str:
    return f"row {first}" if first >= last else f"rows {first} to {last}"
