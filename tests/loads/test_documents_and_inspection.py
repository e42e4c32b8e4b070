"""Manifests searched by number, aircraft, flight and day; what an inspector asks of a day and of all."""

from datetime import timedelta

import pytest
from django.utils import timezone

from fleet.actions.end_duty import end_duty
from fleet.queries.duties import holders_at
from loads.actions.file_manifest import manifest_bytes
from loads.actions.submit_load import submit_load
from loads.actions.withdraw_load import withdraw_load
from loads.models import Paper
from loads.queries.documents import Search, search_documents
from loads.queries.inspection import flights_without_manifest, loads_of_day, numbers_of
from tests.cast import Cast, actor, cast, strangers
from tests.loads.making import DEPARTURE_AT, accepted, load_document, outside_document, prepared, submitted
from tests.makers import ready_aircraft

pytestmark = pytest.mark.django_db
DAY = timedelta(days=1)


@pytest.fixture
def people() -> Cast:
    made = cast()
    ready_aircraft(made)
    return made


def flown(people, reference, departure="2026-12-01T08:30:00-06:00"):
    flight = load_document(people)["flight"] | {"reference": reference, "departure": departure}
    return accepted(people, prepared(people, submitted(people, flight=flight)))


def numbers(people, **search):
    return [one.paper.number for one in search_documents(people.operator.code, Search(**search)).manifests]


def test_documents_are_found_by_number_aircraft_flight_and_day(people) -> None:
    flown(people, "KT-214")
    flown(people, "KT-300", "2026-12-02T08:30:00-06:00")

    assert numbers(people) == [2, 1]
    assert numbers(people, number=1) == [1]
    assert numbers(people, number=3) == []
    assert numbers(people, registration="q9-ktb") == [2, 1]
    assert numbers(people, registration="Q9-KT") == []
    assert numbers(people, reference="kt-2") == [1]
    assert numbers(people, reference="KT-%") == []
    assert numbers(people, since=DEPARTURE_AT + DAY) == [2]
    assert numbers(people, until=DEPARTURE_AT + DAY) == [1]


def test_a_manifest_says_whether_it_is_printed_and_under_which_digest(people) -> None:
    current = flown(people, "KT-214")
    (before,) = search_documents(people.operator.code, Search()).manifests

    manifest_bytes(people.operator.code, current.load.id)

    (after,) = search_documents(people.operator.code, Search()).manifests
    assert (before.digest, before.filed_at) == (None, None)
    assert len(after.digest) == 64
    assert after.size > 1000


def test_pages_of_documents_follow_by_number(people) -> None:
    for number in range(3):
        flown(people, f"KT-{number}")

    first = search_documents(people.operator.code, Search(), most=2)
    second = search_documents(people.operator.code, Search(), after=first.after, most=2)

    assert [one.paper.number for one in first.manifests] == [3, 2]
    assert [one.paper.number for one in second.manifests] == [1]
    assert second.after is None


def test_another_operators_documents_are_not_found(people) -> None:
    flown(people, "KT-214")

    assert search_documents(strangers().operator.code, Search()).manifests == ()


def test_the_day_of_an_aircraft_has_its_loads_with_signatures_number_and_seal(people) -> None:
    current = flown(people, "KT-214")
    flown(people, "KT-LATER", "2026-12-02T08:30:00-06:00")

    (one,) = loads_of_day(current.load.aircraft, DEPARTURE_AT, DEPARTURE_AT + timedelta(hours=1))

    assert one.current.load.id == current.load.id
    assert [signature.meaning for signature in one.signatures] == ["prepared", "accepted"]
    assert one.paper.number == 1
    assert one.seal.act_id == one.paper.act


def test_flights_without_a_manifest_are_those_nobody_accepted_replaced_or_withdrew(people) -> None:
    flown(people, "KT-FLOWN")
    lacking = submit_load(outside_document(people), by=actor(people.preparer))
    gone = submitted(people)
    withdraw_load(gone.load.id, reason="not flown", seen="1", by=actor(people.preparer))

    found = flights_without_manifest(people.operator.code, DEPARTURE_AT - DAY, DEPARTURE_AT + DAY)

    assert [one.load.id for one in found] == [lacking.load.id]
    assert flights_without_manifest(people.operator.code, DEPARTURE_AT - DAY, DEPARTURE_AT) == ()
    assert flights_without_manifest(strangers().operator.code, DEPARTURE_AT - DAY, DEPARTURE_AT + DAY) == ()


def test_numbers_are_counted_and_found_unbroken(people) -> None:
    empty = numbers_of(people.operator.code)
    first = flown(people, "KT-1")
    flown(people, "KT-2")
    manifest_bytes(people.operator.code, first.load.id)

    found = numbers_of(people.operator.code)

    assert (empty.newest, empty.unbroken) == (0, True)
    assert (found.newest, found.first, found.last, found.filed) == (2, 1, 2, 1)
    assert found.unbroken
    assert Paper.objects.count() == 2


def test_who_held_a_duty_is_asked_of_an_instant(people) -> None:
    held = timezone.now()
    ended = end_duty(actor(people.manager), people.other_pilot, "pilot", reason="left")

    before, after = holders_at(people.operator.code, held), holders_at(people.operator.code, ended.since)

    assert [one.name for one in before["pilot"]] == ["R. Amani", "S. Vey"]
    assert [one.name for one in after["pilot"]] == ["R. Amani"]
    assert holders_at(people.operator.code, held - 365 * DAY) == {}
    assert people.idle not in {one for role in before.values() for one in role}
