"""Enters the invented operator, its people and their tokens, through the actions."""

from datetime import timedelta

from django.utils import timezone

from fleet.actions.enter_operator import FirstPerson, enter_operator
from fleet.actions.enter_person import enter_person
from fleet.actions.grant_duty import grant_duty
from fleet.actions.issue_token import issue_token
from fleet.acts import ENTER_OPERATOR, ISSUE_TOKEN
from fleet.models import Operator, Person
from fleet.queries.duties import roles_of
from records.actor import Actor
from service import allowed
from service.actors import actor_of_person
from service.demo.cast import MANAGER, OPERATOR, PEOPLE, SCHEDULER, Login
from service.demo.notes import Notes

REASON = "invented, to show the service"


def enter_people(notes: Notes) -> dict[str, str]:
    """This function will enter what is not entered yet and return a token for everybody who needs one, by
    login.
    """
    operator = _operator(notes.password)
    manager = Person.objects.get(operator=operator, login=MANAGER)
    tokens: dict[str, str] = dict(notes.get("tokens") or {})
    for one in PEOPLE:
        person = _person(operator, manager, one, notes.password)
        if one.scopes and one.login not in tokens:
            tokens[one.login] = _token(person, one)
            notes.keep("tokens", tokens)
    return tokens


def _operator(password: str) -> Operator:
    found = Operator.objects.filter(code=OPERATOR.code).first()
    if found is not None:
        return found
    house = Actor(
        operator=None,
        kind="service",
        key="service:command",
        name="",
        capacity="command line",
        may=frozenset({ENTER_OPERATOR.name}),
    )
    first = FirstPerson(MANAGER, next(one.name for one in PEOPLE if one.login == MANAGER), password)
    operator, _ = enter_operator(house, OPERATOR, first, reason=REASON)
    return operator


def _person(operator: Operator, manager: Person, one: Login, password: str) -> Person:
    by = actor_of_person(manager)
    person = Person.objects.filter(operator=operator, login=one.login).first()
    if person is None:
        person = enter_person(by, operator, login=one.login, name=one.name, password=password, reason=REASON)
    held = roles_of(person, timezone.now())
    for role in one.roles:
        if role not in held:
            grant_duty(by, person, role, reason=REASON)
    return person


def _token(person: Person, one: Login) -> str:
    integration = one.login == SCHEDULER
    by = Actor(
        operator=person.operator_id,
        kind="service",
        key="service:command",
        name="",
        capacity="command line",
        may=frozenset({ISSUE_TOKEN.name}),
    )
    issued = issue_token(
        by,
        person,
        label="invented day",
        scopes=one.scopes,
        grantable=allowed.grantable(roles_of(person, timezone.now()), integration=integration),
        valid_for=timedelta(days=30),
        integration=integration,
    )
    return issued.secret
