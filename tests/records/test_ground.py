"""The ground the tests stand on: who they are to the database, and that nothing is left behind."""

import pytest
from django.db import connection

from records.act import act
from records.actor import Actor
from records.guard import missing_guards
from records.kind import Kind
from records.models import Act, GuardedTable

TRY = Kind("try-ground", "tried the ground")
SETUP = Actor(None, "service", "service:setup", "", "set-up", frozenset({TRY.name}))


@pytest.mark.django_db
def test_tests_run_as_the_service_role():
    with connection.cursor() as cursor:
        cursor.execute("SELECT current_user, session_user")
        assert cursor.fetchone() == ("tarebook_service", "tarebook_service")


@pytest.mark.django_db
def test_an_act_in_a_test_that_never_commits_takes_the_same_path():
    with act(TRY, by=SETUP, about="ground:1") as entry:
        pass

    assert Act.objects.get(id=entry.id).seal.chain == "house"


@pytest.mark.django_db(transaction=True)
@pytest.mark.parametrize("turn", [1, 2])
def test_what_a_committing_test_wrote_is_gone_before_the_next_and_the_guards_stand(turn):
    assert Act.objects.filter(kind=TRY.name).count() == 0
    assert GuardedTable.objects.filter(name="records_act").exists()
    assert missing_guards() == ()

    with act(TRY, by=SETUP, about=f"ground:{turn}"):
        pass

    assert Act.objects.filter(kind=TRY.name).count() == 1
