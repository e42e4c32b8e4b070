"""Whether the trail holds: every chain followed from stored data, and every filed document hashed again."""

from collections.abc import Iterator
from dataclasses import dataclass
from itertools import groupby
from typing import Any

from django.db import connections

from records.chain import ChainBroken, Finding, Head, Link, follow_one

_BATCH = 500
_LINKS = (
    'SELECT chain, position, previous, digest, entry FROM records_seal ORDER BY chain COLLATE "C", position'
)
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
    with connections[using].chunked_cursor() as cursor:
        cursor.execute(_LINKS)
        for chain, links in groupby(_rows(cursor), key=lambda row: row[0]):
            head = Head(chain)
            try:
                for link in links:
                    head = follow_one(Link(*link), head)
            except ChainBroken as at:
                broken.append(
                    Finding(
                        f"chain {at.chain}, entry {at.position}", at.what, str(at.expected), str(at.found)
                    )
                )
            heads.append(head)
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


def _rows(cursor: Any) -> Iterator[tuple[Any, ...]]:
    while rows := cursor.fetchmany(_BATCH):
        yield from rows
