"""Subscribing, rotating, ending: who may, what is refused, what stands in the trail and what never does."""

import base64
from collections.abc import Callable
from typing import Any

import pytest
from django.db import IntegrityError, connection, transaction

from records import acts
from records.act import act
from records.models import Act, Change, Webhook, WebhookDelivery, WebhookSecret, WebhookStep
from records.reconcile import reconcile
from records.refusal import Invalid, NotAllowed, NotKnown, StepRefused
from records.sealing import SealBroken, opened, sealed
from records.webhooks.end_subscription import end_subscription
from records.webhooks.replay import replay
from records.webhooks.resume import resume
from records.webhooks.rotate_secret import rotate_secret
from records.webhooks.standing import standing_of, standings
from records.webhooks.subscribe import MOST_AT_ONCE, subscribe
from tests.cast import actor, cast, strangers
from tests.records.webhooks.making import announced, subscribed

ADDRESS = "https://hooks.example.org/events"


def codes(refused: pytest.ExceptionInfo[Invalid]) -> list[tuple[str, str]]:
    return [(fault.pointer, fault.code) for fault in refused.value.faults]


def test_a_subscription_is_an_act_and_its_secret_stands_nowhere(people, receiver):
    made = subscribed(people, receiver)
    rotate_secret(actor(people.manager), made.standing.webhook.pk)
    secret = base64.b64decode(made.secret.removeprefix("whsec_"))

    kinds = list(
        Act.objects.filter(about=f"webhook:{made.standing.webhook.pk}").values_list("kind", flat=True)
    )
    assert sorted(kinds) == ["rotate-webhook-secret", "subscribe-webhook"]
    assert len(secret) == 32
    assert all(secret not in bytes(kept.sealed) for kept in WebhookSecret.objects.all())
    images = list(Change.objects.filter(table_name="records_webhooksecret").values_list("image", flat=True))
    assert len(images) == 3
    for image in map(str, images):
        assert "changed" in image
        assert not any(bytes(kept.sealed).hex() in image for kept in WebhookSecret.objects.all())


def test_what_subscribing_and_ending_left_fits_the_trail(people, receiver):
    webhook = subscribed(people, receiver).standing.webhook.pk
    rotate_secret(actor(people.manager), webhook)
    end_subscription(actor(people.manager), webhook)

    assert reconcile() == ()


def test_what_is_sealed_opens_for_its_purpose_only(settings):
    kept = sealed(b"a secret", "this")

    assert opened(kept, "this") == b"a secret"
    assert kept != sealed(b"a secret", "this")
    for broken, purpose in ((kept, "that"), (kept[:-1] + b"A", "this"), (b"", "this")):
        with pytest.raises(SealBroken):
            opened(broken, purpose)
    settings.SECRET_KEY = "another-key-another-key-another-key-another-key-"
    with pytest.raises(SealBroken):
        opened(kept, "this")


def test_every_fault_of_a_subscription_is_named(people):
    with pytest.raises(Invalid) as refused:
        subscribe(
            actor(people.manager), address="http://hooks.example.org", events=["load.lost"], label="a\nb"
        )
    assert codes(refused) == [
        ("/address", "address-not-https"),
        ("/events/0", "event-unknown"),
        ("/label", "label-malformed"),
    ]

    with pytest.raises(Invalid) as refused:
        subscribe(actor(people.manager), address="https://10.0.0.1/", events=[], label="")
    assert codes(refused) == [("/address", "address-not-public"), ("/events", "events-missing")]
    assert Webhook.objects.count() == 0


def test_an_operator_has_no_more_than_twenty_at_once(people):
    for _ in range(MOST_AT_ONCE):
        last = subscribe(actor(people.manager), address=ADDRESS, events=["load.rejected"], label="")

    with pytest.raises(StepRefused):
        subscribe(actor(people.manager), address=ADDRESS, events=["load.rejected"], label="")
    end_subscription(actor(people.manager), last.standing.webhook.pk)

    assert subscribe(actor(people.manager), address=ADDRESS, events=["load.rejected"], label="")


def _of(people: Any) -> tuple[Callable[[Any, Any, Any], object], ...]:
    return (
        lambda by, webhook, _: rotate_secret(by, webhook),
        lambda by, webhook, _: resume(by, webhook),
        lambda by, webhook, _: end_subscription(by, webhook),
        replay,
    )


def test_whoever_holds_no_duty_for_it_may_do_none_of_it(people, receiver):
    webhook = subscribed(people, receiver).standing.webhook.pk
    announced(people)
    delivery = WebhookDelivery.objects.get().pk

    for do in _of(people):
        with pytest.raises(NotAllowed):
            do(actor(people.pilot), webhook, delivery)
    with pytest.raises(NotAllowed):
        subscribe(actor(people.auditor), address=ADDRESS, events=["load.rejected"], label="")


