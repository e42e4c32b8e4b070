"""Restrictions of an aircraft: entered, listed by both clocks, lifted."""

from uuid import UUID

from django.http import HttpResponse
from drf_spectacular.utils import extend_schema
from rest_framework.request import Request
from rest_framework.views import APIView

from fleet.actions.enter_restriction import enter_restriction
from fleet.actions.lift_restriction import lift_restriction
from fleet.api.answers_provisions import (
    aircraft_provision_changed,
    aircraft_provision_entered,
    aircraft_provision_shown,
    provisions_answer,
)
from fleet.api.asking import AS_KNOWN_AT, AT, aircraft_asked
from fleet.api.documents import described
from fleet.api.shapes_provisions import ProvisionAnswer, ProvisionList
from fleet.entering import read_ending
from fleet.models import Aircraft, Provision
from fleet.provisions import RESTRICTION
from records.api.asking import actor_of
from records.strict_json import JSON


class RestrictionsEndpoint(APIView):
    """The restrictions of one aircraft."""

    @extend_schema(operation_id="list_restrictions", parameters=[AT, AS_KNOWN_AT], responses=ProvisionList)
    def get(self, request: Request, registration: str) -> HttpResponse:
        """Which bound at `at`, as known at `as-known-at`, and every one ever entered."""
        return provisions_answer(request, RESTRICTION, aircraft_asked(request, registration))

    @extend_schema(
        operation_id="enter_restriction",
        request=described("restriction-1"),
        responses={201: ProvisionAnswer},
    )
    def post(self, request: Request, registration: str) -> HttpResponse:
        """Enters a restriction: a limit lowered, a seat blocked, a place closed, fuel trapped. It binds at
        once, from its `true_from` on; what was accepted before is told to be stale.
        """
        by = actor_of(request)
        return aircraft_provision_entered(
            request,
            RESTRICTION,
            registration,
            lambda aircraft, document: enter_restriction(by, aircraft, document),
        )


class OneRestrictionEndpoint(APIView):
    """One restriction."""

    @extend_schema(operation_id="show_restriction", responses=ProvisionAnswer)
    def get(self, request: Request, registration: str, version: UUID) -> HttpResponse:
        """The restriction with its document, numbers as typed."""
        return aircraft_provision_shown(request, RESTRICTION, registration, version)


class RestrictionLiftingEndpoint(APIView):
    """The lifting of one restriction."""

    @extend_schema(
        operation_id="lift_restriction", request=described("ending-1"), responses={201: ProvisionAnswer}
    )
    def post(self, request: Request, registration: str, version: UUID) -> HttpResponse:
        """Lifts the restriction from `true_from` on, by another person than entered it."""
        by = actor_of(request)

        def lift(aircraft: Aircraft, restriction: Provision, document: JSON) -> None:
            ending = read_ending(document)
            lift_restriction(by, aircraft, restriction, true_from=ending.true_from, reason=ending.reason)

        return aircraft_provision_changed(request, RESTRICTION, registration, version, lift)
