"""Reporting that an accepted load has departed; nothing changes it afterwards."""

from datetime import datetime, timedelta
from uuid import UUID

from loads.actions.stepping import load_as_seen, one_of_two_racers, take_step
from loads.acts import DEPART_LOAD
from loads.queries.current import Current
from records.act import act
from records.actor import Actor
from records.refusal import Fault, Invalid

# Clocks of those who report differ a little from the database's.
CLOCKS_DIFFER = timedelta(minutes=2)


def depart_load(load: UUID, *, at: datetime, seen: str, by: Actor) -> Current:
    """This function will record that an accepted load left at `at`.

    Raises Invalid for a time before the acceptance or in the future; NotKnown, PreconditionFailed,
    StepRefused, NotAllowed.
    """
    with one_of_two_racers(), act(DEPART_LOAD, by=by, about=f"load:{load}") as entry:
        current = load_as_seen(entry, load, seen, "departed")
        accepted_at = current.step.at
        if at < accepted_at - CLOCKS_DIFFER:
            when = f"{accepted_at:%Y-%m-%d %H:%M} UTC"
            detail = f"before the load was accepted ({when}); check the time and its offset"
            raise Invalid(Fault("/at", "before-acceptance", detail))
        if at > entry.at + CLOCKS_DIFFER:
            raise Invalid(
                Fault("/at", "in-the-future", "this has not happened yet; check the time and its offset")
            )
        step = take_step(entry, current, "departed", by=by, departed_at=at)
        return Current(current.load, step, current.assessment)
