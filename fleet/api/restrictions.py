"""Restrictions of an aircraft: entered, listed by both clocks, lifted."""

from uuid import UUID

from django.http import HttpResponse
from drf_spectacular.utils import extend_schema
from rest_framework.request import Request
from rest_framework.views import APIView

from fleet.actions.enter_restriction import enter_restriction
from fleet.actions.lift_restriction import lift_restriction
from fleet.api.answers import shown
from fleet.api.answers_provisions import created, now_as_it_is, provision_line, provisions_answer
from fleet.api.asking import AS_KNOWN_AT, AT, aircraft_asked
from fleet.api.documents import described
from fleet.api.shapes_provisions import ProvisionAnswer, ProvisionList
from fleet.entering import read_ending
from fleet.provisions import RESTRICTION
from fleet.queries.provisions import provision_of
from records.api.asking import actor_of, document_of, operator_of, parameters_of
from records.api.once import Answer, once


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
        document = document_of(request)

        def work() -> Answer:
            aircraft = aircraft_asked(request, registration)
            entered = enter_restriction(actor_of(request), aircraft, document)
            return created(entered, f"/api/v1/aircraft/{aircraft.registration}/restrictions", aircraft)

        return once(request, work)


class OneRestrictionEndpoint(APIView):
    """One restriction."""

    @extend_schema(operation_id="show_restriction", responses=ProvisionAnswer)
    def get(self, request: Request, registration: str, version: UUID) -> HttpResponse:
        """The restriction with its document, numbers as typed."""
        parameters_of(request, allowed=())
        aircraft = aircraft_asked(request, registration)
        found = provision_of(operator_of(request), RESTRICTION, version, aircraft)
        return shown(provision_line(found, aircraft))


class RestrictionLiftingEndpoint(APIView):
    """The lifting of one restriction."""

    @extend_schema(
        operation_id="lift_restriction", request=described("ending-1"), responses={201: ProvisionAnswer}
    )
    def post(self, request: Request, registration: str, version: UUID) -> HttpResponse:
        """Lifts the restriction from `true_from` on, by another person than entered it."""
        document = document_of(request)

        def work() -> Answer:
            aircraft = aircraft_asked(request, registration)
            restriction = provision_of(operator_of(request), RESTRICTION, version, aircraft)
            ending = read_ending(document)
            lift_restriction(
                actor_of(request),
                aircraft,
                restriction,
                true_from=ending.true_from,
                reason=ending.reason,
            )
            return now_as_it_is(restriction, aircraft)

        return once(request, work)
