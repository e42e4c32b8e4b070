"""Moving a load: revised, assessed again, withdrawn, departed."""

from uuid import UUID

from django.http import HttpResponse
from drf_spectacular.utils import extend_schema
from rest_framework.request import Request
from rest_framework.views import APIView

from loads.actions.assess_again import assess_again
from loads.actions.depart_load import depart_load
from loads.actions.revise_load import revise_load
from loads.actions.stepping import reason_in
from loads.actions.withdraw_load import withdraw_load
from loads.api.answering import created, moved, refuse_other_fields, text_in
from loads.api.shapes_in import DepartureRequest, RevisionDocument, WithdrawalRequest
from loads.api.shapes_out import LoadAnswer
from records.api.asking import actor_of, document_of, instant, state_seen
from records.api.describing import IDEMPOTENCY_KEY, IF_MATCH, problems_of_moving
from records.api.once import once

_HEADERS = [IDEMPOTENCY_KEY, IF_MATCH]


class RevisionsView(APIView):
    """A new load in place of this one."""

    @extend_schema(
        operation_id="revise_load",
        summary="Revise a load",
        parameters=_HEADERS,
        request=RevisionDocument,
        responses={201: LoadAnswer, **problems_of_moving()},
    )
    def post(self, request: Request, load: UUID) -> HttpResponse:
        """Replace a load that has not departed by a new one: a whole load document and the reason."""
        seen, actor = state_seen(request), actor_of(request)
        reason = reason_in(document_of(request))
        document = {name: value for name, value in document_of(request).items() if name != "reason"}
        return once(
            request, lambda: created(revise_load(load, document, reason=reason, seen=seen, by=actor), actor)
        )


class AssessmentView(APIView):
    """The same load, assessed again."""

    @extend_schema(
        operation_id="assess_load_again",
        summary="Assess a stale load again",
        parameters=_HEADERS,
        request=None,
        responses={200: LoadAnswer, **problems_of_moving()},
    )
    def post(self, request: Request, load: UUID) -> HttpResponse:
        """Assess what was declared against what is in force now; the load is open again and signed anew."""
        seen, actor = state_seen(request), actor_of(request)
        if request.body.strip():
            refuse_other_fields(document_of(request))
        return once(request, lambda: moved(assess_again(load, seen=seen, by=actor), actor))


class WithdrawalView(APIView):
    """The end of a load that will not fly."""

    @extend_schema(
        operation_id="withdraw_load",
        summary="Withdraw a load",
        parameters=_HEADERS,
        request=WithdrawalRequest,
        responses={200: LoadAnswer, **problems_of_moving()},
    )
    def post(self, request: Request, load: UUID) -> HttpResponse:
        """Withdraw a load that has not departed, for a reason."""
        seen, actor, document = state_seen(request), actor_of(request), document_of(request)
        refuse_other_fields(document, "reason")
        reason = reason_in(document)
        return once(request, lambda: moved(withdraw_load(load, reason=reason, seen=seen, by=actor), actor))


class DepartureView(APIView):
    """The departure of an accepted load."""

    @extend_schema(
        operation_id="depart_load",
        summary="Report a load as departed",
        parameters=_HEADERS,
        request=DepartureRequest,
        responses={200: LoadAnswer, **problems_of_moving()},
    )
    def post(self, request: Request, load: UUID) -> HttpResponse:
        """Report when an accepted load departed; nothing changes it afterwards."""
        seen, actor, document = state_seen(request), actor_of(request), document_of(request)
        refuse_other_fields(document, "at")
        at = instant(text_in(document, "at"), where="/at")
        return once(request, lambda: moved(depart_load(load, at=at, seen=seen, by=actor), actor))
