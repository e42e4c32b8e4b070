"""The log of sign-ins judged from stored rows alone: what fits is silent, what does not is named."""

import hashlib
from dataclasses import replace
from datetime import UTC, datetime, timedelta, timezone

import pytest

from records.access_chain import AccessRow, digest_of_row, faults_of_log

AT = datetime(2026, 12, 1, 8, 30, 0, 250, tzinfo=UTC)


def log(count: int) -> list[AccessRow]:
    """This function will write a sound log of that many rows."""
    rows: list[AccessRow] = []
    for number in range(1, count + 1):
        before = rows[-1].digest if rows else None
        row = AccessRow("kt", number, AT, "sign-in", f"person:{number}", "", "", "", before, "")
        rows.append(replace(row, digest=digest_of_row(row)))
    return rows


def named(rows: list[AccessRow], sealed: dict[int, str]) -> list[tuple[str, str]]:
    """This function will return where and what is wrong, without the words every place shares."""
    return [
        (one.where.removeprefix("log of sign-ins of kt, "), one.what)
        for one in faults_of_log("kt", rows, sealed)
    ]


def test_the_digest_is_that_of_one_json_text() -> None:
    row = AccessRow("kt", 2, AT, "sign-in", "person:7", "", "ab", "r-1", "d1", "")
    # The text, written out by hand from the words in records/sql/access.sql; the hash is Python's own.
    text = (
        '{"schema":"tarebook.access/1","chain":"kt","number":2,"previous":"d1",'
        '"at":"2026-12-01T08:30:00.000250Z","what":"sign-in","key":"person:7","typed":"","origin":"ab",'
        '"request":"r-1"}'
    )

    assert digest_of_row(row) == hashlib.sha256(text.encode()).hexdigest()


def test_the_digest_is_the_same_in_every_time_zone() -> None:
    row = log(1)[0]

    moved = replace(row, at=row.at.astimezone(timezone(timedelta(hours=-7))))

    assert digest_of_row(moved) == row.digest


@pytest.mark.parametrize("field", ["chain", "what", "key", "typed", "origin", "request", "previous"])
def test_every_field_is_in_the_digest(field: str) -> None:
    row = log(2)[1]

    assert digest_of_row(replace(row, **{field: "x"})) != row.digest


def test_a_sound_log_is_silent_sealed_or_not() -> None:
    rows = log(6)

    assert named(rows, {}) == []
    assert named(rows, {3: rows[2].digest, 6: rows[5].digest}) == []
    assert named([], {}) == []


def test_a_missing_row_is_named_wherever_it_stood() -> None:
    rows = log(6)
    sealed = {6: rows[5].digest}

    assert named(rows[1:], sealed) == [("row 1", "gone")]
    assert named(rows[:2] + rows[4:], sealed) == [("rows 3 to 4", "gone")]
    assert named(rows[:4], sealed) == [("rows 5 to 6", "gone")]
    assert named([], sealed) == [("rows 1 to 6", "gone")]


def test_a_changed_row_is_named_once() -> None:
    rows = log(4)
    rows[1] = replace(rows[1], key="person:99")

    assert named(rows, {4: rows[3].digest}) == [("row 2", "it was changed: its digest")]


def test_a_log_made_anew_is_named_from_the_last_seal_that_fits() -> None:
    rows, before = log(6), log(6)
    for place in range(3, 6):
        anew = replace(rows[place], what="sign-out", previous=rows[place - 1].digest)
        rows[place] = replace(anew, digest=digest_of_row(anew))

    found = named(rows, {3: before[2].digest, 6: before[5].digest})

    assert found == [("rows 4 to 6", "made anew: the digest that was sealed")]


def test_what_was_cut_off_after_the_last_seal_is_not_found() -> None:
    # Said openly: the seal comes once a minute.
    rows = log(6)

    assert named(rows[:4], {3: rows[2].digest}) == []
