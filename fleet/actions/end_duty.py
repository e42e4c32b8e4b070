"""Ends a duty of a person, from an instant on."""

from datetime import datetime

from fleet import acts
from fleet.actions.duty_rows import beginning, of_same_operator, refuse_unknown_role
from fleet.actions.last_manager import one_at_a_time, refuse_without_manager
from fleet.models import Duty, Person
from fleet.queries.duties import roles_of
from fleet.queries.people import MANAGER
from records.act import act
from records.actor import Actor
from records.refusal import StepRefused


def end_duty(
    actor: Actor, person: Person, role: str, *, since: datetime | None = None, reason: str = ""
) -> Duty:
    """This function will end the duty from `since`, or from the act's own time.

    Raises Invalid for an unknown role or an instant in the past, StepRefused when the person does not
    hold it then or nobody would be left to grant duties, NotKnown for another operator's person.
    """
    of_same_operator(actor, person)
    refuse_unknown_role(role)
    with act(acts.END_DUTY, by=actor, about=f"person:{person.pk}", reason=reason) as entry:
        if role == MANAGER:
            one_at_a_time(entry)
        from_when = beginning(since, entry.at)
        if role not in roles_of(person, from_when):
            raise StepRefused("duty-not-held", f"{person.name} does not hold the duty {role}.")
        ended = Duty.objects.create(
            operator_id=person.operator_id, person=person, role=role, granted=False, since=from_when
        )
        if role == MANAGER:
            refuse_without_manager(entry, from_when)
        return ended
