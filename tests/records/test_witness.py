"""What the witnesses keep of a row, and what they refuse."""

import json

import pytest
from django.db import IntegrityError, connection

from records.act import act
from records.guard import FixedForGood, NeverChanged
from records.models import Change, Seal
from tests import databases
from tests.records.scratch import AMANI, NOTE, count, run

pytestmark = pytest.mark.usefixtures("scratch_tables")

SALT = b"0123456789abcdef"


def changes(entry) -> list[tuple[str, str, dict]]:
    return [
        (one.row_key, one.operation, json.loads(one.image))
        for one in Change.objects.filter(act_id=entry.id).order_by("id")
    ]


def test_an_image_is_the_same_whatever_the_session_is_set_to():
    insert = (
        "INSERT INTO scratch_thing (operator_id, n, t, r, k) VALUES "
        "('kt', 1.500, timestamptz '2026-12-01 08:30:00.25-06', '{\"b\": 1, \"a\": [2]}', '\\xdead')"
    )
    with act(NOTE, by=AMANI, about="thing:1") as plain:
        run(insert)
    with act(NOTE, by=AMANI, about="thing:1") as strange:
        run(
            "SELECT set_config('TimeZone', 'Asia/Kolkata', true), set_config('DateStyle', 'German', true), "
            "set_config('bytea_output', 'escape', true)"
        )
        run(insert)

    (_, _, first), (_, _, second) = *changes(plain), *changes(strange)
    assert first | {"id": 0} == second | {"id": 0}
    assert first["t"] == "2026-12-01T14:30:00.25+00:00"
    assert first["k"] == "\\xdead"
    assert '"n": 1.500' in Change.objects.get(act_id=plain.id).image


def test_columns_named_like_the_words_of_the_witness_are_kept_as_columns():
    with act(NOTE, by=AMANI, about="thing:1") as entry:
        run("INSERT INTO scratch_thing (operator_id, n, s, c) VALUES ('kt', 7, 'es', 'ce')")

    ((_, _, image),) = changes(entry)
    assert (image["n"], image["s"], image["c"], image["operator_id"]) == (7, "es", "ce", "kt")


def test_a_key_of_several_columns_is_a_list():
    with act(NOTE, by=AMANI, about="thing:1") as entry:
        run("INSERT INTO scratch_thing (id, operator_id) VALUES (7001, 'kt')")
        run("INSERT INTO scratch_part VALUES (7001, 2, 'kt')")

    assert [key for key, _, _ in changes(entry)] == ["7001", "[7001, 2]"]


def test_a_statement_over_many_rows_leaves_one_change_for_each():
    with act(NOTE, by=AMANI, about="thing:1") as entry:
        run(
            "INSERT INTO scratch_thing (operator_id, what) "
            "SELECT 'kt', 'row ' || i FROM generate_series(1, 500) i"
        )

    assert Change.objects.filter(act_id=entry.id).count() == 500
    assert len(json.loads(Seal.objects.get(act_id=entry.id).entry)["changes"]) == 500


def test_personal_values_are_kept_as_salted_digests_and_the_salt_not_at_all():
    with act(NOTE, by=AMANI, about="person:1") as entry:
        run("INSERT INTO scratch_person VALUES (1, 'kt', 'L. Osei', '\\xfeed', 'secret', %s)", SALT)

    text = Seal.objects.get(act_id=entry.id).entry
    ((_, _, image),) = changes(entry)
    with databases.connect() as owner:
        wanted = owner.execute(
            "SELECT 'sha256:' || encode(sha256(%s || convert_to('L. Osei', 'UTF8')), 'hex'), "
            "'sha256:' || encode(sha256(%s || '\\xfeed'::bytea), 'hex')",
            [SALT, SALT],
        ).fetchone()
    assert (image["name"], image["face"]) == wanted
    assert image["password"] == "changed"
    for secret in ("Osei", "feed", "secret", SALT.hex(), "salt"):
        assert secret not in text


