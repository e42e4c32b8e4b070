"""Lifts a restriction: from then on it binds no more. That widens what is allowed: another person does it."""

from datetime import datetime

from fleet import acts
from fleet.actions.authorship import approver_acting, own
from fleet.actions.constraint_refusals import refused_as
from fleet.actions.provision_rows import REFUSALS, end
from fleet.models import Aircraft, Provision, ProvisionEnd
from records.act import act
from records.actor import Actor


def lift_restriction(
    actor: Actor,
    aircraft: Aircraft,
    restriction: Provision,
    *,
    reason: str,
    true_from: datetime | None = None,
) -> ProvisionEnd:
    """This function will lift the restriction from `true_from` on (None: now), with a reason.

    Raises NotAllowed for the person who entered it, StepRefused when it ended already or lapses before.
    """
    own(actor, aircraft)
    about = f"aircraft:{aircraft.id}"
    with (
        refused_as(REFUSALS),
        act(acts.LIFT_RESTRICTION, by=actor, about=about, reason=reason) as entry,
    ):
        approver_acting(actor, restriction.entered_by_id)
        return end(entry, actor, restriction, true_from, reason)
