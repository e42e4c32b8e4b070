"""Changing an accepted load at the last minute: recomputed, and accepted again by its pilot in one step."""

import secrets
from collections.abc import Mapping
from decimal import ROUND_HALF_EVEN, Context, Decimal
from fractions import Fraction
from uuid import UUID

from loads.actions.announcing import announce_accepted
from loads.actions.file_manifest import FILING_ISSUE
from loads.actions.keeping import SALT_BYTES, assessment_of
from loads.actions.signing import (
    Signing,
    person_signing,
    refuse_all_but_the_pilot,
    refuse_unsignable,
    write_signature,
)
from loads.actions.stepping import load_as_seen, one_of_two_racers
from loads.acts import CHANGE_LATE
from loads.models import Assessment, LateChange, Paper, Step
from loads.queries.current import Current
from loads.queries.late_change import Proposal, propose, words_to_sign_late
from records import outbox
from records.act import Entry, act
from records.actor import Actor
from records.canonical import canonical

_DIGITS = Context(prec=60, rounding=ROUND_HALF_EVEN)
_TWELVE_PLACES = Decimal(1).scaleb(-12)


def change_late(
    load: UUID, change: Mapping[str, object], signing: Signing, *, seen: str, by: Actor
) -> Current:
    """This function will change an accepted load within the operator's bound, signed by its pilot in command,
    and promise the reissued manifest. `change` is `{lines, persons_on_board}`.

    The digest signed is that of the changed load, as `propose` shows it. Raises what `propose` raises, and
    NotKnown, PreconditionFailed, NotAllowed; StepRefused: `not-pilot-in-command`, `not-within`,
    `digest-differs`, `estimated-weights`, `step-taken`.
    """
    with one_of_two_racers(), act(CHANGE_LATE, by=by, about=f"load:{load}") as entry:
        signer = person_signing(by)
        current = load_as_seen(entry, load, seen, "accepted")
        refuse_all_but_the_pilot(current.load, by)
        proposal = propose(current, change, entry.at)
        made = proposal.computation
        refuse_unsignable(entry, signing, verdict=made.verdict, digest=made.digest, declared=made.document)
        paper = Paper.objects.get(load=current.load)
        words = words_to_sign_late(current, proposal, paper.number)
        assessment = assessment_of(entry, current.load, made, number=current.assessment.number + 1)
        assessment.save(force_insert=True)
        step = _step(entry, current, assessment, signer)
        write_signature(entry, Current(current.load, step, assessment), signing, words=words, by=by)
        kept = _keep(entry, proposal, step, signer)
        announce_accepted(entry, current.load, assessment, paper, issue=kept.issue)
        outbox.put(entry, FILING_ISSUE, f"{load}/{kept.number}")
        return Current(current.load, step, assessment)


def _step(entry: Entry, current: Current, assessment: Assessment, signer: int) -> Step:
    return Step.objects.create(
        operator_id=entry.chain,
        load=current.load,
        number=current.step.number + 1,
        before=current.state,
        after="accepted",
        previous=current.step.number,
        assessment=assessment,
        person_id=signer,
        at=entry.at,
        act=entry.id,
    )


def _keep(entry: Entry, proposal: Proposal, step: Step, signer: int) -> LateChange:
    return LateChange.objects.create(
        step=step,
        operator_id=entry.chain,
        load=step.load,
        number=proposal.number,
        previous=proposal.number - 1 or None,
        assessment=step.assessment,
        person_id=signer,
        lines=canonical(proposal.lines).decode(),
        body=proposal.computation.inputs,
        salt=secrets.token_bytes(SALT_BYTES),
        settings_number=proposal.bound.settings_number,
        kilograms_moved=_twelve_places(proposal.moved.kilograms),
        kilograms_bound=_twelve_places(proposal.bound.kilograms),
        persons_moved=proposal.moved.persons,
        persons_bound=proposal.bound.persons,
        changed_at=entry.at,
        act=entry.id,
    )


def _twelve_places(exact: Fraction) -> Decimal:
    """Round for the database, which holds the bound again: whoever is within stays within when both are
    rounded.
    """
    return _DIGITS.divide(Decimal(exact.numerator), Decimal(exact.denominator)).quantize(
        _TWELVE_PLACES, context=_DIGITS
    )
