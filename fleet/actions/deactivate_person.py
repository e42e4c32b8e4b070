"""Deactivates a person: no sign-in, no session, no token of theirs serves from then on."""

from fleet import acts
from fleet.actions.duty_rows import of_same_operator
from fleet.actions.last_manager import one_at_a_time, refuse_without_manager
from fleet.models import Person
from records.act import act
from records.actor import Actor
from records.refusal import StepRefused


def deactivate_person(actor: Actor, person: Person, *, reason: str) -> Person:
    """This function will deactivate the person; what they signed and entered stays as it is.

    Sessions and tokens are refused from then on, since both ask for an active person. Raises NotKnown
    (another operator's), NotAllowed and StepRefused (oneself, inactive before, the last manager).
    """
    of_same_operator(actor, person)
    with act(acts.DEACTIVATE_PERSON, by=actor, about=f"person:{person.pk}", reason=reason) as entry:
        if actor.person == person.pk:
            raise StepRefused("own-deactivation", "Nobody deactivates themselves; ask another manager.")
        one_at_a_time(entry)
        # Counted in the database: of two who deactivate at once, one is told that it was done.
        if not Person.objects.filter(pk=person.pk, is_active=True).update(is_active=False):
            raise StepRefused("person-inactive", "This person was deactivated before.")
        refuse_without_manager(entry, entry.at)
    person.is_active = False
    return person
