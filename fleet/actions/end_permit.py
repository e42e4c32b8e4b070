"""Ends a permit before it lapses by itself; what tightens needs no second person."""

from datetime import datetime

from fleet import acts
from fleet.actions.authorship import own
from fleet.actions.constraint_refusals import refused_as
from fleet.actions.provision_rows import REFUSALS, end
from fleet.models import Aircraft, Provision, ProvisionEnd
from records.act import act
from records.actor import Actor


def end_permit(
    actor: Actor, aircraft: Aircraft, permit: Provision, *, reason: str, true_from: datetime | None = None
) -> ProvisionEnd:
    """This function will end the permit at `true_from` (None: now), with a reason.

    Raises StepRefused when it ended already or has lapsed by then.
    """
    own(actor, aircraft)
    about = f"aircraft:{aircraft.id}"
    with refused_as(REFUSALS), act(acts.END_PERMIT, by=actor, about=about, reason=reason) as entry:
        return end(entry, actor, permit, true_from, reason)
