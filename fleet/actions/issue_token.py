"""Issuing a bearer token. Its secret is returned once and kept nowhere."""

import secrets
from collections.abc import Collection
from dataclasses import dataclass
from datetime import timedelta
from typing import Final

from fleet.acts import ENTER_PERSON, ISSUE_TOKEN
from fleet.models import Aircraft, Person, Token
from fleet.models.token import LONGEST
from fleet.queries.tokens import digest_of
from records.act import act
from records.actor import Actor, refuse_without_leave
from records.refusal import Fault, Invalid, NotAllowed, NotKnown, StepRefused

LONGEST_LABEL: Final = 80
MOST_REGISTRATIONS: Final = 200


@dataclass(frozen=True, slots=True)
class Issued:
    """A token and, this once, its secret."""

    token: Token
    secret: str


def issue_token(
    by: Actor,
    person: Person,
    *,
    label: str,
    scopes: Collection[str],
    grantable: frozenset[str],
    valid_for: timedelta,
    integration: bool = False,
    registrations: Collection[str] = (),
) -> Issued:
    """This function will issue a token of `person` and return it with its secret.

    `grantable` is what the person's duties let a token have, as the switchboard knows it. A person issues
    their own; one for an integration is issued by who enters people. With `registrations` it serves for
    those aircraft only. Raises NotAllowed, NotKnown (another operator's person), StepRefused (somebody who
    has left) and Invalid (/label, /scopes, /valid_for, /registrations).
    """
    if by.kind != "service" and by.operator != person.operator_id:
        raise NotKnown("person-not-known", "There is no such person.")
    refuse_meddling(by, person, integration=integration)
    refuse_without_leave(
        by, ISSUE_TOKEN.name
    )  # before the scopes are judged, of which none would be to be had
    if not person.is_active:
        raise StepRefused("person-inactive", "This person has left, so no token of theirs would serve.")
    _refuse_wrong(label, scopes, grantable, valid_for)
    _refuse_strange_aircraft(person.operator_id, registrations)
    secret = new_secret()
    with act(ISSUE_TOKEN, by=by, about=f"person:{person.pk}", reason=label) as entry:
        token = Token.objects.create(
            operator_id=person.operator_id,
            person=person,
            label=label,
            digest=digest_of(secret),
            scopes=sorted(set(scopes)),
            registrations=sorted(set(registrations)),
            integration=integration,
            issued_at=entry.at,
            expires_at=entry.at + valid_for,
        )
    return Issued(token, secret)


def new_secret() -> str:
    """This function will draw a secret: 32 random bytes behind a mark by which scanners find leaked ones."""
    return "tb_" + secrets.token_urlsafe(32)


def refuse_meddling(by: Actor, person: Person, *, integration: bool) -> None:
    """This function will do nothing for one's own token, and for one that enters people about an
    integration's.

    Nobody holds a token that acts in the name of another person. Raises NotAllowed.
    """
    if by.kind == "service" or by.person == person.pk:
        return
    if not (integration and ENTER_PERSON.name in by.may):
        raise NotAllowed(
            "token-of-another-person",
            "A token is issued and revoked by its own person; an integration's by who enters people.",
        )


def _refuse_wrong(
    label: str, scopes: Collection[str], grantable: frozenset[str], valid_for: timedelta
) -> None:
    faults = []
    if not 0 < len(label.strip()) <= LONGEST_LABEL or not label.isprintable():
        words = f"a label has 1 to {LONGEST_LABEL} printable characters"
        faults.append(Fault("/label", "label-malformed", words))
    if not scopes:
        faults.append(Fault("/scopes", "scopes-missing", "a token without a scope serves nothing"))
    known = ", ".join(sorted(grantable)) or "none"
    faults += [
        Fault(
            f"/scopes/{place}", "scope-not-grantable", f"{scope!r} is not to be had here; to be had: {known}"
        )
        for place, scope in enumerate(scopes)
        if scope not in grantable
    ]
    if not timedelta(0) < valid_for <= LONGEST:
        words = f"a token is valid for up to {LONGEST.days} days"
        faults.append(Fault("/valid_for", "expiry-out-of-bounds", words))
    if faults:
        raise Invalid(*faults)


def _refuse_strange_aircraft(operator: str, registrations: Collection[str]) -> None:
    if len(registrations) > MOST_REGISTRATIONS:
        words = f"at most {MOST_REGISTRATIONS} aircraft can be named; leave the list away for all of them"
        raise Invalid(Fault("/registrations", "too-many", words))
    # Whatever is in no registration never reaches the database, whose texts hold no NUL.
    known = set(
        Aircraft.objects.filter(
            operator_id=operator, registration__in=[one for one in registrations if one.isprintable()]
        ).values_list("registration", flat=True)
    )
    faults = [
        Fault(f"/registrations/{place}", "aircraft-not-known", f"no aircraft {one[:20]} is entered")
        for place, one in enumerate(registrations)
        if one not in known
    ]
    if faults:
        raise Invalid(*faults)
