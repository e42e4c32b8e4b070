"""Approves a loading basis: from then on loads rest on it."""

from datetime import datetime

from fleet import acts
from fleet.actions.authorship import approver_acting, own
from fleet.actions.constraint_refusals import refused_as
from fleet.actions.standing_projection import APPROVAL_REFUSALS, stand
from fleet.entering import plausible
from fleet.events import VERSIONS_CHANGED
from fleet.models import Aircraft, Approval, LoadingBasis
from fleet.queries.figures import basis_of
from fleet.sample_loads import failures_of
from records import outbox
from records.act import act
from records.actor import Actor
from records.refusal import Fault, NotKnown, StepRefused


def approve_loading_basis(
    actor: Actor,
    aircraft: Aircraft,
    basis: LoadingBasis,
    *,
    true_from: datetime | None = None,
    reason: str = "",
) -> Approval:
    """This function will approve the basis, true from `true_from` or from the act's own time, and let it
    stand.

    Raises StepRefused when it is approved already, has no sample load or one that does not come out as
    printed; NotAllowed for the person who entered it, or anybody who is no person.
    """
    own(actor, aircraft)
    if basis.aircraft_id != aircraft.id:
        raise NotKnown("loading-basis-not-known", f"{aircraft.registration} has no such loading basis.")
    about = f"aircraft:{aircraft.id}"
    with (
        refused_as(APPROVAL_REFUSALS),
        act(acts.APPROVE_LOADING_BASIS, by=actor, about=about, reason=reason) as entry,
    ):
        approver = approver_acting(actor, basis.entered_by_id)
        _refuse_unproven(basis)
        approval = Approval.objects.create(
            operator_id=aircraft.operator_id,
            aircraft=aircraft,
            loading_basis=basis,
            entered_by_id=basis.entered_by_id,
            approved_by_id=approver,
            true_from=plausible(true_from or entry.at, "/true_from"),
            known_from=entry.at,
        )
        stand(approval, basis)
        outbox.put(entry, VERSIONS_CHANGED, str(approval.id))
    return approval


def _refuse_unproven(version: LoadingBasis) -> None:
    """This function will raise StepRefused unless the manual's own sample loads come out as it prints
    them.
    """
    basis = basis_of(version)
    if not basis.sample_loads:
        raise StepRefused(
            "sample-load-missing",
            "A loading basis is proven by at least one sample load of its manual; this one has none.",
            next_step="Enter a revision that holds one.",
        )
    failures = failures_of(basis)
    if failures:
        raise StepRefused(
            "sample-load-failed",
            "Sample loads do not come out as printed.",
            faults=tuple(
                Fault("", failure.code, f"{failure.name}: {failure.detail}") for failure in failures
            ),
            next_step="Enter a revision with the figures corrected.",
        )
