"""Approves an empty weight: from its own `true from` on, loads rest on it."""

from fleet import acts
from fleet.actions.authorship import approver_acting, own
from fleet.actions.basis_fit import refuse_unfit
from fleet.actions.constraint_refusals import refused_as
from fleet.actions.standing_projection import APPROVAL_REFUSALS, stand
from fleet.actions.unexplained_jump import refuse_unexplained_jump
from fleet.events import VERSIONS_CHANGED
from fleet.models import Aircraft, Approval, EmptyWeight
from records import outbox
from records.act import act
from records.actor import Actor
from records.refusal import Invalid, NotKnown, StepRefused
from records.strict_json import read


def approve_empty_weight(
    actor: Actor, aircraft: Aircraft, empty_weight: EmptyWeight, *, reason: str = ""
) -> Approval:
    """This function will approve the empty weight and let it stand from its own `true_from`.

    Raises StepRefused when it is approved already, no longer goes with the loading basis in force then, or
    is further from the figure it follows than the operator's settings let pass without a cause, which is the
    `reason`; NotAllowed for the person who entered it, or anybody who is no person.
    """
    own(actor, aircraft)
    if empty_weight.aircraft_id != aircraft.id:
        raise NotKnown("empty-weight-not-known", f"{aircraft.registration} has no such empty weight.")
    about = f"aircraft:{aircraft.id}"
    with (
        refused_as(APPROVAL_REFUSALS),
        act(acts.APPROVE_EMPTY_WEIGHT, by=actor, about=about, reason=reason) as entry,
    ):
        approver = approver_acting(actor, empty_weight.entered_by_id)
        try:
            refuse_unfit(aircraft, read(empty_weight.document.encode()), empty_weight.true_from, entry.at)
        except Invalid as unfit:
            raise StepRefused(
                "empty-weight-unfit",
                "The loading basis in force has changed since; this empty weight no longer goes with it.",
                faults=unfit.faults,
                next_step="Enter the empty weight again as the basis in force asks for it.",
            ) from unfit
        if not reason.strip():
            refuse_unexplained_jump(aircraft, empty_weight, entry.at)
        approval = Approval.objects.create(
            operator_id=aircraft.operator_id,
            aircraft=aircraft,
            empty_weight=empty_weight,
            entered_by_id=empty_weight.entered_by_id,
            approved_by_id=approver,
            true_from=empty_weight.true_from,
            known_from=entry.at,
        )
        stand(approval, empty_weight)
        outbox.put(entry, VERSIONS_CHANGED, str(approval.id))
    return approval
