"""Following rows finds what following links finds: the quick way is held to the plain one, entry by entry."""

import json

import pytest
from hypothesis import given
from hypothesis import strategies as st

import records.chain
from records.chain import ChainBroken, Finding, Head, Link, entry_digest, follow, follow_rows

ACT = (
    '{"id":"1","at":"2026-12-01T12:00:00.000000Z","kind":"x",'
    '"actor":{"kind":"person","key":"person:7","name":null,"capacity":"pilot"},'
    '"about":"load:1","reason":"a {word}: [1]","caused_by":null,"request":"r"}'
)
CHANGE = (
    '{"table":"t","key":"1","operation":"insert","image":{"id": 1, "what": "a, \\\\\\": b", "n": [{"a": 1}]}}'
)
Row = tuple[int, str | None, str, str]


def sealed(position: int, previous: str | None, *, act: str = ACT, changes: str = CHANGE) -> Row:
    """An entry in the seal's own form, with its digest."""
    link = f'"{previous}"' if previous else "null"
    entry = (
        f'{{"schema":"tarebook.entry/1","chain":"kt","position":{position},"previous":{link},'
        f'"act":{act},"changes":[{changes}]}}'
    )
    return position, previous, entry_digest(entry), entry


def rows_of(length: int) -> list[Row]:
    rows: list[Row] = []
    for position in range(1, length + 1):
        rows.append(sealed(position, rows[-1][2] if rows else None))
    return rows


def with_entry(row: Row, entry: str) -> Row:
    """The row with another entry and a digest that fits it."""
    return row[0], row[1], entry_digest(entry), entry


def plainly(rows: list[Row]) -> tuple[int, Finding | None]:
    """What the plain way finds: how many links hold, and what does not."""
    links = [Link("kt", *row) for row in rows]
    try:
        return follow(links, Head("kt")).position, None
    except ChainBroken as at:
        where = f"chain {at.chain}, entry {at.position}"
        return at.position - 1, Finding(where, at.what, str(at.expected), str(at.found))


def both(rows: list[Row]) -> tuple[int, Finding | None]:
    head, finding = follow_rows(rows, Head("kt"))
    assert (head.position, finding) == plainly(rows)
    return head.position, finding


def test_rows_that_hold_are_followed_to_their_end() -> None:
    rows = rows_of(5)

    assert both(rows) == (5, None)
    assert follow_rows(rows[3:], Head("kt", 3, rows[2][2])) == (Head("kt", 5, rows[4][2]), None)
    assert follow_rows([], Head("kt")) == (Head("kt"), None)


def test_entries_in_the_seals_form_are_not_followed_step_by_step(monkeypatch) -> None:
    def never(*_: object) -> None:
        raise AssertionError("the plain way was taken")

    monkeypatch.setattr(records.chain, "follow_one", never)

    assert follow_rows(rows_of(4), Head("kt"))[0].position == 4


def plain(image: str, table: str = "t") -> str:
    return f'{{"table":"{table}","key":"1","operation":"insert","image":{image}}}'


FLAT = '{"id": 1, "what": "a, b", "none": null, "much": -1.50e3, "is": true}'
FLAT_BENT = {
    "as the one before": FLAT,
    "other values": '{"id": -0, "what": "", "none": "x", "much": 0, "is": 12345678901234567890.0}',
    "other columns": '{"id": 1, "what": "a", "more": 7}',
    "a column less": FLAT.replace('"id": 1, ', ""),
    "a name twice": FLAT.replace('"id": 1', '"id": 1, "id": 1'),
    "a name twice for another": FLAT.replace('"is"', '"id"'),
    "an object in it": FLAT.replace("null", '{"a": 1}'),
    "a name twice in an object in it": FLAT.replace("null", '{"a": 1, "a": 1}'),
    "a list in it": FLAT.replace("null", "[1]"),
    "a text with a quote": FLAT.replace("a, b", '\\"'),
    "a text in other letters": FLAT.replace("a, b", "\u00f6"),
    "a line break in a text": FLAT.replace("a, b", "\n"),
    "a bad escape": FLAT.replace("a, b", "\\x"),
    "a leading nought": FLAT.replace('"id": 1', '"id": 01'),
    "a sign alone": FLAT.replace('"id": 1', '"id": -'),
    "a point and no figure": FLAT.replace('"id": 1', '"id": 1.'),
    "a whole number beyond reading": FLAT.replace('"id": 1', f'"id": {"9" * 5000}'),
    "a fraction of many figures": FLAT.replace('"id": 1', f'"id": 0.{"9" * 5000}'),
    "an exponent beyond reading": FLAT.replace('"id": 1', '"id": 1e999999'),
    "no number": FLAT.replace('"id": 1', '"id": NaN'),
    "other spaces": FLAT.replace(", ", ","),
    "a comma at the end": FLAT.replace("true}", "true, }"),
    "not closed": FLAT[:-1],
    "nothing": "{}",
    "no object": "7",
}


