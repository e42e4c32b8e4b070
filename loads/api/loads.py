"""Submitting, listing and reading loads."""

from dataclasses import replace
from uuid import UUID

from django.http import HttpResponse
from django.utils import timezone
from drf_spectacular.types import OpenApiTypes
from drf_spectacular.utils import OpenApiParameter, extend_schema
from rest_framework.request import Request
from rest_framework.response import Response
from rest_framework.views import APIView

from loads.actions.submit_load import submit_load
from loads.api.answering import created
from loads.api.pages import PARAMETERS, filters_in, next_address, page_asked
from loads.api.shapes_in import LoadDocument
from loads.api.shapes_out import VERDICTS, FullLoadAnswer, LoadAnswer, LoadList
from loads.lifecycle import STATES
from loads.queries.answer import full_answer_of, summary_of
from loads.queries.current import load_of
from loads.queries.listing import MOST_ROWS, list_loads
from records.api.asking import actor_of, document_of, etag, operator_of, parameters_of
from records.api.describing import IDEMPOTENCY_KEY, problems, problems_of_reading, problems_of_storing
from records.api.once import once

_INSTANT = "date, time and offset"
_FILTERS = [
    OpenApiParameter("aircraft", OpenApiTypes.STR, description="the registration"),
    OpenApiParameter("from", OpenApiTypes.STR, description=f"first departure ({_INSTANT}), included"),
    OpenApiParameter("to", OpenApiTypes.STR, description=f"departures before this ({_INSTANT})"),
    OpenApiParameter("state", OpenApiTypes.STR, enum=STATES),
    OpenApiParameter("verdict", OpenApiTypes.STR, enum=VERDICTS),
    OpenApiParameter("reference", OpenApiTypes.STR, description="the flight's reference, exactly"),
    OpenApiParameter("limit", OpenApiTypes.INT, description=f"rows a page, 1 to {MOST_ROWS}; 50 without"),
    OpenApiParameter("cursor", OpenApiTypes.STR, description="as the link to the next page gives it"),
]


class LoadsView(APIView):
    """Loads by departure, and new ones."""

    limits_its_answer = True

    @extend_schema(
        operation_id="submit_load",
        summary="Submit a load",
        parameters=[IDEMPOTENCY_KEY],
        request=LoadDocument,
        responses={201: LoadAnswer, **problems_of_storing()},
    )
    def post(self, request: Request) -> HttpResponse:
        """Compute a load and keep it, whatever its verdict; the answer holds all checks and the whole sum."""
        document, actor = document_of(request), actor_of(request)
        return once(request, lambda: created(submit_load(document, by=actor), actor))

    @extend_schema(
        operation_id="list_loads",
        summary="List loads by departure",
        parameters=_FILTERS,
        responses={200: LoadList, **problems(401, 403, 422, 503)},
    )
    def get(self, request: Request) -> Response:
        """List loads by planned departure, the earliest first, a page at a time."""
        asked = parameters_of(request, allowed=PARAMETERS)
        after, most = page_asked(asked)
        reach = actor_of(request).reach
        filters = replace(filters_in(asked), reach=reach)
        page = list_loads(operator_of(request), filters, after=after, most=most)
        following = next_address(request, page.after) if page.after else None
        headers = {"Link": f'<{following}>; rel="next"'} if following else {}
        return Response(
            {"loads": [summary_of(one, reach=reach) for one in page.loads], "next": following},
            headers=headers,
        )


class LoadView(APIView):
    """One load."""

    @extend_schema(
        operation_id="read_load",
        summary="Read a load",
        responses={200: FullLoadAnswer, **problems_of_reading()},
    )
    def get(self, request: Request, load: UUID) -> Response:
        """Read a load as it stands: what was declared, computed and signed. Its ETag is needed to move it."""
        parameters_of(request, allowed=())
        current = load_of(operator_of(request), load)
        answer = full_answer_of(current, known=timezone.now(), reach=actor_of(request).reach)
        return Response(answer, headers={"ETag": etag(current.step.number)})
