"""Subscriptions over the API: the whole way of one, who may, and what bad requests get."""

import json
from datetime import timedelta
from uuid import uuid4

import pytest
from rest_framework.test import APIClient

from fleet.actions.issue_token import issue_token
from records.acts import WEBHOOK_KINDS
from records.models import Act, Receipt, Webhook, WebhookDelivery
from records.webhooks.deliver import deliver_due
from service import allowed
from tests.cast import actor, api, cast, get, post, strangers
from tests.makers import make_aircraft
from tests.records.webhooks.making import announced, verified
from tests.records.webhooks.receiver import running

pytestmark = pytest.mark.django_db
ASKED = {"address": "https://hooks.example.org/events", "events": ["load.rejected"], "label": "schedule"}


@pytest.fixture
def people():
    return cast()


@pytest.fixture
def receiver(settings):
    with running() as told:
        settings.WEBHOOK_TRUSTED_RECEIVERS = frozenset({told.place})
        yield told


def answer(response):
    return json.loads(response.content)


def test_a_subscription_from_its_beginning_to_its_end(people, receiver):
    manager = api(people.manager)
    made = post(manager, "/webhooks", ASKED | {"address": receiver.address})
    body = answer(made)
    place = f"/webhooks/{body['id']}"
    assert (made.status_code, made["Location"], made["Cache-Control"]) == (201, f"/api/v1{place}", "no-store")
    assert (body["state"], body["waiting"], body["parked"]) == ("live", 0, 0)
    announced(people, about="load:7")
    deliver_due(Webhook.objects.get().pk)
    assert verified(body["secret"], receiver.received[0])["data"]["about"] == "load:7"

    (listed,) = answer(get(manager, "/webhooks"))["webhooks"]
    assert listed == answer(get(api(people.auditor), place))
    assert "secret" not in listed
    (delivery,) = answer(get(manager, f"{place}/deliveries"))["deliveries"]
    assert (delivery["state"], delivery["event"], delivery["about"]) == (
        "delivered",
        "load.rejected",
        "load:7",
    )
    assert [(one["outcome"], one["status"]) for one in delivery["tries"]] == [("delivered", 200)]
    assert receiver.received[0].headers["webhook-id"] == delivery["message"]

    rotated = post(manager, f"{place}/secret", {})
    assert (rotated.status_code, len(answer(rotated)["secrets"])) == (201, 2)
    again = post(manager, f"{place}/deliveries/{delivery['id']}/replay", b"")
    assert (again.status_code, answer(again)["state"]) == (200, "waiting")
    deliver_due(Webhook.objects.get().pk)
    assert verified(answer(rotated)["secret"], receiver.received[1])

    ended = manager.delete(f"/api/v1{place}")
    assert (ended.status_code, ended.content) == (204, b"")
    assert answer(get(manager, place))["state"] == "ended"
    assert answer(get(manager, "/webhooks"))["webhooks"] == []
    assert manager.delete(f"/api/v1{place}").status_code == 204
    refused = post(manager, f"{place}/secret", {})
    assert (refused.status_code, answer(refused)["code"]) == (409, "webhook-ended")


def test_the_events_that_can_be_subscribed_to_are_listed_with_their_meaning(people):
    assert set(answer(get(api(people.auditor), "/webhooks"))["events"]) == {
        "load.rejected", "load.accepted", "load.stale", "manifest.filed", "falling.due",
    }  # fmt: skip


def test_an_integration_with_the_scope_subscribes_and_one_without_does_not(people):
    def client(*scopes: str) -> APIClient:
        issued = issue_token(
            actor(people.manager),
            people.manager,
            label="schedule",
            scopes=scopes,
            grantable=allowed.grantable(["operations manager"], integration=True),
            valid_for=timedelta(days=1),
            integration=True,
        )
        made = APIClient()
        made.credentials(HTTP_AUTHORIZATION=f"Bearer {issued.secret}")
        return made

    assert post(client("read", "subscribe-webhook"), "/webhooks", ASKED).status_code == 201
    assert post(client("read"), "/webhooks", ASKED).status_code == 403


def test_a_token_limited_to_aircraft_has_no_part_in_it_whatever_body_it_sends(people):
    make_aircraft(people)
    issued = issue_token(
        actor(people.manager),
        people.manager,
        label="one aircraft",
        scopes=[kind.name for kind in WEBHOOK_KINDS] + ["read"],
        grantable=allowed.grantable(["operations manager"], integration=False),
        valid_for=timedelta(days=1),
        registrations=["Q9-KTB"],
    )
    client, body = APIClient(), {"aircraft": "Q9-KTB"}
    client.credentials(HTTP_AUTHORIZATION=f"Bearer {issued.secret}")
    made = answer(post(api(people.manager), "/webhooks", ASKED))
    place = f"/webhooks/{made['id']}"

    assert get(client, "/webhooks").status_code == get(client, place).status_code == 403
    assert post(client, "/webhooks", ASKED).status_code == 403
    assert post(client, "/webhooks", ASKED | body).status_code == 422
    assert post(client, f"{place}/secret", body).status_code == 422
    ended = client.delete(f"/api/v1{place}", data=json.dumps(body), content_type="application/json")
    assert ended.status_code == 422
    assert answer(get(api(people.manager), place))["state"] == "live"


