"""Aircraft: entered, listed, shown."""

from django.http import HttpResponse
from django.utils import timezone
from drf_spectacular.utils import extend_schema
from rest_framework.request import Request
from rest_framework.views import APIView

from fleet.actions.enter_aircraft import enter_aircraft
from fleet.api.answers import aircraft_answer, aircraft_line, basis_named, configurations_of, shown
from fleet.api.asking import AS_KNOWN_AT, AT, aircraft_asked, clocks_asked
from fleet.api.documents import described
from fleet.api.shapes import AircraftAnswer, AircraftList, ConfigurationList
from fleet.entering import read_aircraft
from fleet.queries.aircraft import all_aircraft
from fleet.queries.in_force import basis_in_force
from records.api.asking import actor_of, document_of, operator_of, parameters_of
from records.api.once import Answer, once


class AircraftEndpoint(APIView):
    """The operator's aircraft."""

    limits_its_answer = True

    @extend_schema(operation_id="list_aircraft", responses=AircraftList)
    def get(self, request: Request) -> HttpResponse:
        """Every aircraft of the operator, by registration; a fleet is small, so the list is whole. A token
        limited to some aircraft sees those.
        """
        parameters_of(request, allowed=())
        reach = actor_of(request).reach
        seen = [
            each for each in all_aircraft(operator_of(request)) if reach is None or each.registration in reach
        ]
        return shown({"aircraft": [aircraft_line(each) for each in seen]})

    @extend_schema(
        operation_id="enter_aircraft", request=described("aircraft-1"), responses={201: AircraftAnswer}
    )
    def post(self, request: Request) -> HttpResponse:
        """Enters an aircraft. Nothing is known of it until a loading basis and an empty weight are
        approved.
        """
        document = document_of(request)

        def work() -> Answer:
            new, reason = read_aircraft(document)
            aircraft = enter_aircraft(actor_of(request), new, reason=reason)
            place = f"/api/v1/aircraft/{aircraft.registration}"
            return 201, {"Location": place}, aircraft_answer(aircraft, timezone.now())

        return once(request, work)


class OneAircraftEndpoint(APIView):
    """One aircraft."""

    @extend_schema(operation_id="show_aircraft", responses=AircraftAnswer)
    def get(self, request: Request, registration: str) -> HttpResponse:
        """The aircraft with what is in force now."""
        parameters_of(request, allowed=())
        return shown(aircraft_answer(aircraft_asked(request, registration), timezone.now()))


class ConfigurationsEndpoint(APIView):
    """The configurations of one aircraft."""

    @extend_schema(
        operation_id="list_configurations", parameters=[AT, AS_KNOWN_AT], responses=ConfigurationList
    )
    def get(self, request: Request, registration: str) -> HttpResponse:
        """The configurations of the loading basis in force; none where none is."""
        aircraft = aircraft_asked(request, registration)
        at, known = clocks_asked(request)
        version = basis_in_force(aircraft, at, known)
        return shown(
            {
                "at": at,
                "as_known_at": known,
                "loading_basis": basis_named(version),
                "configurations": configurations_of(version),
            }
        )