def test_of_a_hidden_column_the_image_says_only_whether_it_changed():
    with act(NOTE, by=AMANI, about="person:2"):
        run("INSERT INTO scratch_person VALUES (2, 'kt', 'M. Dravo', NULL, 'one', %s)", SALT)
    with act(NOTE, by=AMANI, about="person:2") as entry:
        run("UPDATE scratch_person SET password = 'two' WHERE id = 2")
        run("UPDATE scratch_person SET name = 'M. Dravo-Osei' WHERE id = 2")

    words = [image["password"] for _, _, image in changes(entry)]
    assert words == ["changed", "unchanged"]


@pytest.mark.parametrize("salt", [None, b"short"])
def test_a_personal_value_without_a_long_salt_is_refused(salt):
    with pytest.raises(IntegrityError), act(NOTE, by=AMANI, about="person:3"):
        run("INSERT INTO scratch_person VALUES (3, 'kt', 'M. Dravo', NULL, 'one', %s)", salt)


def test_an_insert_that_becomes_an_update_is_witnessed_as_what_it_was():
    upsert = (
        "INSERT INTO scratch_person VALUES (10, 'kt', 'A', NULL, '', %s), (11, 'kt', 'B', NULL, '', %s) "
        "ON CONFLICT (id) DO UPDATE SET name = excluded.name"
    )
    with act(NOTE, by=AMANI, about="person:10"):
        run("INSERT INTO scratch_person VALUES (10, 'kt', 'Z', NULL, '', %s)", SALT)
    with act(NOTE, by=AMANI, about="person:10") as entry:
        run(upsert, SALT, SALT)

    assert sorted((key, operation) for key, operation, _ in changes(entry)) == [
        ("10", "update"),
        ("11", "insert"),
    ]


def test_the_key_of_a_row_may_not_change():
    with act(NOTE, by=AMANI, about="person:20"):
        run("INSERT INTO scratch_person VALUES (20, 'kt', 'A', NULL, '', %s)", SALT)

    with (
        pytest.raises(FixedForGood, match="the key of a row of scratch_person may not change"),
        act(NOTE, by=AMANI, about="person:20"),
    ):
        run("UPDATE scratch_person SET id = 21 WHERE id = 20")


def test_a_row_may_be_closed_once():
    with act(NOTE, by=AMANI, about="span:1"):
        run(
            "INSERT INTO scratch_span VALUES (1, 'kt', NULL, '[2026-01-01,)', 'a'), "
            "(2, 'kt', NULL, '[2026-01-01,infinity)', 'b')"
        )
    with act(NOTE, by=AMANI, about="span:1") as entry:
        run("UPDATE scratch_span SET known = tstzrange(lower(known), '2026-06-01')")

    assert len(changes(entry)) == 2
    with pytest.raises(FixedForGood, match="closed once"), act(NOTE, by=AMANI, about="span:1"):
        run("UPDATE scratch_span SET known = tstzrange(lower(known), '2026-07-01') WHERE id = 1")


@pytest.mark.parametrize(
    "setting",
    [
        "known = '[2026-02-01,2026-06-01)'",  # the beginning moves
        "known = '[2026-01-01,)'",  # it stays open
        "known = NULL",
        "known = 'empty'",
        "what = 'other', known = '[2026-01-01,2026-06-01)'",
    ],
)
def test_nothing_but_the_end_of_an_open_row_may_change(setting):
    with databases.connect() as owner:  # the owner holds every right; the guard holds all the same
        owner.execute("BEGIN")
        owner.execute("SELECT act_open('kt', 'note-thing', 'person', 'person:7', '', '', 'span:1')")
        owner.execute("INSERT INTO scratch_span VALUES (50, 'kt', NULL, '[2026-01-01,)', 'a')")
        with pytest.raises(
            Exception, match="may be closed once, and nothing else of it may change"
        ) as refused:
            owner.execute(f"UPDATE scratch_span SET {setting} WHERE id = 50")
        assert refused.value.sqlstate == "TB005"
        owner.execute("ROLLBACK")


