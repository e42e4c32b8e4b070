"""The seal: last of all, gapless, in the order of commits, and without a deadlock."""

import threading
import time

import psycopg
import pytest

from records.act import _SEAL
from records.reconcile import reconcile
from records.verify import follow_chains
from tests import databases
from tests.records.scratch import put

pytestmark = pytest.mark.usefixtures("scratch_tables")

OPEN = "SELECT act_open(%s, 'note-thing', 'service', 'service:client', '', '', 'thing:1')"
PUT = "INSERT INTO scratch_thing (operator_id, what) VALUES (%s, %s)"


def start(*workers: threading.Thread) -> None:
    for worker in workers:
        worker.start()
    for worker in workers:
        worker.join(timeout=60)
    assert not [worker for worker in workers if worker.is_alive()]


def test_many_clients_on_one_chain_leave_it_without_gaps_and_in_the_order_of_their_commits():
    clients, each, failures = 6, 25, []

    def client(number: int) -> None:
        try:
            with databases.connect("default") as connection:
                for turn in range(each):
                    with connection.transaction():
                        connection.execute(OPEN, ["busy"])
                        connection.execute(PUT, ["busy", f"{number}/{turn}"])
                        time.sleep(0.001 * (number % 3))
        except psycopg.Error as error:
            failures.append(error)

    start(*(threading.Thread(target=client, args=(number,)) for number in range(clients)))

    assert failures == []
    with databases.connect("superuser") as admin:
        places = admin.execute(
            "SELECT position FROM records_seal WHERE chain = 'busy' ORDER BY position"
        ).fetchall()
        # xmin rises with the order in which transactions got their number; what counts is that nobody linked
        # to a seal that was not yet committed: each link's predecessor is the one before, with its digest.
        unlinked = admin.execute(
            "SELECT count(*) FROM records_seal s "
            "JOIN records_seal b ON b.chain = s.chain AND b.position = s.position - 1 "
            "WHERE s.chain = 'busy' AND s.previous <> b.digest"
        ).fetchone()
    assert [place for (place,) in places] == list(range(1, clients * each + 1))
    assert unlinked == (0,)
    assert follow_chains().broken == ()
    assert reconcile() == ()


def test_whoever_commits_later_stands_later_even_if_its_act_began_first():
    with databases.connect("default") as early, databases.connect("default") as late:
        early.execute("BEGIN")
        first = early.execute(OPEN, ["order"]).fetchone()
        late.execute("BEGIN")
        late.execute(OPEN, ["order"])
        late.execute(PUT, ["order", "second to begin"])
        late.execute("COMMIT")
        early.execute(PUT, ["order", "first to begin"])
        early.execute("COMMIT")

    with databases.connect("superuser") as admin:
        words = admin.execute(
            "SELECT c.image::jsonb ->> 'what' FROM records_seal s "
            "JOIN records_change c ON c.act_id = s.act_id "
            "WHERE s.chain = 'order' ORDER BY s.position"
        ).fetchall()
    assert first is not None
    assert words == [("second to begin",), ("first to begin",)]


def test_the_seal_comes_after_the_deferred_foreign_key_checks_so_a_held_parent_row_is_no_deadlock():
    """One holds the parent row and then seals; the other's foreign-key check waits for that row at commit.

    A seal in one stage would take the chain's lock before the check, and the two would wait for each other.
    """
    with databases.connect("owner") as owner:
        owner.execute("BEGIN")
        owner.execute(OPEN, ["kt"])
        owner.execute("INSERT INTO scratch_thing (id, operator_id) VALUES (5001, 'kt')")
        owner.execute("COMMIT")
    failures, held, inserted = [], threading.Event(), threading.Event()

    def holder() -> None:
        try:
            # The owner, since the service role has no right on this table that lets it lock a row.
            with databases.connect("owner") as connection, connection.transaction():
                connection.execute("SELECT FROM scratch_thing WHERE id = 5001 FOR UPDATE")
                connection.execute(OPEN, ["kt"])
                connection.execute(PUT, ["kt", "holder"])
                held.set()
                inserted.wait(20)
                time.sleep(0.5)  # the other one is now waiting inside its commit
        except psycopg.Error as error:
            failures.append(error)

    def child() -> None:
        try:
            held.wait(20)
            with databases.connect("default") as connection, connection.transaction():
                connection.execute(OPEN, ["kt"])
                connection.execute("INSERT INTO scratch_part VALUES (5001, 1, 'kt')")
                inserted.set()
        except psycopg.Error as error:
            failures.append(error)

    start(threading.Thread(target=holder), threading.Thread(target=child))

    assert failures == []


def test_the_same_holds_when_the_checks_are_asked_for_at_the_end_of_an_act():
    """As above, through the exit of `act()`: SET CONSTRAINTS runs the checks first and the seal last."""
    failures, held, inserted = [], threading.Event(), threading.Event()
    with databases.connect("owner") as owner:
        owner.execute("BEGIN")
        owner.execute(OPEN, ["kt"])
        owner.execute("INSERT INTO scratch_thing (id, operator_id) VALUES (5002, 'kt')")
        owner.execute("COMMIT")

    def holder() -> None:
        try:
            with databases.connect("owner") as connection, connection.transaction():
                connection.execute("SELECT FROM scratch_thing WHERE id = 5002 FOR UPDATE")
                held.set()
                inserted.wait(20)
                time.sleep(0.5)
                connection.execute(OPEN, ["kt"])
                connection.execute(PUT, ["kt", "holder"])
                connection.execute(_SEAL)
        except psycopg.Error as error:
            failures.append(error)

    def child() -> None:
        try:
            held.wait(20)
            with databases.connect("default") as connection, connection.transaction():
                connection.execute(OPEN, ["kt"])
                connection.execute("INSERT INTO scratch_part VALUES (5002, 1, 'kt')")
                inserted.set()
                connection.execute(_SEAL)
        except psycopg.Error as error:
            failures.append(error)

    start(threading.Thread(target=holder), threading.Thread(target=child))

    assert failures == []


def test_an_old_act_with_the_transaction_number_of_today_is_not_taken_for_the_open_one():
    """After a restore transaction numbers start low again, so an old act may carry the number of a new
    transaction.
    """
    with databases.connect("superuser") as admin:
        admin.execute("BEGIN")
        admin.execute("ALTER TABLE records_act DISABLE TRIGGER refuse_update")
        admin.execute("UPDATE records_act SET txid = pg_current_xact_id()")
        with pytest.raises(psycopg.Error, match="with no open act"):
            admin.execute(PUT, ["kt", "x"])
        admin.execute("ROLLBACK")


def test_a_commit_that_cannot_be_sealed_does_not_happen():
    with databases.connect("superuser") as admin:
        admin.execute("ALTER TABLE records_seal ADD CONSTRAINT no_more CHECK (chain <> 'kt') NOT VALID")
        with (
            pytest.raises(psycopg.Error, match="no_more"),
            databases.connect("default") as connection,
            connection.transaction(),
        ):
            connection.execute(OPEN, ["kt"])
            connection.execute(PUT, ["kt", "never"])
        admin.execute("ALTER TABLE records_seal DROP CONSTRAINT no_more")

        assert admin.execute("SELECT count(*) FROM scratch_thing WHERE what = 'never'").fetchone() == (0,)


def test_a_write_outside_an_act_is_refused_for_psycopg_as_for_django():
    with databases.connect("default") as connection, pytest.raises(psycopg.Error) as refused:
        connection.execute(PUT, ["kt", "x"])

    assert refused.value.sqlstate == "TB001"
    with pytest.raises(Exception, match="with no open act"):
        put()
