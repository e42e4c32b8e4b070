"""Two at once: a new secret for one token, and two managers who take each other's duty."""

import threading
from concurrent.futures import ThreadPoolExecutor
from datetime import timedelta

import pytest
from django.db import connections
from django.utils import timezone

from fleet.actions.end_duty import end_duty
from fleet.actions.grant_duty import grant_duty
from fleet.actions.issue_token import issue_token
from fleet.actions.rotate_token import rotate_token
from fleet.models import Rotation
from fleet.queries.people import MANAGER, has_manager
from fleet.queries.tokens import secrets_of, token_of
from records.refusal import Refused
from tests.cast import actor, cast

pytestmark = pytest.mark.django_db(transaction=True)
DAY = timedelta(days=1)


def both(*steps):
    """What each of the steps, begun at the same moment, ends with: the code of its refusal, or done."""
    together = threading.Barrier(len(steps))

    def run(step):
        try:
            together.wait(timeout=30)
            step()
        except Refused as refused:
            return refused.code
        finally:
            connections.close_all()
        return "done"

    with ThreadPoolExecutor(len(steps)) as pool:
        return sorted(pool.map(run, steps))


def test_of_two_who_rotate_at_once_each_gets_a_secret_of_its_own_or_is_told():
    people = cast()
    may = frozenset({"read"})
    token = issue_token(
        actor(people.pilot), people.pilot, label="x", scopes=may, grantable=may, valid_for=DAY
    ).token
    by = actor(people.pilot)

    outcomes = both(*[lambda: rotate_token(by, token.pk, overlap=DAY, valid_for=DAY)] * 4)

    done = outcomes.count("done")
    assert done >= 1
    assert set(outcomes) <= {"done", "token-rotated-meanwhile"}
    assert sorted(Rotation.objects.values_list("number", flat=True)) == list(range(1, done + 1))
    now = timezone.now()
    serving = [one for one in secrets_of(token_of(people.operator.code, token.pk)) if one.ends_at > now]
    assert len(serving) == 2


def test_of_two_managers_who_end_each_others_duty_one_is_left():
    people = cast()
    grant_duty(actor(people.manager), people.pilot, MANAGER)
    first, second = actor(people.manager), actor(people.pilot)

    outcomes = both(
        lambda: end_duty(first, people.pilot, MANAGER),
        lambda: end_duty(second, people.manager, MANAGER),
    )

    assert outcomes == ["done", "last-manager"]
    assert has_manager(people.operator.code, timezone.now())


def test_a_manager_stays_while_the_other_one_is_to_go_tomorrow():
    people = cast()
    grant_duty(actor(people.manager), people.pilot, MANAGER)
    end_duty(actor(people.manager), people.pilot, MANAGER, since=timezone.now() + DAY)

    with pytest.raises(Refused) as refused:
        end_duty(actor(people.pilot), people.manager, MANAGER)

    assert refused.value.code == "last-manager"
