"""Subscriptions to events: begun, listed, shown, ended; new secrets; taking up what is parked."""

from uuid import UUID

from django.conf import settings
from django.http import HttpResponse
from drf_spectacular.utils import extend_schema
from rest_framework.request import Request
from rest_framework.response import Response
from rest_framework.views import APIView

from records.api.asking import actor_of, document_of, operator_of, parameters_of
from records.api.describing import IDEMPOTENCY_KEY, problems, problems_of_reading, problems_of_storing
from records.api.once import Answer, once
from records.api.webhook_answers import subscription_answer, subscription_asked
from records.api.webhook_shapes import (
    SubscriptionAnswer,
    SubscriptionList,
    SubscriptionRequest,
    SubscriptionWithSecret,
)
from records.refusal import Fault, Invalid
from records.webhooks.end_subscription import end_subscription
from records.webhooks.resume import resume
from records.webhooks.rotate_secret import rotate_secret
from records.webhooks.standing import standing_of, standings
from records.webhooks.subscribe import Subscribed, subscribe


class WebhooksView(APIView):
    """The operator's subscriptions."""

    @extend_schema(
        operation_id="list_webhooks",
        summary="List subscriptions to events",
        responses={200: SubscriptionList, **problems(401, 403, 422, 503)},
    )
    def get(self, request: Request) -> Response:
        """List the subscriptions that are not ended, and the events there are, each with its meaning."""
        parameters_of(request, allowed=())
        found = [subscription_answer(one) for one in standings(operator_of(request))]
        return Response({"webhooks": found, "events": dict(settings.WEBHOOK_EVENTS)})

    @extend_schema(
        operation_id="subscribe",
        summary="Subscribe an address to events",
        parameters=[IDEMPOTENCY_KEY],
        request=SubscriptionRequest,
        responses={201: SubscriptionWithSecret, **problems_of_storing()},
    )
    def post(self, request: Request) -> HttpResponse:
        """Have events sent to an address, signed per the Standard Webhooks specification. The answer shows
        the secret, once.
        """
        document, actor = document_of(request), actor_of(request)

        def work() -> Answer:
            address, events, label = subscription_asked(document)
            made = subscribe(actor, address=address, events=events, label=label)
            place = f"/api/v1/webhooks/{made.standing.webhook.pk}"
            return 201, {"Location": place, "Cache-Control": "no-store"}, _with_secret(made)

        return once(request, work, confidential=True)


class WebhookView(APIView):
    """One subscription."""

    @extend_schema(
        operation_id="read_webhook",
        summary="Read a subscription",
        responses={200: SubscriptionAnswer, **problems_of_reading()},
    )
    def get(self, request: Request, webhook: UUID) -> Response:
        """Read a subscription as it stands, ended or not. Its secret is not shown again."""
        parameters_of(request, allowed=())
        return Response(subscription_answer(standing_of(operator_of(request), webhook)))

    @extend_schema(
        operation_id="end_webhook",
        summary="End a subscription",
        request=None,
        responses={204: None, **problems(401, 403, 404, 409, 422, 503)},
    )
    def delete(self, request: Request, webhook: UUID) -> HttpResponse:
        """End a subscription and whatever waits for it. One that is ended stays ended."""
        parameters_of(request, allowed=())
        refuse_a_body(request)
        actor = actor_of(request)
        standing_of(operator_of(request), webhook)
        end_subscription(actor, webhook)
        return HttpResponse(status=204)


class WebhookSecretView(APIView):
    """The secret of one subscription."""

    @extend_schema(
        operation_id="rotate_webhook_secret",
        summary="Make a new secret for a subscription",
        parameters=[IDEMPOTENCY_KEY],
        request=None,
        responses={201: SubscriptionWithSecret, **problems_of_storing()},
    )
    def post(self, request: Request, webhook: UUID) -> HttpResponse:
        """Make a new secret, shown this once. For a day messages carry two signatures, with the old and the
        new one.
        """
        refuse_a_body(request)
        actor = actor_of(request)

        def work() -> Answer:
            return 201, {"Cache-Control": "no-store"}, _with_secret(rotate_secret(actor, webhook))

        return once(request, work, confidential=True)


class WebhookResumptionView(APIView):
    """Taking up one parked subscription."""

    @extend_schema(
        operation_id="resume_webhook",
        summary="Take a parked subscription up again",
        parameters=[IDEMPOTENCY_KEY],
        request=None,
        responses={200: SubscriptionAnswer, **problems_of_storing()},
    )
    def post(self, request: Request, webhook: UUID) -> HttpResponse:
        """Make a parked subscription live; every event kept for it is sent, the oldest first."""
        refuse_a_body(request)
        actor = actor_of(request)
        return once(request, lambda: (200, {}, subscription_answer(resume(actor, webhook))))


def refuse_a_body(request: Request) -> None:
    """This function will raise Invalid for fields where none are taken; an empty object is none."""
    if request.body.strip() and (document := document_of(request)):
        raise Invalid(Fault("", "unknown-field", f"nothing is taken here, {len(document)} fields were sent"))


def _with_secret(made: Subscribed) -> dict[str, object]:
    return subscription_answer(made.standing) | {"secret": made.secret}
