"""What everybody does for themselves: see who they are, change the password, end their sessions."""

from django.contrib.auth import update_session_auth_hash
from django.http import HttpResponse
from drf_spectacular.utils import extend_schema
from rest_framework import serializers
from rest_framework.request import Request
from rest_framework.views import APIView

from fleet.actions.change_mail import change_mail
from fleet.actions.change_password import change_password
from fleet.actions.confirm_password import confirm_password, refuse_locked_out
from fleet.actions.end_sessions import end_sessions
from fleet.api.answers import shown
from fleet.api.documents import described
from fleet.api.shapes_people import WhoAnswer
from fleet.models import Person
from fleet.people_reading import read_mail, read_password
from records.api.asking import actor_of, document_of, operator_of, parameters_of
from records.api.describing import problems, problems_of_storing
from records.api.once import Answer, once
from records.refusal import Fault, Invalid, NotAllowed


class Done(serializers.Serializer[object]):
    """What was done, in words."""

    done = serializers.CharField()


class OwnEndpoint(APIView):
    """Who asks."""

    limits_its_answer = True

    @extend_schema(
        operation_id="who_am_i",
        summary="Who asks, and what they may do",
        responses={200: WhoAnswer, **problems(401, 403, 422, 503)},
    )
    def get(self, request: Request) -> HttpResponse:
        """The person or token that asks, with everything it may do now."""
        parameters_of(request, allowed=())
        actor = actor_of(request)
        return shown(
            {
                "key": actor.key,
                "operator": operator_of(request),
                "person": f"person:{actor.person}",
                "capacity": actor.capacity,
                "may": sorted(actor.may),
                "registrations": None if actor.reach is None else sorted(actor.reach),
            }
        )


class OwnPasswordEndpoint(APIView):
    """One's own password."""

    @extend_schema(
        operation_id="change_password",
        summary="Change one's own password",
        request=described("password-1"),
        responses={200: Done, **problems_of_storing(), **problems(429)},
    )
    def post(self, request: Request) -> HttpResponse:
        """Changes the password of the person signed in and ends every other session of theirs; tokens serve
        on. Wrong passwords count as failed sign-ins do.
        """
        person, wanted = _signed_in(request), read_password(document_of(request))
        refuse_locked_out(request, person.login)

        def work() -> Answer:
            change_password(actor_of(request), person, current=wanted.current, new=wanted.new)
            return 200, {}, {"done": "The password is changed, and every other session has ended."}

        try:
            answer = once(request, work)
        except Invalid as refused:
            # Outside the transaction that was undone, so that the failure stays counted.
            if any(fault.code == "password-wrong" for fault in refused.faults):
                confirm_password(request, person, wanted.current, pointer="/current")
            raise
        update_session_auth_hash(request, person)
        return answer


class OwnMailEndpoint(APIView):
    """One's own mail address."""

    @extend_schema(
        operation_id="change_mail",
        summary="Change one's own mail address",
        request=described("mail-1"),
        responses={200: Done, **problems_of_storing()},
    )
    def post(self, request: Request) -> HttpResponse:
        """Keeps where the person signed in is told what concerns them; an empty text takes it out."""
        person, document = _signed_in(request), document_of(request)

        def work() -> Answer:
            change_mail(actor_of(request), person, read_mail(document))
            return 200, {}, {"done": "The mail address is kept."}

        return once(request, work)


class SessionsEndingEndpoint(APIView):
    """The end of one's other sessions."""

    @extend_schema(
        operation_id="end_sessions",
        summary="End one's other sessions",
        request=None,
        responses={200: Done, **problems_of_storing()},
    )
    def post(self, request: Request) -> HttpResponse:
        """Ends every session of the person signed in but the one that asks; tokens serve on."""
        person = _signed_in(request)
        if request.body.strip():
            strange = [
                Fault(f"/{name}", "unknown-field", "not a field here; remove it")
                for name in document_of(request)
            ]
            if strange:
                raise Invalid(*strange)

        def work() -> Answer:
            end_sessions(actor_of(request), person)
            return 200, {}, {"done": "Every other session has ended."}

        answer = once(request, work)
        person.refresh_from_db()
        update_session_auth_hash(request, person)
        return answer


def _signed_in(request: Request) -> Person:
    """This function will return the person who is signed in; a token is told that it is none."""
    actor = actor_of(request)
    if actor.kind != "person" or not isinstance(request.user, Person):
        raise NotAllowed(
            "session-needed",
            "This needs a person who is signed in; a token does not do it.",
            next_step="Sign in at the page, and do it there.",
        )
    return request.user
