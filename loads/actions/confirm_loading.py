"""Signing a load as loaded: the loading supervisor's own word, where the operator's rules ask for it."""

from uuid import UUID

from loads.actions.signing import Signing, sign
from loads.actions.stepping import one_of_two_racers
from loads.acts import CONFIRM_LOADING
from loads.queries.current import Current
from records.act import act
from records.actor import Actor


def confirm_loading(load: UUID, signing: Signing, *, seen: str, by: Actor) -> Current:
    """This function will sign a prepared load as loaded as listed.

    Raises NotKnown, PreconditionFailed, NotAllowed; StepRefused: `loading-signature-not-asked` where no rule
    asks for it, and those of `prepare_load`.
    """
    with one_of_two_racers(), act(CONFIRM_LOADING, by=by, about=f"load:{load}") as entry:
        stood, step = sign(entry, load, "loaded", signing, seen=seen, by=by)
        return Current(stood.load, step, stood.assessment)
