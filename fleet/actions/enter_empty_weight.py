"""Enters an empty weight, as a plain result or an opening entry; a second person approves it."""

import secrets

from fleet import acts
from fleet.actions.authorship import own, person_acting
from fleet.actions.basis_fit import refuse_unfit
from fleet.empty_weight_reading import read_particulars
from fleet.entering import plausible
from fleet.models import Aircraft, EmptyWeight
from records.act import act
from records.actor import Actor
from records.canonical import canonical, digest
from records.strict_json import JSON


def enter_empty_weight(actor: Actor, aircraft: Aircraft, document: JSON, *, reason: str = "") -> EmptyWeight:
    """This function will enter the document `tarebook.empty-weight/1` as a version of the aircraft.

    Raises Invalid with every fault of the document, among them that it does not go with the loading basis
    in force at its `true_from`.
    """
    own(actor, aircraft)
    with act(acts.ENTER_EMPTY_WEIGHT, by=actor, about=f"aircraft:{aircraft.id}", reason=reason) as entry:
        particulars = read_particulars(document)
        true_from = plausible(particulars.true_from, "/true_from")
        refuse_unfit(aircraft, document, true_from, entry.at)
        return EmptyWeight.objects.create(
            operator_id=aircraft.operator_id,
            aircraft=aircraft,
            fit=particulars.fit,
            document=canonical(document).decode(),
            salt=secrets.token_bytes(32),
            digest=digest(document),
            true_from=true_from,
            entered_by_id=person_acting(actor),
            entered_at=entry.at,
        )
