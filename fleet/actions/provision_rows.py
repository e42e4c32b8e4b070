"""Rows of what an operator lays down: written by the actions that enter, approve and end it, in their act."""

from collections.abc import Callable, Mapping
from dataclasses import dataclass
from datetime import datetime
from functools import partial
from typing import Final

from django.db.models import Max

from fleet.actions.authorship import approver_acting, person_acting
from fleet.entering import plausible
from fleet.events import PROVISIONS_CHANGED
from fleet.models import Aircraft, Provision, ProvisionApproval, ProvisionEnd
from fleet.queries.figures import basis_of
from fleet.queries.in_force import basis_in_force
from fleet.restriction_reading import Kind, read_entered, read_paper
from fleet.restrictions import Paper
from records import outbox
from records.act import Entry
from records.actor import Actor
from records.canonical import canonical, digest
from records.refusal import Fault, Invalid, NotAllowed, Refused, StepRefused
from records.strict_json import JSON

_SECOND = partial(NotAllowed, "second-person-needed", "Whoever entered a version does not approve it.")
_RACED = partial(
    StepRefused,
    "number-raced",
    "Another one was entered at the same moment.",
    next_step="Look at it, then enter yours again if it is still needed.",
)
REFUSALS: Final[Mapping[str, Callable[[], Refused]]] = {
    "provision_number_is_taken_once": _RACED,
    "provision_number_of_an_aircraft_is_taken_once": _RACED,
    "fleet_provisionapproval_provision_id_key": partial(
        StepRefused, "approved-already", "This version is approved already; an approval is given once."
    ),
    "provision_approval_is_by_a_second_person": _SECOND,
    "fleet_provisionend_provision_id_key": partial(
        StepRefused, "ended-already", "This has ended already; look at when, and enter a new one if needed."
    ),
    "provision_end_of_a_restriction_is_by_a_second_person": partial(
        NotAllowed, "second-person-needed", "Whoever entered a restriction does not lift it."
    ),
}


@dataclass(frozen=True, slots=True)
class Laid:
    """What is laid down: its kind, its document, and from when until when it holds (None: no end)."""

    kind: str
    document: JSON
    true_from: datetime
    true_until: datetime | None = None


def paper_for(aircraft: Aircraft, document: JSON, kind: Kind, *, known: datetime) -> Paper:
    """This function will read a restriction or permit of an aircraft; raises Invalid with every fault, among
    them what the loading basis in force when it begins, as known at `known`, does not have.
    """
    paper = read_paper(document, kind)
    basis = basis_in_force(aircraft, plausible(paper.since, "/true_from"), known)
    return read_entered(document, kind, None if basis is None else basis_of(basis))


def enter(entry: Entry, actor: Actor, laid: Laid, aircraft: Aircraft | None = None) -> Provision:
    """This function will write the next version of a kind, of the operator or of one aircraft."""
    before = Provision.objects.filter(operator_id=entry.chain, aircraft=aircraft, kind=laid.kind)
    last = before.aggregate(last=Max("number"))["last"] or 0
    return Provision.objects.create(
        operator_id=entry.chain,
        aircraft=aircraft,
        kind=laid.kind,
        number=last + 1,
        document=canonical(laid.document).decode(),
        digest=digest(laid.document),
        true_from=laid.true_from,
        true_until=laid.true_until,
        entered_by_id=person_acting(actor),
        entered_at=entry.at,
    )


def approve(entry: Entry, actor: Actor, provision: Provision) -> ProvisionApproval:
    """This function will write the approval of a version, by another person than entered it; from the act's
    time on it is held true.
    """
    approval = ProvisionApproval.objects.create(
        operator_id=entry.chain,
        provision=provision,
        kind=provision.kind,
        entered_by_id=provision.entered_by_id,
        approved_by_id=approver_acting(actor, provision.entered_by_id),
        known_from=entry.at,
    )
    promise_to_tell(entry, provision, "held")
    return approval


def end(entry: Entry, actor: Actor, provision: Provision, at: datetime | None, reason: str) -> ProvisionEnd:
    """This function will write that a restriction or permit ends at `at` (None: now, or at its beginning
    where that is later).

    Raises Invalid when that lies before its beginning, StepRefused for a permit that had lapsed by then.
    """
    ends = at or max(entry.at, provision.true_from)
    if ends < provision.true_from:
        raise Invalid(Fault("/true_from", "out-of-order", "ends before it begins; correct the time"))
    if provision.true_until is not None and ends >= provision.true_until:
        raise StepRefused(
            "lapsed-already", f"The {provision.kind} lapses by itself before that.", next_step="Leave it."
        )
    ended = ProvisionEnd.objects.create(
        operator_id=entry.chain,
        provision=provision,
        kind=provision.kind,
        entered_by_id=provision.entered_by_id,
        ended_by_id=person_acting(actor),
        true_from=ends,
        known_from=entry.at,
        reason=reason,
    )
    promise_to_tell(entry, provision, "ended")
    return ended


def promise_to_tell(entry: Entry, provision: Provision, what: str) -> None:
    """This function will promise that accepted loads which this makes stale are told of."""
    outbox.put(entry, PROVISIONS_CHANGED, f"{provision.id}/{what}")
