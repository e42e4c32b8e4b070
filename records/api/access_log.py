"""The operator's own log of sign-ins and of the use of tokens."""

from typing import Any, Final

from drf_spectacular.types import OpenApiTypes
from drf_spectacular.utils import OpenApiParameter, extend_schema
from rest_framework import serializers
from rest_framework.request import Request
from rest_framework.response import Response
from rest_framework.views import APIView

from records.actor import refuse_without_leave
from records.acts import READ_ACCESS_LOG
from records.api.asking import actor_of, operator_of, parameters_of
from records.api.describing import problems
from records.models.access import WHATS, Access
from records.queries import events_of
from records.refusal import Fault, Invalid

MOST_ROWS: Final = 200
_USUAL: Final = 50
# Numbers are of eight bytes; more digits name nothing.
_MOST_DIGITS: Final = 18
_PARAMETERS: Final = [
    OpenApiParameter("key", OpenApiTypes.STR, description="of one person or token: person:7, token:3"),
    OpenApiParameter("before", OpenApiTypes.INT, description="from before this number on"),
    OpenApiParameter("limit", OpenApiTypes.INT, description=f"rows a page, 1 to {MOST_ROWS}; 50 without"),
]


class AccessEvent(serializers.Serializer[object]):
    """One event. `typed` and `origin` are keyed digests of what somebody unknown typed or sent, and of the
    address it came from: alike where those were alike.
    """

    number = serializers.IntegerField()
    at = serializers.DateTimeField()
    what = serializers.ChoiceField(WHATS)
    key = serializers.CharField(allow_blank=True)
    typed = serializers.CharField(allow_blank=True)
    origin = serializers.CharField(allow_blank=True)
    request = serializers.CharField(allow_blank=True)
    digest = serializers.CharField()


class AccessLog(serializers.Serializer[object]):
    """Some events, the newest first, and where the next page is, if there is one."""

    events = AccessEvent(many=True)
    next = serializers.CharField(allow_null=True)


class AccessLogView(APIView):
    """The log of sign-ins."""

    @extend_schema(
        operation_id="read_access_log",
        summary="Read the log of sign-ins",
        parameters=_PARAMETERS,
        responses={200: AccessLog, **problems(401, 403, 422, 503)},
    )
    def get(self, request: Request) -> Response:
        """Sign-ins, their failures, lock-outs and the use of tokens of this operator, the newest first. The
        use of a token is noted once in five minutes.
        """
        refuse_without_leave(actor_of(request), READ_ACCESS_LOG)
        asked = parameters_of(request, allowed={"key", "before", "limit"})
        most = _whole(asked.get("limit", str(_USUAL)), "?limit", MOST_ROWS)
        before = _whole(asked["before"], "?before") if "before" in asked else None
        found = events_of(operator_of(request), key=asked.get("key", ""), before=before, most=most + 1)
        following = None
        if len(found) > most:
            query = request.query_params.copy()
            query["before"] = str(found[most - 1].number)
            following = f"{request.path}?{query.urlencode()}"
        headers = {"Link": f'<{following}>; rel="next"'} if following else {}
        return Response({"events": [_event(one) for one in found[:most]], "next": following}, headers=headers)


def _event(one: Access) -> dict[str, Any]:
    names = ("number", "at", "what", "key", "typed", "origin", "request", "digest")
    return {name: getattr(one, name) for name in names}


def _whole(text: str, where: str, most: int | None = None) -> int:
    sound = text.isascii() and text.isdigit() and len(text) <= _MOST_DIGITS and int(text) > 0
    if not sound or (most is not None and int(text) > most):
        words = f"write a whole number from 1{'' if most is None else f' to {most}'}"
        raise Invalid(Fault(where, "number-form", words))
    return int(text)
