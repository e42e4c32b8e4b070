"""Approves a table of standard weights: from its own `true from` on, loads count by it."""

from fleet import acts
from fleet.actions.authorship import operator_acting
from fleet.actions.constraint_refusals import refused_as
from fleet.actions.provision_rows import REFUSALS, approve
from fleet.models import Provision, ProvisionApproval
from records.act import act
from records.actor import Actor


def approve_standard_weights(actor: Actor, table: Provision, *, reason: str = "") -> ProvisionApproval:
    """This function will approve the table, by another person than entered it.

    Raises StepRefused when it is approved already, NotAllowed for its author or anybody who is no person.
    """
    about = f"operator:{operator_acting(actor)}"
    with (
        refused_as(REFUSALS),
        act(acts.APPROVE_STANDARD_WEIGHTS, by=actor, about=about, reason=reason) as entry,
    ):
        return approve(entry, actor, table)
