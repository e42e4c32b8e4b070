"""People over the API: who may look, enter, grant and deactivate, and what another operator sees."""

import json
import uuid
from datetime import timedelta

import pytest
from django.utils import timezone

from fleet.models import Duty, Person
from records.models import Act, Receipt
from tests.cast import PASSWORD, actor, api, browser, cast, get, post, strangers

pytestmark = pytest.mark.django_db
NEW = {"login": "N.Ewe", "name": "N. Ewe", "password": "a-good-long-phrase-8"}
GRANT = {"role": "auditor", "granted": True, "reason": "joins the safety desk"}


def body(response):
    return json.loads(response.content)


def faults(response):
    return {(one["pointer"], one["code"]) for one in body(response)["errors"]}


def test_manager_and_auditor_see_every_person_and_nobody_else_does():
    people, others = cast(), strangers()

    for person in (people.manager, people.auditor):
        listed = body(get(api(person), "/people"))["people"]
        assert {one["login"] for one in listed} == {
            one.login for one in Person.objects.filter(operator=people.operator)
        }
        assert not {one["login"] for one in listed} & {others.pilot.login}
    for person in (people.pilot, people.preparer, people.maintenance, people.idle):
        assert get(api(person), "/people").status_code == 403
        assert get(api(person), f"/people/{people.manager.pk}").status_code == 403


def test_a_person_is_entered_with_a_login_in_small_letters_and_no_duty():
    people = cast()

    answer = post(api(people.manager), "/people", NEW)

    assert answer.status_code == 201, answer.content
    person = Person.objects.get(login="n.ewe")
    assert answer["Location"] == f"/api/v1/people/{person.pk}"
    assert body(answer)["roles"] == body(answer)["duties"] == []
    assert person.check_password(NEW["password"])
    assert NEW["password"].encode() not in b"".join(bytes(one.body) for one in Receipt.objects.all())
    assert body(get(api(people.manager), f"/people/{person.pk}"))["name"] == "N. Ewe"


def test_the_same_key_enters_one_person():
    people, key = cast(), str(uuid.uuid4())

    first, again = (post(api(people.manager), "/people", NEW, key=key) for _ in range(2))

    assert first.content == again.content
    assert again["Idempotency-Replayed"] == "true"
    assert Act.objects.filter(kind="enter-person", about=f"person:{body(first)['id']}").count() == 1


@pytest.mark.parametrize(
    ("changes", "pointer", "code"),
    [
        ({"login": "two words"}, "/login", "wrong-form"),
        ({"login": "x"}, "/login", "empty"),
        ({"login": "x" * 61}, "/login", "too-long"),
        ({"login": 7}, "/login", "wrong-type"),
        ({"name": ""}, "/name", "empty"),
        ({"name": "\u0007bell"}, "/name", "wrong-form"),
        ({"name": None}, "/name", "wrong-type"),
        ({"password": "short"}, "/password", "password-weak"),
        ({"password": "x" * 1001}, "/password", "too-long"),
        ({"password": ["a"]}, "/password", "wrong-type"),
        ({"role": "pilot"}, "/role", "unknown-field"),
    ],
)
def test_what_is_wrong_with_a_person_is_named_and_nobody_is_entered(changes, pointer, code):
    people = cast()
    before = Person.objects.count()

    answer = post(api(people.manager), "/people", NEW | changes)

    assert answer.status_code == 422
    assert (pointer, code) in faults(answer)
    assert Person.objects.count() == before


def test_a_login_that_is_taken_by_another_operators_person_is_refused():
    people, others = cast(), strangers()

    answer = post(api(people.manager), "/people", NEW | {"login": others.pilot.login})

    assert (answer.status_code, faults(answer)) == (422, {("/login", "login-taken")})


def test_duties_are_granted_and_ended_with_a_reason():
    people = cast()
    path = f"/people/{people.idle.pk}/duties"

    granted = post(api(people.manager), path, GRANT)
    later = (timezone.now() + timedelta(days=3)).isoformat()
    ended = post(api(people.manager), path, GRANT | {"granted": False, "since": later, "reason": "moves on"})

    assert (granted.status_code, body(granted)["roles"]) == (201, ["auditor"])
    assert (ended.status_code, body(ended)["roles"]) == (201, ["auditor"])
    assert [one["granted"] for one in body(ended)["duties"]] == [False, True]
    assert [one.reason for one in Act.objects.filter(kind__in=("grant-duty", "end-duty")).order_by("at")][
        -2:
    ] == ["joins the safety desk", "moves on"]


