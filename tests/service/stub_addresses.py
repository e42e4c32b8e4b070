"""Endpoints that fail in every way a real one could, for the tests of what becomes of it."""

from django.core.exceptions import PermissionDenied, SuspiciousOperation
from django.db import OperationalError
from django.http import Http404, HttpRequest, HttpResponse
from django.urls import path
from rest_framework import exceptions
from rest_framework.request import Request
from rest_framework.response import Response
from rest_framework.views import APIView

from records.refusal import (
    Fault,
    Invalid,
    LockedOut,
    NotAllowed,
    NotKnown,
    PreconditionFailed,
    PreconditionMissing,
    StepRefused,
    TooLarge,
    Unreadable,
)

SECRET = "the password is quiet-harbour"
FAILURES: dict[str, Exception] = {
    "unreadable": Unreadable("u", "U."),
    "not-allowed": NotAllowed("n", "N."),
    "not-known": NotKnown("k", "K."),
    "step": StepRefused("s", "S.", next_step="Do this."),
    "failed": PreconditionFailed("f", "F."),
    "large": TooLarge("l", "L."),
    "invalid": Invalid(Fault("/a/0", "a-wrong", "this is wrong"), Fault("?b", "b-wrong", "and this")),
    "missing": PreconditionMissing("m", "M."),
    "locked": LockedOut("locked-out", "Wait.", wait_seconds=61),
    "http404": Http404("secret model name"),
    "denied": PermissionDenied(SECRET),
    "suspicious": SuspiciousOperation(SECRET),
    "throttled": exceptions.Throttled(wait=2.2),
    "serializer": exceptions.ValidationError({"a": [{"b": ["wrong"]}, {}], "non_field_errors": ["odd"]}),
    "database": OperationalError(SECRET),
    "bug": RuntimeError(SECRET),
}


class Fails(APIView):
    """Raises what the address names."""

    authentication_classes = ()
    permission_classes = ()

    def get(self, _request: Request, how: str) -> Response:
        raise FAILURES[how]


class Echoes(APIView):
    """Gives back what was read."""

    authentication_classes = ()
    permission_classes = ()

    def post(self, request: Request) -> Response:
        return Response(request.data)


class Asks(APIView):
    """Says who asks."""

    def get(self, request: Request) -> Response:
        actor = request.actor  # type: ignore[attr-defined] # the middleware sets it
        return Response({"key": actor.key, "capacity": actor.capacity, "may": sorted(actor.may)})

    def post(self, request: Request) -> Response:
        return self.get(request)


def breaks(_request: HttpRequest) -> HttpResponse:
    raise RuntimeError(SECRET)


def refuses(_request: HttpRequest) -> HttpResponse:
    raise StepRefused("s", "The load has departed.", next_step="Write a note.")


urlpatterns = [
    path("page-refuses", refuses),
    path("api/v1/refuses", refuses),
    path("api/v1/fails/<str:how>", Fails.as_view()),
    path("api/v1/echoes", Echoes.as_view()),
    path("api/v1/asks", Asks.as_view()),
    path("api/v1/breaks", breaks),
    path("page-breaks", breaks),
]
handler400 = "service.problems.unreadable"
handler403 = "service.problems.not_allowed"
handler404 = "service.problems.not_found"
handler500 = "service.problems.failed"
