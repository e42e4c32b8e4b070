"""What granting and ending a duty ask alike."""

from datetime import datetime

from fleet.duties import ROLES, is_role
from fleet.models import Person
from records.actor import Actor
from records.refusal import Fault, Invalid, NotKnown


def of_same_operator(actor: Actor, person: Person) -> None:
    """This function will raise NotKnown when the person is another operator's."""
    if actor.operator != person.operator_id:
        raise NotKnown("person-not-known", "No such person.")


def refuse_unknown_role(role: str) -> None:
    """This function will raise Invalid when there is no such role."""
    if not is_role(role):
        raise Invalid(Fault("/role", "not-a-choice", f"the roles are {', '.join(ROLES)}"))


def beginning(since: datetime | None, now: datetime) -> datetime:
    """This function will return `since`, or `now` without one; raises Invalid for an instant that is past.

    Who might do what in the past is not rewritten.
    """
    if since is not None and since < now:
        raise Invalid(Fault("/since", "in-the-past", "a duty begins or ends now or later"))
    return since or now
