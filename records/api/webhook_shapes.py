"""What the API takes and answers about subscriptions, for its published description."""

from rest_framework import serializers

from records.models.webhook import STATES
from records.models.webhook_delivery import DELIVERY_STATES


class SubscriptionRequest(serializers.Serializer[object]):
    """Where to send which events."""

    address = serializers.CharField(
        max_length=500, help_text="https://…; http only to a receiver the service is set to trust"
    )
    events = serializers.ListField(child=serializers.CharField(), min_length=1, max_length=50)
    label = serializers.CharField(required=False, allow_blank=True, max_length=80)  # type: ignore[assignment]  # DRF takes fields out of the class


class SigningSecretLine(serializers.Serializer[object]):
    """One signing secret, without the secret; null: until a new one is made."""

    made_at = serializers.DateTimeField()
    ends_at = serializers.DateTimeField(allow_null=True)


class SubscriptionAnswer(serializers.Serializer[object]):
    """A subscription as it stands, and how many events wait for it or are parked."""

    id = serializers.UUIDField()
    address = serializers.CharField()
    events = serializers.ListField(child=serializers.CharField())
    label = serializers.CharField(allow_blank=True)  # type: ignore[assignment]  # as above
    state = serializers.ChoiceField(STATES)
    because = serializers.CharField()
    since = serializers.DateTimeField()
    subscribed_at = serializers.DateTimeField()
    secrets = SigningSecretLine(many=True)
    waiting = serializers.IntegerField()
    parked = serializers.IntegerField()


class SubscriptionWithSecret(SubscriptionAnswer):
    """The same with the secret its messages are signed with, shown this once."""

    secret = serializers.CharField()


class SubscriptionList(serializers.Serializer[object]):
    """The subscriptions of the operator that are not ended, the oldest first, and what can be subscribed
    to.
    """

    webhooks = SubscriptionAnswer(many=True)
    events = serializers.DictField(child=serializers.CharField())


class TryLine(serializers.Serializer[object]):
    """One try: what came of it in a stable word, and the HTTP status where there was one."""

    at = serializers.DateTimeField()
    milliseconds = serializers.IntegerField()
    outcome = serializers.CharField()
    status = serializers.IntegerField(allow_null=True)
    detail = serializers.CharField(allow_blank=True)


class DeliveryAnswer(serializers.Serializer[object]):
    """One event on its way to one subscriber. `message` is the `webhook-id`, the same in every try."""

    id = serializers.UUIDField()
    message = serializers.CharField()
    event = serializers.CharField()
    about = serializers.CharField()
    at = serializers.DateTimeField()
    state = serializers.ChoiceField(DELIVERY_STATES)
    next_try = serializers.DateTimeField(allow_null=True)
    tries = TryLine(many=True)


class DeliveryList(serializers.Serializer[object]):
    """Deliveries to one subscriber, the newest first, a page at a time."""

    deliveries = DeliveryAnswer(many=True)
    next = serializers.CharField(allow_null=True)
