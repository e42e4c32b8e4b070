"""Enters a person of an operator; duties are granted apart."""

import secrets
from functools import partial

from fleet import acts
from fleet.actions.constraint_refusals import refused_as
from fleet.actions.passwords import hash_of_new
from fleet.actions.row_faults import checked
from fleet.mail_address import mail_fault
from fleet.models import Operator, Person
from fleet.models.rows import new_number
from records.act import act
from records.actor import Actor
from records.refusal import Fault, Invalid, NotKnown

_LOGIN_FORM = "a login is 2 to 60 of a-z, 0-9, dot, dash and underscore, beginning with a letter or digit"
LOGIN_REFUSALS = {
    "person_login_is_taken_once": partial(
        Invalid, Fault("/login", "login-taken", "somebody has this login; choose another")
    ),
    "person_login_is_plain": partial(Invalid, Fault("/login", "wrong-form", _LOGIN_FORM)),
}


def enter_person(
    actor: Actor,
    operator: Operator,
    *,
    login: str,
    name: str,
    password: str,
    mail: str = "",
    reason: str = "",
) -> Person:
    """This function will enter a person with a first password.

    Raises Invalid for a login that is taken or not plain, a blank name, a weak password and a wrong mail
    address; NotKnown for another operator's.
    """
    if actor.operator != operator.code:
        raise NotKnown("operator-not-known", "No such operator.")
    if mail and (fault := mail_fault(mail, "/mail")):
        raise Invalid(fault)
    person = Person(
        id=new_number(Person),
        operator=operator,
        login=login.lower(),
        name=name,
        password=hash_of_new(password),
        mail=mail,
        salt=secrets.token_bytes(32),
    )
    checked(person)
    with (
        refused_as(LOGIN_REFUSALS),
        act(acts.ENTER_PERSON, by=actor, about=f"person:{person.id}", reason=reason),
    ):
        person.save(force_insert=True)
    return person
