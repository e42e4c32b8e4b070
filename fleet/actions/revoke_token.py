"""Revoking a bearer token, for good, with every secret it has."""

from fleet.actions.issue_token import refuse_meddling
from fleet.acts import REVOKE_TOKEN
from fleet.models import Token
from fleet.queries.tokens import token_of
from records.act import act
from records.actor import Actor
from records.refusal import StepRefused


def revoke_token(by: Actor, number: int, *, reason: str) -> Token:
    """This function will revoke the token with that number; it serves nobody from then on.

    Raises NotKnown (no such token, or another operator's), NotAllowed (another person's) and StepRefused
    (revoked before).
    """
    token = token_of(None if by.kind == "service" else by.chain, number)
    refuse_meddling(by, token.person, integration=token.integration)
    with act(REVOKE_TOKEN, by=by, about=f"token:{token.pk}", reason=reason) as entry:
        # Counted in the database: of two who revoke at once, one is told that it was done.
        if not Token.objects.filter(pk=token.pk, revoked_at__isnull=True).update(revoked_at=entry.at):
            raise StepRefused("token-already-revoked", "This token was revoked before.")
        token.revoked_at = entry.at
    return token
