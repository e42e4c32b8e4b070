"""One load as the API answers it: plain values, in the order they are read."""

from collections.abc import Mapping
from datetime import datetime
from uuid import UUID

from django.db.models import QuerySet

from fleet.queries.provisions import used_provisions
from loads.balance.engine import ENGINE_VERSION
from loads.balance.late_change import said
from loads.cautions import CAUTIONS, INVENTED
from loads.lifecycle import ways_out
from loads.models import LateChange, Load, LoadFlag, Note, Paper, Signature, StaleNotice
from loads.queries.computation import Computation, versions_of
from loads.queries.current import Current
from loads.queries.declaration import declared_now
from loads.queries.doubles import Double, doubles_of
from loads.queries.late_change import (
    Bound,
    Proposal,
    bound_of,
    changes_of,
    lines_of,
    words_to_sign_late,
)
from loads.queries.legs import legs_answer
from loads.queries.rechecks import flags_of
from loads.queries.signable import signatures_due
from loads.queries.stale import stale_parts
from records.canonical import decimal_text

LOAD_PATH = "/api/v1/loads/{}"
MANIFEST_PATH = "/api/v1/loads/{}/manifest"
Answer = dict[str, object]
Reach = frozenset[str] | None


def answer_of(current: Current, *, reach: Reach) -> Answer:
    """This function will return the answer about a stored load, without the name of any person, for somebody
    limited to the aircraft of `reach` (None: to none), to whom no load of another one is named.

    It is what a change of state answers, and such answers are kept a while for repeated requests.
    """
    before, _, after = answer_parts(current, reach=reach)
    return {**before, **current.result(), **after}


def answer_parts(current: Current, *, reach: Reach) -> tuple[Answer, str, Answer]:
    """This function will return what stands before the result document in the answer, the result as the text
    that is stored, and what stands behind it.
    """
    load, used = current.load, current.assessment
    begun = current.step.number > 1  # a first step can have neither signature nor manifest
    after = {
        "basis": {
            **versions_of(used.loading_basis, used.empty_weight, used_provisions(used.provisions)),
            "configuration": load.configuration,
            "engine": used.engine,
        },
        "digest": used.digest,
        "submitted_at": load.submitted_at,
        "assessed_at": used.assessed_at,
        "signatures": [_signature(one) for one in signatures_of(load)] if begun else [],
        "manifest": _manifest(load) if begun else None,
        "late_changes": [late_answer(one) for one in changes_of(load)] if begun else [],
        "warnings": [_warning(one) for one in doubles_of(current, reach=reach)],
        "cautions": cautions(invented=load.operator.invented),
    }
    return _standing(current, reach), used.result, after


def full_answer_of(current: Current, *, known: datetime, reach: Reach) -> Answer:
    """This function will return all there is to read about a load: `answer_of`, and what was declared, the
    names of the signers, every step, and whether the assessment still rests on what is in force as known at
    `known`.
    """
    load, declared = current.load, declared_now(current)
    signatures = [
        {**_signature(one), "name": bytes(one.name).decode(), "statement": one.statement}
        for one in signatures_of(load)
    ]
    return {
        **answer_of(current, reach=reach),
        "signatures": signatures,
        "stale": list(stale_parts(current, known)) if ways_out(current.state) else [],
        "replaced_by": _seen(Load.objects.filter(replaces=load), reach),
        "steps": [
            {"number": one.number, "state": one.after, "at": one.at, "reason": one.reason}
            for one in load.steps.order_by("number")
        ],
        "to_sign": signatures_due(current, declared),
        "legs": legs_answer(current),
        "stale_notices": [
            {"told_at": one.told_at, "changed": one.changed.split(", "), "mail_addresses": one.mail_addresses}
            for one in StaleNotice.objects.filter(load=load).order_by("told_at", "id")
        ],
        "flags": [flag_answer(one) for one in flags_of(load.id)],
        "notes": [note_answer(one) for one in notes_of(load)],
        "declared": declared,
    }


def computed_answer(computation: Computation) -> Answer:
    """This function will return the answer about a computation of which nothing is stored."""
    outline = computation.outline
    return {
        "aircraft": computation.aircraft.registration,
        "configuration": outline.configuration,
        "flight": {
            "reference": outline.flight.reference,
            "leg": outline.flight.leg,
            "departure": departure_text(computation.document),
            "origin": outline.flight.origin,
            "destination": outline.flight.destination,
            "operation": outline.flight.operation,
        },
        **computation.result,
        "basis": {
            **versions_of(computation.basis, computation.empty_weight, computation.provisions),
            "configuration": outline.configuration,
            "engine": ENGINE_VERSION,
        },
        "digest": computation.digest,
        "cautions": cautions(invented=computation.aircraft.operator.invented),
    }


