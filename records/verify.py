"""Whether the trail holds: every chain followed from stored data, and every filed document hashed again."""

from collections import deque
from collections.abc import Iterator
from dataclasses import dataclass
from typing import Any

from django.db import connections

from records.chain import Finding, Head, follow_rows

_BATCH = 1000
# From each chain to the next by the index: going through all the entries for the names took longer.
_CHAINS = """
WITH RECURSIVE found AS (
    (SELECT chain FROM records_seal ORDER BY chain LIMIT 1)
    UNION ALL
    SELECT (SELECT chain FROM records_seal WHERE chain > found.chain ORDER BY chain LIMIT 1)
    FROM found WHERE found.chain IS NOT NULL
)
SELECT chain FROM found WHERE chain IS NOT NULL ORDER BY chain COLLATE "C"
"""
# Asked chain by chain: an index gives each in its order, where all at once would be sorted first.
_LINKS = "SELECT position, previous, digest, entry FROM records_seal WHERE chain = %s ORDER BY position"
_DOCUMENTS = """
SELECT digest, encode(sha256(body), 'hex') FROM records_document
WHERE digest <> encode(sha256(body), 'hex') AND octet_length(body) > 0 ORDER BY filed_at
"""


@dataclass(frozen=True, slots=True)
class Chains:
    """Every chain with where it ends, and the first broken place of each that does not hold."""

    heads: tuple[Head, ...]
    broken: tuple[Finding, ...]


def follow_chains(using: str = "default") -> Chains:
    """This function will follow every chain from its first entry on."""
    heads: list[Head] = []
    broken: list[Finding] = []
    with connections[using].cursor() as cursor:
        cursor.execute(_CHAINS)
        chains = [chain for (chain,) in cursor.fetchall()]
    for chain in chains:
        links = _links(chain, using)
        head, finding = follow_rows(links, Head(chain))
        deque(links, maxlen=0)  # of a broken chain the rest, which the connection still hands over
        heads.append(head)
        if finding is not None:
            broken.append(finding)
    return Chains(tuple(heads), tuple(broken))


def altered_documents(using: str = "default") -> tuple[Finding, ...]:
    """This function will hash every filed document again and return those whose digest does not fit.

    A document whose body was destroyed when its time came is empty; its digest stays.
    """
    with connections[using].cursor() as cursor:
        cursor.execute(_DOCUMENTS)
        return tuple(
            Finding(f"document {digest}", "the digest of its bytes", digest, found)
            for digest, found in cursor.fetchall()
        )


def _links(chain: str, using: str) -> Iterator[tuple[Any, ...]]:
    """The links of a chain as they come: the database reads ahead while those before are judged."""
    with connections[using].connection.cursor() as cursor:
        yield from cursor.stream(_LINKS, [chain], size=_BATCH)
