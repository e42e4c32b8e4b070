"""Followed in the background: from where each chain last held, and everything once a night."""

import logging
from datetime import UTC, datetime, timedelta

import pytest

from records import verified
from records.act import act
from records.models import Verified
from records.verified import EVERYTHING, last_verified, verify_everything, verify_onwards
from tests import databases
from tests.records.scratch import AMANI, NOTE, make_tables, put


@pytest.fixture
def three_entries(fresh_database: str) -> str:
    make_tables()
    for _ in range(3):
        note()
    return fresh_database


def note() -> None:
    with act(NOTE, by=AMANI, about="thing:1"):
        put()


def past_the_guards(table: str, statement: str) -> None:
    """What somebody who owns the tables can do: switch their triggers off and write."""
    with databases.connect("superuser") as superuser:
        superuser.execute(f"ALTER TABLE {table} DISABLE TRIGGER USER")
        superuser.execute(statement)


def test_each_round_goes_on_where_the_last_one_ended(three_entries, monkeypatch):
    assert verify_onwards() == ()
    first = Verified.objects.get(chain="kt")
    note()
    seen = []
    follow = verified.follow_one
    monkeypatch.setattr(verified, "follow_one", lambda link, head: seen.append(link) or follow(link, head))

    assert verify_onwards() == ()

    then = Verified.objects.get(chain="kt")
    assert (first.position, then.position) == (3, 4)
    # The entry that held last is hashed again, and those since.
    assert [link.position for link in seen if link.chain == "kt"] == [3, 4]
    assert then.at > first.at


def test_it_tells_what_was_verified_and_what_is_waiting(three_entries):
    before = last_verified()
    verify_onwards()
    held = last_verified()
    note()
    after = last_verified()

    assert (before.entries, before.at, before.whole_at) == (0, None, None)
    assert (held.waiting, held.sound) == (0, True)
    assert held.entries == before.waiting
    assert (after.entries, after.waiting) == (held.entries, 1)
    assert timedelta(0) <= datetime.now(UTC) - held.at < timedelta(minutes=1)


def test_a_chain_that_was_never_followed_leaves_no_time_to_tell(three_entries):
    verify_onwards()
    Verified.objects.filter(chain="kt").update(chain="gone")

    assert last_verified().at is None


@pytest.mark.parametrize(
    ("statement", "where", "what"),
    [
        (
            "DELETE FROM records_seal WHERE chain = 'kt' AND position = 3",
            "chain kt, entry 3",
            "the entry that held when last followed",
        ),
        (
            "UPDATE records_seal SET digest = repeat('a', 64) WHERE chain = 'kt' AND position = 3",
            "chain kt, entry 3",
            "the entry that held when last followed",
        ),
        (
            "UPDATE records_seal SET entry = replace(entry, 'kt', 'kx') WHERE chain = 'kt' AND position = 3",
            "chain kt, entry 3",
            "the digest of the stored entry",
        ),
    ],
)
def test_a_tail_that_was_cut_off_or_altered_since_is_found_and_stays_told(
    three_entries, caplog, statement, where, what
):
    verify_onwards()
    past_the_guards("records_seal", statement)

    with caplog.at_level(logging.ERROR, logger="records.verified"):
        found = verify_onwards()

    assert [(finding.where, finding.what) for finding in found] == [(where, what)]
    assert caplog.messages == [f"the trail does not hold: {where}: {what}"]
    assert not last_verified().sound
    # Each round tells it again, although a chain whose tail is gone is sound in itself.
    assert [finding.where for finding in verify_onwards()] == [where]
    assert not last_verified().sound


def test_what_was_put_back_holds_again(three_entries):
    verify_onwards()
    digest = Verified.objects.get(chain="kt").digest
    past_the_guards(
        "records_seal", "UPDATE records_seal SET digest = repeat('a', 64) WHERE chain = 'kt' AND position = 3"
    )
    assert verify_onwards()

    past_the_guards(
        "records_seal", f"UPDATE records_seal SET digest = '{digest}' WHERE chain = 'kt' AND position = 3"
    )

    assert [finding for finding in verify_onwards() if finding.where.startswith("chain kt")] == []


def test_everything_at_once_finds_a_row_that_no_act_changed(three_entries):
    assert verify_everything() == ()
    assert Verified.objects.get(chain=EVERYTHING).broken == ""
    past_the_guards(
        "scratch_thing",
        "UPDATE scratch_thing SET what = 'another' WHERE id = (SELECT min(id) FROM scratch_thing)",
    )

    found = verify_everything()

    assert any("it differs in what" in finding.what for finding in found)
    assert not last_verified().sound
    assert last_verified().whole_at is not None
