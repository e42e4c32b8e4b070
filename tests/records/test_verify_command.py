"""`manage.py verify` says whether the trail holds, and where it first does not."""

from io import StringIO

import pytest
from django.core.management import call_command
from django.db import connections

import records.chain
from records.act import act
from records.chain import Finding, Head, Link
from records.reconcile import reconcile
from records.verify import follow_chains
from tests import databases
from tests.records.scratch import AMANI, NOTE, make_tables, put


def verified(database: str = "default") -> tuple[int, str, str]:
    out, err = StringIO(), StringIO()
    with pytest.raises(SystemExit) as ended:
        call_command("verify", database=database, stdout=out, stderr=err)
    return ended.value.code, out.getvalue(), err.getvalue()


@pytest.fixture
def three_entries(fresh_database: str) -> str:
    make_tables()
    for _ in range(3):
        with act(NOTE, by=AMANI, about="thing:1"):
            put()
    return fresh_database


def test_a_sound_trail_ends_with_zero_and_tells_where_each_chain_ends(three_entries):
    code, said, _ = verified()

    assert code == 0
    assert "chain kt: 3 entries hold, head " in said
    assert said.endswith("Sound: chains, filed documents, rows and guards all hold.\n")


def test_what_the_database_seals_is_in_the_form_that_is_followed_quickly(three_entries, monkeypatch):
    plainly: list[str] = []
    step = records.chain.follow_one

    def counted(link: Link, head: Head) -> Head:
        plainly.append(link.entry)
        return step(link, head)

    monkeypatch.setattr(records.chain, "follow_one", counted)
    chains = follow_chains()

    assert chains.broken == ()
    assert {head.chain for head in chains.heads} == {"house", "kt"}
    assert plainly == []


def test_acts_that_are_open_or_sealed_meanwhile_raise_no_false_alarm(three_entries, monkeypatch):
    opening = "SELECT act_open('kt', 'note-thing', 'service', 'service:x', '', '', 'thing:9')"
    writing = "INSERT INTO scratch_thing (operator_id, what) VALUES ('kt', 'meanwhile')"

    def meanwhile(database: str) -> tuple[Finding, ...]:
        with databases.connect("default") as other, other.transaction():
            other.execute(opening)
            other.execute(writing)
        return reconcile(database)

    monkeypatch.setattr("records.management.commands.verify.reconcile", meanwhile)
    with databases.connect("default") as unfinished:
        unfinished.execute("BEGIN")
        unfinished.execute(opening)
        unfinished.execute(writing)
        code, said, _ = verified()

    assert (code, "chain kt: 3 entries hold" in said) == (0, True)


def test_a_broken_trail_ends_with_one_and_names_the_first_broken_place_with_both_values(three_entries):
    with databases.connect("superuser") as admin:
        admin.execute("ALTER TABLE records_seal DISABLE TRIGGER USER")
        admin.execute("UPDATE records_seal SET digest = repeat('0', 64) WHERE chain = 'kt' AND position = 2")
        admin.execute("ALTER TABLE records_seal ENABLE ALWAYS TRIGGER refuse_update")
        admin.execute("ALTER TABLE records_seal ENABLE ALWAYS TRIGGER refuse_delete")
        admin.execute("ALTER TABLE records_seal ENABLE ALWAYS TRIGGER refuse_truncate")

    code, said, _ = verified()

    assert code == 1
    assert "chain kt: 1 entries hold" in said
    assert "BROKEN  chain kt, entry 2: the digest of the stored entry" in said
    assert f"found    {'0' * 64}" in said
    assert said.endswith("Broken in 1 places; the first is chain kt, entry 2.\n")


def test_a_filed_document_whose_bytes_were_swapped_is_named(three_entries):
    with databases.connect("superuser") as admin:
        admin.execute("ALTER TABLE records_document DISABLE TRIGGER USER")
        admin.execute("ALTER TABLE records_document DROP CONSTRAINT document_digest_fits_its_body")
        admin.execute(
            "INSERT INTO records_document "
            "(digest, operator_id, about, title, media_type, size, renderer, body, salt, filed_at) "
            "VALUES (repeat('a', 64), 'kt', 'load:1', 't', 'application/pdf', 3, '', '\\x616263', "
            "'\\x00112233445566778899aabbccddeeff', now())"
        )

    code, said, _ = verified()

    assert code == 1
    assert f"BROKEN  document {'a' * 64}: the digest of its bytes" in said


def test_a_database_that_cannot_be_reached_ends_with_two(fresh_database):
    connection = connections["default"]
    connection.close()
    place = connection.settings_dict["NAME"]
    connection.settings_dict["NAME"] = "no-such-database"

    try:
        code, _, complaint = verified()
    finally:
        connection.settings_dict["NAME"] = place

    assert code == 2
    assert complaint.startswith("Could not verify: ")
