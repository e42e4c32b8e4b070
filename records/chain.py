"""The chain of sealed entries, followed from stored data alone: builder and verifier are different programs.

The database builds the chain (records/sql/seal.sql); this module only judges it.

    entry 1          entry 2          entry 3
    previous: -   .- previous: d1  .- previous: d2        d = SHA-256(0x00 || entry text)
         d1 ------'       d2 ------'       d3
"""

import hashlib
import json
import re
from collections import Counter
from collections.abc import Iterable
from dataclasses import dataclass
from operator import ne

SCHEMA = "tarebook.entry/1"
# RFC 6962 section 2.1: MTH({d(0)}) = SHA-256(0x00 || d(0)). The prefix keeps an entry from passing for a
# node.
_LEAF = b"\x00"
# How the seal writes act and change, texts without anything to be escaped; others go the plain way.
_TEXT = r'"[ !#-\[\]-~]*+"'
_ACT = re.compile(
    rf'{{"id":{_TEXT},"at":{_TEXT},"kind":{_TEXT},'
    rf'"actor":{{"kind":{_TEXT},"key":{_TEXT},"name":(?:null|{_TEXT}),"capacity":{_TEXT}}},'
    rf'"about":{_TEXT},"reason":{_TEXT},"caused_by":(?:null|{_TEXT}),"request":{_TEXT}}},"changes":\['
)
_CHANGE = re.compile(rf'{{"table":({_TEXT}),"key":{_TEXT},"operation":{_TEXT},"image":')
# How the database writes an image, and a value in it that holds no others (RFC 8259 sections 3, 6 and 7).
_NAME = re.compile(r"[ !#-\[\]-~]+")
# Whole numbers as long as no reader has trouble with.
_VALUE = rf"(?:{_TEXT}|-?(?:0|[1-9][0-9]{{0,99}}+)(?:\.[0-9]++)?(?:[eE][-+]?[0-9]++)?|true|false|null)"
_TRIES = 9  # a table's shape is learned so often at most, as its columns may have changed along the chain


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


def follow_rows(rows: Iterable[tuple[int, str | None, str, str]], head: Head) -> tuple[Head, Finding | None]:
    """This function will follow a chain from `head` on through rows of (position, previous, digest, entry),
    and return how far it holds and what does not, None when all of it does.

    It finds what `follow` finds, in half the time: of an entry in the very form of the seal the first values
    are compared as text and the rest is read in two pieces. Any other is followed step by step.
    """
    chain, place, before, form = head.chain, head.position, head.digest, _SealsForm(head.chain)
    for position, previous, digest, entry in rows:
        if not (
            position == place + 1
            and previous == before
            and digest == hashlib.sha256(_LEAF + entry.encode()).hexdigest()
            and form.has(entry, position, previous)
        ):
            try:
                follow_one(Link(chain, position, previous, digest, entry), Head(chain, place, before))
            except ChainBroken as at:
                where = f"chain {at.chain}, entry {at.position}"
                finding = Finding(where, at.what, str(at.expected), str(at.found))
                return Head(chain, place, before), finding
        place, before = position, digest
    return Head(chain, place, before), None


class _SealsForm:
    """Judges whether entries of one chain stand in the form in which the seal writes them: all names of
    entry, act and change in their order, nothing between them, the first four with the wanted values.

    Only the images are read as JSON. The reader hands over each object as its pairs, so that a name that
    stands twice is seen; what is done with them takes no step of ours for each. Of an image without objects
    and lists in it the names are remembered by table, and the next one is compared with them as text.
    """

    def __init__(self, chain: str) -> None:
        self._opening = f'{{"schema":"{SCHEMA}","chain":{json.dumps(chain, ensure_ascii=False)},"position":'
        self._objects: list[list[tuple[str, object]]] = []
        self._read = json.JSONDecoder(object_pairs_hook=self._objects.append).raw_decode
        self._shapes: dict[str, re.Pattern[str]] = {}
        self._learned: Counter[str] = Counter()

    def has(self, entry: str, position: int, previous: str | None) -> bool:
        """This function will say whether the entry is of that form and reads as sound JSON in which no name
        stands twice in one object; of one that is not it says nothing more.
        """
        link = f'"{previous}"' if previous is not None else "null"
        beginning = f'{self._opening}{position},"previous":{link},"act":'
        act = _ACT.match(entry, len(beginning)) if entry.startswith(beginning) else None
        if act is None:
            return False
        end, objects = act.end(), self._objects
        if entry[end:] == "]}":
            return True  # an act that wrote nothing
        objects.clear()
        try:
            while change := _CHANGE.match(entry, end):
                shape = self._shapes.get(change[1])
                image = shape.match(entry, change.end()) if shape is not None else None
                end = image.end() if image is not None else self._image(entry, change)
                if not entry.startswith("},", end):
                    twice = any(map(ne, map(len, map(dict, objects)), map(len, objects)))
                    return entry[end:] == "}]}" and not twice
                end += 2
        except (ValueError, RecursionError):
            pass
        return False

    def _image(self, entry: str, change: re.Match[str]) -> int:
        """Read an image as JSON, remember its shape if it has no other object in it, return where it ends."""
        before, table = len(self._objects), change[1]
        end = self._read(entry, change.end())[1]
        if self._learned[table] == _TRIES or len(self._objects) != before + 1:
            return end
        pairs = dict(self._objects[before])
        sound = len(pairs) == len(self._objects[before]) and all(map(_NAME.fullmatch, pairs))
        if sound and not any(isinstance(value, list) for value in pairs.values()):
            self._learned[table] += 1
            members = ", ".join(f'"{re.escape(name)}": {_VALUE}' for name in pairs)
            self._shapes[table] = re.compile(rf"{{{members}}}")
        return end


def _same(chain: str, position: int, what: str, expected: object, found: object) -> None:
    # A whole number is not a true or false, whatever Python says.
    if expected != found or type(expected) is not type(found):
        raise ChainBroken(chain, position, what, expected, found)


def _read(link: Link, place: int) -> dict[str, object]:
    try:
        inside = _READER.decode(link.entry)
    except (ValueError, RecursionError) as problem:
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
