"""All remedies for a load outside its limits: the smallest change of each kind, assessed before it is
offered.

    kind             smallest means
    reseat           fewest people moved, then least weight moved
    move-items       fewest lines moved, then least weight moved
    rearrange        both together, where neither does it alone: fewest moved, then least weight moved
    leave-items      least weight left behind
    ballast          least ballast
    less-fuel        least fuel left out, above the minimum at landing: in whole tenths, of one tank, or alike
                     of the tanks of one stage of the burn
    fuel-elsewhere   least fuel in other tanks: in tenths, from one tank or stage to another
    configuration    none: every other configuration that carries all of it as it is
    leave-people     fewest people; only where nothing else helps, and nobody is named

No crew moves, no weighed figure changes, and whatever is offered was found within by the whole assessment,
read again from the changed document.
"""

from collections.abc import Callable, Mapping
from dataclasses import dataclass
from typing import Any

from loads.balance.remedies.amounts import least_ballast, least_removed
from loads.balance.remedies.arranging import Found, arranged
from loads.balance.remedies.fuelling import fuel_elsewhere, less_fuel
from loads.balance.remedies.leaving import fewest_left
from loads.balance.remedies.patching import patch_of, patched
from loads.balance.remedies.question import Question, broken
from loads.balance.remedies.reach import ways_of
from loads.balance.remedies.refitting import refitted
from loads.balance.remedies.wording import figures, left_sentence, mended, sentence
from loads.balance.result import Json, Result
from records.refusal import Invalid

Reread = Callable[[dict[str, Any]], Result]

SMALLEST = "smallest"
BEST_FOUND = "best found"
UNSETTLED = "First settle what could not be checked; what is in the way then may be another matter."
NOTHING = "No single kind of change brings this load within. Combine them, or plan the flight anew."
NOT_IN_TIME = "The time ran out before everything was tried."


@dataclass(frozen=True, slots=True)
class Remedies:
    """What was found: documents in plain values, and a sentence where there is something to say besides."""

    offers: tuple[Json, ...]
    said: str


def find_remedies(question: Question, document: Mapping[str, Any], reread: Reread) -> Remedies:
    """Return the remedies for a load, the mildest kind first; none for a load that is not outside.

    `reread` assesses a changed document as if it had been sent in, and may refuse it.
    """
    stops = broken(question.result)
    if question.result.verdict != "outside" or not question.result.states:
        return Remedies((), UNSETTLED if stops else "")
    if any(check.outcome == "unresolved" for check in stops):
        return Remedies((), UNSETTLED)
    offers = []
    for kind, found in _found(question):
        offer = _offer(question, kind, found, document, reread)
        if offer is not None:
            offers.append(offer)
    if not offers:
        offers += _last_resort(question)
    out_of_time = "" if question.left() else NOT_IN_TIME
    return Remedies(tuple(offers), out_of_time if offers else out_of_time or NOTHING)


def _found(question: Question) -> list[tuple[str, Found]]:
    ways = ways_of(question.result, question.ready)
    people = arranged(question, ways, people=True, items=False)
    items = arranged(question, ways, people=False, items=True)
    both = arranged(question, ways, people=True, items=True) if people is None and items is None else None
    each = [
        ("reseat", people),
        ("move-items", items),
        ("rearrange", both),
        ("leave-items", least_removed(question)),
        ("ballast", least_ballast(question)),
        ("less-fuel", less_fuel(question)),
        ("fuel-elsewhere", fuel_elsewhere(question)),
    ]
    found = [(kind, one) for kind, one in each if one is not None]
    return found + [("configuration", one) for one in refitted(question)]


def _offer(
    question: Question, kind: str, found: Found, document: Mapping[str, Any], reread: Reread
) -> Json | None:
    """Return what is offered; None where the changed document does not come out within."""
    plan = question.declared.fuel
    patch = patch_of(found.steps, document, plan.density, question.ready)
    try:
        result = reread(patched(document, patch))
    except Invalid:
        return None
    if result.verdict != "within":
        return None
    words = sentence(found.steps, plan, question.ready)
    proved = SMALLEST if found.proven and kind != "configuration" else BEST_FOUND
    return _told(question, kind, words, proved, result) | {"change": patch}


def _last_resort(question: Question) -> list[Json]:
    left = fewest_left(question)
    if left is None:
        return []
    words = left_sentence(left, question.ready)
    proved = SMALLEST if left.proven else BEST_FOUND
    return [_told(question, "leave-people", words, proved, left.result) | {"change": []}]


def _told(question: Question, kind: str, words: str, proved: str, result: Result) -> Json:
    return {
        "kind": kind,
        "sentence": words,
        "found": proved,
        "figures": figures(question.result, result, question.ready),
        "mended": mended(question.result, result),
        "next": result.document.get("governing"),
    }
