"""A new secret for a token; the one it had serves on for a stated overlap, then ends."""

from dataclasses import dataclass
from datetime import timedelta

from fleet.actions.constraint_refusals import refused_as
from fleet.actions.issue_token import new_secret, refuse_meddling
from fleet.acts import ROTATE_TOKEN
from fleet.models import Rotation, Token
from fleet.models.token import LONGEST, LONGEST_OVERLAP
from fleet.queries.tokens import digest_of, secrets_of, token_of
from records.act import act
from records.actor import Actor
from records.refusal import Fault, Invalid, StepRefused


@dataclass(frozen=True, slots=True)
class Rotated:
    """A token, its rotation and, this once, the new secret."""

    token: Token
    rotation: Rotation
    secret: str


def rotate_token(
    by: Actor, number: int, *, overlap: timedelta, valid_for: timedelta, reason: str = ""
) -> Rotated:
    """This function will give the token with that number a new secret and return it, this once.

    The secret it had serves for `overlap` more, 0 to 30 days, and never beyond its own time; one that still
    served from a rotation before ends at once, so two serve at a time at most. Token, scopes and what the
    trail calls it stay. Raises NotKnown, NotAllowed (another person's), StepRefused (revoked, or of
    somebody who has left) and Invalid (/overlap, /valid_for).
    """
    token = token_of(None if by.kind == "service" else by.chain, number)
    refuse_meddling(by, token.person, integration=token.integration)
    _refuse_wrong(overlap, valid_for)
    if not token.person.is_active:
        raise StepRefused("person-inactive", "The person of this token has left, so it serves nobody.")
    secret = new_secret()
    with (
        refused_as({"rotation_number_is_taken_once": _taken}),
        act(ROTATE_TOKEN, by=by, about=f"token:{token.pk}", reason=reason) as entry,
    ):
        token = token_of(token.operator_id, number)
        if token.revoked_at is not None:
            raise StepRefused(
                "token-already-revoked", "This token was revoked.", next_step="Have a fresh token issued."
            )
        rotation = Rotation.objects.create(
            operator_id=token.operator_id,
            token=token,
            number=len(secrets_of(token)),
            digest=digest_of(secret),
            issued_at=entry.at,
            expires_at=entry.at + valid_for,
            previous_ends_at=entry.at + overlap,
        )
    return Rotated(token_of(token.operator_id, number), rotation, secret)


def _refuse_wrong(overlap: timedelta, valid_for: timedelta) -> None:
    faults = []
    if not timedelta(0) <= overlap <= LONGEST_OVERLAP:
        words = f"the secret before serves for up to {LONGEST_OVERLAP.days} days more"
        faults.append(Fault("/overlap", "overlap-out-of-bounds", words))
    if not timedelta(0) < valid_for <= LONGEST:
        words = f"a secret is valid for up to {LONGEST.days} days"
        faults.append(Fault("/valid_for", "expiry-out-of-bounds", words))
    if faults:
        raise Invalid(*faults)


def _taken() -> StepRefused:
    return StepRefused(
        "token-rotated-meanwhile",
        "Somebody else gave this token a new secret at the same moment.",
        next_step="Look at the token again.",
    )
