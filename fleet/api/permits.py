"""Permits of an aircraft: entered, listed by both clocks, approved, ended."""

from uuid import UUID

from django.http import HttpResponse
from drf_spectacular.utils import extend_schema
from rest_framework.request import Request
from rest_framework.views import APIView

from fleet.actions.approve_permit import approve_permit
from fleet.actions.end_permit import end_permit
from fleet.actions.enter_permit import enter_permit
from fleet.api.answers_provisions import (
    aircraft_provision_changed,
    aircraft_provision_entered,
    aircraft_provision_shown,
    provisions_answer,
)
from fleet.api.asking import AS_KNOWN_AT, AT, aircraft_asked, approval_asked
from fleet.api.documents import described
from fleet.api.shapes_provisions import ProvisionAnswer, ProvisionList
from fleet.entering import read_ending
from fleet.models import Aircraft, Provision
from fleet.provisions import PERMIT
from records.api.asking import actor_of
from records.strict_json import JSON


class PermitsEndpoint(APIView):
    """The permits of one aircraft."""

    @extend_schema(operation_id="list_permits", parameters=[AT, AS_KNOWN_AT], responses=ProvisionList)
    def get(self, request: Request, registration: str) -> HttpResponse:
        """Which held at `at`, as known at `as-known-at`, and every one ever entered."""
        return provisions_answer(request, PERMIT, aircraft_asked(request, registration))

    @extend_schema(
        operation_id="enter_permit", request=described("permit-1"), responses={201: ProvisionAnswer}
    )
    def post(self, request: Request, registration: str) -> HttpResponse:
        """Enters a permit. It widens nothing until a second person approves it, and lapses by itself."""
        by = actor_of(request)
        return aircraft_provision_entered(
            request, PERMIT, registration, lambda aircraft, document: enter_permit(by, aircraft, document)
        )


class OnePermitEndpoint(APIView):
    """One permit."""

    @extend_schema(operation_id="show_permit", responses=ProvisionAnswer)
    def get(self, request: Request, registration: str, version: UUID) -> HttpResponse:
        """The permit with its document, numbers as typed."""
        return aircraft_provision_shown(request, PERMIT, registration, version)


class PermitApprovalEndpoint(APIView):
    """The approval of one permit."""

    @extend_schema(
        operation_id="approve_permit", request=described("approval-1"), responses={201: ProvisionAnswer}
    )
    def post(self, request: Request, registration: str, version: UUID) -> HttpResponse:
        """Approves the permit, by another person than entered it; it holds between its own dates."""
        by = actor_of(request)

        def approve(aircraft: Aircraft, permit: Provision, document: JSON) -> None:
            approve_permit(by, aircraft, permit, reason=approval_asked(document).reason)

        return aircraft_provision_changed(request, PERMIT, registration, version, approve)


class PermitEndingEndpoint(APIView):
    """The ending of one permit before it lapses."""

    @extend_schema(operation_id="end_permit", request=described("ending-1"), responses={201: ProvisionAnswer})
    def post(self, request: Request, registration: str, version: UUID) -> HttpResponse:
        """Ends the permit at `true_from`, with a reason."""
        by = actor_of(request)

        def end(aircraft: Aircraft, permit: Provision, document: JSON) -> None:
            ending = read_ending(document)
            end_permit(by, aircraft, permit, true_from=ending.true_from, reason=ending.reason)

        return aircraft_provision_changed(request, PERMIT, registration, version, end)
