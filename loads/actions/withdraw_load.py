"""Withdrawing a load that will not fly."""

from uuid import UUID

from loads.actions.stepping import load_as_seen, one_of_two_racers, take_step
from loads.acts import WITHDRAW_LOAD
from loads.queries.current import Current
from records.act import act
from records.actor import Actor


def withdraw_load(load: UUID, *, reason: str, seen: str, by: Actor) -> Current:
    """This function will end a load that has not departed, for the stated reason.

    Raises NotKnown, PreconditionFailed, StepRefused, NotAllowed.
    """
    with one_of_two_racers(), act(WITHDRAW_LOAD, by=by, about=f"load:{load}", reason=reason) as entry:
        current = load_as_seen(entry, load, seen, "withdrawn")
        step = take_step(entry, current, "withdrawn", by=by, reason=reason)
        return Current(current.load, step, current.assessment)
