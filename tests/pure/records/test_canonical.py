"""Canonical bytes: an outside implementation of RFC 8785 judges, and the RFC's own example of key order."""

import random
from decimal import Decimal

import pytest
import rfc8785

from records.canonical import NotCanonical, canonical, decimal_text, digest

ALPHABET = ['"', "\\", "/", "\b", "\n", "\x1f", "\x7f", "a", "Z", "0", "é", "€", "ﬓ", "😀", "\u2028"]


def _document(rng: random.Random, depth: int, keys: list[str]) -> object:
    kinds = ["text", "whole", "true", "null"] + (["list", "object"] * 2 if depth else [])
    match rng.choice(kinds):
        case "text":
            return "".join(rng.choices(ALPHABET, k=rng.randrange(6)))
        case "whole":
            return rng.randrange(-(2**53) + 1, 2**53)
        case "true":
            return rng.random() < 0.5
        case "list":
            return [_document(rng, depth - 1, keys) for _ in range(rng.randrange(4))]
        case "object":
            names = {"".join(rng.choices(keys, k=rng.randrange(4))) for _ in range(4)}
            return {name: _document(rng, depth - 1, keys) for name in names}
        case _:
            return None


@pytest.mark.parametrize("keys", [["a", "B", "_", "1", '"'], ALPHABET], ids=["ascii keys", "any keys"])
def test_two_thousand_random_documents_equal_an_outside_implementation(keys):
    rng = random.Random(8785)

    for _ in range(2000):
        document = _document(rng, 4, keys)
        assert canonical(document) == rfc8785.dumps(document)


def test_keys_are_ordered_by_utf_16_units_as_in_the_rfcs_own_example():
    # RFC 8785 section 3.2.3, remembered: the expected order of its property names.
    document = {
        "\u20ac": "Euro Sign",
        "\r": "Carriage Return",
        "\ufb33": "Hebrew Letter Dalet With Dagesh",
        "1": "One",
        "\U0001f600": "Emoji: Grinning Face",
        "\u0080": "Control",
        "\u00f6": "Latin Small Letter O With Diaeresis",
    }

    text = canonical(document).decode()

    order = ["Carriage", "One", "Control", "Latin", "Euro", "Emoji", "Hebrew"]
    assert sorted(order, key=text.index) == order


def test_a_decimal_keeps_its_digits_and_never_takes_an_exponent():
    document = {"b": Decimal("6.70"), "a": [Decimal("0.00000001"), Decimal("1E+3"), Decimal("-0.0")]}

    assert canonical(document) == b'{"a":["0.00000001","1000","-0.0"],"b":"6.70"}'
    assert decimal_text(Decimal("1E-8")) == "0.00000001"


@pytest.mark.parametrize(
    "document",
    [
        1.5,
        {"a": [0.0]},
        {1: "a"},
        {"a": {b"k": 1}},
        {"a": {1, 2}},
        {"a": b"bytes"},
        2**53,
        -(2**53),
        Decimal("NaN"),
        Decimal("Infinity"),
        {"a": "\ud800"},
    ],
    ids=repr,
)
def test_what_a_document_may_not_hold_is_refused(document):
    with pytest.raises(NotCanonical):
        canonical(document)


def test_the_digest_is_sha_256_of_the_canonical_bytes():
    # SHA-256 of the two bytes "{}", computed with sha256sum of GNU coreutils.
    assert digest({}) == "44136fa355b3678a1146ad16f7e8649e94fb4fc21fe77e8310c060f61caaff8a"
    assert digest({"b": 1, "a": 2}) == digest({"a": 2, "b": 1})
