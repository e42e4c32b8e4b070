"""Approves a set of rule values: from its own `true from` on, they bind."""

from fleet import acts
from fleet.actions.authorship import operator_acting
from fleet.actions.constraint_refusals import refused_as
from fleet.actions.provision_rows import REFUSALS, approve
from fleet.models import Provision, ProvisionApproval
from records.act import act
from records.actor import Actor


def approve_rules(actor: Actor, rules: Provision, *, reason: str = "") -> ProvisionApproval:
    """This function will approve the rules, by another person than entered them.

    Raises StepRefused when they are approved already, NotAllowed for their author or who is no person.
    """
    about = f"operator:{operator_acting(actor)}"
    with refused_as(REFUSALS), act(acts.APPROVE_RULES, by=actor, about=about, reason=reason) as entry:
        return approve(entry, actor, rules)
