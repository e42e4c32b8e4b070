"""Signing a load."""

from uuid import UUID

from django.http import HttpResponse
from drf_spectacular.utils import extend_schema
from rest_framework.request import Request
from rest_framework.views import APIView

from fleet.actions.confirm_password import confirm_password
from fleet.models import Person
from loads.actions.accept_load import accept_load
from loads.actions.confirm_loading import confirm_loading
from loads.actions.prepare_load import prepare_load
from loads.actions.self_check import check_when_overdue
from loads.actions.signing import Signing, refuse_unless_signer
from loads.acts import ACCEPT_LOAD, CONFIRM_LOADING, PREPARE_LOAD
from loads.api.answering import moved, refuse_other_fields, text_in
from loads.api.shapes_in import SignatureRequest
from loads.api.shapes_out import LoadAnswer
from records.api.asking import actor_of, document_of, state_seen
from records.api.describing import IDEMPOTENCY_KEY, IF_MATCH, problems, problems_of_moving
from records.api.once import once
from records.refusal import Fault, Invalid, NotSignedIn

_KINDS = {"prepared": PREPARE_LOAD, "loaded": CONFIRM_LOADING, "accepted": ACCEPT_LOAD}
_ACTIONS = {"prepared": prepare_load, "loaded": confirm_loading, "accepted": accept_load}


class SignaturesView(APIView):
    """Signatures under one exact result."""

    @extend_schema(
        operation_id="sign_load",
        summary="Sign a load as prepared, loaded or accepted",
        parameters=[IDEMPOTENCY_KEY, IF_MATCH],
        request=SignatureRequest,
        responses={200: LoadAnswer, **problems_of_moving(), **problems(429)},
    )
    def post(self, request: Request, load: UUID) -> HttpResponse:
        """Sign the digest that was shown, with the password again. Only a person signs; only the load's pilot
        in command accepts. The loading supervisor signs as loaded where the operator's rules ask for it.
        """
        seen, actor, document = state_seen(request), actor_of(request), document_of(request)
        refuse_other_fields(document, "meaning", "digest", "password")
        meaning = text_in(document, "meaning")
        if meaning not in _ACTIONS:
            raise Invalid(Fault("/meaning", "choice", "write prepared, loaded or accepted"))
        signing = Signing(text_in(document, "digest"), str(request.META.get("REMOTE_ADDR", "")))
        refuse_unless_signer(_KINDS[meaning], actor)
        if not isinstance(request.user, Person):
            raise NotSignedIn("not-signed-in", "Only a person signs.")
        # Before the transaction: a wrong password must stay counted although nothing else is kept.
        confirm_password(request, request.user, document.get("password"))
        check_when_overdue(actor.chain)
        return once(request, lambda: moved(_ACTIONS[meaning](load, signing, seen=seen, by=actor), actor))
