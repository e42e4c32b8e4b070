"""People: entered, listed, shown; their duties granted and ended; deactivated."""

from django.http import HttpResponse
from django.utils import timezone
from drf_spectacular.utils import extend_schema
from rest_framework.request import Request
from rest_framework.views import APIView

from fleet.actions.deactivate_person import deactivate_person
from fleet.actions.end_duty import end_duty
from fleet.actions.enter_person import enter_person
from fleet.actions.grant_duty import grant_duty
from fleet.api.answers import shown
from fleet.api.answers_people import person_answer, person_line
from fleet.api.documents import described
from fleet.api.shapes_people import PeopleList, PersonAnswer
from fleet.duties import READ_PEOPLE
from fleet.people_reading import read_duty, read_person, read_reason
from fleet.queries.people import operator_named, people_of, person_of
from records.actor import refuse_without_leave
from records.api.asking import actor_of, document_of, operator_of, parameters_of
from records.api.describing import problems, problems_of_reading, problems_of_storing
from records.api.once import Answer, once


class PeopleEndpoint(APIView):
    """The operator's people."""

    @extend_schema(
        operation_id="list_people",
        summary="List the people",
        responses={200: PeopleList, **problems(401, 403, 422, 503)},
    )
    def get(self, request: Request) -> HttpResponse:
        """Every person of the operator by login, with the duties held now; those who have left, too."""
        refuse_without_leave(actor_of(request), READ_PEOPLE)
        parameters_of(request, allowed=())
        now = timezone.now()
        return shown({"people": [person_line(one, now) for one in people_of(operator_of(request))]})

    @extend_schema(
        operation_id="enter_person",
        summary="Enter a person",
        request=described("person-1"),
        responses={201: PersonAnswer, **problems_of_storing()},
    )
    def post(self, request: Request) -> HttpResponse:
        """Enters a person with a first password. They see nothing until a duty is granted."""
        document = document_of(request)

        def work() -> Answer:
            new = read_person(document)
            person = enter_person(
                actor_of(request),
                operator_named(operator_of(request)),
                login=new.login,
                name=new.name,
                password=new.password,
                mail=new.mail,
                reason=new.reason,
            )
            return 201, {"Location": f"/api/v1/people/{person.pk}"}, person_answer(person, timezone.now())

        return once(request, work)


class OnePersonEndpoint(APIView):
    """One person."""

    @extend_schema(
        operation_id="show_person",
        summary="Read a person",
        responses={200: PersonAnswer, **problems_of_reading()},
    )
    def get(self, request: Request, person: int) -> HttpResponse:
        """One person with every duty ever granted or ended."""
        refuse_without_leave(actor_of(request), READ_PEOPLE)
        parameters_of(request, allowed=())
        return shown(person_answer(person_of(operator_of(request), person), timezone.now()))


class DutiesEndpoint(APIView):
    """The duties of one person."""

    @extend_schema(
        operation_id="change_duty",
        summary="Grant or end a duty",
        request=described("duty-1"),
        responses={201: PersonAnswer, **problems_of_storing()},
    )
    def post(self, request: Request, person: int) -> HttpResponse:
        """Grants or ends a duty, now or from a later instant on. Tokens and sessions follow at once. An
        operator keeps an operations manager: the last one's duty does not end.
        """
        document = document_of(request)

        def work() -> Answer:
            whose = person_of(operator_of(request), person)
            change = read_duty(document)
            does = grant_duty if change.granted else end_duty
            does(actor_of(request), whose, change.role, since=change.since, reason=change.reason)
            return 201, {}, person_answer(person_of(operator_of(request), person), timezone.now())

        return once(request, work)


class DeactivationEndpoint(APIView):
    """The end of a person's access."""

    @extend_schema(
        operation_id="deactivate_person",
        summary="Deactivate a person",
        request=described("reason-1"),
        responses={200: PersonAnswer, **problems_of_storing()},
    )
    def post(self, request: Request, person: int) -> HttpResponse:
        """No sign-in, no session and no token of theirs serves from then on; what they signed stays."""
        document = document_of(request)

        def work() -> Answer:
            whose = person_of(operator_of(request), person)
            left = deactivate_person(actor_of(request), whose, reason=read_reason(document))
            return 200, {}, person_answer(left, timezone.now())

        return once(request, work)
