"""Changes the password of whoever acts; the trail says "changed" and nothing more."""

from django.contrib.auth.hashers import identify_hasher, make_password

from fleet import acts
from fleet.actions.passwords import hash_of_new
from fleet.models import Person
from records.act import act
from records.actor import Actor
from records.refusal import Fault, Invalid, NotAllowed

RENEWED = "the same password, hashed anew with stronger settings"


def change_password(actor: Actor, person: Person, *, current: str, new: str) -> None:
    """This function will give the person acting a new password; raises Invalid for a wrong current, the
    same or a weak new one.

    Sessions begun with the old one end by themselves, since Django ties them to the hash.
    """
    if actor.person != person.pk:
        raise NotAllowed("own-password-only", "A person changes their own password only.")
    if not person.check_password(current):
        raise Invalid(Fault("/current", "password-wrong", "this is not the current password"))
    if new == current:
        raise Invalid(Fault("/new", "password-same", "this is the password you have; choose another"))
    hashed = hash_of_new(new, pointer="/new")
    with act(acts.CHANGE_PASSWORD, by=actor, about=f"person:{person.pk}"):
        _keep(person, hashed)


def renew_hash(actor: Actor, person: Person, password: str) -> bool:
    """This function will hash a password anew when its hash is of an older kind, and say whether it did.

    Called after a sign-in with the password that was just proven. Django would do this in passing, by a
    save that the database refuses outside an act; this is that save, in one.
    """
    if actor.person != person.pk or not person.check_password(password) or not _is_old(person.password):
        return False
    with act(acts.CHANGE_PASSWORD, by=actor, about=f"person:{person.pk}", reason=RENEWED):
        _keep(person, make_password(password))
    return True


def _is_old(hashed: str) -> bool:
    """This function will say whether the hash is of another kind, or weaker, than new ones are."""
    used, preferred = identify_hasher(hashed), identify_hasher(make_password("any"))
    return used.algorithm != preferred.algorithm or used.must_update(hashed)


def _keep(person: Person, hashed: str) -> None:
    person.password = hashed
    person.save(update_fields=["password"])
