"""Flights over midnight and approvals that come late: two clocks, and the local date where a rule speaks of
days.
"""

from datetime import datetime, timedelta

import pytest

from fleet.queries.provisions import provisions_at
from loads.queries.overtaken import database_time
from loads.queries.stale import stale_parts
from tests.cast import cast
from tests.fleet.papers import permitted, restrict
from tests.loads.test_restrictions_and_permits import LOWER, MORE, submitted, take_off
from tests.makers import ready_aircraft

pytestmark = pytest.mark.django_db


@pytest.fixture
def people():
    return cast()


@pytest.fixture
def aircraft(people):
    return ready_aircraft(people)


def test_a_flight_over_midnight_goes_by_the_instant_of_its_departure(people, aircraft) -> None:
    """A restriction from 1 December 00:00 UTC: 23:30 local of 30 November at UTC-6 is 05:30 UTC, so it binds;
    half an hour before midnight UTC it does not, however long the flight.
    """
    restrict(people, aircraft, LOWER, true_from="2026-12-01T00:00:00Z")

    bound = submitted(people, departure="2026-11-30T23:30:00-06:00", reference="A")
    free = submitted(people, departure="2026-11-30T23:30:00Z", reference="B")

    assert (take_off(bound)["limit"], take_off(free)["limit"]) == ("7000", "8750")


def test_an_approval_that_comes_late_flags_what_was_assessed_and_rewrites_nothing(people, aircraft) -> None:
    before = submitted(people)
    kept = (before.assessment.result, before.assessment.digest)
    known_before = database_time()
    permit = permitted(people, aircraft, MORE, true_from="2026-11-01T00:00:00Z")

    assert stale_parts(before, known_before) == ()
    assert stale_parts(before, database_time()) == ("permits",)
    before.assessment.refresh_from_db()
    assert (before.assessment.result, before.assessment.digest) == kept
    at = datetime.fromisoformat("2026-11-15T00:00:00+00:00")
    then = provisions_at(people.operator.code, aircraft, at, known_before)
    now = provisions_at(people.operator.code, aircraft, at, database_time() + timedelta(seconds=1))
    assert (then.permits, [one.id for one in now.permits]) == ((), [permit.id])
