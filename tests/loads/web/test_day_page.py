"""The day's loads: by departure, of the own operator only, on the operator's own clock."""

from zoneinfo import ZoneInfo

import pytest
from django.utils import timezone

from loads.actions.revise_load import revise_load
from loads.actions.submit_load import submit_load
from tests.cast import actor, browser, cast, strangers
from tests.loads.making import accepted, load_document, outside_document, submitted
from tests.makers import make_empty_weight, ready_aircraft
from tests.reading_pages import Page

pytestmark = pytest.mark.django_db
DAY = "/?day=2026-12-01"


def flight(people, reference, departure):
    return load_document(people)["flight"] | {"reference": reference, "departure": departure}


def shown(person, path=DAY):
    return Page(browser(person).get(path))


def test_loads_stand_in_the_order_of_departure_with_both_clocks(people) -> None:
    submitted(people, flight=flight(people, "KT-LATE", "2026-12-01T16:00:00-07:00"))
    submitted(people, flight=flight(people, "KT-EARLY", "2026-12-01T06:05:00-07:00"))
    submitted(people, flight=flight(people, "KT-NOON", "2026-12-01T19:00:00Z"))

    words = shown(people.auditor).words

    places = [words.index(reference) for reference in ("KT-EARLY", "KT-NOON", "KT-LATE")]
    assert places == sorted(places)
    assert "06:05 13:05 UTC" in words
    assert "3 loads standing, all within limits." in words


def test_the_day_is_that_of_the_operators_clock(people) -> None:
    submitted(people, flight=flight(people, "KT-LAST", "2026-12-01T23:59:00-07:00"))
    submitted(people, flight=flight(people, "KT-NEXT", "2026-12-02T00:00:00-07:00"))

    first, second = shown(people.auditor).words, shown(people.auditor, "/?day=2026-12-02").words

    assert ("KT-LAST" in first, "KT-NEXT" in first) == (True, False)
    assert ("KT-LAST" in second, "KT-NEXT" in second) == (False, True)


def test_every_line_says_verdict_state_and_nearest_limits(people) -> None:
    accepted(people, None)
    submit_load(outside_document(people), by=actor(people.preparer))

    page = shown(people.auditor)

    assert "2 loads standing, 1 not within limits." in page.words
    assert "within" in page.words
    assert "outside" in page.words
    assert "accepted" in page.words
    assert page.links["No. 1"].endswith("/manifest")
    assert page.links["Q9-KTB"].startswith("/loads/")


def test_of_many_limits_in_the_way_two_are_told_and_the_others_counted(people) -> None:
    document = outside_document(people)
    document["items"][0]["weight"] = {"value": "2500", "unit": "lb"}
    current = submit_load(document, by=actor(people.preparer))
    broken = [check for check in current.result()["checks"] if check["result"] != "pass"]
    assert len(broken) > 2

    words = shown(people.auditor).words

    assert f"{broken[1]['margin_text']} and {len(broken) - 2} more in the way".casefold() in words.casefold()
    assert broken[2]["margin_text"].casefold() not in words.casefold()


def test_a_replaced_load_is_shown_and_not_counted(people) -> None:
    first = submitted(people)
    revise_load(
        first.load.id, load_document(people), reason="one bag less", seen="1", by=actor(people.preparer)
    )

    page = shown(people.auditor)

    assert "1 load standing, all within limits." in page.words
    assert "superseded" in page.words


def test_a_stale_load_says_so(people) -> None:
    current = submitted(people)
    make_empty_weight(people, current.load.aircraft)

    assert "stale: assess again" in shown(people.auditor).words


def test_another_operators_loads_are_not_there(people) -> None:
    submitted(people)

    page = shown(strangers().pilot)

    assert "No load is declared for this day." in page.words
    assert "KT-214" not in page.words


def test_an_operator_of_the_same_registration_sees_its_own(people) -> None:
    submitted(people)
    others = cast("heron-test")
    ready_aircraft(others)
    submitted(others, flight=flight(others, "HN-1", "2026-12-01T10:00:00-07:00"))

    page = shown(others.auditor)

    assert "HN-1" in page.words
    assert "KT-214" not in page.words
    assert "1 load standing" in page.words


@pytest.mark.parametrize(
    "nonsense",
    ["yesterday", "2026-13-01", "0001-01-01", "9999-12-31", "", "2026-12-01T00:00", "%00", "9" * 5000, "🛩"],
)
def test_a_day_that_is_none_shows_today(people, nonsense) -> None:
    today = timezone.now().astimezone(ZoneInfo(people.operator.time_zone)).date()

    page = Page(browser(people.auditor).get("/", {"day": nonsense}))

    assert page.status == 200
    assert page.h1 == f"Loads of {today:%A} {today.day} {today:%B %Y}"


def test_the_cautions_and_the_invention_are_said_beside_the_verdicts(people) -> None:
    submitted(people)

    words = shown(people.auditor).words

    assert "INVENTED DATA, NOT FOR FLIGHT" in words
    assert "Nothing that was not assessed is shown as passed" in words


def test_somebody_without_any_duty_sees_nothing(people) -> None:
    submitted(people)

    page = shown(people.idle)

    assert page.status == 403
    assert "holds no duty" in page.words
    assert "KT-214" not in page.words
