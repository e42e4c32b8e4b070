"""Enters a permit of an aircraft; it widens nothing until a second person approves it."""

from fleet import acts
from fleet.actions.authorship import own, person_acting
from fleet.actions.constraint_refusals import refused_as
from fleet.actions.provision_rows import REFUSALS, Laid, enter, paper_for
from fleet.models import Aircraft, Provision
from fleet.provisions import PERMIT
from records.act import act
from records.actor import Actor
from records.strict_json import JSON


def enter_permit(actor: Actor, aircraft: Aircraft, document: JSON, *, reason: str = "") -> Provision:
    """This function will enter the document `tarebook.permit/1`.

    Raises Invalid with every fault, among them what the loading basis in force then does not have.
    """
    own(actor, aircraft)
    person_acting(actor)
    about = f"aircraft:{aircraft.id}"
    with (
        refused_as(REFUSALS),
        act(acts.ENTER_PERMIT, by=actor, about=about, reason=reason) as entry,
    ):
        paper = paper_for(aircraft, document, "permit", known=entry.at)
        return enter(entry, actor, Laid(PERMIT, document, paper.since, paper.until), aircraft)
