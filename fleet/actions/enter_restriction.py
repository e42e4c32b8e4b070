"""Enters a restriction of an aircraft; what tightens binds at once, without a second person."""

from fleet import acts
from fleet.actions.authorship import own, person_acting
from fleet.actions.constraint_refusals import refused_as
from fleet.actions.provision_rows import REFUSALS, Laid, enter, paper_for, promise_to_tell
from fleet.models import Aircraft, Provision
from fleet.provisions import RESTRICTION
from records.act import act
from records.actor import Actor
from records.strict_json import JSON


def enter_restriction(actor: Actor, aircraft: Aircraft, document: JSON, *, reason: str = "") -> Provision:
    """This function will enter the document `tarebook.restriction/1`; it binds from its `true_from`, as known
    from now on.

    Raises Invalid with every fault, among them what the loading basis in force then does not have.
    """
    own(actor, aircraft)
    person_acting(actor)
    about = f"aircraft:{aircraft.id}"
    with (
        refused_as(REFUSALS),
        act(acts.ENTER_RESTRICTION, by=actor, about=about, reason=reason) as entry,
    ):
        paper = paper_for(aircraft, document, "restriction", known=entry.at)
        entered = enter(entry, actor, Laid(RESTRICTION, document, paper.since, paper.until), aircraft)
        promise_to_tell(entry, entered, "held")
        return entered