def test_a_delete_that_cascades_is_refused_and_nothing_is_gone():
    with act(NOTE, by=AMANI, about="thing:8001"):
        run("INSERT INTO scratch_thing (id, operator_id) VALUES (8001, 'kt')")
        run("INSERT INTO scratch_part VALUES (8001, 1, 'kt')")
    before = (count("scratch_thing"), count("scratch_part"))

    with databases.connect() as owner:
        owner.execute(
            "BEGIN; SELECT act_open('kt', 'note-thing', 'person', 'person:7', '', '', 'thing:8001')"
        )
        with pytest.raises(Exception, match="DELETE is refused: rows of scratch_thing"):
            owner.execute("DELETE FROM scratch_thing WHERE id = 8001")
        owner.execute("ROLLBACK")

    assert (count("scratch_thing"), count("scratch_part")) == before


def test_a_guard_without_its_arguments_lets_nothing_pass():
    with databases.connect() as owner:
        owner.execute("BEGIN; CREATE TABLE bare (id int, operator_id text)")
        owner.execute(
            "CREATE TRIGGER witness_insert AFTER INSERT ON bare REFERENCING NEW TABLE AS new_rows "
            "FOR EACH STATEMENT EXECUTE FUNCTION witness_insert()"
        )
        owner.execute("SELECT act_open('kt', 'note-thing', 'person', 'person:7', '', '', 'thing:1')")
        with pytest.raises(Exception, match="the guard of bare is not set up as it must be") as refused:
            owner.execute("INSERT INTO bare VALUES (1, 'kt')")
        assert refused.value.sqlstate == "TB006"
        owner.execute("ROLLBACK")


@pytest.mark.parametrize(
    ("definition", "complaint"),
    [
        ("'nowhere', key => '{id}', mode => 'append', operator => 'o'", "not an ordinary table"),
        ("'odd', key => '{}', mode => 'append', operator => 'o'", "has no key"),
        ("'odd', key => '{id}', mode => 'append', operator => ''", "no column says whose"),
        ("'odd', key => '{id}', mode => 'append', operator => 'nobody'", "no column nobody"),
        ("'odd', key => '{id}', mode => 'sometimes', operator => 'o'", "its mode is none of"),
        ("'odd', key => '{id}', mode => 'close-once', operator => 'o'", "closing columns go with close-once"),
        (
            "'odd', key => '{id}', mode => 'append', operator => 'o', closes => '{p}'",
            "closing columns go with",
        ),
        ("'odd', key => '{id}', mode => 'append', operator => 'o', personal => '{p}'", "need a column salt"),
    ],
)
def test_a_table_that_cannot_be_guarded_as_asked_is_refused(definition, complaint):
    with databases.connect() as owner:
        owner.execute("BEGIN; CREATE TABLE odd (id int, o text, p text)")
        with pytest.raises(Exception, match=complaint) as refused:
            owner.execute(f"SELECT guard_table({definition})")
        assert refused.value.sqlstate == "TB006"
        owner.execute("ROLLBACK")


def test_an_append_only_table_refuses_an_update_even_by_its_owner_inside_an_act():
    with databases.connect() as owner:
        owner.execute("BEGIN; SELECT act_open('kt', 'note-thing', 'person', 'person:7', '', '', 'thing:1')")
        with pytest.raises(Exception, match="UPDATE is refused: rows of scratch_thing") as refused:
            owner.execute("UPDATE scratch_thing SET what = 'x'")
        assert refused.value.sqlstate == NeverChanged.sqlstate
        owner.execute("ROLLBACK")


def test_the_right_to_update_a_row_that_closes_is_on_that_column_alone():
    with connection.cursor() as cursor:
        cursor.execute(
            "SELECT has_table_privilege('scratch_span', 'UPDATE'), "
            "has_column_privilege('scratch_span', 'known', 'UPDATE'), "
            "has_column_privilege('scratch_span', 'what', 'UPDATE')"
        )
        assert cursor.fetchone() == (False, True, False)
