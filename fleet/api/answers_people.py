"""Writes people and tokens as the API answers them."""

from collections.abc import Mapping
from datetime import datetime
from typing import Any

from fleet.models import Person, Token
from fleet.queries.duties import roles_of
from fleet.queries.people import duties_in_order
from fleet.queries.tokens import secrets_of


def person_line(person: Person, now: datetime) -> dict[str, Any]:
    """This function will write one person with the duties held at `now`."""
    return {
        "id": person.pk,
        "key": f"person:{person.pk}",
        "login": person.login,
        "name": person.name,
        "mail": person.mail,
        "active": person.is_active,
        "roles": list(roles_of(person, now)),
    }


def person_answer(person: Person, now: datetime) -> dict[str, Any]:
    """This function will write one person with every duty, the newest first."""
    duties = [
        {"role": duty.role, "granted": duty.granted, "since": duty.since} for duty in duties_in_order(person)
    ]
    return person_line(person, now) | {"duties": duties}


def token_line(token: Token, now: datetime, used: Mapping[int, datetime]) -> dict[str, Any]:
    """This function will write one token with the secrets that serve at `now`."""
    secrets = () if token.revoked_at else secrets_of(token)
    return {
        "id": token.pk,
        "key": f"token:{token.pk}",
        "label": token.label,
        "person": f"person:{token.person_id}",
        "integration": token.integration,
        "scopes": token.scopes,
        "registrations": token.registrations,
        "issued_at": token.issued_at,
        "revoked_at": token.revoked_at,
        "last_used_at": used.get(token.pk),
        "secrets": [
            {"number": one.number, "expires_at": one.expires_at, "ends_at": one.ends_at}
            for one in secrets
            if one.ends_at > now
        ],
    }
