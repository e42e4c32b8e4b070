"""Enters a revision of an aircraft's loading basis; it counts for nothing until a second person approves
it.
"""

from functools import partial

from django.db.models import Max

from fleet import acts
from fleet.actions.authorship import own, person_acting
from fleet.actions.constraint_refusals import refused_as
from fleet.basis import Basis
from fleet.basis_reading import read_basis
from fleet.models import Aircraft, LoadingBasis
from records.act import act
from records.actor import Actor
from records.canonical import canonical, digest
from records.refusal import Fault, Invalid, StepRefused
from records.strict_json import JSON

_RACED = {
    "loading_basis_revision_is_taken_once": partial(
        StepRefused,
        "revision-raced",
        "Another revision of this loading basis was entered at the same moment.",
        next_step="Look at it, then enter yours again if it is still needed.",
    )
}


def enter_loading_basis(
    actor: Actor, aircraft: Aircraft, document: JSON, *, reason: str = ""
) -> LoadingBasis:
    """This function will enter the document `tarebook.loading-basis/1` as the aircraft's next revision.

    Raises Invalid with every fault of the document, one that is of another type, category, number of
    engines or seats than the aircraft among them.
    """
    own(actor, aircraft)
    with (
        refused_as(_RACED),
        act(acts.ENTER_LOADING_BASIS, by=actor, about=f"aircraft:{aircraft.id}", reason=reason) as entry,
    ):
        faults = _faults_against(aircraft, read_basis(document))
        if faults:
            raise Invalid(*faults)
        last = aircraft.loading_bases.aggregate(last=Max("revision"))["last"] or 0
        return LoadingBasis.objects.create(
            operator_id=aircraft.operator_id,
            aircraft=aircraft,
            revision=last + 1,
            document=canonical(document).decode(),
            digest=digest(document),
            entered_by_id=person_acting(actor),
            entered_at=entry.at,
        )


def _faults_against(aircraft: Aircraft, basis: Basis) -> list[Fault]:
    """This function will return a fault for everything that shows the document is another aircraft's."""
    pairs = (
        ("/aircraft_type", basis.aircraft_type, aircraft.type),
        ("/category", basis.category, aircraft.category),
        ("/engines", basis.engines, aircraft.engines),
        ("/passenger_seats_installed", basis.passenger_seats_installed, aircraft.passenger_seats),
    )
    return [
        Fault(pointer, "not-this-aircraft", f"{aircraft.registration} is entered with {entered}, not {said}")
        for pointer, said, entered in pairs
        if said != entered
    ]
