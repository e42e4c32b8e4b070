"""Accepting a load: the pilot in command signs, and the manifest takes its number in the same act."""

from uuid import UUID

from django.db import connection

from loads.actions.announcing import announce_accepted
from loads.actions.signing import Signing, sign
from loads.actions.stepping import one_of_two_racers
from loads.acts import ACCEPT_LOAD
from loads.models import Load, Paper
from loads.queries.current import Current
from records import outbox
from records.act import Entry, act
from records.actor import Actor

FILING = "loads.tasks.file_manifest"
# The class of advisory locks under which an operator's manifest numbers are taken.
_NUMBERS = 4202


def accept_load(load: UUID, signing: Signing, *, seen: str, by: Actor) -> Current:
    """This function will sign a prepared load as accepted by its pilot in command, and promise its paper.

    Raises NotKnown, PreconditionFailed, NotAllowed; StepRefused: `not-pilot-in-command`,
    `second-person-needed`, and those of `prepare_load`.
    """
    with one_of_two_racers(), act(ACCEPT_LOAD, by=by, about=f"load:{load}") as entry:
        stood, step = sign(entry, load, "accepted", signing, seen=seen, by=by)
        paper = _take_number(entry, stood.load)
        announce_accepted(entry, stood.load, stood.assessment, paper)
        outbox.put(entry, FILING, str(load))
        return Current(stood.load, step, stood.assessment)


def _take_number(entry: Entry, load: Load) -> Paper:
    """Take the operator's next manifest number. The lock is asked for after the step was written, never
    before: who holds it then waits for nobody but the chain, so two acceptances cannot wait for each other.
    """
    with connection.cursor() as cursor:
        cursor.execute("SELECT pg_advisory_xact_lock(hashtextextended(%s, %s))", [entry.chain, _NUMBERS])
    numbers = Paper.objects.filter(operator_id=entry.chain).order_by("-number")
    last = numbers.values_list("number", flat=True).first()
    return Paper.objects.create(
        load=load, operator_id=entry.chain, number=(last or 0) + 1, previous=last, act=entry.id
    )
