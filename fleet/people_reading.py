"""Reads the documents about people and tokens: somebody to be entered, a duty, a token, a new secret, a
password.
"""

from collections.abc import Mapping
from dataclasses import dataclass
from datetime import datetime, timedelta
from typing import Any

from fleet.document_schema import shape_faults
from fleet.entering import plausible
from records.refusal import Invalid


@dataclass(frozen=True, slots=True)
class NewPerson:
    """Somebody to be entered. `password` is the first one."""

    login: str
    name: str
    password: str
    mail: str = ""
    reason: str = ""


@dataclass(frozen=True, slots=True)
class DutyChange:
    """A duty to be granted or ended; `since` None means now."""

    role: str
    granted: bool
    since: datetime | None
    reason: str


@dataclass(frozen=True, slots=True)
class NewToken:
    """A token to be issued; `person` None means whoever asks, no registrations all aircraft."""

    label: str
    scopes: tuple[str, ...]
    registrations: tuple[str, ...]
    valid_for: timedelta
    person: int | None
    integration: bool


@dataclass(frozen=True, slots=True)
class NewSecret:
    """A new secret for a token, and how long the one before serves on."""

    overlap: timedelta
    valid_for: timedelta
    reason: str


@dataclass(frozen=True, slots=True)
class NewPassword:
    """A password change."""

    current: str
    new: str


def read_person(document: object) -> NewPerson:
    """This function will return the person in a document; raises Invalid with all faults."""
    return NewPerson(**_sound("person-1", document))


def read_duty(document: object) -> DutyChange:
    """This function will return the change of a duty in a document; raises Invalid with all faults."""
    entry = _sound("duty-1", document)
    given = entry.get("since")
    since = None if given is None else plausible(datetime.fromisoformat(given), "/since")
    return DutyChange(entry["role"], entry["granted"], since, entry["reason"])


def read_reason(document: object) -> str:
    """This function will return the reason in a document; raises Invalid with all faults."""
    return str(_sound("reason-1", document)["reason"])


def read_token(document: object) -> NewToken:
    """This function will return the token in a document; raises Invalid with all faults."""
    entry = _sound("token-1", document)
    person = entry.get("person")
    return NewToken(
        label=entry["label"],
        scopes=tuple(entry["scopes"]),
        registrations=tuple(entry.get("registrations", ())),
        valid_for=timedelta(days=int(entry["days"])),
        person=None if person is None else int(person),
        integration=entry.get("integration", False),
    )


def read_rotation(document: object) -> NewSecret:
    """This function will return the new secret in a document; raises Invalid with all faults."""
    entry = _sound("rotation-1", document)
    return NewSecret(
        timedelta(hours=int(entry["overlap_hours"])),
        timedelta(days=int(entry["days"])),
        entry.get("reason", ""),
    )


def read_password(document: object) -> NewPassword:
    """This function will return the password change in a document; raises Invalid with all faults."""
    return NewPassword(**_sound("password-1", document))


def read_mail(document: object) -> str:
    """This function will return the mail address in a document; raises Invalid with all faults."""
    return str(_sound("mail-1", document)["mail"])


def _sound(schema: str, document: object) -> dict[str, Any]:
    faults = shape_faults(schema, document)
    if faults or not isinstance(document, Mapping):
        raise Invalid(*faults)
    return dict(document)
