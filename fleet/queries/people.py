"""The people of one operator. Another operator's person does not exist here."""

from datetime import datetime

from django.db.models import QuerySet

from fleet.duties import Role
from fleet.models import Duty, Operator, Person
from records.refusal import NotKnown

MANAGER: Role = "operations manager"


def operator_named(code: str) -> Operator:
    """This function will return the operator of that code; raises NotKnown."""
    found = Operator.objects.filter(pk=code).first()
    if found is None:
        raise NotKnown("operator-not-known", "No such operator.")
    return found


def people_of(operator: str) -> "QuerySet[Person]":
    """This function will return the operator's people by login, with their duties."""
    return Person.objects.filter(operator=operator).order_by("login").prefetch_related("duties")


def person_of(operator: str, number: int) -> Person:
    """This function will return the operator's person of that number; raises NotKnown."""
    found = people_of(operator).filter(pk=number).first()
    if found is None:
        raise NotKnown("person-not-known", "There is no such person.")
    return found


def duties_in_order(person: Person) -> tuple[Duty, ...]:
    """This function will return every duty ever granted or ended, the newest first."""
    return tuple(sorted(person.duties.all(), key=lambda duty: (duty.since, duty.pk), reverse=True))


def has_manager(operator: str, at: datetime) -> bool:
    """This function will say whether somebody who can sign in is operations manager at `at`."""
    newest = (
        Duty.objects.filter(operator=operator, role=MANAGER, since__lte=at, person__is_active=True)
        .order_by("person", "-since", "-id")
        .distinct("person")
    )
    return any(duty.granted for duty in newest)
