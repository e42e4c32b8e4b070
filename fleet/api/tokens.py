"""Bearer tokens: issued, listed, given a new secret, revoked."""

from datetime import datetime

from django.http import HttpResponse
from django.utils import timezone
from drf_spectacular.utils import extend_schema
from rest_framework.request import Request
from rest_framework.views import APIView

from fleet.actions.issue_token import issue_token
from fleet.actions.revoke_token import revoke_token
from fleet.actions.rotate_token import rotate_token
from fleet.api.answers import shown
from fleet.api.answers_people import token_line
from fleet.api.documents import described
from fleet.api.shapes_people import TokenIssued, TokenLine, TokenList
from fleet.duties import READ_PEOPLE
from fleet.models import Token
from fleet.people_reading import read_reason, read_rotation, read_token
from fleet.queries.grantable import grantable_to
from fleet.queries.people import person_of
from fleet.queries.tokens import tokens_of
from records.actor import Actor
from records.api.asking import actor_of, document_of, operator_of, parameters_of
from records.api.describing import problems, problems_of_storing
from records.api.once import Answer, once
from records.queries import last_uses
from records.refusal import NotAllowed


class TokensEndpoint(APIView):
    """Tokens."""

    @extend_schema(
        operation_id="list_tokens",
        summary="List tokens",
        responses={200: TokenList, **problems(401, 403, 422, 503)},
    )
    def get(self, request: Request) -> HttpResponse:
        """One's own tokens, the newest first; all of the operator's for who may look at the people."""
        parameters_of(request, allowed=())
        found = tokens_to_see(actor_of(request), operator_of(request))
        used, now = last_uses(operator_of(request), [one.pk for one in found]), timezone.now()
        return shown({"tokens": [token_line(one, now, used) for one in found]})

    @extend_schema(
        operation_id="issue_token",
        summary="Issue a token",
        request=described("token-1"),
        responses={201: TokenIssued, **problems_of_storing()},
    )
    def post(self, request: Request) -> HttpResponse:
        """Issues a token and shows its secret, this once. Needs a person who is signed in: no token issues
        another. One for an integration may be of somebody else, by who enters people.
        """
        document = document_of(request)

        def work() -> Answer:
            new, by = read_token(document), actor_of(request)
            person = person_of(operator_of(request), person_asking(by) if new.person is None else new.person)
            issued = issue_token(
                by,
                person,
                label=new.label,
                scopes=new.scopes,
                grantable=grantable_to(person, integration=new.integration),
                valid_for=new.valid_for,
                integration=new.integration,
                registrations=new.registrations,
            )
            return 201, {}, _with_secret(issued.token, issued.secret, issued.token.issued_at)

        return once(request, work, confidential=True)


class RotationEndpoint(APIView):
    """A new secret for a token."""

    @extend_schema(
        operation_id="rotate_token",
        summary="Give a token a new secret",
        request=described("rotation-1"),
        responses={201: TokenIssued, **problems_of_storing()},
    )
    def post(self, request: Request, token: int) -> HttpResponse:
        """Makes a new secret and shows it, this once. The one before serves for the overlap stated; any
        older one ends at once. Scopes, aircraft and what the trail calls the token stay.
        """
        document = document_of(request)

        def work() -> Answer:
            new = read_rotation(document)
            made = rotate_token(
                actor_of(request), token, overlap=new.overlap, valid_for=new.valid_for, reason=new.reason
            )
            return 201, {}, _with_secret(made.token, made.secret, made.rotation.issued_at)

        return once(request, work, confidential=True)


class RevocationEndpoint(APIView):
    """The end of a token."""

    @extend_schema(
        operation_id="revoke_token",
        summary="Revoke a token",
        request=described("reason-1"),
        responses={200: TokenLine, **problems_of_storing()},
    )
    def post(self, request: Request, token: int) -> HttpResponse:
        """Revokes the token with every secret it has, for good, with the reason."""
        document = document_of(request)

        def work() -> Answer:
            revoked = revoke_token(actor_of(request), token, reason=read_reason(document))
            used = last_uses(operator_of(request), [revoked.pk])
            return 200, {}, token_line(revoked, timezone.now(), used)

        return once(request, work)


def tokens_to_see(actor: Actor, operator: str) -> tuple[Token, ...]:
    """This function will return the tokens the actor may see: their own, or all of the operator's."""
    return tokens_of(operator, None if READ_PEOPLE in actor.may else person_asking(actor))


def person_asking(actor: Actor) -> int:
    """This function will return the number of the person who asks; raises NotAllowed without one."""
    if actor.person is None:
        raise NotAllowed("no-person", "This needs a person.")
    return actor.person


def _with_secret(token: Token, secret: str, now: datetime) -> dict[str, object]:
    return token_line(token, now, {}) | {"secret": secret}
