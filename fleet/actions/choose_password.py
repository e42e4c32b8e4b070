"""Gives somebody who came with a good link the password they chose."""

from axes.handlers.proxy import AxesProxyHandler
from django.contrib.auth.tokens import default_token_generator
from django.db.models import F

from fleet import acts
from fleet.actions.passwords import hash_of_new
from fleet.models import Person
from records.act import act
from records.actor import Actor
from records.refusal import NotKnown

BY_LINK = "chosen anew by a link that an operations manager made"


def person_of_link(number: int, code: str) -> Person:
    """This function will return the active person a link is for; raises NotKnown for one that is spent, too
    old, or never was.
    """
    person = Person.objects.filter(pk=number, is_active=True).first()
    if person is None or not default_token_generator.check_token(person, code):
        raise NotKnown(
            "link-spent",
            "This link does not serve: it was used, is too old, or is not whole.",
            next_step="Ask an operations manager for a new one.",
        )
    return person


def choose_password(actor: Actor, person: Person, code: str, *, new: str) -> None:
    """This function will give the person acting the new password; the link is spent by that, and every
    session of theirs ends.

    A lock-out of the login ends, too. Raises NotKnown as above, Invalid for a weak password at `/new`.
    """
    hashed = hash_of_new(new, pointer="/new")
    with act(acts.CHANGE_PASSWORD, by=actor, about=f"person:{person.pk}", reason=BY_LINK):
        # Of two who come with one link, the second finds another hash than the code was made of.
        current = person_of_link(person.pk, code).password
        values = {"password": hashed, "session_series": F("session_series") + 1}
        if not Person.objects.filter(pk=person.pk, password=current).update(**values):
            raise NotKnown("link-spent", "This link was used just now.")
    AxesProxyHandler.reset_attempts(username=person.login)
