"""The rows of a submission and of an assessment: the parts that submitting, revising and assessing again
share.
"""

import secrets
from uuid import UUID

from django.db import models

from loads.actions.announcing import announce_rejected
from loads.actions.identifier import new_load_id
from loads.actions.together import insert_together
from loads.balance.engine import ENGINE_VERSION
from loads.models import Assessment, Declaration, Leg, Load, Step
from loads.queries.answer import departure_text
from loads.queries.computation import Computation
from loads.queries.current import Current
from records.act import Entry

SALT_BYTES = 32


def keep_load(
    entry: Entry, number: UUID, computation: Computation, *, by: int | None, replaces: Load | None
) -> Current:
    """This function will write a new load: what identifies it, what was declared, its assessment and first
    step.
    """
    flight = computation.outline.flight
    load = Load(
        id=number,
        operator=computation.aircraft.operator,
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
    declaration = Declaration(
        load=load,
        operator_id=entry.chain,
        body=computation.inputs,
        salt=secrets.token_bytes(SALT_BYTES),
    )
    rows: tuple[models.Model, ...] = (load, declaration)
    if computation.before is not None:
        rows += (Leg(load=load, operator_id=entry.chain, follows=computation.before.load),)
    return _keep_opening(entry, load, computation, rows, after=None, by=by)


def keep_assessment(
    entry: Entry, load: Load, computation: Computation, *, after: Current, by: int | None
) -> Current:
    """This function will write an assessment and the step that brings it into use; `after` is where the load
    stood.
    """
    return _keep_opening(entry, load, computation, (), after=after, by=by)


def assessment_of(entry: Entry, load: Load, computation: Computation, *, number: int) -> Assessment:
    """This function will return the row of an assessment, not yet written."""
    return Assessment(
        id=new_load_id(),
        operator_id=entry.chain,
        load=load,
        number=number,
        verdict=computation.verdict,
        result=computation.result_text.decode(),
        salt=secrets.token_bytes(SALT_BYTES),
        digest=computation.digest,
        loading_basis=computation.basis,
        empty_weight=computation.empty_weight,
        provisions=[one.id for one in computation.provisions],
        engine=ENGINE_VERSION,
        assessed_at=entry.at,
    )


def _keep_opening(
    entry: Entry,
    load: Load,
    computation: Computation,
    before: tuple[models.Model, ...],
    *,
    after: Current | None,
    by: int | None,
) -> Current:
    number = after.assessment.number + 1 if after else 1
    assessment = assessment_of(entry, load, computation, number=number)
    step = Step(
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
    step.id = insert_together((*before, assessment, step))
    if computation.verdict != "within":
        announce_rejected(entry, load, assessment, computation.result)
    return Current(load, step, assessment)
