"""What would bring a load within, and what room there is in one that is: computed when asked, not stored."""

import time
from collections import OrderedDict
from collections.abc import Callable, Sequence
from datetime import datetime
from hashlib import sha256
from threading import Lock
from typing import Any

from fleet.applicable import applicable
from fleet.models import Aircraft
from fleet.queries.aircraft import aircraft_of
from fleet.queries.figures import basis_of
from fleet.queries.in_force import InForce, in_force_for
from loads.balance.aboard import Declared, Outline
from loads.balance.assess import assess
from loads.balance.declared import read_outline
from loads.balance.engine import ENGINE_VERSION
from loads.balance.prepared import prepared
from loads.balance.remedies.error import room_for_error
from loads.balance.remedies.finding import find_remedies
from loads.balance.remedies.more import how_much_more
from loads.balance.remedies.question import Question
from loads.balance.result import Result
from loads.queries.answer import cautions
from loads.queries.computation import assessed_with
from loads.queries.current import Current
from loads.queries.declaration import declared_now
from loads.queries.figures import empty_figures
from loads.queries.provided import declared_under, ruled_for
from records.canonical import canonical_of_exact
from records.strict_json import JSON

# In all, of this thread's processor time, so that a busy machine tells no less; what was found until then is
# told, as the best found.
SECONDS = 1.5
MOST_KEPT = 256
NO_BASIS = "No loading basis is in force at the departure."
NOT_IN_TIME = "The time ran out before all of it was computed."
Answer = dict[str, Any]

_KEPT: "OrderedDict[bytes, Answer]" = OrderedDict()
_LOCK = Lock()


def remedies_answer(current: Current, known: datetime) -> Answer:
    """This function will return what the API answers about a stored load: what would bring it within, or the
    room in it, as known at `known`.
    """
    load = current.load
    return {
        "load": load.id,
        "step": current.step.number,
        **remedies_for(load.operator_id, declared_now(current), known),
        "cautions": cautions(invented=load.operator.invented),
    }


def remedies_for(
    operator: str, document: dict[str, JSON], known: datetime, *, seconds: float = SECONDS
) -> Answer:
    """This function will return what would bring a load document within, or the room in it, with the versions
    in force at its departure, as known at `known`. Raises Invalid for a document that cannot be read.

    The latest answers are kept in this process, each under all it was computed from.
    """
    outline = read_outline(document)
    aircraft = aircraft_of(operator, outline.aircraft)
    used = in_force_for(aircraft, outline.flight.departure, known, outline.configuration)
    question = _question(document, outline, used, known, seconds)
    if question is None:
        return _answer("unresolved", said=NO_BASIS)
    key = _key(document, used, question.result)
    with _LOCK:
        kept = _KEPT.get(key)
    if kept is not None:
        return kept
    found = _found(question, document, _reader(aircraft, outline, used, known))
    if question.left():
        with _LOCK:
            _KEPT[key] = found
            while len(_KEPT) > MOST_KEPT:
                _KEPT.popitem(last=False)
    return found


def _question(
    document: dict[str, JSON], outline: Outline, used: InForce, known: datetime, seconds: float
) -> Question | None:
    if used.basis is None:
        return None
    ruled = ruled_for(basis_of(used.basis), used.provisions, outline)
    declared = declared_under(document, used, ruled, known)
    empty = (
        empty_figures(used.empty_weight.document, used.basis.document)
        if used.empty_weight is not None
        else None
    )

    def judge(changed: Declared) -> Result:
        return assess(changed, ruled.basis, empty, advised=False)

    category = None if declared.category is None else declared.category.id
    ready = prepared(applicable(ruled.basis, declared.configuration.id, category))
    until = time.thread_time() + seconds
    return Question(declared, judge(declared), ready, judge, time.thread_time, until)


def _found(
    question: Question, document: dict[str, JSON], reread: Callable[[dict[str, Any]], Result]
) -> Answer:
    if question.result.verdict == "within":
        more, error = how_much_more(question), room_for_error(question)
        return _answer("within", more=more, error=error, said="" if question.left() else NOT_IN_TIME)
    found = find_remedies(question, document, reread)
    return _answer(question.result.verdict, remedies=found.offers, said=found.said)


def _reader(
    aircraft: Aircraft, outline: Outline, used: InForce, known: datetime
) -> Callable[[dict[str, Any]], Result]:
    """This function will return what assesses a changed document as if it had been sent in."""

    def reread(changed: dict[str, Any]) -> Result:
        again = read_outline(changed)
        held = used
        if again.configuration != outline.configuration:
            held = in_force_for(aircraft, again.flight.departure, known, again.configuration)
        return assessed_with(changed, again, held, known, advised=False)[1]

    return reread


def _key(document: dict[str, JSON], used: InForce, result: Result) -> bytes:
    """This function will return a digest of all that an answer is computed from."""
    provisions = used.provisions
    held = (*provisions.restrictions, *provisions.permits, provisions.standard_weights)
    versions = (used.basis, used.empty_weight, *held)
    digests = [str(one.digest) for one in versions if one is not None]
    parts = (canonical_of_exact(document), canonical_of_exact(result.as_document()), repr(digests).encode())
    return sha256(b"\n".join(parts)).digest()


def _answer(
    verdict: str,
    *,
    remedies: Sequence[Answer] = (),
    more: Sequence[Answer] = (),
    error: Sequence[Answer] = (),
    said: str = "",
) -> Answer:
    return {
        "verdict": verdict,
        "engine": ENGINE_VERSION,
        "remedies": list(remedies),
        "more": list(more),
        "error": list(error),
        "said": said,
    }
