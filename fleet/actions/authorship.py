"""Who enters and who approves: always a person, never the same one twice."""

from fleet.models import Aircraft
from records.actor import Actor
from records.refusal import NotAllowed, NotKnown

INTEGRATION = "integration"


def person_acting(actor: Actor) -> int:
    """This function will return the number of the person acting; raises NotAllowed when it is nobody's
    act.
    """
    if actor.person is None:
        raise NotAllowed(
            "person-needed",
            "Figures that loads rest on are entered and approved by a person.",
            next_step="Sign in, or use a token of your own.",
        )
    return actor.person


def approver_acting(actor: Actor, entered_by: int) -> int:
    """This function will return the number of the approving person.

    Raises NotAllowed for an integration and for the person who entered the version. The database checks the
    second as well.
    """
    person = person_acting(actor)
    if actor.capacity == INTEGRATION:
        raise NotAllowed("person-needed", "An integration does not approve; a person does.")
    if person == entered_by:
        raise NotAllowed(
            "second-person-needed",
            "Whoever entered a version does not approve it.",
            next_step="Ask another person with the duty of records approver.",
        )
    return person


def operator_acting(actor: Actor) -> str:
    """This function will return the code of the actor's operator; raises NotAllowed without one."""
    if actor.operator is None:
        raise NotAllowed("no-operator", "This needs somebody who belongs to an operator.")
    return actor.operator


def own(actor: Actor, aircraft: Aircraft) -> None:
    """This function will raise NotKnown when the aircraft is another operator's."""
    if actor.operator != aircraft.operator_id:
        raise NotKnown("aircraft-not-known", f"No aircraft {aircraft.registration} is entered.")
