"""The log of sign-ins: written through one function, never changed, bounded, sealed each minute; whoever
alters it is found out and the row is named.
"""

import threading
from concurrent.futures import ThreadPoolExecutor
from itertools import pairwise

import psycopg
import pytest
from django.db import DatabaseError, connection, connections, transaction

from records.access_chain import AccessRow, digest_of_row
from records.access_log import broken_rows, note, seal_log
from records.models import Access, AccessSeal, Act, Seal
from records.tasks import seal_access_log
from tests import databases

pytestmark = pytest.mark.django_db(transaction=True)


def fill(most: int = 6, *, sealed_at: tuple[int, ...] = (3, 6)) -> None:
    for number in range(1, most + 1):
        assert note("sign-in", operator="kt", key=f"person:{number}", address="192.0.2.7") == number
        if number in sealed_at:
            assert seal_log() == 1


def refused_as(statement: str, alias: str) -> str:
    with databases.connect(alias) as own:
        try:
            own.execute(statement)
        except psycopg.Error as error:
            return error.sqlstate or "?"
    return "done"


def test_rows_are_numbered_without_gaps_and_each_names_the_one_before():
    fill(4, sealed_at=())
    note("sign-in-failed", operator=None, typed="nobody")

    rows = list(Access.objects.filter(chain="kt").order_by("number"))

    assert [row.number for row in rows] == [1, 2, 3, 4]
    assert [row.previous for row in rows] == [None, *(row.digest for row in rows[:-1])]
    assert Access.objects.get(chain="house").number == 1
    for row in rows:
        plain = AccessRow(
            *(getattr(row, name) for name in AccessRow.__dataclass_fields__)  # the same names
        )
        assert digest_of_row(plain) == row.digest


def test_what_was_typed_and_where_from_stand_nowhere_in_clear():
    note("sign-in-failed", operator=None, typed="r.amani my-secret", address="192.0.2.7")
    note("sign-in-failed", operator=None, typed="r.amani my-secret", address="2001:db8::1")
    note("sign-in-failed", operator=None, typed="other", address="192.0.2.7")

    first, again, other = Access.objects.order_by("number")

    with connection.cursor() as cursor:
        cursor.execute("SELECT string_agg(a::text, '') FROM records_access a")
        whole = cursor.fetchone()[0]
    assert not [word for word in ("amani", "192.0.2.7", "2001:db8") if word in whole]
    assert first.typed == again.typed != other.typed
    assert first.origin == other.origin != again.origin


@pytest.mark.parametrize(
    "statement",
    [
        "UPDATE records_access SET what = 'sign-in'",
        "DELETE FROM records_access",
        "TRUNCATE records_access",
        "UPDATE records_accessseal SET number = 1",
        "DELETE FROM records_accessseal",
        "TRUNCATE records_accessseal",
    ],
)
def test_nobody_changes_a_row(statement):
    fill(3)

    assert refused_as(statement, "default") == "42501"
    assert refused_as(statement, "owner") == "TB004"
    assert refused_as(statement, "superuser") == "TB004"


def test_the_one_function_is_the_only_way_in():
    fill(3)

    forged = "INSERT INTO records_access SELECT * FROM records_access"
    assert refused_as(forged, "default") == "42501"
    assert refused_as("SELECT access_digest('a',1,now(),'','','','','','')", "default") == "42501"
    assert refused_as(
        "INSERT INTO records_accessseal (operator_id, number, digest) VALUES ('kt', 9, '')", "default"
    )
    with pytest.raises(DatabaseError, match="access_what_is_known"):
        note("made-up", operator="kt")
    with pytest.raises(DatabaseError, match="access_key_is_a_person_or_a_token"):
        note("sign-in", operator="kt", key="R. Amani")


def test_a_scheduled_act_seals_each_log_that_grew_and_no_other():
    fill(2, sealed_at=())
    note("sign-in-failed", operator=None, typed="x")

    assert seal_access_log() == 2
    assert seal_access_log() == 0
    note("sign-out", operator="kt", key="person:1")
    assert seal_access_log() == 1

    acts = Act.objects.filter(kind="seal-access-log").order_by("at")
    assert [(one.chain, one.about, one.actor_kind) for one in acts] == [
        ("house", "access-log:house", "service"),
        ("kt", "access-log:kt", "service"),
        ("kt", "access-log:kt", "service"),
    ]
    entry = Seal.objects.filter(chain="kt").latest("position").entry
    assert Access.objects.get(chain="kt", number=3).digest in entry
    assert AccessSeal.objects.get(operator_id="kt", number=3)


def test_a_stranger_costs_a_few_rows_and_one_line_that_says_there_were_more():
    numbers = [note("sign-in-failed", operator=None, typed=f"guess {each}") for each in range(60)]

    assert numbers[:21] == list(range(1, 22))
    assert set(numbers[21:]) == {None}
    assert Access.objects.get(number=21).what == "more-not-listed"


def test_a_flood_of_failures_does_not_hide_the_sign_in_that_works():
    for _ in range(30):
        note("locked-out", operator="kt", key="person:1")

    assert note("sign-in", operator="kt", key="person:1") is not None
    assert note("sign-in-failed", operator="kt", key="person:2") is not None


def test_the_use_of_a_token_is_noted_once_in_five_minutes():
    assert note("token-used", operator="kt", key="token:1") == 1
    assert note("token-used", operator="kt", key="token:1") is None
    assert note("token-used", operator="kt", key="token:2") == 2


def test_the_log_holds_together_when_many_write_at_once():
    together = threading.Barrier(4)

    def write(person):
        try:
            together.wait(timeout=30)
            for _ in range(10):
                note("sign-in", operator="kt", key=f"person:{person}")
                seal_log()
        finally:
            connections.close_all()

    with ThreadPoolExecutor(4) as pool:
        list(pool.map(write, range(4)))

    rows = list(Access.objects.order_by("number"))
    assert [row.number for row in rows] == list(range(1, 41))
    assert all(later.at >= earlier.at for earlier, later in pairwise(rows))
    assert list(broken_rows()) == []


def test_a_note_stays_when_the_work_after_it_is_undone_only_outside_its_transaction():
    note("sign-in-failed", operator="kt", key="person:1")

    with pytest.raises(ZeroDivisionError), transaction.atomic():
        note("sign-in-failed", operator="kt", key="person:1")
        1 / 0  # noqa: B018  # any failure

    assert Access.objects.count() == 1
