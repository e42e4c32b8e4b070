"""Bad bodies as a table: each is refused with a stable code, at its place, before anything computes."""

import time
from decimal import Decimal

import pytest
from hypothesis import given
from hypothesis import strategies as st

from records.refusal import TooLarge, Unreadable
from records.strict_json import MOST_BYTES, MOST_DEPTH, _depth, pointer_step, read

# body, code, pointer of the first fault (None: it has no place in a document)
REFUSED = [
    (b"", "body-empty", None),
    (b" \r\n\t", "body-empty", None),
    (b"{", "json-malformed", None),
    (b'{"a": 1,}', "json-malformed", None),
    (b"{'a': 1}", "json-malformed", None),
    (b'{"a": 01}', "json-malformed", None),
    (b'{"a": +1}', "json-malformed", None),
    (b'{"a": .5}', "json-malformed", None),
    (b'{"a": 1.}', "json-malformed", None),
    (b'{"a": 1,5}', "json-malformed", None),
    (b'{"a": 0x10}', "json-malformed", None),
    (b'{"a": "tab\there"}', "json-malformed", None),
    (b'{"a": "\x00"}', "json-malformed", None),
    (b"{} {}", "json-malformed", None),
    (b'{"a": 1} // note', "json-malformed", None),
    (b'{"a": 1e3}', "json-number-exponent", "/a"),
    (b'{"a": 1E3}', "json-number-exponent", "/a"),
    (b'{"a": 1.5e-3}', "json-number-exponent", "/a"),
    (b'{"a": [0, 1e9999999]}', "json-number-exponent", "/a/1"),
    (b"-1e9999999", "json-number-exponent", ""),
    (b'{"a": NaN}', "json-not-a-number", "/a"),
    (b'{"a": Infinity}', "json-not-a-number", "/a"),
    (b'{"a": -Infinity}', "json-not-a-number", "/a"),
    (b'{"weight": {"value": 1234567890123456}}', "json-number-too-long", "/weight/value"),
    (b'{"a": 0.1234567890123456}', "json-number-too-long", "/a"),
    (b'{"a": 1, "a": 2}', "json-duplicate-key", "/a"),
    (b'{"a": 1, "a": 1}', "json-duplicate-key", "/a"),
    (b'{"a": 1, "\\u0061": 2}', "json-duplicate-key", "/a"),
    (b'[{"x/y~z": {"k": 1, "k": 2}}]', "json-duplicate-key", "/0/x~1y~0z/k"),
    (b'{"a": "b\\u0000c"}', "json-nul", "/a"),
    (b'{"list": [{"a\\u0000": 1}]}', "json-nul", "/list/0"),
    (b'{"a": "\\ud800"}', "json-lone-surrogate", "/a"),
    (b'{"a": "\\udc00\\ud800"}', "json-lone-surrogate", "/a"),
    (b'{"\\udfff": 1}', "json-lone-surrogate", ""),
    (b"[" * 33 + b"]" * 33, "json-too-deep", None),
    (b'{"a":' * 33 + b"1" + b"}" * 33, "json-too-deep", None),
    (b"\xff", "json-not-utf-8", None),
    (b'{"a": "\xed\xa0\x80"}', "json-not-utf-8", None),
    (b'{"a": "\xc0\x80"}', "json-not-utf-8", None),
    (b"\xef\xbb\xbf{}", "json-byte-order-mark", None),
    ('{"a": 1}'.encode("utf-16"), "json-byte-order-mark", None),
]


@pytest.mark.parametrize(("body", "code", "pointer"), REFUSED)
def test_a_body_two_readers_could_understand_differently_is_refused_at_its_place(body, code, pointer):
    with pytest.raises(Unreadable) as refused:
        read(body)

    assert refused.value.code == code
    assert refused.value.detail.endswith(".")
    assert [fault.pointer for fault in refused.value.faults[:1]] == ([] if pointer is None else [pointer])


def test_every_fault_that_can_be_placed_is_named_at_once():
    with pytest.raises(Unreadable) as refused:
        read(b'{"a": 1e3, "b": [NaN, 1], "c": {"d": 1, "d": 2}}')

    found = [(fault.pointer, fault.code) for fault in refused.value.faults]
    assert found == [
        ("/a", "json-number-exponent"),
        ("/b/0", "json-not-a-number"),
        ("/c/d", "json-duplicate-key"),
    ]


@pytest.mark.parametrize(
    ("body", "document"),
    [
        (b'{"a": 181}', {"a": 181}),
        (b'{"a": 6.70}', {"a": Decimal("6.70")}),
        (b'{"a": 999999999999999}', {"a": 999999999999999}),
        (b'{"a": -0.00000000000001}', {"a": Decimal("-0.00000000000001")}),
        (b'{"a": "1e3"}', {"a": "1e3"}),
        (b'[true, false, null, ""]', [True, False, None, ""]),
        ('{"å": "\N{AIRPLANE} \N{SLIGHTLY SMILING FACE}"}'.encode(), {"å": "✈ 🙂"}),
        (b'"\\ud83d\\ude42"', "🙂"),
        (b"[" * 32 + b"]" * 32, None),
        (b'["[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[", "\\"[{"]', ["[" * 40, '"[{']),
    ],
)
def test_what_is_plain_is_read_digit_for_digit(body, document):
    read_back = read(body)

    if document is not None:
        assert read_back == document
        assert str(read_back) == str(document)


def test_more_than_one_mebibyte_is_refused_unread():
    with pytest.raises(TooLarge) as refused:
        read(b"[" + b" " * MOST_BYTES)

    assert refused.value.code == "body-too-large"


@pytest.mark.parametrize(
    "body",
    [
        b"1e9999999",
        b"1" * MOST_BYTES,
        b"0." + b"1" * (MOST_BYTES - 2),
        b'"' * MOST_BYTES,
        b'\\"' * (MOST_BYTES // 2),
        b'"\\"' + b'\\"' * (MOST_BYTES // 2 - 2),
        b"[" * MOST_BYTES,
        b'{"a":' * (MOST_BYTES // 5),
        b'"[' * (MOST_BYTES // 2),
        b"[" + b'"\\ud800",' * (MOST_BYTES // 9 - 1) + b"1]",
        b'{"a":1,"a":1' + b',"a":1' * (MOST_BYTES // 6 - 3) + b"}",
    ],
    ids=lambda body: f"{body[:9]!r}...",
)
def test_a_body_made_to_cost_time_costs_none(body):
    started = time.process_time()

    with pytest.raises(Unreadable):
        read(body)

    assert time.process_time() - started < 2


def test_a_pointer_step_is_escaped_as_rfc_6901_section_3_says():
    # RFC 6901 section 5, read: the member "a/b" is at /a~1b, the member "m~n" at /m~0n.
    assert pointer_step("a/b") == "/a~1b"
    assert pointer_step("m~n") == "/m~0n"
    assert pointer_step(3) == "/3"


@given(
    st.lists(
        st.sampled_from(["[", "]", "{", "}", '"', '\\"', "\\\\", "\\", "a", ",", '"["', '"\\"["', "[" * 20]),
        max_size=120,
    )
)
def test_depth_is_what_counting_mark_by_mark_gives(parts):
    body = "".join(parts).encode()
    depth = deepest = 0
    inside = escaped = False
    for mark in body.decode():
        if inside:
            inside, escaped = mark != '"' or escaped, mark == "\\" and not escaped
        elif mark == '"':
            inside = True
        else:
            depth += (mark in "[{") - (mark in "]}")
            deepest = max(deepest, depth)

    assert (_depth(body) > MOST_DEPTH) == (deepest > MOST_DEPTH)
