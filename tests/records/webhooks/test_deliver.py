"""Delivered or parked by schedule, whatever a receiver does; nothing to a private address; nothing lost."""

from datetime import timedelta

import pytest
from django.utils import timezone

from records.models import Act, WebhookAttempt, WebhookDelivery, WebhookEvent
from records.tasks import deliver_to_webhook, sweep_webhooks
from records.webhooks import deliver
from records.webhooks.deliver import deliver_due, due_webhooks
from records.webhooks.end_subscription import end_subscription
from records.webhooks.replay import replay
from records.webhooks.resume import resume
from records.webhooks.rotate_secret import rotate_secret
from records.webhooks.schedule import WAITS
from records.webhooks.sending import Outcome
from records.webhooks.standing import standing_of
from records.webhooks.subscribe import subscribe
from tests.cast import actor, cast
from tests.records.webhooks.making import announced, make_due, subscribed, verified


def state(webhook) -> str:
    return standing_of(webhook.operator_id, webhook.pk).state


def test_an_event_is_delivered_signed_and_named(people, receiver):
    made = subscribed(people, receiver)
    announced(people, about="load:7")

    assert deliver_to_webhook(str(made.standing.webhook.pk)) == 1

    (request,) = receiver.received
    document = verified(made.secret, request)
    assert document["type"] == "load.rejected"
    assert document["data"] == {"about": "load:7", "verdict": "outside"}
    assert request.headers["webhook-id"] == WebhookEvent.objects.get().pk.hex
    delivery = WebhookDelivery.objects.get()
    assert (delivery.state, delivery.try_at, delivery.held_until) == ("delivered", None, None)
    assert list(WebhookAttempt.objects.values_list("outcome", "status")) == [("delivered", 200)]


def test_a_delivered_event_is_not_sent_again(people, receiver):
    webhook = subscribed(people, receiver).standing.webhook.pk
    announced(people)

    assert (deliver_due(webhook), deliver_due(webhook), due_webhooks(10)) == (1, 0, [])
    assert len(receiver.received) == 1


def test_an_event_goes_to_everybody_subscribed_to_it_and_to_nobody_else(people, receiver):
    first = subscribed(people, receiver, "load.rejected", "load.accepted").standing.webhook.pk
    subscribed(people, receiver, "manifest.filed")
    third = subscribed(people, receiver).standing.webhook.pk
    subscribed(cast("other-test"), receiver)

    assert announced(people) == 2

    assert set(due_webhooks(10)) == {first, third}
    assert {one.event_id for one in WebhookDelivery.objects.all()} == {WebhookEvent.objects.get().pk}


def test_where_nobody_subscribes_an_event_costs_one_query(people, receiver, django_assert_num_queries):
    subscribed(people, receiver, "manifest.filed")
    from records.act import act  # noqa: PLC0415  # only here
    from records.webhooks.announce import announce  # noqa: PLC0415  # only here
    from tests.records.webhooks.making import KIND  # noqa: PLC0415  # only here

    with act(KIND, by=actor(people.preparer), about="load:1") as entry, django_assert_num_queries(1):
        assert announce(entry, "load.rejected", "load:1", {}) == 0

    assert WebhookEvent.objects.count() == 0


def test_an_event_of_an_act_that_fails_is_not_sent(people, receiver):
    subscribed(people, receiver)
    from records.act import act  # noqa: PLC0415  # only here
    from records.webhooks.announce import announce  # noqa: PLC0415  # only here
    from tests.records.webhooks.making import KIND  # noqa: PLC0415  # only here

    def fail() -> None:
        with act(KIND, by=actor(people.preparer), about="load:1") as entry:
            announce(entry, "load.rejected", "load:1", {})
            raise ZeroDivisionError

    with pytest.raises(ZeroDivisionError):
        fail()

    assert WebhookEvent.objects.count() == WebhookDelivery.objects.count() == 0


