"""Signing a load as prepared."""

from uuid import UUID

from loads.actions.signing import Signing, sign
from loads.actions.stepping import one_of_two_racers
from loads.acts import PREPARE_LOAD
from loads.queries.current import Current
from records.act import act
from records.actor import Actor


def prepare_load(load: UUID, signing: Signing, *, seen: str, by: Actor) -> Current:
    """This function will sign an open load, within every limit, as prepared.

    Raises NotKnown, PreconditionFailed, NotAllowed; StepRefused: `digest-differs`, `not-within`, `stale`,
    `estimated-weights`, `step-not-allowed`, `step-taken`.
    """
    with one_of_two_racers(), act(PREPARE_LOAD, by=by, about=f"load:{load}") as entry:
        stood, step = sign(entry, load, "prepared", signing, seen=seen, by=by)
        return Current(stood.load, step, stood.assessment)
