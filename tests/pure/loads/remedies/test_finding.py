"""What of what was found is offered: nothing that the changed document would not bear out, the mildest first,
and a word on what was not tried.
"""

from typing import Any

import pytest

from loads.balance.assess import assess
from loads.balance.declared import read_load
from loads.balance.remedies.finding import NOT_IN_TIME, NOTHING, UNSETTLED, Remedies, find_remedies
from loads.balance.result import Result
from records.refusal import Fault, Invalid
from tests.pure.loads.remedies.rejects import (
    EMPTY,
    Asked,
    no_single_kind_helps,
    nothing_is_outside,
    question_of,
    somebody_stays,
    something_could_not_be_checked,
    too_far_aft,
    too_heavy_to_take_off,
)
from tests.pure.loads.round_figures import q


def found(asked: Asked, *, until: float = 60.0, reread: Any = None) -> Remedies:
    document, basis = asked
    question = question_of(asked)
    question.until = until

    def again(changed: dict[str, Any]) -> Result:
        return assess(read_load(changed, basis), basis, EMPTY, advised=False)

    return find_remedies(question, document, reread or again)


def kinds_of(remedies: Remedies) -> list[object]:
    return [offer["kind"] for offer in remedies.offers]


def coming_out(result: Result) -> Any:
    """What reads every changed document as one that comes out like this."""

    def reread(changed: dict[str, Any]) -> Result:
        assert changed["aircraft"]
        return result

    return reread


def test_a_document_that_would_be_refused_is_not_offered_and_then_people_are_the_last_resort() -> None:
    def refusing(changed: dict[str, Any]) -> Result:
        assert changed["aircraft"]
        raise Invalid(Fault("/items", "unknown", "there is no such place"))

    assert kinds_of(found(too_heavy_to_take_off(), reread=refusing)) == ["leave-people"]


def test_a_document_that_comes_out_outside_is_not_offered() -> None:
    outside = question_of(too_heavy_to_take_off()).result
    remedies = found(too_heavy_to_take_off(), reread=coming_out(outside))
    assert kinds_of(remedies) == ["leave-people"]
    assert remedies.said == ""


def test_what_is_told_is_what_came_out_of_the_changed_document() -> None:
    document, basis = too_heavy_to_take_off()
    lighter = assess(
        read_load(document | {"items": document["items"][:2]}, basis), basis, EMPTY, advised=False
    )
    first, *_ = found((document, basis), reread=coming_out(lighter)).offers
    assert first["figures"][0] == {  # type: ignore[index]  # rows of a document
        "title": "Take-off weight",
        "unit": "lb",
        "before": "3018",
        "after": "2988",
    }
    assert first["next"] == lighter.document["governing"]


@pytest.mark.parametrize(
    ("make", "until", "kinds", "said"),
    [
        (too_far_aft, 60.0, ["reseat", "move-items", "leave-items", "ballast"], ""),
        (too_heavy_to_take_off, 60.0, ["leave-items", "less-fuel"], ""),
        (too_heavy_to_take_off, 0.0, [], NOT_IN_TIME),
        (too_far_aft, 0.0, [], NOT_IN_TIME),
        (somebody_stays, 60.0, ["leave-people"], ""),
        (somebody_stays, 0.0, [], NOT_IN_TIME),
        (something_could_not_be_checked, 60.0, [], UNSETTLED),
        (something_could_not_be_checked, 0.0, [], UNSETTLED),
        (no_single_kind_helps, 60.0, [], NOTHING),
        (no_single_kind_helps, 0.0, [], NOT_IN_TIME),
        (nothing_is_outside, 60.0, [], ""),
    ],
)
def test_kinds_and_a_word_on_what_is_missing(make: Any, until: float, kinds: list[str], said: str) -> None:
    remedies = found(make(), until=until)
    assert kinds_of(remedies) == kinds
    assert remedies.said == said


def test_a_load_that_is_not_known_to_be_within_is_told_to_be_settled_first() -> None:
    document, basis = nothing_is_outside()
    del document["passengers"][0]["weight"]
    document["passengers"][0] |= {"how": "standard", "category": "adult"}
    question = question_of((document, basis))
    assert question.result.verdict == "unresolved"
    assert found((document, basis)) == Remedies((), UNSETTLED)
    document["items"].append({**document["items"][0], "weight": q(5)})
    assert found((document, basis)) == Remedies((), UNSETTLED)


def test_the_words_are_these() -> None:
    assert UNSETTLED == (
        "First settle what could not be checked; what is in the way then may be another matter."
    )
    assert NOTHING == (
        "No single kind of change brings this load within. Combine them, or plan the flight anew."
    )
    assert NOT_IN_TIME == "The time ran out before everything was tried."
