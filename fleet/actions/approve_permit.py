"""Approves a permit: between its own dates it replaces the limits it names."""

from fleet import acts
from fleet.actions.authorship import own
from fleet.actions.constraint_refusals import refused_as
from fleet.actions.provision_rows import REFUSALS, approve
from fleet.models import Aircraft, Provision, ProvisionApproval
from records.act import act
from records.actor import Actor


def approve_permit(
    actor: Actor, aircraft: Aircraft, permit: Provision, *, reason: str = ""
) -> ProvisionApproval:
    """This function will approve the permit, by another person than entered it.

    Raises StepRefused when it is approved already, NotAllowed for its author or anybody who is no person.
    """
    own(actor, aircraft)
    about = f"aircraft:{aircraft.id}"
    with refused_as(REFUSALS), act(acts.APPROVE_PERMIT, by=actor, about=about, reason=reason) as entry:
        return approve(entry, actor, permit)
