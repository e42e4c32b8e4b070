"""What the log of sign-ins is told: who, if that is known, and never what was typed."""

from django.http import HttpRequest

from fleet.models import Person, Token
from records.access_log import note


def note_person(request: HttpRequest, what: str, person: Person) -> None:
    """This function will note an event of a person on their operator's log."""
    note(what, operator=person.operator_id, key=f"person:{person.pk}", address=address_of(request))


def note_login(request: HttpRequest, what: str, typed: str) -> None:
    """This function will note an event of whoever typed this login: on the operator's log when it is a
    person's, otherwise on that of the house, with a keyed digest in its place.
    """
    person = Person.objects.filter(login=typed).first() if typed.isprintable() else None
    if person is not None:
        note_person(request, what, person)
        return
    note(what, operator=None, typed=typed, address=address_of(request))


def note_token(request: HttpRequest, what: str, token: Token) -> None:
    """This function will note an event of a token on its operator's log."""
    note(what, operator=token.operator_id, key=f"token:{token.pk}", address=address_of(request))


def note_stranger(request: HttpRequest, what: str, sent: str) -> None:
    """This function will note that somebody sent what is nobody's, as a keyed digest, on the log of the
    house.
    """
    note(what, operator=None, typed=sent[:200], address=address_of(request))


def address_of(request: HttpRequest) -> str:
    """This function will return the address a request came from, as the server sees it."""
    return str(request.META.get("REMOTE_ADDR", ""))