def test_a_repeated_request_gets_the_same_secret_and_it_is_not_kept_readable(people):
    key = str(uuid4())

    first, second = (post(api(people.manager), "/webhooks", ASKED, key=key) for _ in range(2))

    assert (first.content, second["Idempotency-Replayed"]) == (second.content, "true")
    assert Webhook.objects.count() == 1
    kept = bytes(Receipt.objects.get().body)
    assert b"whsec_" not in kept
    assert b"hooks.example.org" not in kept


def test_who_holds_no_duty_for_it_is_refused_and_a_stranger_gets_a_404(people):
    made = answer(post(api(people.manager), "/webhooks", ASKED))
    announced(people)
    place, delivery = f"/webhooks/{made['id']}", WebhookDelivery.objects.get().pk
    moves = (f"{place}/secret", f"{place}/resumption", f"{place}/deliveries/{delivery}/replay")

    for who, status in ((people.pilot, 403), (strangers().manager, 404)):
        client = api(who)
        assert [post(client, move, {}).status_code for move in moves] == [status] * 3
        assert client.delete(f"/api/v1{place}").status_code == status
    assert post(api(people.pilot), "/webhooks", ASKED).status_code == 403
    other = api(strangers("third-test").manager)
    assert [get(other, where).status_code for where in (place, f"{place}/deliveries")] == [404, 404]
    assert answer(get(other, "/webhooks"))["webhooks"] == []
    assert get(api(people.idle), "/webhooks").status_code == 403
    assert get(APIClient(), "/webhooks").status_code == 401


@pytest.mark.parametrize(
    ("changes", "pointer"),
    [
        ({"address": None}, "/address"),
        ({"address": 7}, "/address"),
        ({"address": ["https://hooks.example.org"]}, "/address"),
        ({"address": ""}, "/address"),
        ({"address": "http://hooks.example.org/"}, "/address"),
        ({"address": "https://127.0.0.1/"}, "/address"),
        ({"address": "https://hooks.example.org/" + "a" * 600}, "/address"),
        ({"address": "https://hooks.example.org/\u0000"}, None),
        ({"events": None}, "/events"),
        ({"events": "load.rejected"}, "/events"),
        ({"events": []}, "/events"),
        ({"events": [1]}, "/events/0"),
        ({"events": ["load.rejected", "load.lost"]}, "/events/1"),
        ({"events": ["load.rejected"] * 51}, "/events"),
        ({"label": 1}, "/label"),
        ({"label": "x" * 81}, "/label"),
        ({"label": "a\nb"}, "/label"),
        ({"secret": "whsec_mine"}, "/secret"),
        ({"a/b": 1}, "/a~1b"),
    ],
)
def test_a_field_that_is_wrong_is_named_and_nothing_is_stored(people, changes, pointer):
    response = post(api(people.manager), "/webhooks", ASKED | changes)

    assert response.status_code == (422 if pointer else 400)
    if pointer:
        assert pointer in [error["pointer"] for error in answer(response)["errors"]]
    assert Webhook.objects.count() == Receipt.objects.count() == 0
    assert not Act.objects.filter(kind="subscribe-webhook").exists()


@pytest.mark.parametrize("name", ["address", "events"])
def test_a_field_that_is_missing_is_named(people, name):
    without = {field: value for field, value in ASKED.items() if field != name}

    response = post(api(people.manager), "/webhooks", without)

    assert [(e["pointer"], e["code"]) for e in answer(response)["errors"]] == [(f"/{name}", "missing")]


@pytest.mark.parametrize("body", [b"[]", b"7", b'"text"', b"null"])
def test_a_body_that_is_no_object_is_refused(people, body):
    assert post(api(people.manager), "/webhooks", body).status_code == 422


@pytest.mark.parametrize(
    "query",
    [
        "state=lost",
        "limit=0",
        "limit=201",
        "limit=x",
        "cursor=x",
        "cursor=",
        "page=2",
        "state=parked&state=x",
    ],
)
def test_a_parameter_that_is_wrong_is_refused(people, query):
    made = answer(post(api(people.manager), "/webhooks", ASKED))

    assert get(api(people.manager), f"/webhooks/{made['id']}/deliveries?{query}").status_code == 422


def test_what_takes_no_fields_refuses_them_and_an_unknown_delivery_is_a_404(people):
    made = answer(post(api(people.manager), "/webhooks", ASKED))
    manager, place = api(people.manager), f"/webhooks/{made['id']}"

    assert post(manager, f"{place}/secret", {"secret": "whsec_mine"}).status_code == 422
    assert post(manager, f"{place}/deliveries/{uuid4()}/replay", {}).status_code == 404
    assert post(manager, f"/webhooks/{uuid4()}/secret", {}).status_code == 404
    assert get(manager, "/webhooks/7").status_code == 404


def test_deliveries_come_a_page_at_a_time_the_newest_first_and_by_state(people):
    made = answer(post(api(people.manager), "/webhooks", ASKED))
    for number in range(5):
        announced(people, about=f"load:{number}")
    manager, path, seen = api(people.manager), f"/webhooks/{made['id']}/deliveries?limit=2", []

    while path:
        page = get(manager, path)
        body = answer(page)
        seen.append([one["about"] for one in body["deliveries"]])
        path = body["next"].removeprefix("/api/v1") if body["next"] else None
        assert page.get("Link") == (f'<{body["next"]}>; rel="next"' if path else None)

    assert seen == [["load:4", "load:3"], ["load:2", "load:1"], ["load:0"]]
    assert answer(get(manager, f"/webhooks/{made['id']}/deliveries?state=parked"))["deliveries"] == []
