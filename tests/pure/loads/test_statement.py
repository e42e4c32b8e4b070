"""What is signed: any change of it gives another digest, and the sentences shown hold every figure that
counts.
"""

import hashlib
from copy import deepcopy

import pytest

from loads.balance.assess import assess
from loads.balance.declared import read_load
from loads.balance.engine import ENGINE_VERSION
from loads.statement import digest_of, signing_text, statement
from records.canonical import canonical
from tests.pure.loads.making import load, twin, twin_empty

VERSIONS = {
    "loading_basis": {"id": "b1", "digest": "aa"},
    "empty_weight": {"id": "e1", "digest": "bb"},
}


def stated(document=None):
    document = document or load()
    result = assess(read_load(document, twin()), twin(), twin_empty())
    return statement(document, VERSIONS, ENGINE_VERSION, result.as_document())


def leaves(value, path=()):
    if isinstance(value, dict):
        for key, inner in value.items():
            yield from leaves(inner, (*path, key))
    elif isinstance(value, list):
        for place, inner in enumerate(value):
            yield from leaves(inner, (*path, place))
    else:
        yield path, value


def changed(document, path):
    other = deepcopy(document)
    spot = other
    for part in path[:-1]:
        spot = spot[part]
    spot[path[-1]] = "changed" if spot[path[-1]] != "changed" else "again"
    return other


def test_the_digest_is_the_sha_256_of_the_canonical_bytes_and_the_same_every_time():
    one = stated()

    assert digest_of(one) == hashlib.sha256(canonical(one)).hexdigest()
    assert digest_of(one) == digest_of(stated())


def test_a_change_of_any_field_at_all_gives_another_digest():
    one = stated()
    digests = {digest_of(changed(one, path)) for path, _ in leaves(one)}

    assert digest_of(one) not in digests
    assert len(digests) == len(list(leaves(one))) > 300


def test_a_field_taken_out_gives_another_digest():
    one = stated()

    for part in one:
        assert digest_of({name: value for name, value in one.items() if name != part}) != digest_of(one)


def test_the_sentences_show_exactly_what_is_signed():
    one = stated()
    text = signing_text(one, name="R. Amani", capacity="pilot in command", meaning="accepted")

    for part in (
        "Aircraft Q9-KTB",
        "flight KT-214 leg 1, XNAL to XKOR, departure 2026-12-01T08:30:00-06:00",
        "Verdict: within.",
        "Take-off: 5760.5 lb, CG 118.77 in (14 % of the mean chord), lateral L 0.23 in.",
        "Zero fuel: 5004.5 lb",
        "Landing: 5340.5 lb",
        "left-main 50 US gal",
        "density 6 lb/US gal (delivery note 4471)",
        "taxi 24 lb, trip 420 lb, at landing 336 lb, minimum at landing 240 lb",
        "Persons on board: 4 (1 crew, 2 passengers, 1 lap infants).",
        "Not assessed: nothing.",
        "Loading basis: b1, digest aa.",
        "Empty weight: e1, digest bb.",
        f"engine version {ENGINE_VERSION}",
        digest_of(one),
        "R. Amani, pilot in command: I accept this load",
    ):
        assert part in text


def test_another_capacity_or_meaning_is_another_text():
    one = stated()
    accepted = signing_text(one, name="R. Amani", capacity="pilot in command", meaning="accepted")

    assert signing_text(one, name="R. Amani", capacity="load preparer", meaning="accepted") != accepted
    assert signing_text(one, name="R. Amani", capacity="pilot in command", meaning="prepared") != accepted
    with pytest.raises(KeyError):
        signing_text(one, name="R. Amani", capacity="pilot in command", meaning="waved through")


def test_what_was_never_computed_cannot_be_put_into_a_sentence_to_sign():
    result = assess(read_load(load(), twin()), twin(), None)
    one = statement(load(), {"loading_basis": None, "empty_weight": None}, "1", result.as_document())

    with pytest.raises(KeyError):
        signing_text(one, name="R. Amani", capacity="pilot in command", meaning="accepted")