def summary_of(current: Current, *, reach: Reach) -> Answer:
    """This function will return one line of the list of loads, as `answer_of` has it."""
    result = current.result()
    return {
        **_standing(current, reach),
        "verdict": current.assessment.verdict,
        "governing": result.get("governing"),
        "digest": current.assessment.digest,
    }


def signatures_of(load: Load) -> list[Signature]:
    """This function will return the signatures of a load in the order they were given."""
    return list(Signature.objects.filter(load=load).order_by("signed_at", "id"))


def cautions(*, invented: bool) -> list[str]:
    """This function will return the sentences that stand beside every verdict."""
    return [INVENTED, *CAUTIONS] if invented else list(CAUTIONS)


def departure_text(document: Mapping[str, object]) -> str:
    """This function will return the planned departure as it was typed, with its offset."""
    flight = document["flight"]
    return str(flight["departure"]) if isinstance(flight, dict) else ""


def _standing(current: Current, reach: Reach) -> Answer:
    load = current.load
    replaces = load.replaces_id
    if replaces is not None and reach is not None:
        replaces = _seen(Load.objects.filter(id=replaces), reach)
    return {
        "id": load.id,
        "state": current.state,
        "step": current.step.number,
        "replaces": replaces,
        "aircraft": load.aircraft.registration,
        "configuration": load.configuration,
        "flight": {
            "reference": load.reference,
            "leg": load.leg,
            "departure": load.departure_text,
            "origin": load.origin,
            "destination": load.destination,
            "operation": load.operation,
        },
    }


def _seen(loads: "QuerySet[Load]", reach: Reach) -> UUID | None:
    if reach is not None:
        loads = loads.filter(aircraft__registration__in=reach)
    return loads.values_list("id", flat=True).first()


def _signature(one: Signature) -> Answer:
    return {
        "meaning": one.meaning,
        "capacity": one.capacity,
        "person": one.person_id,
        "signed_at": one.signed_at,
        "digest": one.digest,
    }


def late_answer(change: LateChange) -> Answer:
    """This function will return one last-minute change without the name of anybody."""
    bound = bound_of(change)
    return {
        "number": change.number,
        "issue": change.issue,
        "lines": [said(line, named=False) for line in lines_of(change)],
        "changed_at": change.changed_at,
        "person": change.person_id,
        "digest": change.assessment.digest,
        "moved": {
            "kilograms": decimal_text(change.kilograms_moved.normalize()),
            "persons": change.persons_moved,
        },
        "bound": bound_answer(bound),
    }


def bound_answer(bound: Bound) -> Answer:
    """This function will return the most that may change at the last minute, as the settings state it."""
    weight = {"value": decimal_text(bound.weight), "unit": bound.unit.value}
    return {"weight": weight, "persons": bound.persons, "settings": bound.settings_number}


def proposed_answer(current: Current, proposal: Proposal, number: int) -> Answer:
    """This function will return the answer about a last-minute change of which nothing is stored."""
    return {
        **computed_answer(proposal.computation),
        "load": current.load.id,
        "step": current.step.number,
        "number": proposal.number,
        "issue": proposal.issue,
        "lines": [said(line, named=False) for line in proposal.lines],
        "moved": proposal.bound.said(proposal.moved),
        "bound": bound_answer(proposal.bound),
        "to_sign": words_to_sign_late(current, proposal, number)
        if proposal.computation.verdict == "within"
        else "",
    }


def note_answer(note: Note) -> Answer:
    """This function will return one note after flight, with the name of who wrote it."""
    return {
        "id": note.id,
        "written_at": note.written_at,
        "person": note.person_id,
        "name": note.person.name,
        "text": note.text,
    }


def flag_answer(flag: LoadFlag) -> Answer:
    """This function will return one flag: that a later figure puts the flight outside, and which recheck
    found it.
    """
    return {
        "flagged_at": flag.flagged_at,
        "recheck": flag.recheck_id,
        "verdict_now": flag.now,
        "limit": flag.limit,
        "excess": flag.excess,
    }


def notes_of(load: Load) -> list[Note]:
    """This function will return the notes on a load, the first one first."""
    return list(Note.objects.filter(load=load).select_related("person").order_by("written_at", "id"))


def _warning(one: Double) -> Answer:
    return {
        "code": one.code,
        "detail": one.detail,
        "pointer": one.pointer,
        "load": one.load,
        "href": None if one.load is None else LOAD_PATH.format(one.load),
    }


def _manifest(load: Load) -> Answer | None:
    paper = Paper.objects.filter(load=load).first()
    if paper is None:
        return None
    issue = 1 + LateChange.objects.filter(load=load).count()
    return {"number": paper.number, "issue": issue, "href": MANIFEST_PATH.format(load.id)}
