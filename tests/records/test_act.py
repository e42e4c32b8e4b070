"""The door: an act opens, its writer writes, it is sealed; everything else is refused."""

from uuid import uuid4

import pytest
from django.db import IntegrityError, connection, transaction

from records.act import act, request_id, transaction_for_acts
from records.actor import Actor
from records.guard import ActMisplaced, NoOpenAct, OtherOperator
from records.kind import Kind
from records.models import Act, Change, Name, Seal
from records.queries import seal_of
from records.refusal import NotAllowed
from tests import databases
from tests.records.scratch import AMANI, HOUSE, IDLE, NOTE, OTHER, count, put, run

pytestmark = pytest.mark.usefixtures("scratch_tables")


def test_an_act_with_one_row_is_sealed_with_that_row():
    with act(NOTE, by=AMANI, about="thing:1", reason="because") as entry:
        number = put("hammer")

    seal = Seal.objects.get(act_id=entry.id)
    assert f'"table":"scratch_thing","key":"{number}","operation":"insert"' in seal.entry
    assert '"what": "hammer"' in seal.entry
    assert '"reason":"because"' in seal.entry
    assert (entry.chain, entry.kind, entry.at.utcoffset().total_seconds()) == ("kt", "note-thing", 0)


def test_an_act_that_writes_nothing_is_sealed_too():
    with act(NOTE, by=AMANI, about="thing:1") as entry:
        pass

    assert Seal.objects.get(act_id=entry.id).entry.endswith('"changes":[]}')


def test_a_seal_is_known_by_its_act_and_links_to_the_one_before():
    with act(NOTE, by=AMANI, about="thing:1") as first:
        assert seal_of(first.id) is None
    with act(NOTE, by=AMANI, about="thing:1") as second:
        put()

    before, after = seal_of(first.id), seal_of(second.id)
    assert (after.position, after.previous) == (before.position + 1, before.digest)


def test_an_actor_without_the_right_opens_nothing():
    acts = Act.objects.count()

    with pytest.raises(NotAllowed) as refused, act(NOTE, by=IDLE, about="thing:1"):
        pytest.fail("the body must not run")

    assert refused.value.code == "act-not-allowed"
    assert Act.objects.count() == acts


def test_a_write_with_no_open_act_is_refused_and_changes_nothing():
    things = count("scratch_thing")

    with pytest.raises(NoOpenAct, match="a write to scratch_thing with no open act"), transaction_for_acts():
        put()

    assert count("scratch_thing") == things


def test_a_write_after_the_seal_of_its_act_is_refused():
    with pytest.raises(NoOpenAct), transaction_for_acts():
        with act(NOTE, by=AMANI, about="thing:1"):
            put()
        put("too late")

    assert run("SELECT count(*) FROM scratch_thing WHERE what = 'too late'") == [(0,)]


def test_an_act_inside_an_act_is_refused():
    with (
        pytest.raises(ActMisplaced, match="inside another act"),
        act(NOTE, by=AMANI, about="thing:1"),
        act(NOTE, by=AMANI, about="thing:2"),
    ):
        pytest.fail("the inner body must not run")


def test_an_act_inside_an_act_is_refused_by_the_database_as_well():
    opening = "SELECT act_open('kt', 'note-thing', 'person', 'person:7', '', 'pilot', 'thing:2')"

    with pytest.raises(ActMisplaced, match="opened inside another act"), act(NOTE, by=AMANI, about="thing:1"):
        run(opening)


def test_an_act_inside_a_plain_transaction_is_refused():
    with (
        transaction.atomic(),
        pytest.raises(ActMisplaced, match="plain transaction"),
        act(NOTE, by=AMANI, about="thing:1"),
    ):
        pytest.fail("the body must not run")


def test_an_act_inside_a_plain_block_inside_the_transaction_for_acts_is_refused():
    with (
        transaction_for_acts(),
        transaction.atomic(),
        pytest.raises(ActMisplaced),
        act(NOTE, by=AMANI, about="thing:1"),
    ):
        pytest.fail("the body must not run")


def test_acts_one_after_the_other_in_one_transaction_are_each_sealed():
    with transaction_for_acts():
        with act(NOTE, by=AMANI, about="thing:1") as first:
            put()
        with act(NOTE, by=AMANI, about="thing:2") as second:
            put()
            put()

    assert [Change.objects.filter(act_id=one.id).count() for one in (first, second)] == [1, 2]
    assert seal_of(second.id).position == seal_of(first.id).position + 1


def test_a_failure_in_the_body_takes_the_act_and_its_rows_back():
    before = (count("scratch_thing"), Act.objects.count(), Seal.objects.count(), Name.objects.count())

    with pytest.raises(ZeroDivisionError), act(NOTE, by=OTHER, about="thing:1"):
        put(operator="zz")
        raise ZeroDivisionError

    assert (count("scratch_thing"), Act.objects.count(), Seal.objects.count(), Name.objects.count()) == before


def test_a_failed_act_takes_the_whole_transaction_for_acts_with_it():
    things = count("scratch_thing")

    with pytest.raises(ZeroDivisionError), transaction_for_acts():
        with act(NOTE, by=AMANI, about="thing:1"):
            put()
        with act(NOTE, by=AMANI, about="thing:2"):
            raise ZeroDivisionError

    assert count("scratch_thing") == things


