"""Grants a person a duty, from an instant on."""

from datetime import datetime

from fleet import acts
from fleet.actions.duty_rows import beginning, of_same_operator, refuse_unknown_role
from fleet.models import Duty, Person
from fleet.queries.duties import roles_of
from records.act import act
from records.actor import Actor
from records.refusal import StepRefused


def grant_duty(
    actor: Actor, person: Person, role: str, *, since: datetime | None = None, reason: str = ""
) -> Duty:
    """This function will grant the duty from `since`, or from the act's own time.

    Raises Invalid for an unknown role or a beginning in the past, StepRefused when the person holds it by
    then, NotKnown for another operator's person.
    """
    of_same_operator(actor, person)
    refuse_unknown_role(role)
    with act(acts.GRANT_DUTY, by=actor, about=f"person:{person.pk}", reason=reason) as entry:
        from_when = beginning(since, entry.at)
        if role in roles_of(person, from_when):
            raise StepRefused("duty-held", f"{person.name} already holds the duty {role}.")
        return Duty.objects.create(
            operator_id=person.operator_id, person=person, role=role, granted=True, since=from_when
        )
