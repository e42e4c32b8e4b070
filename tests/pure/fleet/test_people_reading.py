"""The plain documents about people and tokens: every field arrives, what is left out has its meaning."""

from datetime import UTC, datetime, timedelta

import pytest

from fleet.mail_address import mail_fault
from fleet.people_reading import (
    DutyChange,
    NewPassword,
    NewPerson,
    NewSecret,
    NewToken,
    read_duty,
    read_mail,
    read_password,
    read_person,
    read_reason,
    read_rotation,
    read_token,
)
from records.refusal import Fault
from tests.pure.fleet.documents import told

PERSON = {"login": "m.ferrow", "name": "M. Ferrow", "password": "one long enough"}
TOKEN = {"label": "crew tablet", "scopes": ["load", "sign"], "days": 90}
DUTY = {"role": "pilot", "granted": True, "reason": "line check passed"}


def test_a_person_is_read_with_and_without_a_mail_address_and_a_reason():
    assert read_person(PERSON) == NewPerson("m.ferrow", "M. Ferrow", "one long enough", "", "")
    assert read_person(PERSON | {"mail": "m@example.org", "reason": "new"}) == NewPerson(
        "m.ferrow", "M. Ferrow", "one long enough", "m@example.org", "new"
    )


def test_a_duty_holds_from_the_instant_named_or_from_now():
    assert read_duty(DUTY) == DutyChange("pilot", True, None, "line check passed")
    assert read_duty(DUTY | {"granted": False, "since": "2026-05-01T00:00:00Z"}) == DutyChange(
        "pilot", False, datetime(2026, 5, 1, tzinfo=UTC), "line check passed"
    )


def test_a_year_that_cannot_be_meant_is_refused_where_it_stands():
    for since in ("1899-12-31T23:59:59Z", "2901-01-01T00:00:00Z"):
        assert told(read_duty, DUTY | {"since": since}) == [
            ("/since", "instant-implausible", "the year cannot be meant; correct it")
        ]
    for since in ("1900-01-01T00:00:00Z", "2900-12-31T00:00:00Z"):
        assert read_duty(DUTY | {"since": since}).since


def test_a_token_is_for_whoever_asks_and_for_all_aircraft_unless_it_says_otherwise():
    assert read_token(TOKEN) == NewToken(
        label="crew tablet",
        scopes=("load", "sign"),
        registrations=(),
        valid_for=timedelta(days=90),
        person=None,
        integration=False,
    )
    full = TOKEN | {"registrations": ["OK-AB", "OK-CD"], "person": 7, "integration": True}
    assert read_token(full) == NewToken(
        label="crew tablet",
        scopes=("load", "sign"),
        registrations=("OK-AB", "OK-CD"),
        valid_for=timedelta(days=90),
        person=7,
        integration=True,
    )


def test_a_new_secret_overlaps_by_hours_and_is_valid_for_days():
    assert read_rotation({"overlap_hours": 24, "days": 30}) == NewSecret(
        timedelta(days=1), timedelta(days=30), ""
    )
    assert read_rotation({"overlap_hours": 0, "days": 1, "reason": "lost"}).reason == "lost"


def test_a_password_a_reason_and_a_mail_address():
    assert read_password({"current": "old one", "new": "new one"}) == NewPassword("old one", "new one")
    assert read_reason({"reason": "weighed anew"}) == "weighed anew"
    assert read_mail({"mail": "m@example.org"}) == "m@example.org"


@pytest.mark.parametrize(
    ("read", "document", "missing"),
    [
        (read_person, PERSON, "login"),
        (read_duty, DUTY, "role"),
        (read_reason, {"reason": "new"}, "reason"),
        (read_token, TOKEN, "days"),
        (read_rotation, {"overlap_hours": 1, "days": 1}, "overlap_hours"),
        (read_password, {"current": "old one", "new": "new one"}, "new"),
        (read_mail, {"mail": "m@example.org"}, "mail"),
    ],
)
def test_what_is_missing_or_strange_is_refused_by_its_own_schema(read, document, missing):
    left = {name: value for name, value in document.items() if name != missing}
    assert told(read, left) == [(f"/{missing}", "missing", f"{missing} is missing; give it")]
    assert told(read, document | {"colour": "blue"}) == [
        ("/colour", "unknown-field", "not a field here; remove or correct it")
    ]
    assert told(read, [document]) == [
        ("", "wrong-type", "not the kind of value asked for here; see the schema")
    ]


def test_a_mail_address_is_one_mailbox_and_a_domain_of_two_labels():
    wrong = Fault("/mail", "mail-form", "write one address, like ops@example.org")
    longest = f"ops@{'.'.join(['a' * 61] * 4)}.ab"
    assert len(longest) == 254
    for address in ("ops@example.org", "o.p-s+1@a-b.example.org", longest):
        assert mail_fault(address, "/mail") is None
    for address in ("ops", "ops@example", "a b@example.org", "ops@example.org, x@example.org", f"a{longest}"):
        assert mail_fault(address, "/mail") == wrong
