"""Writing a note after flight: what was wrong on a manifest that nothing changes any more."""

import secrets
from uuid import UUID

from loads.actions.keeping import SALT_BYTES
from loads.acts import WRITE_NOTE
from loads.balance.fields import fault_of_text
from loads.models import Note
from loads.queries.current import load_of
from records.act import act
from records.actor import Actor
from records.refusal import Fault, Invalid, NotAllowed, StepRefused

LONGEST_NOTE = 2000


def write_note(load: UUID, text: str, *, by: Actor) -> Note:
    """This function will add a person's dated note to a departed load; the load and its manifest stay as they
    are.

    Raises NotKnown; StepRefused `not-departed`; Invalid for an empty, long or unprintable text; NotAllowed
    for somebody without the duty, or who is no person.
    """
    fault = fault_of_text(text, LONGEST_NOTE)
    if fault is not None:
        raise Invalid(Fault("/text", *fault))
    with act(WRITE_NOTE, by=by, about=f"load:{load}") as entry:
        if by.person is None:
            raise NotAllowed("person-needed", "A note is a person's; a program writes none.")
        current = load_of(entry.chain, load)
        if current.state != "departed":
            raise StepRefused(
                "not-departed",
                f"The load is {current.state}; a note is written after departure.",
                next_step="Revise or withdraw the load while it has not departed.",
            )
        return Note.objects.create(
            operator_id=entry.chain,
            load=current.load,
            person_id=by.person,
            text=text,
            salt=secrets.token_bytes(SALT_BYTES),
            written_at=entry.at,
            act=entry.id,
        )