def test_a_failing_receiver_is_tried_by_schedule_and_then_parked_with_what_follows(people, receiver):
    receiver.status = 500
    webhook = subscribed(people, receiver).standing.webhook
    announced(people)
    waits = []
    for _ in range(len(WAITS)):
        make_due(webhook.pk)
        assert deliver_due(webhook.pk) == 1
        delivery = WebhookDelivery.objects.get()
        waits.append(delivery.try_at - timezone.now() if delivery.try_at else None)

    for wait, planned in zip(waits[:-1], WAITS[1:], strict=True):
        assert planned - timedelta(seconds=5) < wait <= planned * 1.1
    assert waits[-1] is None
    assert (delivery.state, state(webhook), len(receiver.received)) == ("parked", "parked", 10)
    assert WebhookAttempt.objects.filter(outcome="refused", status=500).count() == 10
    parked = Act.objects.get(kind="park-webhook")
    assert (parked.actor_key, parked.about) == ("service:worker", f"webhook:{webhook.pk}")

    announced(people)  # kept, not sent
    make_due(webhook.pk)
    assert (deliver_due(webhook.pk), len(receiver.received)) == (0, 10)
    assert set(WebhookDelivery.objects.values_list("state", flat=True)) == {"parked"}


def test_a_parked_subscription_is_taken_up_again_with_all_that_was_kept(people, receiver):
    receiver.status = 500
    made = subscribed(people, receiver)
    webhook = made.standing.webhook
    announced(people, about="load:1")
    WebhookDelivery.objects.update(failed=9)
    deliver_due(webhook.pk)
    announced(people, about="load:2")
    assert state(webhook) == "parked"

    receiver.status = 200
    resume(actor(people.manager), webhook.pk)
    assert deliver_due(webhook.pk) == 2

    sent = [verified(made.secret, request)["data"]["about"] for request in receiver.received]
    assert sent == ["load:1", "load:1", "load:2"]
    assert state(webhook) == "live"


def test_a_receiver_that_is_gone_ends_its_subscription(people, receiver):
    receiver.status = 410
    webhook = subscribed(people, receiver).standing.webhook
    announced(people)
    announced(people)

    deliver_due(webhook.pk)

    assert state(webhook) == "ended"
    assert set(WebhookDelivery.objects.values_list("state", flat=True)) == {"ended"}
    assert Act.objects.get(kind="end-webhook").actor_key == "service:worker"
    assert (announced(people), deliver_due(webhook.pk), len(receiver.received)) == (0, 0, 1)


def test_a_redirect_is_a_failure_that_is_tried_again(people, receiver):
    receiver.status, receiver.headers = 302, {"Location": receiver.address}
    webhook = subscribed(people, receiver).standing.webhook
    announced(people)

    deliver_due(webhook.pk)

    assert receiver.connections == 1
    assert WebhookAttempt.objects.get().outcome == "redirected"
    assert WebhookDelivery.objects.get().state == "waiting"


def test_an_address_that_resolves_to_this_machine_is_never_called_and_is_parked_by_schedule(
    people, receiver, settings, monkeypatch
):
    settings.WEBHOOK_TRUSTED_RECEIVERS = frozenset()
    address = f"https://hooks.example.test:{receiver.port}/events"
    webhook = subscribe(
        actor(people.manager), address=address, events=["load.rejected"], label=""
    ).standing.webhook
    monkeypatch.setattr("socket.getaddrinfo", lambda *_, **__: [(2, 1, 6, "", ("127.0.0.1", receiver.port))])
    announced(people)

    for _ in range(len(WAITS)):
        make_due(webhook.pk)
        deliver_due(webhook.pk)

    assert receiver.connections == 0
    assert state(webhook) == "parked"
    assert set(WebhookAttempt.objects.values_list("outcome", flat=True)) == {"address-refused"}


def test_a_receiver_that_is_no_longer_trusted_is_not_called(people, receiver, settings):
    webhook = subscribed(people, receiver).standing.webhook
    announced(people)
    settings.WEBHOOK_TRUSTED_RECEIVERS = frozenset()

    deliver_due(webhook.pk)

    assert receiver.connections == 0
    assert WebhookAttempt.objects.get().outcome == "address-refused"


def test_while_a_secret_is_replaced_both_serve_and_later_only_the_new_one(people, receiver):
    made = subscribed(people, receiver)
    webhook = made.standing.webhook
    newer = rotate_secret(actor(people.manager), webhook.pk)
    announced(people)
    deliver_due(webhook.pk)

    (request,) = receiver.received
    assert verified(made.secret, request) == verified(newer.secret, request)
    assert made.secret != newer.secret

    newest = rotate_secret(actor(people.manager), webhook.pk)
    announced(people)
    deliver_due(webhook.pk)
    request = receiver.received[-1]
    assert len(request.headers["webhook-signature"].split(" ")) == 2
    assert verified(newest.secret, request) == verified(newer.secret, request)
    with pytest.raises(Exception, match="No matching signature"):
        verified(made.secret, request)


