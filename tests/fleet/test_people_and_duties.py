"""Operators, people, duties and passwords, through the actions."""

import dataclasses
from datetime import timedelta

import pytest
from django.contrib.auth import authenticate
from django.db import connection
from django.test import RequestFactory, override_settings
from django.utils import timezone

from fleet.actions.change_password import RENEWED, change_password, renew_hash
from fleet.actions.end_duty import end_duty
from fleet.actions.enter_operator import FirstPerson, NewOperator, enter_operator
from fleet.actions.enter_person import enter_person
from fleet.actions.grant_duty import grant_duty
from fleet.models import Duty, Operator, Person
from fleet.queries.duties import roles_of
from records.models import Act, Change, Name, Seal
from records.refusal import Invalid, NotAllowed, NotKnown, StepRefused
from tests.cast import HOUSE, PASSWORD, actor, cast, strangers

pytestmark = pytest.mark.django_db

NEW = NewOperator(
    code="new-air",
    name="New Air",
    time_zone="America/Denver",
    rule_set="US",
    procedure="Operations manual, section 8",
    weight_method="weighed",
)
FIRST = FirstPerson(login="O.Keel", name="O. Keel", password=PASSWORD)
FAST_AND_SLOW = [
    "django.contrib.auth.hashers.PBKDF2PasswordHasher",
    "django.contrib.auth.hashers.MD5PasswordHasher",
]


def test_an_operator_is_entered_on_the_house_chain_with_its_first_manager() -> None:
    operator, person = enter_operator(HOUSE, NEW, FIRST)

    assert Operator.objects.get() == operator
    assert person.login == "o.keel"
    assert roles_of(person, timezone.now()) == ("operations manager",)
    entered = Act.objects.get(kind="enter-operator")
    assert entered.chain == "house"
    assert set(Change.objects.filter(act=entered).values_list("table_name", flat=True)) == {
        "fleet_operator",
        "fleet_person",
        "fleet_duty",
    }


@pytest.mark.parametrize(
    ("new", "first", "pointer", "code"),
    [
        ({"code": "House Air"}, {}, "/code", "wrong-form"),
        ({"code": "house"}, {}, "/code", "operator-taken"),
        ({"code": ""}, {}, "/code", "empty"),
        ({"name": ""}, {}, "/name", "empty"),
        ({"name": "x" * 121}, {}, "/name", "too-long"),
        ({"time_zone": "Mars/Olympus"}, {}, "/time_zone", "time-zone-unknown"),
        ({"time_zone": "../../etc/passwd"}, {}, "/time_zone", "time-zone-unknown"),
        ({"rule_set": "XX"}, {}, "/rule_set", "not-a-choice"),
        ({}, {"login": "o keel"}, "/login", "wrong-form"),
        ({}, {"name": ""}, "/name", "empty"),
        ({}, {"password": "short"}, "/password", "password-weak"),
        ({}, {"password": "123456789012"}, "/password", "password-weak"),
        ({}, {"password": "x" * 201}, "/password", "too-long"),
    ],
)
def test_what_is_wrong_with_an_operator_is_named(
    new: dict[str, str], first: dict[str, str], pointer: str, code: str
) -> None:
    with pytest.raises(Invalid) as refused:
        enter_operator(HOUSE, dataclasses.replace(NEW, **new), dataclasses.replace(FIRST, **first))

    assert (refused.value.faults[0].pointer, refused.value.faults[0].code) == (pointer, code)
    assert not Operator.objects.exists()
    assert not Person.objects.exists()


def test_an_operator_is_entered_once() -> None:
    enter_operator(HOUSE, NEW, FIRST)

    with pytest.raises(Invalid) as refused:
        enter_operator(HOUSE, NEW, dataclasses.replace(FIRST, login="another"))

    assert refused.value.faults[0].code == "operator-taken"


def test_names_and_logins_stand_nowhere_in_the_trail() -> None:
    people = cast()

    entries = "".join(Seal.objects.values_list("entry", flat=True))

    for person in (people.manager, people.pilot):
        assert person.name not in entries
        assert f'"{person.login}"' not in entries
        assert f'"key":"person:{person.id}"' in entries or f'"key":"{person.id}"' in entries
    assert Name.objects.filter(name=people.manager.name.encode()).exists()


def test_a_login_is_taken_whoever_has_it() -> None:
    people, others = cast(), strangers()

    with pytest.raises(Invalid) as refused:
        enter_person(
            actor(people.manager),
            people.operator,
            login=others.pilot.login.upper(),
            name="Double",
            password=PASSWORD,
        )

    assert refused.value.faults[0].code == "login-taken"


