"""Settings over the API and on their page: read by all, changed by a manager who saw the last version."""

import uuid

import pytest

from fleet.models import OperatorSettings
from tests.cast import api, browser, cast, get, strangers
from tests.makers import q
from tests.reading_pages import Page

pytestmark = pytest.mark.django_db
CHANGE = {"reason": "manual rev 6", "last_minute_bound": {"weight": q("30.0", "kg"), "persons": 1}}


def change(person, document=CHANGE, seen='"0"', **headers):
    headers = {"Idempotency-Key": str(uuid.uuid4())} | ({"If-Match": seen} if seen else {}) | headers
    return api(person).post("/api/v1/settings", document, format="json", headers=headers)


def test_a_change_is_answered_and_read_back_as_typed() -> None:
    people = cast()

    made = change(people.manager)
    read = get(api(people.auditor), "/settings")

    assert made.status_code == 201
    assert made["ETag"] == read["ETag"] == '"1"'
    assert made.json()["last_minute_bound"] == {"weight": {"value": "30.0", "unit": "kg"}, "persons": 1}
    assert read.json()["in_force"] == made.json()
    (version,) = read.json()["versions"]
    assert (version["entered_by"], version["reason"]) == (f"person:{people.manager.pk}", "manual rev 6")


def test_the_state_last_seen_is_asked_for() -> None:
    people = cast()
    change(people.manager)

    assert change(people.manager, seen=None).status_code == 428
    assert change(people.manager, seen='"0"').status_code == 412
    assert change(people.manager, seen='"1"').status_code == 201


def test_who_may_not_is_refused_and_other_operators_see_their_own() -> None:
    people, others = cast(), strangers()
    change(people.manager)

    assert change(people.pilot, seen='"1"').status_code == 403
    assert get(api(people.idle), "/settings").status_code == 403
    assert get(api(others.pilot), "/settings").json()["in_force"]["number"] == 0


def test_both_clocks_can_be_asked() -> None:
    people = cast()
    before = get(api(people.auditor), "/settings").json()["at"]
    change(people.manager, CHANGE | {"true_from": "2026-01-01T00:00:00Z"})

    then = get(api(people.auditor), f"/settings?at={before}").json()["in_force"]
    known = get(api(people.auditor), f"/settings?at={before}&as-known-at={before}").json()["in_force"]

    assert (then["number"], known["number"]) == (1, 0)


def test_the_page_changes_them_and_shows_every_version() -> None:
    people = cast()
    form = Page(browser(people.manager).get("/settings")).form("")

    sent = browser(people.manager).post(
        "/settings",
        form.filled(
            {
                "last_minute_weight": "60",
                "last_minute_persons": "2",
                "operations_mail": "ops@kestrel.example  duty@kestrel.example",
                "prepare_and_accept_by_one": "no",
                "reason": "manual rev 6",
            }
        ),
    )
    page = Page(browser(people.auditor).get("/settings"))

    assert sent.status_code == 302
    assert "60 lb and 2 persons, added up over a load" in page.words
    assert "another person prepares than accepts" in page.words
    assert "ops@kestrel.example, duty@kestrel.example" in page.words
    assert "manual rev 6" in page.words
    assert page.actions() == set()
    assert OperatorSettings.objects.get().weight_method == "weighed and declared weights"


@pytest.mark.parametrize(
    ("typed", "field"),
    [
        ({"last_minute_weight": "60"}, "last_minute_persons"),
        ({"last_minute_persons": "2"}, "last_minute_weight"),
        ({"last_minute_weight": "sixty", "last_minute_persons": "1"}, "last_minute_weight"),
        ({"last_minute_weight": "60", "last_minute_persons": "9999999999"}, "last_minute_persons"),
        ({"operations_mail": "nobody"}, "operations_mail"),
        ({"weighing_threshold_percent": "-1"}, "weighing_threshold_percent"),
        ({"true_from": "tomorrow"}, "true_from"),
        ({"reason": ""}, "reason"),
        ({"procedure": "\x00"}, "procedure"),
    ],
)
def test_what_makes_no_sense_stands_beside_its_field_with_all_that_was_typed(typed, field) -> None:
    people = cast()
    form = Page(browser(people.manager).get("/settings")).form("")

    page = Page(browser(people.manager).post("/settings", form.filled({"reason": "because"} | typed)))

    assert page.status == 422
    assert field in page.faults
    assert page.form("").values["procedure"] or "procedure" in typed
    assert not OperatorSettings.objects.exists()


def test_all_that_is_wrong_is_named_at_once() -> None:
    people = cast()
    form = Page(browser(people.manager).get("/settings")).form("")
    wrong = {
        "last_minute_weight": "abc",
        "last_minute_persons": "1",
        "operations_mail": "nobody",
        "reason": "x",
    }

    page = Page(browser(people.manager).post("/settings", form.filled(wrong)))

    assert set(page.faults) == {"last_minute_weight", "operations_mail"}
    assert "The fields that are wrong are marked below" in page.words


def test_who_saw_an_older_version_is_told() -> None:
    people = cast()
    form = Page(browser(people.manager).get("/settings")).form("")
    change(people.manager)

    page = Page(browser(people.manager).post("/settings", form.filled({"reason": "late"})))

    assert page.status == 412
    assert "Somebody changed the settings since they were read." in page.words
