"""Loads computed again against a later figure: asking for it, and reading how it stands."""

import re
from http import HTTPStatus
from typing import Any
from uuid import UUID

from django.http import HttpResponse, StreamingHttpResponse
from django.http.response import HttpResponseBase
from drf_spectacular.types import OpenApiTypes
from drf_spectacular.utils import OpenApiParameter, OpenApiResponse, extend_schema
from rest_framework.renderers import BaseRenderer
from rest_framework.request import Request
from rest_framework.response import Response
from rest_framework.views import APIView

from loads.actions.ask_recheck import ask_recheck
from loads.api.shapes_recheck import RecheckAnswer, RecheckRequest
from loads.models import Recheck
from loads.queries.recheck_answer import CSV_TYPE, RECHECK_PATH, csv_of, recheck_answer
from loads.queries.recheck_csv import csv_lines
from loads.queries.rechecks import Page, recheck_of, table_page
from records.api.asking import actor_of, document_of, operator_of, parameters_of
from records.api.describing import IDEMPOTENCY_KEY, problems_of_reading, problems_of_storing
from records.api.once import Answer, once
from records.api.render import ExactJSONRenderer
from records.refusal import Fault, Invalid

_PLACE = re.compile(r"(\d{1,9})\.(\d{1,18})", re.ASCII)
_TABLE = OpenApiResponse(OpenApiTypes.STR, description="The whole table as CSV.")


class CSVRenderer(BaseRenderer):
    """Lets an endpoint be asked for `text/csv`; the lines are streamed past it."""

    media_type = CSV_TYPE
    format = "csv"
    charset = "utf-8"

    def render(self, data: Any, *_positional: Any, **_named: Any) -> bytes:
        """This function will refuse to be used: no answer of this kind is made of a document."""
        raise TypeError(f"a table is streamed, not rendered from {type(data).__name__}")


class RechecksView(APIView):
    """Loads to be computed again."""

    @extend_schema(
        operation_id="ask_recheck",
        summary="Have loads computed again against a later figure",
        parameters=[IDEMPOTENCY_KEY],
        request=RecheckRequest,
        responses={202: RecheckAnswer, **problems_of_storing()},
    )
    def post(self, request: Request) -> HttpResponse:
        """Have an aircraft's loads, or the whole operator's, computed again. The work is done part by part
        after this answer; no filed record is changed, and flights a later figure puts outside are flagged.
        """
        document, actor = document_of(request), actor_of(request)

        def work() -> Answer:
            recheck = ask_recheck(document, by=actor)
            headers = {"Location": RECHECK_PATH.format(recheck.id)}
            return HTTPStatus.ACCEPTED, headers, recheck_answer(recheck, Page((), None))

        return once(request, work)


class RecheckView(APIView):
    """One recheck."""

    renderer_classes = (ExactJSONRenderer, CSVRenderer)

    @extend_schema(
        operation_id="read_recheck",
        summary="Read how a recheck stands, and its table",
        parameters=[
            OpenApiParameter("after", OpenApiTypes.STR, description="as the link to the next page gives it")
        ],
        responses={
            (200, "application/json"): RecheckAnswer,
            (200, CSV_TYPE): _TABLE,
            **problems_of_reading(),
        },
    )
    def get(self, request: Request, recheck: UUID) -> HttpResponseBase:
        """Read progress, counts and a page of the table; with `Accept: text/csv` the whole table."""
        asked = parameters_of(request, allowed=("after",))
        found = recheck_of(operator_of(request), recheck)
        if getattr(request.accepted_renderer, "format", "") == "csv":
            return streamed(found)
        answer = recheck_answer(found, table_page(found, _after(asked.get("after"))))
        headers = {"Link": f'<{answer["next"]}>; rel="next"'} if answer["next"] else {}
        return Response(answer, headers=headers)


class RecheckTableView(APIView):
    """The table of a recheck as CSV, at an address of its own."""

    renderer_classes = (CSVRenderer, ExactJSONRenderer)

    @extend_schema(
        operation_id="read_recheck_table",
        summary="Read the table of a recheck as CSV",
        responses={(200, CSV_TYPE): _TABLE, **problems_of_reading()},
    )
    def get(self, request: Request, recheck: UUID) -> StreamingHttpResponse:
        """Read the whole table. A cell that a spreadsheet would take for a formula has an apostrophe in
        front.
        """
        parameters_of(request, allowed=())
        return streamed(recheck_of(operator_of(request), recheck))


def streamed(recheck: Recheck) -> StreamingHttpResponse:
    """This function will answer with the table, read and sent a few hundred rows at a time."""
    headers = {"Content-Disposition": f'attachment; filename="recheck-{recheck.id}.csv"'}
    lines = csv_lines(csv_of(recheck))
    return StreamingHttpResponse(lines, content_type=f"{CSV_TYPE}; charset=utf-8", headers=headers)


def _after(text: str | None) -> tuple[int, int] | None:
    if text is None:
        return None
    place = _PLACE.fullmatch(text)
    if place is None:
        raise Invalid(Fault("?after", "cursor-malformed", "take it from the link to the next page"))
    return int(place[1]), int(place[2])
