"""The roles a person holds at an instant."""

from datetime import datetime

from fleet.models import Duty, Person


def roles_of(person: Person, at: datetime) -> tuple[str, ...]:
    """This function will return the roles the person holds at `at`, by name.

    Of the rows of one role that have begun, the one with the latest beginning counts; of equals, the one
    entered last.
    """
    begun = (
        Duty.objects.filter(person=person, since__lte=at).order_by("role", "-since", "-id").distinct("role")
    )
    return tuple(duty.role for duty in begun if duty.granted)
