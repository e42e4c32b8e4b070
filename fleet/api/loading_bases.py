"""Loading bases: entered, listed, shown, approved."""

from uuid import UUID

from django.http import HttpResponse
from drf_spectacular.utils import extend_schema
from rest_framework.request import Request
from rest_framework.views import APIView

from fleet.actions.approve_loading_basis import approve_loading_basis
from fleet.actions.enter_loading_basis import enter_loading_basis
from fleet.api.answers import shown, version_answer, version_line
from fleet.api.asking import aircraft_asked
from fleet.api.documents import described
from fleet.api.shapes import LoadingBasisAnswer, LoadingBasisLine, LoadingBasisList
from fleet.entering import read_approval
from fleet.queries.aircraft import loading_basis_of
from fleet.queries.history import history_of, loading_basis_history
from records.api.asking import actor_of, document_of, parameters_of
from records.api.once import Answer, once


class LoadingBasesEndpoint(APIView):
    """The loading bases of one aircraft."""

    @extend_schema(operation_id="list_loading_bases", responses=LoadingBasisList)
    def get(self, request: Request, registration: str) -> HttpResponse:
        """Every revision, newest first, with author, approval and when it held; documents are left out."""
        parameters_of(request, allowed=())
        aircraft = aircraft_asked(request, registration)
        return shown(
            {"loading_bases": [version_line(each, aircraft) for each in loading_basis_history(aircraft)]}
        )

    @extend_schema(
        operation_id="enter_loading_basis",
        request=described("loading-basis-1"),
        responses={201: LoadingBasisLine},
    )
    def post(self, request: Request, registration: str) -> HttpResponse:
        """Enters the next revision. It counts for nothing until a second person approves it."""
        document = document_of(request)

        def work() -> Answer:
            aircraft = aircraft_asked(request, registration)
            basis = enter_loading_basis(actor_of(request), aircraft, document)
            place = f"/api/v1/aircraft/{aircraft.registration}/loading-bases/{basis.id}"
            return 201, {"Location": place}, version_line(history_of(basis), aircraft)

        return once(request, work)


class OneLoadingBasisEndpoint(APIView):
    """One revision."""

    @extend_schema(operation_id="show_loading_basis", responses=LoadingBasisAnswer)
    def get(self, request: Request, registration: str, version: UUID) -> HttpResponse:
        """The revision with its document, numbers as typed."""
        parameters_of(request, allowed=())
        aircraft = aircraft_asked(request, registration)
        return shown(version_answer(history_of(loading_basis_of(aircraft, version)), aircraft))


class LoadingBasisApprovalEndpoint(APIView):
    """The approval of one revision."""

    @extend_schema(
        operation_id="approve_loading_basis",
        request=described("approval-1"),
        responses={201: LoadingBasisLine},
    )
    def post(self, request: Request, registration: str, version: UUID) -> HttpResponse:
        """Approves the revision, by another person than entered it, once its sample loads come out as
        printed.
        """
        document = document_of(request)

        def work() -> Answer:
            aircraft = aircraft_asked(request, registration)
            basis = loading_basis_of(aircraft, version)
            approving = read_approval(document)
            approve_loading_basis(
                actor_of(request), aircraft, basis, true_from=approving.true_from, reason=approving.reason
            )
            approved = loading_basis_of(aircraft, version)
            return 201, {}, version_line(history_of(approved), aircraft)

        return once(request, work)
