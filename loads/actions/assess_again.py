"""Assessing a stale load again: the same declaration against what is in force now."""

from uuid import UUID

from loads.actions.keeping import keep_assessment
from loads.actions.stepping import load_as_seen, one_of_two_racers
from loads.acts import ASSESS_LOAD
from loads.queries.computation import compute
from loads.queries.current import Current, declared_in
from loads.queries.stale import stale_parts
from records.act import act
from records.actor import Actor
from records.refusal import StepRefused


def assess_again(load: UUID, *, seen: str, by: Actor) -> Current:
    """This function will assess what was declared against the versions in force now; the load is open again.

    Raises StepRefused when nothing changed since the assessment, or the load is accepted (revise it) or
    ended; NotKnown, PreconditionFailed, NotAllowed; Invalid when the declaration no longer fits the loading
    basis.
    """
    with one_of_two_racers(), act(ASSESS_LOAD, by=by, about=f"load:{load}") as entry:
        current = load_as_seen(entry, load, seen, "open")
        if not stale_parts(current, entry.at):
            raise StepRefused(
                "assessment-current",
                "Nothing it rests on has changed since it was assessed.",
                next_step="Sign it, or revise the load.",
            )
        computation = compute(entry.chain, declared_in(current.load), entry.at)
        return keep_assessment(entry, current.load, computation, after=current, by=by.person)
