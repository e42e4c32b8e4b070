"""What falls due of an aircraft: on its page and answer, and told once for each threshold."""

from datetime import UTC, datetime, timedelta
from zoneinfo import ZoneInfo

import pytest
from django.core import mail
from django.utils import timezone

from fleet.actions.approve_rules import approve_rules
from fleet.actions.change_settings import change_settings
from fleet.actions.enter_rules import enter_rules
from fleet.actions.tell_falling_due import mail_falling_due, tell_all_falling_due, threshold_passed
from fleet.models import DueNotice
from fleet.queries.falling_due import falling_due
from fleet.queries.settings import last_number
from fleet.settings_reading import read_settings
from fleet.tasks import mail_what_falls_due, tell_falling_due
from records.models import Act, Outbox, WebhookEvent
from records.webhooks.subscribe import subscribe
from tests.cast import actor, api, browser, cast
from tests.fleet.papers import permitted
from tests.makers import ready_aircraft
from tests.pure.fleet.test_rules import every, rule, rules_document
from tests.pure.loads.papers import lb

pytestmark = pytest.mark.django_db
MORE = {"effect": "limit", "limit": "take_off", "weight": lb("8800")}


@pytest.fixture
def people():
    return cast()


@pytest.fixture
def aircraft(people):
    made = ready_aircraft(people)
    entered = enter_rules(actor(people.manager), rules_document(rule(**every(500, "years"))))
    approve_rules(actor(people.approver), entered)
    return made


def test_a_weighing_lapses_with_its_last_day_on_the_operators_clock(people, aircraft):
    (due,) = falling_due(aircraft, timezone.now())

    assert due.what == "weighing of 2025-12-30 on wheels"
    assert (
        due.lapses.astimezone(ZoneInfo(aircraft.operator.time_zone)).isoformat()[:19] == "2525-12-31T00:00:00"
    )
    assert due.source == "every 500 years, 135.185, 14 CFR p. a"


@pytest.mark.parametrize(
    ("left", "threshold"),
    [
        (timedelta(days=61), None),
        (timedelta(days=60), 60),
        (timedelta(days=30, seconds=1), 60),
        (timedelta(days=30), 30),
        (timedelta(days=7), 7),
        (timedelta(seconds=1), 7),
        (timedelta(0), 0),
        (timedelta(days=-400), 0),
    ],
)
def test_the_least_threshold_reached_counts(left, threshold):
    assert threshold_passed(left) == threshold


def test_it_is_told_once_for_each_threshold(people, aircraft):
    (due,) = falling_due(aircraft, timezone.now())

    counts = [
        tell_all_falling_due(due.lapses - timedelta(days=days))
        for days in (61, 59, 58, 30, 29, 6, 1, 0, -1, -100)
    ]

    assert counts == [0, 1, 0, 1, 0, 1, 0, 1, 0, 0]
    assert [one.threshold_days for one in DueNotice.objects.order_by("-threshold_days")] == [60, 30, 7, 0]
    told = Act.objects.filter(kind="tell-falling-due").first()
    assert (told.actor_key, told.about) == ("service:scheduler", f"aircraft:{aircraft.id}")


def test_subscribers_and_operations_are_told(people, aircraft, settings):
    settings.EMAIL_HOST = "mail.example"
    change = read_settings({"reason": "told", "operations_mail": ["ops@kestrel.example"]})
    change_settings(actor(people.manager), change, seen=str(last_number(people.operator.code)))
    subscribe(actor(people.manager), address="https://hooks.example.org/", events=["falling.due"], label="x")
    (due,) = falling_due(aircraft, timezone.now())

    tell_all_falling_due(due.lapses)

    event = WebhookEvent.objects.get()
    assert event.name == "falling.due"
    notice = DueNotice.objects.get()
    promised = Outbox.objects.get(task="fleet.tasks.mail_falling_due")
    mail_what_falls_due(promised.key)
    (letter,) = mail.outbox
    assert letter.to == ["ops@kestrel.example"]
    assert letter.subject == "Falling due: Q9-KTB, weighing of 2025-12-30 on wheels"
    assert "every 500 years" in letter.body
    promised.refresh_from_db()
    assert promised.done_at is not None
    settings.EMAIL_HOST = ""
    assert mail_falling_due(notice.id) == 0


def test_a_permit_falls_due_until_it_has_lapsed_or_was_ended(people, aircraft):
    permit = permitted(
        people, aircraft, MORE, true_from="2026-01-01T00:00:00Z", true_until="2026-06-01T00:00:00Z"
    )

    before = datetime(2026, 5, 31, 23, 59, 59, tzinfo=UTC)
    assert [one.about for one in falling_due(aircraft, before)][:1] == [f"permit {permit.id}"]
    at = datetime(2026, 6, 1, tzinfo=UTC)
    assert all(not one.about.startswith("permit") for one in falling_due(aircraft, at))


def test_without_rules_no_weighing_falls_due(people):
    assert falling_due(ready_aircraft(people), timezone.now()) == ()
    assert tell_falling_due() == 0


def test_page_and_answer_tell_what_falls_due(people, aircraft):
    page = browser(people.maintenance).get(f"/aircraft/{aircraft.registration}").content.decode()
    answer = api(people.maintenance).get(f"/api/v1/aircraft/{aircraft.registration}").json()

    assert "Weighing of 2025-12-30 on wheels" in page
    assert answer["falling_due"][0]["what"] == "weighing of 2025-12-30 on wheels"