def test_what_a_savepoint_took_back_is_not_in_the_entry():
    with act(NOTE, by=AMANI, about="thing:1") as entry:
        kept = put("kept")
        with pytest.raises(ZeroDivisionError), transaction.atomic():
            put("taken back")
            raise ZeroDivisionError

    assert [change.row_key for change in Change.objects.filter(act_id=entry.id)] == [str(kept)]


def test_a_broken_foreign_key_is_found_before_the_seal():
    seals = Seal.objects.count()

    with pytest.raises(IntegrityError), act(NOTE, by=AMANI, about="thing:1"):
        run("INSERT INTO scratch_part VALUES (999999, 1, 'kt')")

    assert Seal.objects.count() == seals


def test_a_row_of_another_operator_is_refused():
    with (
        pytest.raises(OtherOperator, match="an act of 'kt' may not write a row of 'zz'"),
        act(NOTE, by=AMANI, about="thing:1"),
    ):
        put(operator="zz")


def test_a_row_of_no_operator_is_refused():
    with pytest.raises(OtherOperator), act(NOTE, by=AMANI, about="thing:1"):
        put(operator=None)


def test_the_house_writes_the_first_rows_of_an_operator_and_none_after_its_chain_began():
    newcomer = Actor("newcomer", "person", "person:1", "", "operations manager", frozenset({NOTE.name}))
    with act(NOTE, by=HOUSE, about="operator:newcomer"):
        put(operator="newcomer")
    with act(NOTE, by=newcomer, about="thing:1"):
        put(operator="newcomer")

    with pytest.raises(OtherOperator), act(NOTE, by=HOUSE, about="operator:newcomer"):
        put(operator="newcomer")


def test_an_act_needs_read_committed():
    with pytest.raises(ActMisplaced, match="READ COMMITTED"), transaction_for_acts():
        run("SET TRANSACTION ISOLATION LEVEL REPEATABLE READ")
        with act(NOTE, by=AMANI, about="thing:1"):
            put()


def test_the_name_of_an_actor_stands_in_one_place_only_and_can_be_told_by_its_digest():
    with act(NOTE, by=AMANI, about="thing:1") as entry:
        put()
    with act(NOTE, by=AMANI, about="thing:1") as again:
        put()

    first, second = Act.objects.get(id=entry.id), Act.objects.get(id=again.id)
    kept = Name.objects.get(digest=first.name_digest)
    assert bytes(kept.name).decode() == "R. Amani"
    assert first.name_digest == second.name_digest
    assert "Amani" not in Seal.objects.get(act_id=entry.id).entry


def test_an_act_says_what_caused_it_and_in_which_request():
    cause = uuid4()
    worker = Actor("kt", "service", "service:worker", "", "worker", frozenset({NOTE.name}), caused_by=cause)
    token = request_id.set("req-42")

    try:
        with act(NOTE, by=worker, about="thing:1") as entry:
            pass
    finally:
        request_id.reset(token)

    assert f'"caused_by":"{cause}","request":"req-42"' in Seal.objects.get(act_id=entry.id).entry


def test_an_act_of_a_name_that_is_no_verb_and_object_is_refused_below_python_too():
    with pytest.raises(IntegrityError, match="act_kind_is_a_verb_and_object"), transaction_for_acts():
        run("SELECT act_open('kt', 'Note', 'person', 'person:7', '', 'pilot', 'thing:2')")


@pytest.mark.parametrize("values", [("", "a", "b"), ("kt", "", "b"), ("kt", "a", "")])
def test_an_act_without_chain_actor_or_subject_is_refused(values):
    with pytest.raises(IntegrityError, match="act_says_whose_by_whom_and_about_what"), transaction_for_acts():
        run("SELECT act_open(%s, 'note-thing', 'person', %s, '', 'pilot', %s)", *values)


def test_raw_sql_without_the_python_door_is_sealed_at_commit_all_the_same():
    with transaction.atomic():
        run("SELECT act_open('kt', 'note-thing', 'person', 'person:7', '', 'pilot', 'thing:raw')")
        put("raw")

    opened = Act.objects.get(about="thing:raw")
    assert seal_of(opened.id) is not None
    with databases.connect("superuser") as superuser:
        assert superuser.execute("SELECT count(*) FROM records_closing").fetchone() == (0,)


def test_an_act_inside_the_transaction_for_acts_is_closed_at_its_end_and_sealed_with_the_commit():
    with transaction_for_acts():
        with act(NOTE, by=AMANI, about="thing:1") as entry:
            number = put()
        assert seal_of(entry.id) is None
        with databases.connect("default") as other:  # while the chain is free for everybody else
            other.execute("SET lock_timeout = '5s'")
            other.execute("SELECT act_open('kt', 'note-thing', 'service', 'service:x', '', '', 'thing:2nd')")
        assert connection.in_atomic_block

    sealed, quicker = seal_of(entry.id), seal_of(Act.objects.get(about="thing:2nd").id)
    assert f'"table":"scratch_thing","key":"{number}"' in Seal.objects.get(act_id=entry.id).entry
    assert sealed.position > quicker.position


def test_an_act_closed_by_hand_takes_no_more_rows():
    with pytest.raises(NoOpenAct), act(NOTE, by=AMANI, about="thing:1"):
        put()
        run("SET CONSTRAINTS ALL IMMEDIATE")
        put("too late")

    assert run("SELECT count(*) FROM scratch_thing WHERE what = 'too late'") == [(0,)]


def test_kinds_are_the_permission():
    other = Kind("note-other-thing", "noted another thing")

    with pytest.raises(NotAllowed), act(other, by=AMANI, about="thing:1"):
        pytest.fail("the body must not run")
