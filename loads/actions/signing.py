"""Signing: what preparing and accepting share. Every refusal here leaves no row."""

import secrets
from collections.abc import Mapping
from dataclasses import dataclass
from typing import Literal
from uuid import UUID

from fleet.queries.settings import settings_at
from loads.actions.keeping import SALT_BYTES
from loads.actions.self_check import refuse_unproven
from loads.actions.stepping import load_as_seen, take_step
from loads.models import Load, Signature, Step
from loads.queries.current import Current
from loads.queries.declaration import declared_now
from loads.queries.signable import capacity_of, loading_signature_asked, statement_of, words_to_sign
from loads.queries.stale import stale_parts
from loads.statement import digest_of
from records.act import Entry
from records.actor import Actor
from records.kind import Kind
from records.refusal import NotAllowed, StepRefused
from records.strict_json import JSON

Meaning = Literal["prepared", "loaded", "accepted"]
LONGEST_ADDRESS = 60


@dataclass(frozen=True, slots=True)
class Signing:
    """What a signer sends: the digest that was shown, and where it was sent from.

    Make one only after `fleet.actions.confirm_password` found the password right, which must happen before
    the act.
    """

    digest: str
    signed_from: str


def refuse_unless_signer(kind: Kind, by: Actor) -> None:
    """This function will do nothing when the actor is a person who may sign so; raises NotAllowed.

    Ask it before the password, so that nobody without the duty can try passwords here.
    """
    if kind.name not in by.may:
        raise _not_a_signer(by)
    person_signing(by)


def person_signing(by: Actor) -> int:
    """This function will return the number of the person who signs; raises NotAllowed without one."""
    if by.person is None:
        raise _not_a_signer(by)
    return by.person


def _not_a_signer(by: Actor) -> NotAllowed:
    return NotAllowed(
        "signature-not-allowed",
        f"{by.key} ({by.capacity}) may not sign here.",
        next_step="A person who holds the duty signs; a token needs the scope sign.",
    )


def sign(
    entry: Entry, load: UUID, meaning: Meaning, signing: Signing, *, seen: str, by: Actor
) -> tuple[Current, Step]:
    """This function will write the step and the signature under it; returns where the load stood, and the
    step.

    Raises NotKnown, PreconditionFailed, StepRefused.
    """
    signer = person_signing(by)
    current = load_as_seen(entry, load, seen, meaning)
    declared = declared_now(current)
    _refuse_against_the_rules(entry, current, meaning)
    if meaning == "accepted":
        refuse_all_but_the_pilot(current.load, by)
        _refuse_the_same_hand_twice(entry, current, signer)
    used = current.assessment
    refuse_unsignable(entry, signing, verdict=used.verdict, digest=used.digest, declared=declared)
    _refuse_what_moved_on(entry, current, declared)
    words = words_to_sign(current, declared, meaning)
    step = take_step(entry, current, meaning, by=by)
    write_signature(entry, Current(current.load, step, used), signing, words=words, by=by)
    return current, step


def write_signature(entry: Entry, stands: Current, signing: Signing, *, words: str, by: Actor) -> Signature:
    """This function will write the signature under the step just taken; `words` are what was signed."""
    step = stands.step
    return Signature.objects.create(
        operator_id=entry.chain,
        load=stands.load,
        assessment=stands.assessment,
        step=step,
        person_id=person_signing(by),
        meaning=step.after,
        capacity=capacity_of(step.before, step.after),
        statement=words,
        digest=signing.digest,
        name=by.name.encode(),
        salt=secrets.token_bytes(SALT_BYTES),
        signed_at=entry.at,
        signed_from=signing.signed_from[:LONGEST_ADDRESS],
        means="token" if by.kind == "token" else "session",
    )


def refuse_all_but_the_pilot(load: Load, by: Actor) -> None:
    """This function will raise StepRefused unless the actor is the load's pilot in command."""
    if load.pilot_id is None:
        raise StepRefused(
            "no-pilot-in-command",
            "The load names no login for its pilot in command, so nobody can accept it.",
            next_step="Revise the load and name the pilot's login in crew.",
        )
    if load.pilot_id != by.person:
        raise StepRefused(
            "not-pilot-in-command",
            "Only the pilot in command of this load accepts it.",
            next_step="Let that pilot sign, or revise the load if another pilot flies.",
        )


def _refuse_against_the_rules(entry: Entry, current: Current, meaning: Meaning) -> None:
    """The loading supervisor signs where the rules in force at the departure ask for it, and only there."""
    if current.state != "prepared":
        return
    asked = loading_signature_asked(current.load, entry.at)
    if asked and meaning == "accepted":
        raise StepRefused(
            "loading-signature-needed",
            "The operator's rules ask that the loading supervisor signs before the pilot accepts.",
            next_step="Let the loading supervisor confirm that the aircraft is loaded as listed.",
        )
    if not asked and meaning == "loaded":
        raise StepRefused(
            "loading-signature-not-asked",
            "No rule of the operator asks the loading supervisor to sign this load.",
            next_step="The pilot in command accepts it as it is.",
        )


def _refuse_the_same_hand_twice(entry: Entry, current: Current, signer: int) -> None:
    prepared = current.load.steps.filter(after="prepared", assessment=current.assessment, person_id=signer)
    if prepared.exists() and not settings_at(entry.chain, entry.at, entry.at).prepare_and_accept_by_one:
        raise StepRefused(
            "second-person-needed",
            "This operator asks that somebody else prepares the load.",
            next_step="Let somebody else prepare it.",
        )


def refuse_unsignable(
    entry: Entry, signing: Signing, *, verdict: str, digest: str, declared: Mapping[str, JSON]
) -> None:
    """This function will raise StepRefused unless what was shown is what would be signed, and may be."""
    refuse_unproven(entry.chain)
    if signing.digest != digest:
        raise StepRefused(
            "digest-differs",
            "What was shown is not what would be signed.",
            next_step="Read the load again and sign the digest it shows now.",
        )
    if verdict != "within":
        raise StepRefused(
            "not-within",
            f"The verdict is {verdict}; only a load that is within every limit can be signed.",
            next_step="See the checks, and revise the load.",
        )
    if _estimated(declared) and not settings_at(entry.chain, entry.at, entry.at).estimates_may_be_signed:
        raise StepRefused(
            "estimated-weights",
            "The weight of a person is estimated, and this operator's procedure has no estimates of people.",
            next_step="Weigh or ask, and revise the load.",
        )


def _refuse_what_moved_on(entry: Entry, current: Current, declared: Mapping[str, JSON]) -> None:
    if changed := stale_parts(current, entry.at):
        raise StepRefused(
            "stale",
            f"Changed since it was assessed: {', '.join(changed)}.",
            next_step="Have it assessed again, look at the result, and sign that.",
        )
    if digest_of(statement_of(current, declared)) != current.assessment.digest:
        raise StepRefused(
            "record-altered",
            "What is stored no longer gives the digest it was kept under.",
            next_step="Do not fly on it. Tell whoever keeps the records, and verify the trail.",
        )


def _estimated(declared: Mapping[str, JSON]) -> bool:
    for group in ("crew", "passengers"):
        lines = declared.get(group)
        for line in lines if isinstance(lines, list) else []:
            infant = line.get("lap_infant") if isinstance(line, dict) else None
            if isinstance(line, dict) and line.get("how") == "estimated":
                return True
            if isinstance(infant, dict) and infant.get("how") == "estimated":
                return True
    return False
