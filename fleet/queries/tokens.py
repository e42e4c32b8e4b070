"""Finding the bearer token that was sent, and how long each of its secrets serves."""

import hashlib
import re
from collections.abc import Sequence
from dataclasses import dataclass
from datetime import datetime
from functools import lru_cache
from typing import Final

from django.db.models import Q

from fleet.models import Person, Rotation, Token
from records.prepared import columns, instance, rows, width
from records.refusal import NotKnown, NotSignedIn

# `tb_` and 32 random bytes as base64url without padding (RFC 4648 section 5).
SHAPE: Final = re.compile(r"tb_[A-Za-z0-9_-]{43}")
_FRESH_ONE: Final = "Have a fresh token issued."


class TokenRefused(NotSignedIn):
    """A token that does not serve; `token` is the one it was, where there is one."""

    def __init__(self, code: str, detail: str, token: Token | None = None) -> None:
        left = code == "token-person-inactive"
        super().__init__(code, detail, next_step="" if left else _FRESH_ONE)
        self.token = token


@dataclass(frozen=True, slots=True)
class Secret:
    """A secret of a token: number 0 is the first, the others are of rotations. It serves until `ends_at`,
    which is `expires_at` or comes before it.
    """

    number: int
    expires_at: datetime
    ends_at: datetime


def digest_of(secret: str) -> str:
    """This function will return what is kept of a token: its SHA-256, 64 hexadecimal digits.

    A plain hash serves, since 32 random bytes cannot be guessed from it.
    """
    return hashlib.sha256(secret.encode("utf-8", "surrogatepass")).hexdigest()


def token_sent(secret: str, *, at: datetime) -> Token:
    """This function will return the token, with its person, that `secret` is and that is valid at `at`.

    Raises TokenRefused: token-malformed, token-unknown, token-revoked, token-expired, token-rotated,
    token-person-inactive.
    """
    if not SHAPE.fullmatch(secret):
        raise TokenRefused("token-malformed", "This has not the form of a token.")
    found = _found(digest_of(secret))
    if found is None:
        raise TokenRefused("token-unknown", "No such token was issued.")
    token, number, rotated = found
    if token.revoked_at is not None:
        raise TokenRefused("token-revoked", "This token was revoked.", token)
    sent = (secrets_of(token) if rotated else lives(token, ()))[number]
    if sent.expires_at <= at:
        raise TokenRefused("token-expired", "This token has expired.", token)
    if sent.ends_at <= at:
        raise TokenRefused(
            "token-rotated", "This token has a newer secret; the time of this one is over.", token
        )
    if not token.person.is_active:
        raise TokenRefused("token-person-inactive", "The person this token belongs to has left.", token)
    return token


def secrets_of(token: Token) -> tuple[Secret, ...]:
    """This function will return every secret the token ever had, in order."""
    return lives(token, sorted(token.rotations.all(), key=lambda one: one.number))


def lives(token: Token, rotations: Sequence[Rotation]) -> tuple[Secret, ...]:
    """This function will return how long each secret serves, given the rotations by number.

    A rotation lets the secret before it serve for the overlap it states, and ends the one before that: two
    serve at a time, at most.
    """
    expires = [token.expires_at, *(one.expires_at for one in rotations)]
    ends = list(expires)
    for place, one in enumerate(rotations):
        ends[place] = min(ends[place], one.previous_ends_at)
        if place:
            ends[place - 1] = min(ends[place - 1], one.issued_at)
    return tuple(Secret(number, *both) for number, both in enumerate(zip(expires, ends, strict=True)))


def token_of(operator: str | None, number: int) -> Token:
    """This function will return the operator's token of that number (any operator's for None); raises
    NotKnown.
    """
    whose = Q() if operator is None else Q(operator=operator)
    token = Token.objects.select_related("person").filter(whose, pk=number).first()
    if token is None:
        raise NotKnown("token-not-known", "There is no such token.")
    return token


def tokens_of(operator: str, person: int | None = None) -> tuple[Token, ...]:
    """This function will return the tokens of a person, or all of the operator's, the newest first."""
    wanted = Q(operator=operator) if person is None else Q(operator=operator, person=person)
    found = Token.objects.filter(wanted).select_related("person").prefetch_related("rotations")
    return tuple(found.order_by("-issued_at", "-id"))


def _found(digest: str) -> tuple[Token, int, bool] | None:
    """This function will return the token with its person, the number of the secret, whether others came
    after the first.
    """
    found = rows(_statement(), [digest, digest])
    if not found:
        return None
    number, rotated, *row = found[0]
    token = instance(Token, row)
    token.person = instance(Person, row, width(Token))
    return token, number, rotated


@lru_cache(maxsize=1)
def _statement() -> str:
    return (
        "SELECT sent.number, EXISTS (SELECT FROM fleet_rotation r WHERE r.token_id = t.id), "  # noqa: S608  # names of our own only
        f"{columns(Token, 't')}, {columns(Person, 'p')} "
        "FROM (SELECT id, 0 AS number FROM fleet_token WHERE digest = %s "
        "UNION ALL SELECT token_id, number FROM fleet_rotation WHERE digest = %s) AS sent "
        "JOIN fleet_token t ON t.id = sent.id JOIN fleet_person p ON p.id = t.person_id"
    )