def test_another_operators_subscription_is_not_known(people, receiver):
    webhook = subscribed(people, receiver).standing.webhook.pk
    announced(people)
    delivery, others = WebhookDelivery.objects.get().pk, strangers()

    for do in _of(people):
        with pytest.raises(NotKnown):
            do(actor(others.manager), webhook, delivery)
    assert standings(others.operator.code) == []
    assert standing_of(people.operator.code, webhook).state == "live"


def test_nothing_is_done_with_one_that_is_ended_and_ending_again_changes_nothing(people, receiver):
    webhook = subscribed(people, receiver).standing.webhook.pk
    announced(people)
    delivery = WebhookDelivery.objects.get().pk
    end_subscription(actor(people.manager), webhook)

    for do in (rotate_secret, resume):
        with pytest.raises(StepRefused):
            do(actor(people.manager), webhook)
    with pytest.raises(StepRefused):
        replay(actor(people.manager), webhook, delivery)
    end_subscription(actor(people.manager), webhook)

    assert WebhookStep.objects.filter(webhook=webhook).count() == 2
    assert announced(people) == 0


def test_only_a_parked_one_is_taken_up_again(people, receiver):
    webhook = subscribed(people, receiver).standing.webhook.pk

    with pytest.raises(StepRefused) as refused:
        resume(actor(people.manager), webhook)

    assert refused.value.code == "webhook-live"


def write(people, table: str, **row: Any) -> None:
    """Write one row in plain SQL, inside an act of the operator."""
    with (
        act(acts.SUBSCRIBE_WEBHOOK, by=actor(people.manager), about="test:constraints") as entry,
        connection.cursor() as cursor,
    ):
        known = {"at": entry.at, "made_at": entry.at, "act": entry.id}
        values = {name: known.get(name) if value is ... else value for name, value in row.items()}
        names = ", ".join(values)
        places = ", ".join(["%s"] * len(values))
        cursor.execute(f"INSERT INTO {table} ({names}) VALUES ({places})", list(values.values()))


STEP = {
    "number": 2,
    "previous": 1,
    "before": "live",
    "after": "parked",
    "because": "x",
    "at": ...,
    "act": ...,
}


@pytest.mark.parametrize(
    ("changes", "constraint"),
    [
        ({"before": "live", "after": "live"}, "webhook_step_is_allowed"),
        ({"before": "ended", "after": "live"}, "webhook_step_is_allowed"),
        ({"before": "", "after": "ended", "number": 1, "previous": None}, "webhook_step_is_allowed"),
        ({"number": 3}, "webhook_steps_follow_each_other"),
        ({"number": 1, "previous": 0}, "webhook_step_is_taken_once"),
        ({"before": "parked", "after": "ended"}, "webhook_step_starts_where_the_last_ended"),
        ({"number": 5, "previous": 4}, "webhook_step_starts_where_the_last_ended"),
    ],
)
def test_the_database_refuses_a_step_that_is_not_allowed(people, receiver, changes, constraint):
    webhook = subscribed(people, receiver).standing.webhook

    with pytest.raises(IntegrityError, match=constraint):
        write(
            people,
            "records_webhookstep",
            operator_id=webhook.operator_id,
            webhook_id=webhook.pk,
            **STEP | changes,
        )


def test_the_database_keeps_one_secret_without_end_and_each_with_its_operator(people, receiver):
    webhook = subscribed(people, receiver).standing.webhook
    theirs = subscribed(cast("other-test"), receiver).standing.webhook
    row = {"operator_id": webhook.operator_id, "sealed": b"x", "made_at": ...}

    with pytest.raises(IntegrityError, match="webhook_has_one_secret_without_end"):
        write(people, "records_webhooksecret", webhook_id=webhook.pk, **row)
    with pytest.raises(IntegrityError, match="webhook_secret_is_of_its_webhooks_operator"):
        write(
            people, "records_webhooksecret", webhook_id=theirs.pk, **row | {"ends_at": "2099-01-01T00:00:00Z"}
        )


def test_the_log_of_tries_and_the_events_are_only_added_to(people, receiver):
    subscribed(people, receiver)
    announced(people)

    for statement in (
        "UPDATE records_webhookevent SET body = 'x'",
        "DELETE FROM records_webhookevent",
        "UPDATE records_webhookattempt SET outcome = 'x'",
        "DELETE FROM records_webhookattempt",
        "DELETE FROM records_webhookdelivery",
    ):
        with (
            pytest.raises(Exception, match="permission denied"),
            transaction.atomic(),
            connection.cursor() as cursor,
        ):
            cursor.execute(statement)
