"""Last-minute changes of an accepted load, and notes after its departure."""

from http import HTTPStatus
from uuid import UUID

from django.http import HttpResponse
from drf_spectacular.utils import extend_schema
from rest_framework.request import Request
from rest_framework.response import Response
from rest_framework.views import APIView

from fleet.actions.confirm_password import confirm_password
from fleet.models import Person
from loads.actions.change_late import change_late
from loads.actions.self_check import check_when_overdue
from loads.actions.signing import Signing, refuse_unless_signer
from loads.actions.write_note import write_note
from loads.acts import CHANGE_LATE
from loads.api.answering import moved, refuse_other_fields, text_in
from loads.api.shapes_late import LateChangeDocument, LateChangeRequest, NoteAnswer, NoteRequest
from loads.api.shapes_out import LatePreview, LoadAnswer
from loads.manifest.gathering import paper_of
from loads.queries.answer import note_answer, proposed_answer
from loads.queries.current import load_of
from loads.queries.late_change import propose
from loads.queries.overtaken import database_time
from records.actor import READ, refuse_without_leave
from records.api.asking import actor_of, document_of, operator_of, state_seen
from records.api.describing import (
    IDEMPOTENCY_KEY,
    IF_MATCH,
    problems,
    problems_of_moving,
    problems_of_storing,
)
from records.api.once import Answer, once
from records.refusal import NotSignedIn
from records.strict_json import JSON

_CHANGE = ("lines", "persons_on_board")


class LateChangesView(APIView):
    """Changes of an accepted load at the last minute."""

    @extend_schema(
        operation_id="change_load_late",
        summary="Change an accepted load at the last minute",
        parameters=[IDEMPOTENCY_KEY, IF_MATCH],
        request=LateChangeRequest,
        responses={200: LoadAnswer, **problems_of_moving(), **problems(429)},
    )
    def post(self, request: Request, load: UUID) -> HttpResponse:
        """Change an accepted load within the operator's bound and accept it again, in one step: by the same
        pilot in command, with the password, under the digest the preview showed.
        """
        seen, actor, document = state_seen(request), actor_of(request), document_of(request)
        refuse_other_fields(document, *_CHANGE, "digest", "password")
        signing = Signing(text_in(document, "digest"), str(request.META.get("REMOTE_ADDR", "")))
        refuse_unless_signer(CHANGE_LATE, actor)
        if not isinstance(request.user, Person):
            raise NotSignedIn("not-signed-in", "Only a person signs.")
        # Before the transaction: a wrong password must stay counted although nothing else is kept.
        confirm_password(request, request.user, document.get("password"))
        change = _change_in(document)
        check_when_overdue(actor.chain)
        return once(request, lambda: moved(change_late(load, change, signing, seen=seen, by=actor), actor))


class LatePreviewView(APIView):
    """A last-minute change worked out, nothing stored."""

    @extend_schema(
        operation_id="preview_late_change",
        summary="Compute a last-minute change; nothing is stored",
        request=LateChangeDocument,
        responses={200: LatePreview, **problems(400, 401, 403, 404, 409, 413, 422, 503)},
    )
    def post(self, request: Request, load: UUID) -> Response:
        """Compute an accepted load with the change in it; the answer holds the digest and words to sign."""
        # Nothing is stored, so no act asks: the answer tells what stands in the load.
        refuse_without_leave(actor_of(request), READ)
        document = document_of(request)
        refuse_other_fields(document, *_CHANGE)
        operator = operator_of(request)
        current = load_of(operator, load)
        proposal = propose(current, _change_in(document), database_time())
        return Response(proposed_answer(current, proposal, paper_of(operator, load).number))


class NotesView(APIView):
    """Notes after flight."""

    @extend_schema(
        operation_id="write_note",
        summary="Write a note on a departed load",
        parameters=[IDEMPOTENCY_KEY],
        request=NoteRequest,
        responses={201: NoteAnswer, **problems_of_storing()},
    )
    def post(self, request: Request, load: UUID) -> HttpResponse:
        """Say what was wrong on a load that departed. Its manifest stays as it is; the note stands beside."""
        actor, document = actor_of(request), document_of(request)
        refuse_other_fields(document, "text")
        text = text_in(document, "text")

        def work() -> Answer:
            return HTTPStatus.CREATED, {}, note_answer(write_note(load, text, by=actor))

        # The answer names who wrote it, so the copy kept for repeated requests is kept sealed.
        return once(request, work, confidential=True)


def _change_in(document: dict[str, JSON]) -> dict[str, JSON]:
    return {name: document[name] for name in _CHANGE if name in document}
