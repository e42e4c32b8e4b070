"""What every step of a load's life asks first, and the row it leaves."""

from collections.abc import Iterator, Mapping
from contextlib import contextmanager
from datetime import datetime
from uuid import UUID

from fleet.actions.constraint_refusals import refused_as
from loads import lifecycle
from loads.balance.fields import fault_of_text
from loads.models import Step
from loads.queries.current import Current, load_of
from records.act import Entry
from records.actor import Actor
from records.refusal import Fault, Invalid, NotAllowed, PreconditionFailed, StepRefused

LONGEST_REASON = 500


def operator_of(by: Actor) -> str:
    """This function will return the operator an actor acts for; raises NotAllowed for one without."""
    if by.operator is None:
        raise NotAllowed("no-operator", "This needs somebody who belongs to an operator.")
    return by.operator


def load_as_seen(entry: Entry, load: UUID, seen: str, to: str) -> Current:
    """This function will return the load if it still is as it was seen and may step to the state `to`.

    `seen` is its step number as text. Raises NotKnown, PreconditionFailed and StepRefused.
    """
    current = load_of(entry.chain, load)
    if seen != str(current.step.number):
        raise PreconditionFailed(
            "state-moved-on",
            f"The load has moved on since it was read; it is {current.state} now.",
            next_step="Read it again, look at what changed, and send its new ETag.",
        )
    lifecycle.step(current.state, to, entry.kind)
    return current


def take_step(
    entry: Entry,
    current: Current,
    to: str,
    *,
    by: Actor,
    reason: str = "",
    departed_at: datetime | None = None,
) -> Step:
    """This function will write the step from where the load stands to the state `to`, under the same
    assessment.
    """
    return Step.objects.create(
        operator_id=entry.chain,
        load=current.load,
        number=current.step.number + 1,
        before=current.state,
        after=to,
        previous=current.step.number,
        assessment=current.assessment,
        person_id=by.person,
        reason=reason,
        at=entry.at,
        departed_at=departed_at,
        act=entry.id,
    )


@contextmanager
def one_of_two_racers() -> Iterator[None]:
    """This function will refuse whoever takes the same step as another at the same time and comes second.

    It goes around the act. The database decides: a step's number is taken once.
    """
    # An assessment is written before the step that brings it, so its number may be what is taken.
    taken = ("step_number_is_taken_once", "assessment_number_is_taken_once", "loads_load_replaces_id_key")
    with refused_as(dict.fromkeys(taken, _taken)):
        yield


def _taken() -> StepRefused:
    return StepRefused(
        "step-taken",
        "Somebody else moved this load at the same moment.",
        next_step="Read it again and look at what changed.",
    )


def reason_in(document: Mapping[str, object], pointer: str = "/reason") -> str:
    """This function will return the reason in a document, 1 to 500 characters; raises Invalid."""
    given = document.get("reason")
    if given is None:
        raise Invalid(Fault(pointer, "missing", "say why, in a few words"))
    if not isinstance(given, str):
        raise Invalid(Fault(pointer, "text-form", "a text is needed here; write it in quotes"))
    fault = fault_of_text(given, LONGEST_REASON)
    if fault is not None:
        raise Invalid(Fault(pointer, *fault))
    return given
