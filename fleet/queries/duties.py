"""The roles a person holds at an instant."""

from datetime import datetime
from typing import Final

from fleet.models import Duty, Person
from records.prepared import rows

_ROLES: Final = (
    "SELECT DISTINCT ON (role) role, granted FROM fleet_duty WHERE person_id = %s AND since <= %s "
    "ORDER BY role, since DESC, id DESC"
)


def roles_of(person: Person, at: datetime) -> tuple[str, ...]:
    """This function will return the roles the person holds at `at`, by name.

    Of the rows of one role that have begun, the one with the latest beginning counts; of equals, the one
    entered last.
    """
    return tuple(role for role, granted in rows(_ROLES, [person.pk, at]) if granted)


def holders_at(operator: str, at: datetime) -> dict[str, tuple[Person, ...]]:
    """This function will return who held each role at `at`, by role and name; roles nobody held are left out.

    Rows of duties never begin before they are entered, so what was known then is the same question.
    """
    begun = (
        Duty.objects.filter(operator_id=operator, since__lte=at)
        .select_related("person")
        .order_by("person_id", "role", "-since", "-id")
        .distinct("person_id", "role")
    )
    held: dict[str, list[Person]] = {}
    for duty in begun:
        if duty.granted:
            held.setdefault(duty.role, []).append(duty.person)
    return {role: tuple(sorted(people, key=lambda one: one.name)) for role, people in sorted(held.items())}
