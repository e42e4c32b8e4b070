"""Makes the link by which somebody who forgot their password chooses a new one."""

from dataclasses import dataclass

from django.contrib.auth.tokens import default_token_generator

from fleet import acts
from fleet.actions.duty_rows import of_same_operator
from fleet.models import Person
from records.act import act
from records.actor import Actor
from records.refusal import NotAllowed, StepRefused


@dataclass(frozen=True, slots=True)
class Link:
    """Whose password may be chosen anew, and the code that lets them."""

    person: int
    code: str


def let_choose_password(actor: Actor, person: Person, *, reason: str) -> Link:
    """This function will return a code that lets the person choose a new password, once, within the hours of
    the setting PASSWORD_RESET_TIMEOUT; nothing of it is stored.

    Whoever holds it can sign in as them, so the trail says who made it and why, and the page of the person
    shows it. Raises NotKnown (another operator's), NotAllowed (oneself) and StepRefused (deactivated).
    """
    of_same_operator(actor, person)
    if actor.person == person.pk:
        raise NotAllowed("own-password-known", "Who is signed in changes the password on their own page.")
    if not person.is_active:
        raise StepRefused("person-inactive", "This person is deactivated; no password of theirs serves.")
    with act(acts.LET_CHOOSE_PASSWORD, by=actor, about=f"person:{person.pk}", reason=reason):
        return Link(person.pk, default_token_generator.make_token(person))
