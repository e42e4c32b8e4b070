"""Revising a load: a new one that replaces it, with the reason, in one act."""

from uuid import UUID

from loads.actions.identifier import new_load_id
from loads.actions.keeping import keep_load
from loads.actions.stepping import load_as_seen, one_of_two_racers, take_step
from loads.acts import REVISE_LOAD
from loads.queries.computation import compute
from loads.queries.current import Current
from loads.queries.legs import demand_standing
from records.act import act
from records.actor import Actor
from records.strict_json import JSON


def revise_load(load: UUID, document: dict[str, JSON], *, reason: str, seen: str, by: Actor) -> Current:
    """This function will keep a new load in place of `load`, which is superseded; the new one starts open,
    unsigned.

    Raises NotKnown, PreconditionFailed, StepRefused (departed, withdrawn or superseded already), Invalid,
    NotAllowed.
    """
    number = new_load_id()
    with one_of_two_racers(), act(REVISE_LOAD, by=by, about=f"load:{number}", reason=reason) as entry:
        replaced = load_as_seen(entry, load, seen, "superseded")
        computation = compute(entry.chain, document, entry.at)
        demand_standing(computation.before)
        take_step(entry, replaced, "superseded", by=by, reason=reason)
        return keep_load(entry, number, computation, by=by.person, replaces=replaced.load)
