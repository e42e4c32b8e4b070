"""What was sent to a subscriber and what came of it; having one event sent again."""

from urllib.parse import urlencode
from uuid import UUID

from django.http import HttpResponse
from drf_spectacular.types import OpenApiTypes
from drf_spectacular.utils import OpenApiParameter, extend_schema
from rest_framework.request import Request
from rest_framework.response import Response
from rest_framework.views import APIView

from records.api.asking import actor_of, operator_of, parameters_of
from records.api.describing import IDEMPOTENCY_KEY, problems_of_reading, problems_of_storing
from records.api.once import once
from records.api.webhook_answers import delivery_answer
from records.api.webhook_shapes import DeliveryAnswer, DeliveryList
from records.api.webhooks import refuse_a_body
from records.models.webhook_delivery import DELIVERY_STATES
from records.refusal import Fault, Invalid
from records.webhooks.deliveries import deliveries_of
from records.webhooks.replay import replay
from records.webhooks.standing import standing_of

MOST_ROWS, USUAL_ROWS = 200, 50
_LIMITS = frozenset(str(rows) for rows in range(1, MOST_ROWS + 1))
_PARAMETERS = [
    OpenApiParameter("state", OpenApiTypes.STR, enum=DELIVERY_STATES),
    OpenApiParameter("limit", OpenApiTypes.INT, description=f"rows a page, 1 to {MOST_ROWS}; 50 without"),
    OpenApiParameter("cursor", OpenApiTypes.STR, description="as the link to the next page gives it"),
]


class WebhookDeliveriesView(APIView):
    """Deliveries to one subscriber."""

    @extend_schema(
        operation_id="list_webhook_deliveries",
        summary="List deliveries to a subscriber",
        parameters=_PARAMETERS,
        responses={200: DeliveryList, **problems_of_reading()},
    )
    def get(self, request: Request, webhook: UUID) -> Response:
        """List what was or will be sent to a subscriber, the newest first, each with every try."""
        asked = parameters_of(request, allowed=("state", "limit", "cursor"))
        state, limit = asked.get("state", ""), asked.get("limit", str(USUAL_ROWS))
        if state and state not in DELIVERY_STATES:
            raise Invalid(Fault("?state", "choice", f"one of: {', '.join(DELIVERY_STATES)}"))
        if limit not in _LIMITS:
            raise Invalid(Fault("?limit", "out-of-range", f"write a whole number from 1 to {MOST_ROWS}"))
        before = _cursor_in(asked["cursor"]) if "cursor" in asked else None
        subscription = standing_of(operator_of(request), webhook).webhook
        rows, after = deliveries_of(subscription, state=state, before=before, most=int(limit))
        kept = {name: value for name, value in asked.items() if name != "cursor"}
        following = f"{request.path}?{urlencode({**kept, 'cursor': str(after)})}" if after else None
        headers = {"Link": f'<{following}>; rel="next"'} if following else {}
        return Response(
            {"deliveries": [delivery_answer(one) for one in rows], "next": following}, headers=headers
        )


class WebhookReplayView(APIView):
    """Sending one event again."""

    @extend_schema(
        operation_id="replay_webhook_delivery",
        summary="Have an event delivered again",
        parameters=[IDEMPOTENCY_KEY],
        request=None,
        responses={200: DeliveryAnswer, **problems_of_storing()},
    )
    def post(self, request: Request, webhook: UUID, delivery: UUID) -> HttpResponse:
        """Begin a new round of tries at once, with the same message number and the same body."""
        refuse_a_body(request)
        actor = actor_of(request)
        return once(request, lambda: (200, {}, delivery_answer(replay(actor, webhook, delivery))))


def _cursor_in(text: str) -> UUID:
    try:
        return UUID(text)
    except ValueError:
        raise Invalid(
            Fault("?cursor", "cursor-malformed", "send a cursor as the link to the next page gives it")
        ) from None
