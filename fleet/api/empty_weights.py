"""Empty weights: entered, listed by both clocks, approved."""

from uuid import UUID

from django.http import HttpResponse
from drf_spectacular.utils import extend_schema
from rest_framework.request import Request
from rest_framework.views import APIView

from fleet.actions.approve_empty_weight import approve_empty_weight
from fleet.actions.enter_empty_weight import enter_empty_weight
from fleet.api.answers import shown, version_answer, version_line, weight_named
from fleet.api.asking import AS_KNOWN_AT, AT, aircraft_asked, clocks_asked
from fleet.api.documents import described
from fleet.api.shapes import EmptyWeightAnswer, EmptyWeightLine, EmptyWeightList
from fleet.entering import read_approval
from fleet.queries.aircraft import empty_weight_of
from fleet.queries.history import empty_weight_history, history_of
from fleet.queries.in_force import empty_weights_in_force
from records.api.asking import actor_of, document_of, parameters_of
from records.api.once import Answer, once
from records.refusal import Fault, Invalid


class EmptyWeightsEndpoint(APIView):
    """The empty weights of one aircraft."""

    @extend_schema(operation_id="list_empty_weights", parameters=[AT, AS_KNOWN_AT], responses=EmptyWeightList)
    def get(self, request: Request, registration: str) -> HttpResponse:
        """Which were in force at `at`, as known at `as-known-at`, and every version ever entered."""
        aircraft = aircraft_asked(request, registration)
        at, known = clocks_asked(request)
        return shown(
            {
                "at": at,
                "as_known_at": known,
                "in_force": [weight_named(each) for each in empty_weights_in_force(aircraft, at, known)],
                "empty_weights": [version_answer(each, aircraft) for each in empty_weight_history(aircraft)],
            }
        )


class WeighingsEndpoint(APIView):
    """Where empty weights come in: a plain result of a weighing, or an opening entry from paper."""

    @extend_schema(
        operation_id="enter_empty_weight",
        request=described("empty-weight-1"),
        responses={201: EmptyWeightLine},
    )
    def post(self, request: Request, registration: str) -> HttpResponse:
        """Enters an empty weight. It counts for nothing until a second person approves it."""
        document = document_of(request)

        def work() -> Answer:
            aircraft = aircraft_asked(request, registration)
            weight = enter_empty_weight(actor_of(request), aircraft, document)
            place = f"/api/v1/aircraft/{aircraft.registration}/empty-weights/{weight.id}"
            return 201, {"Location": place}, version_line(history_of(weight), aircraft)

        return once(request, work)


class OneEmptyWeightEndpoint(APIView):
    """One empty weight."""

    @extend_schema(operation_id="show_empty_weight", responses=EmptyWeightAnswer)
    def get(self, request: Request, registration: str, version: UUID) -> HttpResponse:
        """The version with its document, numbers as typed."""
        parameters_of(request, allowed=())
        aircraft = aircraft_asked(request, registration)
        return shown(version_answer(history_of(empty_weight_of(aircraft, version)), aircraft))


class EmptyWeightApprovalEndpoint(APIView):
    """The approval of one empty weight."""

    @extend_schema(
        operation_id="approve_empty_weight", request=described("approval-1"), responses={201: EmptyWeightLine}
    )
    def post(self, request: Request, registration: str, version: UUID) -> HttpResponse:
        """Approves the version, by another person than entered it; it holds from its own `true_from`."""
        document = document_of(request)

        def work() -> Answer:
            aircraft = aircraft_asked(request, registration)
            weight = empty_weight_of(aircraft, version)
            approving = read_approval(document)
            if approving.true_from is not None:
                raise Invalid(
                    Fault("/true_from", "unknown-field", "an empty weight says itself from when it holds")
                )
            approve_empty_weight(actor_of(request), aircraft, weight, reason=approving.reason)
            return 201, {}, version_line(history_of(empty_weight_of(aircraft, version)), aircraft)

        return once(request, work)
