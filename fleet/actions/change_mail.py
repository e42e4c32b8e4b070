"""Changes the mail address of whoever acts; the trail holds a salted digest of it only."""

from fleet import acts
from fleet.mail_address import mail_fault
from fleet.models import Person
from records.act import act
from records.actor import Actor
from records.refusal import Invalid, NotAllowed


def change_mail(actor: Actor, person: Person, mail: str) -> Person:
    """This function will keep the person's own mail address; "" takes it out.

    Told there: a load of theirs that goes stale, and a link to choose a new password. Raises NotAllowed for
    anybody else's address, Invalid at `/mail`.
    """
    if actor.person != person.pk:
        raise NotAllowed("own-mail-only", "A person changes their own mail address only.")
    if mail and (fault := mail_fault(mail, "/mail")):
        raise Invalid(fault)
    with act(acts.CHANGE_MAIL, by=actor, about=f"person:{person.pk}"):
        Person.objects.filter(pk=person.pk).update(mail=mail)
    person.mail = mail
    return person
