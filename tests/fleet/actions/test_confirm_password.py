"""Asking for the password again: right, wrong, and locked out with the wait stated, counted with sign-ins."""

from datetime import timedelta

import pytest
from axes.models import AccessAttempt
from django.contrib.auth import authenticate
from django.contrib.auth.backends import ModelBackend
from django.db import transaction
from django.db.models import F
from django.test import RequestFactory
from rest_framework.request import Request

from fleet.actions.confirm_password import confirm_password
from records.refusal import Invalid, LockedOut
from tests.cast import PASSWORD, cast

pytestmark = pytest.mark.django_db


def _request():
    return RequestFactory().post("/api/v1/loads/x/signatures")


def _refused(person, password):
    with pytest.raises(Invalid) as refused:
        confirm_password(_request(), person, password)
    (fault,) = refused.value.faults
    return fault.pointer, fault.code


def test_the_right_password_passes_for_a_page_and_for_the_api():
    people = cast()

    confirm_password(_request(), people.pilot, PASSWORD)
    confirm_password(Request(_request()), people.pilot, PASSWORD)


@pytest.mark.parametrize("password", [None, "", 7, True, ["x"], {"a": 1}, "x" * 1001])
def test_what_is_no_password_is_refused_and_not_counted(password):
    people = cast()

    assert _refused(people.pilot, password) == ("/password", "password-missing")
    assert not AccessAttempt.objects.exists()


def test_a_wrong_password_and_anothers_password_are_refused():
    people = cast()

    assert _refused(people.pilot, PASSWORD + "x") == ("/password", "password-wrong")
    assert _refused(people.pilot, PASSWORD.upper()) == ("/password", "password-wrong")


def test_five_failures_lock_the_login_out_and_the_wait_is_stated():
    people = cast()
    for _ in range(4):
        assert _refused(people.pilot, "wrong") == ("/password", "password-wrong")

    with pytest.raises(LockedOut) as fifth:
        confirm_password(_request(), people.pilot, "wrong")
    with pytest.raises(LockedOut) as after:
        confirm_password(_request(), people.pilot, PASSWORD)

    assert fifth.value.code == after.value.code == "locked-out"
    assert 14 * 60 < after.value.wait_seconds <= 15 * 60
    assert after.value.detail.startswith("Too many wrong passwords. Wait 1")
    confirm_password(_request(), people.other_pilot, PASSWORD)


def test_the_lock_ends_after_the_wait_and_trying_meanwhile_does_not_make_it_longer():
    people = cast()
    for _ in range(5):
        with pytest.raises((Invalid, LockedOut)):
            confirm_password(_request(), people.pilot, "wrong")
    AccessAttempt.objects.update(attempt_time=F("attempt_time") - timedelta(minutes=14))

    with pytest.raises(LockedOut) as refused:
        confirm_password(_request(), people.pilot, "wrong")
    assert refused.value.wait_seconds <= 60

    AccessAttempt.objects.update(attempt_time=F("attempt_time") - timedelta(minutes=1))
    confirm_password(_request(), people.pilot, PASSWORD)


def test_a_success_starts_the_count_again():
    people = cast()
    for _ in range(3):
        for _ in range(4):
            _refused(people.pilot, "wrong")
        confirm_password(_request(), people.pilot, PASSWORD)


def test_failures_at_signing_and_at_signing_in_are_counted_together():
    people = cast()
    for _ in range(4):
        _refused(people.pilot, "wrong")

    # What the sign-in page calls.
    assert authenticate(_request(), username=people.pilot.login, password="wrong") is None

    with pytest.raises(LockedOut):
        confirm_password(_request(), people.pilot, PASSWORD)


def test_a_person_who_has_left_cannot_confirm(monkeypatch):
    people = cast()
    monkeypatch.setattr(ModelBackend, "user_can_authenticate", lambda _self, person: person != people.pilot)

    assert _refused(people.pilot, PASSWORD) == ("/password", "password-wrong")


@pytest.mark.django_db(transaction=True)
def test_inside_a_transaction_it_raises_since_the_failure_would_not_stay_counted():
    people = cast()

    with transaction.atomic(), pytest.raises(RuntimeError):
        confirm_password(_request(), people.pilot, "wrong")