@pytest.mark.parametrize("image", FLAT_BENT.values(), ids=FLAT_BENT.keys())
def test_a_bent_image_after_one_of_its_table_is_found_as_the_plain_way_finds_it(image: str) -> None:
    changes = [plain(FLAT), plain(image), plain(FLAT), f"{plain(FLAT)},{plain(image)}", plain(image, "other")]
    rows: list[Row] = []
    for position, change in enumerate(changes, 1):
        rows.append(sealed(position, rows[-1][2] if rows else None, changes=change))

    both(rows)


def test_names_that_mean_something_to_a_pattern_are_taken_as_they_stand() -> None:
    rows = [sealed(1, None, changes=plain('{"a.*": 1}'))]
    rows.append(sealed(2, rows[0][2], changes=plain('{"a.*": 1}')))
    rows.append(sealed(3, rows[1][2], changes=plain('{"abc": 1, "abc": 1}')))

    assert both(rows)[0] == 2


def test_shapes_of_flat_images_are_learned_and_then_no_image_is_read_as_json(monkeypatch) -> None:
    form = records.chain._SealsForm("kt")
    first, second = (sealed(at, None, changes=plain(FLAT)) for at in (1, 2))
    assert form.has(first[3], 1, None)
    monkeypatch.setattr(form, "_read", None)

    assert form.has(second[3], 2, None)


ENTRY = rows_of(3)[1][3]
REST = ENTRY.partition(',"act":')[2]
CHANGES = f'"changes":[{CHANGE}]'
BENT = {
    "a name twice in the act": ENTRY.replace('"kind":"x"', '"kind":"x","kind":"y"'),
    "a name twice in an image": ENTRY.replace('"id": 1,', '"id": 1, "id": 2,'),
    "a name twice deep inside": ENTRY.replace('{"a": 1}', '{"a": 1, "a": 1}'),
    "the place once more at the end": ENTRY[:-1] + ',"position":9}',
    "the place once more in front of the act": ENTRY.replace('"act":', '"position":2,"act":', 1),
    "another place": ENTRY.replace('"position":2', '"position":3'),
    "the place as a text": ENTRY.replace('"position":2', '"position":"2"'),
    "the place as a fraction": ENTRY.replace('"position":2', '"position":2.0'),
    "another chain": ENTRY.replace('"chain":"kt"', '"chain":"zz"'),
    "another schema": ENTRY.replace("entry/1", "entry/2"),
    "no act": ENTRY.partition('"act":')[0] + CHANGES + "}",
    "an act and nothing": ENTRY.partition('"act":')[0][:-1] + ",}",
    "cut short": ENTRY[:-1],
    "something behind": ENTRY + " ",
    "something else behind": ENTRY + "x",
    "an object behind": ENTRY + "{}",
    "a bracket too many": ENTRY[:-1] + "]}",
    "spaces": json.dumps(json.loads(ENTRY)),
    "spaces before colons": json.dumps(json.loads(ENTRY), separators=(", ", " : ")),
    "other names in another order": json.dumps(dict(reversed(json.loads(ENTRY).items()))),
    "a raw line break in a text": ENTRY.replace('"kind":"x"', '"kind":"\n"'),
    "a list": "[]",
    "nothing": "",
    "nested beyond all sense": ENTRY.replace('{"a": 1}', "[" * 100_000 + "]" * 100_000),
    "a comma and no change behind it": ENTRY[:-2] + ",]}",
    "a comma and a bracket behind the change": ENTRY[:-2] + ",}]}",
    "a comma before the first change": ENTRY.replace('"changes":[', '"changes":[,'),
    "no change": ENTRY.replace(CHANGE, ""),
    "two changes": ENTRY.replace(CHANGE, f"{CHANGE},{CHANGE}"),
    "a name twice in the second": ENTRY.replace(CHANGE, f"{CHANGE},{CHANGE}").replace(
        '{"id": 1, "what": "a, \\\\\\": b", "n": [{"a": 1}]}}]', '{"id": 1, "id": 1}}]'
    ),
    "a change with something behind its image": ENTRY[:-3] + ',"more":1}]}',
    "a reason with a quote": ENTRY.replace("a {word}", 'a \\"word\\"'),
    "a reason in other letters": ENTRY.replace("a {word}", "gewöhnlich"),
    "a name instead of null": ENTRY.replace('"name":null', '"name":"sha256:0"'),
    "a number for a name": ENTRY.replace('"name":null', '"name":7'),
    "another name in the act": ENTRY.replace('"about"', '"around"'),
    "changes that are none": ENTRY.replace(CHANGES, '"changes":[1,2]'),
    "the changes once more": ENTRY[:-1] + f",{CHANGES}}}",
}


