"""Workers and people at the same time, with real threads and real commits."""

from collections import Counter
from concurrent.futures import ThreadPoolExecutor

import pytest
from django.db import connections

from records.models import WebhookAttempt, WebhookDelivery, WebhookSecret, WebhookStep
from records.refusal import StepRefused
from records.webhooks.deliver import deliver_due
from records.webhooks.end_subscription import end_subscription
from records.webhooks.rotate_secret import rotate_secret
from tests.cast import actor, cast
from tests.records.webhooks.making import announced, subscribed
from tests.records.webhooks.receiver import running

pytestmark = pytest.mark.usefixtures("own_database")
HANDS = 8


def at_once(work) -> list[object]:
    """Do the work in eight threads at once, each with a connection of its own; refusals are returned."""

    def one(_: int) -> object:
        try:
            return work()
        except StepRefused as refused:
            return refused
        finally:
            connections.close_all()

    with ThreadPoolExecutor(HANDS) as hands:
        return list(hands.map(one, range(HANDS)))


def test_eight_workers_at_one_subscription_send_each_event_once(settings):
    people = cast("racing-workers")
    with running() as told:
        settings.WEBHOOK_TRUSTED_RECEIVERS = frozenset({told.place})
        webhook = subscribed(people, told).standing.webhook.pk
        for number in range(12):
            announced(people, about=f"load:{number}")

        while WebhookDelivery.objects.filter(webhook=webhook, state="waiting").exists():
            at_once(lambda: deliver_due(webhook))

    assert set(Counter(one.headers["webhook-id"] for one in told.received).values()) == {1}
    assert len(told.received) == 12
    assert WebhookAttempt.objects.filter(delivery__webhook=webhook).count() == 12


def test_of_people_who_end_one_subscription_at_once_the_trail_has_one_end(settings):
    people = cast("racing-people")
    with running() as told:
        settings.WEBHOOK_TRUSTED_RECEIVERS = frozenset({told.place})
        webhook = subscribed(people, told).standing.webhook.pk
    by = actor(people.manager)

    at_once(lambda: end_subscription(by, webhook))

    assert list(
        WebhookStep.objects.filter(webhook=webhook).order_by("id").values_list("after", flat=True)
    ) == [
        "live",
        "ended",
    ]


def test_of_new_secrets_made_at_once_one_is_without_end_and_the_others_are_refused_or_replaced(settings):
    people = cast("racing-secrets")
    with running() as told:
        settings.WEBHOOK_TRUSTED_RECEIVERS = frozenset({told.place})
        webhook = subscribed(people, told).standing.webhook.pk
    by = actor(people.manager)

    made = at_once(lambda: rotate_secret(by, webhook))

    won = [one for one in made if not isinstance(one, StepRefused)]
    assert won
    secrets = WebhookSecret.objects.filter(webhook=webhook)
    assert (secrets.count(), secrets.filter(ends_at=None).count()) == (1 + len(won), 1)
