"""Tables of standard weights: entered, listed by both clocks, approved."""

from uuid import UUID

from django.http import HttpResponse
from drf_spectacular.utils import extend_schema
from rest_framework.request import Request
from rest_framework.views import APIView

from fleet.actions.approve_standard_weights import approve_standard_weights
from fleet.actions.enter_standard_weights import enter_standard_weights
from fleet.api.answers import shown
from fleet.api.answers_provisions import created, now_as_it_is, provision_line, provisions_answer
from fleet.api.asking import AS_KNOWN_AT, AT, approval_asked
from fleet.api.documents import described
from fleet.api.shapes_provisions import ProvisionAnswer, ProvisionList
from fleet.provisions import STANDARD_WEIGHTS
from fleet.queries.provisions import provision_of
from records.api.asking import actor_of, document_of, operator_of, parameters_of
from records.api.once import Answer, once

PLACE = "/api/v1/standard-weights"


class StandardWeightsEndpoint(APIView):
    """The operator's tables of standard weights."""

    @extend_schema(
        operation_id="list_standard_weights", parameters=[AT, AS_KNOWN_AT], responses=ProvisionList
    )
    def get(self, request: Request) -> HttpResponse:
        """Which table was in force at `at`, as known at `as-known-at`, and every version ever entered."""
        return provisions_answer(request, STANDARD_WEIGHTS)

    @extend_schema(
        operation_id="enter_standard_weights",
        request=described("standard-weights-1"),
        responses={201: ProvisionAnswer},
    )
    def post(self, request: Request) -> HttpResponse:
        """Enters a table. It counts for nothing until a second person approves it."""
        document = document_of(request)

        def work() -> Answer:
            return created(enter_standard_weights(actor_of(request), document), PLACE)

        return once(request, work)


class OneStandardWeightsEndpoint(APIView):
    """One table."""

    @extend_schema(operation_id="show_standard_weights", responses=ProvisionAnswer)
    def get(self, request: Request, version: UUID) -> HttpResponse:
        """The table with its document, numbers as typed."""
        parameters_of(request, allowed=())
        return shown(provision_line(provision_of(operator_of(request), STANDARD_WEIGHTS, version)))


class StandardWeightsApprovalEndpoint(APIView):
    """The approval of one table."""

    @extend_schema(
        operation_id="approve_standard_weights",
        request=described("approval-1"),
        responses={201: ProvisionAnswer},
    )
    def post(self, request: Request, version: UUID) -> HttpResponse:
        """Approves the table, by another person than entered it; it holds from its own `true_from`."""
        document = document_of(request)

        def work() -> Answer:
            table = provision_of(operator_of(request), STANDARD_WEIGHTS, version)
            reason = approval_asked(document).reason
            approve_standard_weights(actor_of(request), table, reason=reason)
            return now_as_it_is(table)

        return once(request, work)
