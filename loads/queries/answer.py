"""One load as the API answers it: plain values, in the order they are read."""

from collections.abc import Mapping
from datetime import datetime

from loads.balance.engine import ENGINE_VERSION
from loads.cautions import CAUTIONS, INVENTED
from loads.lifecycle import ways_out
from loads.models import Load, Paper, Signature
from loads.queries.computation import Computation, versions_of
from loads.queries.current import Current
from loads.queries.declaration import declared_now
from loads.queries.signable import signatures_due
from loads.queries.stale import stale_parts

MANIFEST_PATH = "/api/v1/loads/{}/manifest"
Answer = dict[str, object]


def answer_of(current: Current) -> Answer:
    """This function will return the answer about a stored load, without the name of any person.

    It is what a change of state answers, and such answers are kept a while for repeated requests.
    """
    before, _, after = answer_parts(current)
    return {**before, **current.result(), **after}


def answer_parts(current: Current) -> tuple[Answer, str, Answer]:
    """This function will return what stands before the result document in the answer, the result as the text
    that is stored, and what stands behind it.
    """
    load, used = current.load, current.assessment
    begun = current.step.number > 1  # a first step can have neither signature nor manifest
    after = {
        "basis": {
            **versions_of(used.loading_basis, used.empty_weight),
            "configuration": load.configuration,
            "engine": used.engine,
        },
        "digest": used.digest,
        "submitted_at": load.submitted_at,
        "assessed_at": used.assessed_at,
        "signatures": [_signature(one) for one in signatures_of(load)] if begun else [],
        "manifest": _manifest(load) if begun else None,
        "cautions": cautions(invented=load.operator.invented),
    }
    return _standing(current), used.result, after


def full_answer_of(current: Current, *, known: datetime) -> Answer:
    """This function will return all there is to read about a load: also what was declared, the names of the
    signers, every step, and whether the assessment still rests on what is in force as known at `known`.
    """
    load, declared = current.load, declared_now(current)
    signatures = [
        {**_signature(one), "name": bytes(one.name).decode(), "statement": one.statement}
        for one in signatures_of(load)
    ]
    return {
        **answer_of(current),
        "signatures": signatures,
        "stale": list(stale_parts(current, known)) if ways_out(current.state) else [],
        "replaced_by": Load.objects.filter(replaces=load).values_list("id", flat=True).first(),
        "steps": [
            {"number": one.number, "state": one.after, "at": one.at, "reason": one.reason}
            for one in load.steps.order_by("number")
        ],
        "to_sign": signatures_due(current, declared),
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
            **versions_of(computation.basis, computation.empty_weight),
            "configuration": outline.configuration,
            "engine": ENGINE_VERSION,
        },
        "digest": computation.digest,
        "cautions": cautions(invented=computation.aircraft.operator.invented),
    }


def summary_of(current: Current) -> Answer:
    """This function will return one line of the list of loads."""
    result = current.result()
    return {
        **_standing(current),
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


def _standing(current: Current) -> Answer:
    load = current.load
    return {
        "id": load.id,
        "state": current.state,
        "step": current.step.number,
        "replaces": load.replaces_id,
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


def _signature(one: Signature) -> Answer:
    return {
        "meaning": one.meaning,
        "capacity": one.capacity,
        "person": one.person_id,
        "signed_at": one.signed_at,
        "digest": one.digest,
    }


def _manifest(load: Load) -> Answer | None:
    paper = Paper.objects.filter(load=load).first()
    return {"number": paper.number, "href": MANIFEST_PATH.format(load.id)} if paper else None
