"""The rows of a submission and of an assessment: the parts that submitting, revising and assessing again
share.
"""

import secrets
from uuid import UUID

from loads.balance.engine import ENGINE_VERSION
from loads.models import Assessment, Declaration, Load, Step
from loads.queries.answer import departure_text
from loads.queries.computation import Computation
from loads.queries.current import Current
from records.act import Entry
from records.canonical import canonical

SALT_BYTES = 32


def keep_load(
    entry: Entry, number: UUID, computation: Computation, *, by: int | None, replaces: Load | None
) -> Current:
    """This function will write a new load: what identifies it, what was declared, its assessment and first
    step.
    """
    flight = computation.outline.flight
    load = Load.objects.create(
        id=number,
        operator_id=entry.chain,
        aircraft=computation.aircraft,
        configuration=computation.outline.configuration,
        reference=flight.reference,
        leg=flight.leg,
        departure=flight.departure,
        departure_text=departure_text(computation.document),
        origin=flight.origin,
        destination=flight.destination,
        operation=flight.operation,
        pilot_id=computation.pilot,
        replaces=replaces,
        submitted_at=entry.at,
    )
    load.operator = computation.aircraft.operator
    Declaration.objects.create(
        load=load,
        operator_id=entry.chain,
        body=canonical(computation.document),
        salt=secrets.token_bytes(SALT_BYTES),
    )
    return keep_assessment(entry, load, computation, after=None, by=by)


def keep_assessment(
    entry: Entry, load: Load, computation: Computation, *, after: Current | None, by: int | None
) -> Current:
    """This function will write an assessment and the step that brings it into use; `after` is where the load
    stood.
    """
    assessment = Assessment.objects.create(
        operator_id=entry.chain,
        load=load,
        number=after.assessment.number + 1 if after else 1,
        verdict=computation.verdict,
        result=canonical(computation.result).decode(),
        digest=computation.digest,
        loading_basis=computation.basis,
        empty_weight=computation.empty_weight,
        engine=ENGINE_VERSION,
        assessed_at=entry.at,
    )
    step = Step.objects.create(
        operator_id=entry.chain,
        load=load,
        number=after.step.number + 1 if after else 1,
        before=after.state if after else "",
        after="open",
        previous=after.step.number if after else None,
        assessment=assessment,
        person_id=by,
        at=entry.at,
        act=entry.id,
    )
    return Current(load, step, assessment)
