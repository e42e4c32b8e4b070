"""The trail over the API: acts in sentences, newest first, and one act with its entry as it is hashed."""

from collections.abc import Mapping
from uuid import UUID

from drf_spectacular.types import OpenApiTypes
from drf_spectacular.utils import OpenApiParameter, extend_schema
from rest_framework.request import Request
from rest_framework.response import Response
from rest_framework.views import APIView

from loads.api.shapes_trail import ActAnswer, TrailList
from loads.queries.trail_words import SENTENCES, Subject, said, subjects, who
from records.api.asking import instant, operator_of, parameters_of
from records.api.cursor import cursor_text, limit_in, next_page, uuid_in
from records.api.describing import problems, problems_of_reading
from records.refusal import Fault, Invalid
from records.trail import MOST_ACTS, Asked, Line, entry_of, read_trail

_INSTANT = "date, time and offset"
_FILTERS = [
    OpenApiParameter(
        "about", OpenApiTypes.STR, description='what it is about, like "load:<id>", "aircraft:<id>"'
    ),
    OpenApiParameter("actor", OpenApiTypes.STR, description='who acted, like "person:7", "token:3"'),
    OpenApiParameter("kind", OpenApiTypes.STR, description="the name of an act, like accept-load"),
    OpenApiParameter("from", OpenApiTypes.STR, description=f"acts at or after this ({_INSTANT})"),
    OpenApiParameter("to", OpenApiTypes.STR, description=f"acts before this ({_INSTANT})"),
    OpenApiParameter("limit", OpenApiTypes.INT, description=f"rows a page, 1 to {MOST_ACTS}; 50 without"),
    OpenApiParameter("cursor", OpenApiTypes.STR, description="as the link to the next page gives it"),
]
_PARAMETERS = ("about", "actor", "kind", "from", "to", "limit", "cursor")


class TrailView(APIView):
    """The trail of the operator."""

    @extend_schema(
        operation_id="read_trail",
        summary="Read the trail",
        parameters=_FILTERS,
        responses={200: TrailList, **problems(401, 403, 422, 503)},
    )
    def get(self, request: Request) -> Response:
        """Read who did what, the newest act first, a page at a time."""
        operator = operator_of(request)
        asked = parameters_of(request, allowed=_PARAMETERS)
        after = uuid_in(asked["cursor"]) if "cursor" in asked else None
        trail = read_trail(operator, acts_asked(asked), after=after, most=limit_in(asked, MOST_ACTS))
        called = subjects(operator, {line.about for line in trail.lines})
        following = next_page(request, cursor_text(trail.after)) if trail.after else None
        headers = {"Link": f'<{following}>; rel="next"'} if following else {}
        acts = [line_answer(line, called[line.about]) for line in trail.lines]
        return Response({"acts": acts, "next": following}, headers=headers)


class ActView(APIView):
    """One act."""

    @extend_schema(
        operation_id="read_act",
        summary="Read one act of the trail",
        responses={200: ActAnswer, **problems_of_reading()},
    )
    def get(self, request: Request, act: UUID) -> Response:
        """Read one act with the entry exactly as it was sealed: its digest is the SHA-256 over a zero byte
        and that text.
        """
        parameters_of(request, allowed=())
        operator = operator_of(request)
        entry = entry_of(operator, act)
        called = subjects(operator, {entry.line.about})[entry.line.about]
        return Response({**line_answer(entry.line, called), "previous": entry.previous, "entry": entry.text})


def acts_asked(asked: Mapping[str, str]) -> Asked:
    """This function will return the filters asked for; raises Invalid, for a kind no act has too."""
    kind = asked.get("kind", "")
    if kind and kind not in SENTENCES:
        raise Invalid(Fault("?kind", "choice", f"one of: {', '.join(sorted(SENTENCES))}"))
    return Asked(
        about=asked.get("about", ""),
        actor=asked.get("actor", ""),
        kind=kind,
        since=instant(asked["from"], where="?from") if "from" in asked else None,
        until=instant(asked["to"], where="?to") if "to" in asked else None,
    )


def line_answer(line: Line, subject: Subject) -> dict[str, object]:
    """This function will write one act as it is sent."""
    words = " ".join(part for part in (subject.registration, subject.words) if part)
    return {
        "act": line.act,
        "at": line.at,
        "kind": line.kind,
        "sentence": f"{who(line)} {said(line.kind)}: {words}",
        "actor": line.actor_key,
        "capacity": line.capacity,
        "about": line.about,
        "reason": line.reason,
        "request": line.request,
        "caused_by": line.caused_by,
        "rows": line.rows,
        "position": line.position,
        "digest": line.digest,
    }
