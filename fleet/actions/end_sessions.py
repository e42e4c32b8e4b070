"""Ends every session of whoever acts, wherever they are signed in."""

from django.db.models import F

from fleet import acts
from fleet.models import Person
from records.act import act
from records.actor import Actor
from records.refusal import NotAllowed


def end_sessions(actor: Actor, person: Person) -> Person:
    """This function will end every session of the person acting; tokens serve on. Raises NotAllowed.

    Each session carries a digest of the series of its day, so none of them is looked for.
    """
    if actor.person != person.pk:
        raise NotAllowed("own-sessions-only", "A person ends their own sessions only.")
    with act(acts.END_SESSIONS, by=actor, about=f"person:{person.pk}"):
        Person.objects.filter(pk=person.pk).update(session_series=F("session_series") + 1)
    person.refresh_from_db()
    return person
