"""Finding the bearer token that was sent."""

import hashlib
import re
from datetime import datetime
from typing import Final

from fleet.models import Token
from records.refusal import NotSignedIn

# `tb_` and 32 random bytes as base64url without padding (RFC 4648 section 5).
SHAPE: Final = re.compile(r"tb_[A-Za-z0-9_-]{43}")
_FRESH_ONE: Final = "Have a fresh token issued."


def digest_of(secret: str) -> str:
    """This function will return what is kept of a token: its SHA-256, 64 hexadecimal digits.

    A plain hash serves, since 32 random bytes cannot be guessed from it.
    """
    return hashlib.sha256(secret.encode("utf-8", "surrogatepass")).hexdigest()


def token_sent(secret: str, *, at: datetime) -> Token:
    """This function will return the token, with its person, that `secret` is and that is valid at `at`.

    Raises NotSignedIn: token-malformed, token-unknown, token-revoked, token-expired, token-person-inactive.
    """
    if not SHAPE.fullmatch(secret):
        raise NotSignedIn("token-malformed", "This has not the form of a token.", next_step=_FRESH_ONE)
    token = Token.objects.select_related("person").filter(digest=digest_of(secret)).first()
    if token is None:
        raise NotSignedIn("token-unknown", "No such token was issued.", next_step=_FRESH_ONE)
    if token.revoked_at is not None:
        raise NotSignedIn("token-revoked", "This token was revoked.", next_step=_FRESH_ONE)
    if token.expires_at <= at:
        raise NotSignedIn("token-expired", "This token has expired.", next_step=_FRESH_ONE)
    if not token.person.is_active:
        raise NotSignedIn("token-person-inactive", "The person this token belongs to has left.")
    return token


def tokens_of(operator: str, person: int) -> tuple[Token, ...]:
    """This function will return the person's tokens, the newest first."""
    return tuple(Token.objects.filter(operator=operator, person=person).order_by("-issued_at", "-id"))