@pytest.mark.parametrize("entry", BENT.values(), ids=BENT.keys())
def test_a_bent_entry_is_found_as_the_plain_way_finds_it(entry: str) -> None:
    rows = rows_of(3)
    rows[1] = with_entry(rows[1], entry)
    rows[2] = sealed(3, rows[1][2])

    both(rows)


def test_what_is_bent_beyond_reading_is_named() -> None:
    rows = rows_of(3)
    rows[1] = with_entry(rows[1], BENT["a name twice in an image"])

    position, finding = both(rows)

    assert position == 1
    assert finding is not None
    assert finding.where == "chain kt, entry 2"
    assert "twice" in finding.found


@pytest.mark.parametrize(
    ("bend", "what"),
    [
        (lambda rows: rows.pop(2), "the place in the chain"),
        (lambda rows: rows.insert(2, rows[2]), "the place in the chain"),
        (lambda rows: rows.__setitem__(2, (3, "0" * 64, *rows[2][2:])), "the link to the entry before"),
        (lambda rows: rows.__setitem__(2, (3, None, *rows[2][2:])), "the link to the entry before"),
        (lambda rows: rows.__setitem__(2, (*rows[2][:2], "0" * 64, rows[2][3])), "the digest of the stored"),
        (lambda rows: rows.__setitem__(2, (*rows[2][:3], rows[2][3] + " ")), "the digest of the stored"),
        (lambda rows: rows.__setitem__(2, sealed(3, "0" * 64)), "the link to the entry before"),
    ],
)
def test_rows_out_of_place_are_named_where_they_stand(bend, what: str) -> None:
    rows = rows_of(5)
    bend(rows)

    position, finding = both(rows)

    assert position == 2 or what == "the place in the chain"
    assert finding is not None
    assert finding.what.startswith(what)


@given(st.data())
def test_any_entry_altered_anywhere_is_judged_alike(data: st.DataObject) -> None:
    rows = rows_of(3)
    entry = rows[1][3]
    place = data.draw(st.integers(0, len(entry)))
    cut = data.draw(st.integers(0, 12))
    put = data.draw(st.text(alphabet='"{}[],: \\1a\n', max_size=12) | st.sampled_from([entry, ACT, CHANGE]))
    rows[1] = with_entry(rows[1], entry[:place] + put + entry[place + cut :])
    rows[2] = sealed(3, rows[1][2])

    both(rows)
