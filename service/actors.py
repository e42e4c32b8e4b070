"""Finds out who asks: from a bearer token, or from a signed-in browser; fills the Actor of the request."""

from collections.abc import Callable
from datetime import UTC, datetime, timedelta
from typing import Any, Final

from django.http import HttpRequest
from django.http.response import HttpResponseBase
from django.utils import timezone
from rest_framework import authentication, permissions
from rest_framework.request import Request

from fleet.actions.noting import note_stranger, note_token
from fleet.models import Person, Token
from fleet.queries.duties import roles_of
from fleet.queries.tokens import TokenRefused, token_sent
from records.actor import Actor
from records.refusal import NotAllowed, NotSignedIn
from service import allowed
from service.limited import refuse_beyond
from service.problems import CHALLENGE, is_api

STRANGER: Final = Actor(
    operator=None, kind="stranger", key="stranger", name="", capacity="stranger", may=frozenset()
)
# How often the use of a token is noted, and when this process last did, by the token's digest.
NOTED_EVERY: Final = timedelta(minutes=5)
_LONG_AGO: Final = datetime(1970, 1, 1, tzinfo=UTC)
_last_use: dict[str, datetime] = {}


def actor_of_person(person: Person) -> Actor:
    """This function will return the actor a signed-in person is, with the duties in force now."""
    roles = roles_of(person, timezone.now())
    return Actor(
        operator=person.operator_id,
        kind="person",
        key=f"person:{person.pk}",
        name=person.name,
        capacity=", ".join(roles) or "no duty",
        may=allowed.to_person(roles),
        person=person.pk,
    )


def actor_of_token(token: Token) -> Actor:
    """This function will return the actor a token is: what its scopes and its person's duties now both
    allow.
    """
    roles = roles_of(token.person, timezone.now())
    return Actor(
        operator=token.operator_id,
        kind="token",
        key=f"token:{token.pk}",
        name=token.person.name,
        capacity="integration" if token.integration else ", ".join(roles) or "no duty",
        may=allowed.to_token(roles, token.scopes, integration=token.integration),
        person=token.person_id,
        reach=frozenset(token.registrations) or None,
    )


def _asks(request: Request, actor: Actor) -> None:
    """Say who asks on the plain request: the framework's request hands it on, the request log reads it."""
    plain: Any = getattr(request, "_request", request)
    plain.actor = actor


class ActorMiddleware:
    """Sets `request.actor` for pages. The API's own authentication does it for the API, where a token
    counts too.
    """

    def __init__(self, get_response: Callable[[HttpRequest], HttpResponseBase]) -> None:
        self.get_response = get_response

    def __call__(self, request: HttpRequest) -> HttpResponseBase:
        """This function will answer the request once its actor is known."""
        actor = STRANGER
        if not is_api(request) and isinstance(request.user, Person):
            actor = actor_of_person(request.user)
        request.actor = actor  # type: ignore[attr-defined]  # this is where it is set; asking.actor_of reads it
        return self.get_response(request)


class TokenAuthentication(authentication.BaseAuthentication):
    """`Authorization: Bearer tb_...`; a token that does not serve is a 401 that says why."""

    def authenticate(self, request: Request) -> tuple[Person, Token] | None:
        """This function will return person and token, None without an Authorization header; raises
        NotSignedIn.
        """
        header = request.headers.get("Authorization", "")
        if not header:
            return None
        scheme, _, secret = header.partition(" ")
        if scheme.lower() != "bearer":
            raise NotSignedIn(
                "token-malformed",
                "The header Authorization is not a bearer token.",
                next_step="Send: Authorization: Bearer tb_...",
            )
        token = _noted(request, secret.strip())
        _asks(request, actor_of_token(token))
        return token.person, token

    def authenticate_header(self, request: Request) -> str:  # noqa: ARG002  # the framework's form
        """This function will return the challenge of a 401."""
        return CHALLENGE


def _noted(request: Request, secret: str) -> Token:
    """This function will return the token sent; its use, or why it does not serve, is noted first."""
    now = timezone.now()
    try:
        token = token_sent(secret, at=now)
    except TokenRefused as refused:
        if refused.token is None:
            note_stranger(request, "token-refused", secret)
        else:
            note_token(request, "token-refused", refused.token)
        raise
    # The log takes one line in five minutes; each process remembers, so that it is not asked every time.
    if _last_use.get(token.digest, _LONG_AGO) + NOTED_EVERY <= now:
        note_token(request, "token-used", token)
        _last_use[token.digest] = now
    return token


class SessionAuthentication(authentication.SessionAuthentication):
    """A browser that is signed in; what is not safe needs the CSRF token besides."""

    def authenticate(self, request: Request) -> tuple[Person, None] | None:
        """This function will return the signed-in person or None; raises PermissionDenied on a forgery."""
        found = super().authenticate(request)
        if found is None or not isinstance(found[0], Person):
            return None
        _asks(request, actor_of_person(found[0]))
        return found[0], None


class Known(permissions.BasePermission):
    """Lets in who is signed in; reading needs `read` besides. Each act asks for itself."""

    def has_permission(self, request: Request, view: Any) -> bool:
        """This function will say yes, or raise NotSignedIn or NotAllowed."""
        actor = getattr(request, "actor", STRANGER)
        if actor.kind == "stranger":
            raise NotSignedIn(
                "not-signed-in",
                "Nobody is signed in.",
                next_step="Sign in, or send a token: Authorization: Bearer tb_...",
            )
        if request.method in permissions.SAFE_METHODS and allowed.READ not in actor.may:
            raise NotAllowed(
                "read-not-allowed",
                f"{actor.key} ({actor.capacity}) may not read here.",
                next_step="Use a token with the scope read, or have a duty granted.",
            )
        if actor.reach is not None:
            refuse_beyond(actor.reach, request, view)
        return True