def test_only_who_may_enters_people_and_only_of_their_operator() -> None:
    people, others = cast(), strangers()

    with pytest.raises(NotAllowed):
        enter_person(actor(people.pilot), people.operator, login="abc", name="A", password=PASSWORD)
    with pytest.raises(NotKnown):
        enter_person(actor(people.manager), others.operator, login="abc", name="A", password=PASSWORD)
    with pytest.raises(NotKnown):
        grant_duty(actor(people.manager), others.pilot, "auditor")
    with pytest.raises(NotKnown):
        end_duty(actor(people.manager), others.pilot, "pilot")
    with pytest.raises(NotAllowed):
        grant_duty(actor(people.pilot), people.pilot, "operations manager")


def test_a_duty_begins_and_ends_when_it_says() -> None:
    people = cast()
    now = timezone.now()
    tomorrow, later = now + timedelta(days=1), now + timedelta(days=30)

    grant_duty(actor(people.manager), people.idle, "auditor", since=tomorrow)
    end_duty(actor(people.manager), people.idle, "auditor", since=later)

    assert roles_of(people.idle, now) == ()
    assert roles_of(people.idle, tomorrow) == ("auditor",)
    assert roles_of(people.idle, later - timedelta(microseconds=1)) == ("auditor",)
    assert roles_of(people.idle, later) == ()


def test_a_duty_is_not_granted_twice_ended_unheld_or_moved_into_the_past() -> None:
    people = cast()
    manager = actor(people.manager)

    with pytest.raises(StepRefused):
        grant_duty(manager, people.pilot, "pilot")
    with pytest.raises(StepRefused):
        end_duty(manager, people.idle, "pilot")
    with pytest.raises(Invalid):
        grant_duty(manager, people.idle, "pilot", since=timezone.now() - timedelta(days=1))
    with pytest.raises(Invalid):
        grant_duty(manager, people.idle, "owner")

    assert Duty.objects.filter(person=people.idle).count() == 0


def test_a_person_without_duty_may_do_nothing() -> None:
    assert actor(cast().idle).may == frozenset()


def test_a_password_change_is_an_act_that_says_changed_and_nothing_more() -> None:
    people = cast()

    change_password(actor(people.pilot), people.pilot, current=PASSWORD, new="another-good-phrase-4")

    people.pilot.refresh_from_db()
    assert people.pilot.check_password("another-good-phrase-4")
    changed = Change.objects.get(act=Act.objects.get(kind="change-password"))
    assert '"password": "changed"' in changed.image
    assert people.pilot.password not in changed.image


def test_a_password_is_changed_by_its_own_person_who_knows_it() -> None:
    people = cast()

    with pytest.raises(NotAllowed):
        change_password(actor(people.manager), people.pilot, current=PASSWORD, new="another-good-phrase-4")
    with pytest.raises(Invalid) as wrong:
        change_password(actor(people.pilot), people.pilot, current="guess", new="another-good-phrase-4")
    with pytest.raises(Invalid) as weak:
        change_password(actor(people.pilot), people.pilot, current=PASSWORD, new="short")

    assert wrong.value.faults[0].pointer == "/current"
    assert weak.value.faults[0].pointer == "/new"
    people.pilot.refresh_from_db()
    assert people.pilot.check_password(PASSWORD)


def test_signing_in_with_an_old_hash_writes_nothing_and_the_renewal_is_an_act() -> None:
    people = cast()
    old = Person.objects.get(id=people.pilot.id).password

    with override_settings(PASSWORD_HASHERS=FAST_AND_SLOW):
        signed_in = authenticate(
            RequestFactory().post("/sign-in"), username=people.pilot.login, password=PASSWORD
        )
        assert signed_in == people.pilot
        assert Person.objects.get(id=people.pilot.id).password == old

        assert renew_hash(actor(people.pilot), people.pilot, PASSWORD)
        assert not renew_hash(actor(people.pilot), people.pilot, PASSWORD)

        renewed = Person.objects.get(id=people.pilot.id)
        assert renewed.password.startswith("pbkdf2_sha256$")
        assert renewed.check_password(PASSWORD)
    assert Act.objects.get(kind="change-password").reason == RENEWED


def test_a_hash_is_not_renewed_with_a_wrong_password() -> None:
    people = cast()

    with override_settings(PASSWORD_HASHERS=FAST_AND_SLOW):
        assert not renew_hash(actor(people.pilot), people.pilot, "guess")


def test_a_person_keeps_no_last_sign_in() -> None:
    with connection.cursor() as cursor:
        columns = {
            column.name for column in connection.introspection.get_table_description(cursor, "fleet_person")
        }

    assert "last_login" not in columns
