"""Following a chain: each way it can fail to hold is found at its place, with both values."""

import hashlib
import json
from dataclasses import replace

import pytest
from hypothesis import given
from hypothesis import strategies as st

from records.chain import ChainBroken, Head, Link, entry_digest, follow


def chain_of(length: int, chain: str = "kt") -> list[Link]:
    links: list[Link] = []
    for position in range(1, length + 1):
        previous = links[-1].digest if links else None
        inside = {
            "schema": "tarebook.entry/1",
            "chain": chain,
            "position": position,
            "previous": previous,
            "act": {},
        }
        entry = json.dumps(inside)
        links.append(Link(chain, position, previous, entry_digest(entry), entry))
    return links


def fitted(link: Link, **inside: object) -> Link:
    """The link with other words inside its entry and a digest that fits them."""
    entry = json.dumps(json.loads(link.entry) | inside)
    return replace(link, entry=entry, digest=entry_digest(entry))


def broken_at(links: list[Link]) -> ChainBroken:
    with pytest.raises(ChainBroken) as broken:
        follow(links, Head("kt"))
    return broken.value


def test_a_digest_is_the_leaf_hash_of_rfc_6962():
    # RFC 6962 section 2.1: SHA-256(0x00 || d). The value for an empty leaf is the one the RFC's own test
    # vectors use (6e340b9c...), remembered, and computed here a second time.
    assert entry_digest("") == "6e340b9cffb37a989ca544e6bb780a2c78901d3fb33738768511a30617afa01d"
    assert entry_digest("ä") == hashlib.sha256(b"\x00\xc3\xa4").hexdigest()


def test_a_chain_that_holds_is_followed_to_its_end():
    links = chain_of(5)

    assert follow(links, Head("kt")) == Head("kt", 5, links[-1].digest)


def test_a_chain_can_be_followed_from_a_place_known_before():
    links = chain_of(5)

    assert follow(links[3:], Head("kt", 3, links[2].digest)).position == 5


def test_no_links_leave_the_head_where_it_was():
    assert follow([], Head("kt")) == Head("kt", 0, None)


def test_an_altered_entry_is_found_at_its_place_with_both_values():
    links = chain_of(5)
    links[2] = replace(links[2], entry=links[2].entry.replace("{}", '{"x":1}'))

    broken = broken_at(links)

    assert (broken.position, broken.what) == (3, "the digest of the stored entry")
    assert (broken.expected, broken.found) == (entry_digest(links[2].entry), links[2].digest)
    assert str(broken).startswith("chain kt, entry 3: the digest of the stored entry: expected ")


@pytest.mark.parametrize(
    ("harm", "position", "what"),
    [
        (lambda x: x[:2] + x[3:], 3, "the place in the chain"),
        (lambda x: x[1:], 1, "the place in the chain"),
        (lambda x: [*x[:2], x[3], x[2], x[4]], 3, "the place in the chain"),
        (lambda x: [*x[:2], replace(x[2], chain="zz"), *x[3:]], 3, "the name of the chain"),
        (lambda x: [*x[:2], replace(x[2], previous="0" * 64), *x[3:]], 3, "the link to the entry before"),
        (lambda x: [*x[:2], replace(x[2], previous=None), *x[3:]], 3, "the link to the entry before"),
        (lambda x: [*x[:2], fitted(x[2], act={"x": 1}), *x[3:]], 4, "the link to the entry before"),
        (lambda x: [*x[:4], fitted(x[4], position=6)], 5, "position inside the entry"),
        (lambda x: [*x[:4], fitted(x[4], position="5")], 5, "position inside the entry"),
        (lambda x: [fitted(x[0], position=True)], 1, "position inside the entry"),
        (lambda x: [*x[:4], fitted(x[4], chain="zz")], 5, "chain inside the entry"),
        (lambda x: [*x[:4], fitted(x[4], schema="tarebook.entry/2")], 5, "schema inside the entry"),
        (lambda x: [*x[:4], fitted(x[4], previous=x[2].digest)], 5, "previous inside the entry"),
    ],
)
def test_harm_is_found_at_the_first_place_that_does_not_hold(harm, position, what):
    broken = broken_at(harm(chain_of(5)))

    assert (broken.position, broken.what) == (position, what)


@pytest.mark.parametrize("text", ["", "{", "[]", "1", '{"schema": "a", "schema": "tarebook.entry/1"}'])
def test_an_entry_that_is_no_object_is_found(text):
    link = Link("kt", 1, None, entry_digest(text), text)

    assert (broken_at([link]).position, broken_at([link]).what) == (1, "the entry")


@given(st.integers(2, 8), st.data())
def test_one_changed_letter_anywhere_is_found_at_its_entry(length, data):
    links = chain_of(length)
    at = data.draw(st.integers(0, length - 1))
    where = data.draw(st.integers(0, len(links[at].entry) - 1))
    letter = chr(ord(links[at].entry[where]) ^ 1)
    links[at] = replace(links[at], entry=links[at].entry[:where] + letter + links[at].entry[where + 1 :])

    assert broken_at(links).position == at + 1
