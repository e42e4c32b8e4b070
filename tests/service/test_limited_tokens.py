"""A token limited to some aircraft: for it the others do not exist; what is about none of them is refused."""

import json
import uuid
from datetime import timedelta

import pytest
from django.urls import get_resolver
from rest_framework.test import APIClient

from fleet.actions.issue_token import issue_token
from loads.models import Load
from service import allowed
from tests.cast import Cast, actor, api, cast, post
from tests.loads.making import load_document
from tests.makers import ready_aircraft

pytestmark = pytest.mark.django_db
INSIDE, OUTSIDE = "Q9-KTB", "Q9-KTC"


@pytest.fixture
def people() -> Cast:
    people = cast()
    ready_aircraft(people, INSIDE)
    ready_aircraft(people, OUTSIDE)
    return people


def limited(people, *registrations):
    scopes = allowed.grantable(["pilot"], integration=False)
    token = issue_token(
        actor(people.pilot),
        people.pilot,
        label="one aircraft",
        scopes=scopes,
        grantable=scopes,
        valid_for=timedelta(days=1),
        registrations=registrations or (INSIDE,),
    )
    return APIClient(headers={"Authorization": f"Bearer {token.secret}"})


def body(response):
    return json.loads(response.content)


def send(client, path, document, **headers):
    return client.post(
        f"/api/v1{path}",
        data=json.dumps(document),
        content_type="application/json",
        headers={"Idempotency-Key": str(uuid.uuid4()), **headers},
    )


def submitted(people, client, aircraft):
    return post(client, "/loads", load_document(people, aircraft=aircraft))


def test_it_sees_its_aircraft_and_no_other(people):
    client = limited(people)

    assert [one["registration"] for one in body(client.get("/api/v1/aircraft"))["aircraft"]] == [INSIDE]
    assert client.get(f"/api/v1/aircraft/{INSIDE}").status_code == 200
    assert client.get(f"/api/v1/aircraft/{INSIDE.lower()}").status_code == 200
    for path in ("", "/loading-bases", "/empty-weights", "/configurations"):
        assert client.get(f"/api/v1/aircraft/{OUTSIDE}{path}").status_code == 404


def test_it_submits_and_computes_loads_of_its_aircraft_only(people):
    client = limited(people)

    assert submitted(people, client, INSIDE).status_code == 201
    for aircraft in (OUTSIDE, OUTSIDE.lower()):
        for path in ("/loads", "/assessments"):
            answer = post(client, path, load_document(people, aircraft=aircraft))
            assert answer.status_code == 422
            assert body(answer)["errors"][0]["code"] == "unknown-aircraft"
    assert Load.objects.count() == 1


def test_it_lists_and_reads_loads_of_its_aircraft_only(people):
    seen = body(submitted(people, api(people.pilot), INSIDE))["id"]
    hidden = body(submitted(people, api(people.pilot), OUTSIDE))["id"]
    client = limited(people)

    assert [one["id"] for one in body(client.get("/api/v1/loads"))["loads"]] == [seen]
    assert body(client.get(f"/api/v1/loads?aircraft={OUTSIDE}"))["loads"] == []
    assert client.get(f"/api/v1/loads/{seen}").status_code == 200
    assert client.get(f"/api/v1/loads/{hidden}").status_code == 404
    assert client.get(f"/api/v1/loads/{hidden}/manifest").status_code == 404


def test_it_moves_no_load_of_another_aircraft_and_none_onto_one(people):
    hidden = body(submitted(people, api(people.pilot), OUTSIDE))["id"]
    client = limited(people)
    own = body(submitted(people, client, INSIDE))["id"]
    state = {"If-Match": '"1"'}

    elsewhere = send(client, f"/loads/{hidden}/withdrawal", {"reason": "x"}, **state)
    moved = send(
        client,
        f"/loads/{own}/revisions",
        load_document(people, aircraft=OUTSIDE) | {"reason": "swap"},
        **state,
    )
    withdrawn = send(client, f"/loads/{own}/withdrawal", {"reason": "x"}, **state)

    assert (elsewhere.status_code, moved.status_code, withdrawn.status_code) == (404, 422, 200)


def test_it_is_told_that_a_person_stands_on_a_load_it_may_not_see_and_not_on_which(people):
    hidden = body(submitted(people, api(people.pilot), OUTSIDE))["id"]
    client = limited(people)

    answers = [submitted(people, client, INSIDE)]
    answers.append(client.get(f"/api/v1/loads/{body(answers[0])['id']}"))
    whole = body(api(people.pilot).get(f"/api/v1/loads/{body(answers[0])['id']}"))

    for answer in answers:
        told = body(answer)["warnings"]
        assert [(one["code"], one["pointer"], one["load"], one["href"]) for one in told] == [
            ("same-person", pointer, None, None) for pointer in ("/crew/0", "/passengers/0", "/passengers/1")
        ]
        assert "another load" in told[0]["detail"]
        assert OUTSIDE not in answer.content.decode()
        assert hidden not in answer.content.decode()
    assert {one["load"] for one in whole["warnings"]} == {hidden}


def test_it_is_not_told_which_load_of_another_aircraft_replaces_its_own_or_was_replaced_by_it(people):
    client, pilot = limited(people), api(people.pilot)
    first = body(submitted(people, client, INSIDE))["id"]
    revision = load_document(people, aircraft=OUTSIDE) | {"reason": "swap"}
    away = body(send(pilot, f"/loads/{first}/revisions", revision, **{"If-Match": '"1"'}))["id"]
    revision = load_document(people, aircraft=INSIDE) | {"reason": "swap"}
    back = body(send(pilot, f"/loads/{away}/revisions", revision, **{"If-Match": '"1"'}))["id"]

    answers = [client.get(f"/api/v1/loads{path}") for path in (f"/{first}", f"/{back}", "")]

    assert body(answers[0])["replaced_by"] is body(answers[1])["replaces"] is None
    assert all(away not in answer.content.decode() for answer in answers)
    assert body(pilot.get(f"/api/v1/loads/{first}"))["replaced_by"] == away
    assert body(pilot.get(f"/api/v1/loads/{back}"))["replaces"] == away


def test_what_is_about_no_aircraft_is_refused_unless_it_limits_its_own_answer(people):
    client = limited(people)

    assert client.get("/api/v1/me").status_code == 200
    assert body(client.get("/api/v1/me"))["registrations"] == [INSIDE]
    for path in ("/people", "/tokens", "/access-log", "/settings", f"/documents/{'0' * 64}"):
        answer = client.get(f"/api/v1{path}")
        assert (answer.status_code, body(answer)["code"]) == (403, "token-limited-to-aircraft"), path
    entered = send(client, "/aircraft", {"registration": "Q9-NEW"})
    assert (entered.status_code, body(entered)["code"]) == (403, "token-limited-to-aircraft")


def test_every_endpoint_that_limits_its_own_answer_is_known_here():
    found = set()

    def walk(patterns):
        for one in patterns:
            walk(getattr(one, "url_patterns", ()))
            view = getattr(getattr(one, "callback", None), "cls", None)
            if getattr(view, "limits_its_answer", False):
                found.add(view.__name__)

    walk(get_resolver().url_patterns)

    # Each of these is tried above; a new one is tried there, too.
    assert found == {"AircraftEndpoint", "LoadsView", "OwnEndpoint"}


def test_a_token_limited_to_two_serves_for_both(people):
    client = limited(people, INSIDE, OUTSIDE)

    assert (
        submitted(people, client, INSIDE).status_code == submitted(people, client, OUTSIDE).status_code == 201
    )