def test_a_replay_is_the_same_message_again(people, receiver):
    made = subscribed(people, receiver)
    webhook = made.standing.webhook
    announced(people)
    deliver_due(webhook.pk)

    replay(actor(people.manager), webhook.pk, WebhookDelivery.objects.get().pk)
    deliver_due(webhook.pk)

    first, second = receiver.received
    assert first.body == second.body
    assert first.headers["webhook-id"] == second.headers["webhook-id"]
    assert verified(made.secret, second)
    assert Act.objects.filter(kind="replay-webhook").count() == 1


def test_a_subscription_that_is_ended_meanwhile_stays_ended(people, receiver):
    webhook = subscribed(people, receiver).standing.webhook
    announced(people)

    def end_while_sending(*_: object) -> Outcome:
        end_subscription(actor(people.manager), webhook.pk)
        return Outcome("delivered", 200)

    deliver_due(webhook.pk, sending=end_while_sending)

    assert (state(webhook), WebhookDelivery.objects.get().state) == ("ended", "ended")


def test_one_worker_at_a_time_serves_a_subscription_and_a_dead_one_leaves_it(people, receiver):
    webhook = subscribed(people, receiver).standing.webhook
    announced(people)
    announced(people)
    tried_meanwhile = []

    def look_and_die(*_: object) -> Outcome:
        tried_meanwhile.extend([deliver_due(webhook.pk), due_webhooks(10)])
        raise KeyboardInterrupt

    with pytest.raises(KeyboardInterrupt):
        deliver_due(webhook.pk, sending=look_and_die)
    assert tried_meanwhile == [0, []]
    assert deliver_due(webhook.pk) == 0

    WebhookDelivery.objects.exclude(held_until=None).update(held_until=timezone.now())
    assert deliver_due(webhook.pk) == 2


def test_a_failure_ends_the_turn_so_that_a_sick_receiver_is_not_asked_for_each_event(people, receiver):
    receiver.status = 503
    webhook = subscribed(people, receiver).standing.webhook
    for _ in range(3):
        announced(people)

    assert deliver_due(webhook.pk) == 1
    assert len(receiver.received) == 1


def test_a_changed_key_of_the_service_is_said_and_nothing_is_sent_unsigned(people, receiver, settings):
    webhook = subscribed(people, receiver).standing.webhook
    announced(people)
    settings.SECRET_KEY = "another-key-another-key-another-key-another-key-"

    deliver_due(webhook.pk)

    assert receiver.received == []
    assert WebhookAttempt.objects.get().outcome == "secret-lost"


def test_the_sweeper_wakes_a_worker_for_what_is_due_and_for_nothing_else(people, receiver, monkeypatch):
    woken = []
    monkeypatch.setattr("records.outbox.wake", lambda task, key: woken.append((task, key)) or True)
    webhook = subscribed(people, receiver).standing.webhook.pk
    assert sweep_webhooks() == 0

    announced(people)
    assert sweep_webhooks() == 1
    assert woken == [("records.tasks.deliver_to_webhook", str(webhook))]

    deliver_due(webhook)
    assert sweep_webhooks() == 0


def test_a_worker_is_woken_after_the_commit_and_a_broker_that_is_down_is_asked_once(
    people, receiver, monkeypatch, django_capture_on_commit_callbacks
):
    asked = []
    monkeypatch.setattr("records.outbox.wake", lambda _task, key: asked.append(key) or False)
    subscribed(people, receiver)
    subscribed(people, receiver)

    with django_capture_on_commit_callbacks(execute=True):
        announced(people)
        assert asked == []

    assert len(asked) == 1


def test_after_the_first_failure_the_queue_wakes_a_worker_itself_after_that_the_sweeper_does(
    people, receiver, monkeypatch
):
    asked = []
    monkeypatch.setattr("records.outbox.wake", lambda _task, key, after: asked.append((key, after)) or True)
    receiver.status = 500
    webhook = subscribed(people, receiver).standing.webhook.pk
    announced(people)

    for _ in range(3):
        make_due(webhook)
        deliver_due(webhook)

    ((key, after),) = asked
    assert key == str(webhook)
    assert timedelta(seconds=4) < after <= timedelta(seconds=5.5)


def test_the_worker_may_do_its_two_acts_and_no_other():
    assert {"park-webhook", "end-webhook"} == deliver.ACTS_OF_THE_WORKER