@pytest.mark.parametrize(
    ("changes", "status", "code"),
    [
        ({"role": "emperor"}, 422, ("/role", "not-a-choice")),
        ({"granted": "yes"}, 422, ("/granted", "wrong-type")),
        ({"reason": None}, 422, ("/reason", "wrong-type")),
        ({"since": "2020-01-01T00:00:00Z"}, 422, ("/since", "in-the-past")),
        ({"since": "9999-01-01T00:00:00Z"}, 422, ("/since", "instant-implausible")),
        ({"since": "tomorrow"}, 422, ("/since", "wrong-form")),
    ],
)
def test_what_is_wrong_with_a_duty_is_named(changes, status, code):
    people = cast()

    answer = post(api(people.manager), f"/people/{people.idle.pk}/duties", GRANT | changes)

    assert (answer.status_code, faults(answer)) == (status, {code})
    assert not Duty.objects.filter(person=people.idle).exists()


def test_an_operator_keeps_a_manager():
    people = cast()
    ends = {"role": "operations manager", "granted": False, "reason": "retires"}
    own = f"/people/{people.manager.pk}/duties"

    alone = post(api(people.manager), own, ends)
    post(api(people.manager), f"/people/{people.pilot.pk}/duties", ends | {"granted": True})
    of_two = post(api(people.manager), own, ends)
    last = post(api(people.pilot), f"/people/{people.pilot.pk}/duties", ends)

    assert (alone.status_code, body(alone)["code"]) == (409, "last-manager")
    assert of_two.status_code == 201
    assert (last.status_code, body(last)["code"]) == (409, "last-manager")


def test_a_manager_who_was_deactivated_does_not_count():
    people = cast()
    manages = {"role": "operations manager", "granted": True, "reason": "deputy"}
    post(api(people.manager), f"/people/{people.pilot.pk}/duties", manages)
    post(api(people.manager), f"/people/{people.pilot.pk}/deactivation", {"reason": "left"})

    answer = post(api(people.manager), f"/people/{people.manager.pk}/duties", manages | {"granted": False})

    assert (answer.status_code, body(answer)["code"]) == (409, "last-manager")


def test_a_deactivated_person_is_out_at_once_and_for_good():
    people = cast()
    signed_in, over_api = browser(people.pilot), api(people.pilot)
    assert over_api.get("/api/v1/aircraft").status_code == 200

    answer = post(api(people.manager), f"/people/{people.pilot.pk}/deactivation", {"reason": "left us"})

    assert (answer.status_code, body(answer)["active"]) == (200, False)
    assert over_api.get("/api/v1/aircraft").status_code == 401
    assert signed_in.get("/").status_code == 302
    typed = {"login": people.pilot.login, "password": PASSWORD}
    assert signed_in.post("/sign-in", typed).status_code == 422
    assert Act.objects.get(kind="deactivate-person").reason == "left us"
    again = post(api(people.manager), f"/people/{people.pilot.pk}/deactivation", {"reason": "again"})
    assert (again.status_code, body(again)["code"]) == (409, "person-inactive")


def test_nobody_deactivates_themselves():
    people = cast()

    answer = post(api(people.manager), f"/people/{people.manager.pk}/deactivation", {"reason": "bye"})

    assert (answer.status_code, body(answer)["code"]) == (409, "own-deactivation")
    assert Person.objects.get(pk=people.manager.pk).is_active


def test_who_holds_no_duty_for_it_changes_nobody():
    people = cast()
    target = people.idle.pk

    for person in (people.pilot, people.auditor, people.preparer, people.maintenance):
        client = api(person)
        assert post(client, "/people", NEW).status_code == 403
        assert post(client, f"/people/{target}/duties", GRANT).status_code == 403
        assert post(client, f"/people/{target}/deactivation", {"reason": "x"}).status_code == 403
    assert not Person.objects.filter(login="n.ewe").exists()
    assert Person.objects.get(pk=target).is_active


@pytest.mark.parametrize("number", ["other", "999999", "99999999999999999999999999"])
def test_another_operators_person_and_nobody_are_not_known(number):
    people, others = cast(), strangers()
    number = others.pilot.pk if number == "other" else number
    client = api(people.manager)

    assert get(client, f"/people/{number}").status_code == 404
    assert post(client, f"/people/{number}/duties", GRANT).status_code == 404
    assert post(client, f"/people/{number}/deactivation", {"reason": "x"}).status_code == 404
    assert Person.objects.get(pk=others.pilot.pk).is_active
    assert "auditor" not in actor(others.pilot).capacity
