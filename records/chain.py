"""The chain of sealed entries, followed from stored data alone: builder and verifier are different programs.

The database builds the chain (records/sql/seal.sql); this module only judges it.

    entry 1          entry 2          entry 3
    previous: -   .- previous: d1  .- previous: d2        d = SHA-256(0x00 || entry text)
         d1 ------'       d2 ------'       d3
"""

import hashlib
import json
from collections.abc import Iterable
from dataclasses import dataclass

SCHEMA = "tarebook.entry/1"
# RFC 6962 section 2.1: MTH({d(0)}) = SHA-256(0x00 || d(0)). The prefix keeps an entry from passing for a
# node.
_LEAF = b"\x00"


@dataclass(frozen=True, slots=True)
class Link:
    """One sealed entry as stored: its place, and the entry text with its digest (lower-case hex)."""

    chain: str
    position: int
    previous: str | None
    digest: str
    entry: str


@dataclass(frozen=True, slots=True)
class Head:
    """How far a chain was followed: the last position (0: nothing yet) and the digest there."""

    chain: str
    position: int = 0
    digest: str | None = None


@dataclass(frozen=True, slots=True)
class Finding:
    """Something that does not hold: where, what, and both values."""

    where: str
    what: str
    expected: str
    found: str


class ChainBroken(Exception):
    """The first place where a chain does not hold, with what was expected there and what was found."""

    def __init__(self, chain: str, position: int, what: str, expected: object, found: object) -> None:
        super().__init__(f"chain {chain}, entry {position}: {what}: expected {expected}, found {found}")
        self.chain = chain
        self.position = position
        self.what = what
        self.expected = expected
        self.found = found


def entry_digest(entry: str) -> str:
    """This function will return the digest of an entry text: lower-case hex SHA-256 over 0x00 and its UTF-8
    bytes.
    """
    return hashlib.sha256(_LEAF + entry.encode("utf-8")).hexdigest()


def follow(links: Iterable[Link], head: Head) -> Head:
    """This function will follow a chain from `head` on and return where it ends.

    `links` come in order of position. Raises ChainBroken at the first place that does not hold.
    """
    for link in links:
        head = follow_one(link, head)
    return head


def follow_one(link: Link, head: Head) -> Head:
    """This function will take one step along a chain; raises ChainBroken when the step does not hold."""
    place = head.position + 1
    _same(link.chain, place, "the name of the chain", head.chain, link.chain)
    _same(link.chain, place, "the place in the chain", place, link.position)
    _same(link.chain, place, "the link to the entry before", head.digest, link.previous)
    _same(link.chain, place, "the digest of the stored entry", entry_digest(link.entry), link.digest)
    inside = _read(link, place)
    for name, wanted in (
        ("schema", SCHEMA),
        ("chain", link.chain),
        ("position", link.position),
        ("previous", link.previous),
    ):
        _same(link.chain, place, f"{name} inside the entry", wanted, inside.get(name))
    return Head(link.chain, link.position, link.digest)


def _same(chain: str, position: int, what: str, expected: object, found: object) -> None:
    # A whole number is not a true or false, whatever Python says.
    if expected != found or type(expected) is not type(found):
        raise ChainBroken(chain, position, what, expected, found)


def _read(link: Link, place: int) -> dict[str, object]:
    try:
        inside = _READER.decode(link.entry)
    except ValueError as problem:
        raise ChainBroken(link.chain, place, "the entry", "a JSON object", str(problem)) from problem
    if not isinstance(inside, dict):
        raise ChainBroken(link.chain, place, "the entry", "a JSON object", type(inside).__name__)
    return inside


def _without_repeats(pairs: list[tuple[str, object]]) -> dict[str, object]:
    found = dict(pairs)
    if len(found) != len(pairs):
        raise ValueError("a name stands twice in one object")
    return found


# Made once: making it anew for each entry took a fifth of the time of following it.
_READER = json.JSONDecoder(object_pairs_hook=_without_repeats)
