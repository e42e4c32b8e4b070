"""A load on the hook: its own arm and limit, a higher maximum only while it hangs there and can be released,
all else within the ordinary maximum, and the ordinary limits from the release on.

The principle is that of 14 CFR 27.25(c) and 29.25(c) as remembered: what exceeds the maximum weight is made
up only of the jettisonable external load, and nobody hangs outside. Figures are reckoned by hand on the
invented aircraft of `round_figures`: 2,200 lb with its pilot, 360 lb of fuel.
"""

from dataclasses import replace
from typing import Any

import pytest

from fleet.basis import Basis
from fleet.restrictions import apply
from loads.balance.declared import read_load
from loads.balance.result import Result
from records.refusal import Invalid
from tests.pure.loads.cases.test_hoist import FOUND
from tests.pure.loads.cases.test_loads_that_leave_or_move import event
from tests.pure.loads.making import F, limit
from tests.pure.loads.papers import lb, restriction
from tests.pure.loads.round_figures import at, box, flown, q, round_basis, round_load

DRUM = {"kind": "cargo", "what": "drum", "place": "HOOK", "weight": q(400), "how": "weighed"}
SLUNG = DRUM | {"jettisonable": True}
RELEASE = {"place": "HOOK", "what": "drum"}


def hook_basis(*envelopes: Any, external: Any = 3000, hook: Any = 500, **weights: Any) -> Basis:
    """The aircraft with its hook outside: ordinary maximum 2,600 lb, with an external load `external`."""
    basis = round_basis(*envelopes, weights={"take_off": 2600, "landing": 2600, "ramp": 2700} | weights)
    places = tuple(
        replace(one, external=True, maximum=None if hook is None else limit(hook))
        if one.id == "HOOK"
        else one
        for one in basis.places
    )
    higher = None if external is None else limit(external)
    entered = replace(basis.limits, with_external_load=higher)
    known = replace(basis.configurations[0], limits=entered)
    return replace(basis, places=places, limits=entered, configurations=(known,))


def slung(*events: Any, item: Any = SLUNG, jumpers: int = 0) -> dict[str, Any]:
    """A load that takes off with the drum on the hook."""
    document = round_load(jumpers, sequence=list(events)) if events else round_load(jumpers)
    return document | {"items": [item]}


def of(result: Result, code: str) -> tuple[Any, ...]:
    check = result.check(code)
    return check.outcome, check.actual, check.limit, check.room


def test_a_load_on_the_hook_may_weigh_more_than_the_ordinary_maximum_while_all_else_is_within() -> None:
    # take-off 2560 + 400 = 2960 of 3000; without the drum 2560 of 2600; after the release 2500 of 2600
    result = flown(slung(event(60, leave=[RELEASE])), hook_basis())

    assert of(result, "weight.take-off") == ("pass", "2960", "3000", 40)
    assert of(result, "weight.take-off-internal") == ("pass", "2560", "2600", 40)
    assert of(result, "weight.in-flight") == ("pass", "2960", "3000", 40)
    assert of(result, "weight.in-flight-internal") == ("pass", "2560", "2600", 40)
    assert of(result, "weight.ramp") == ("pass", "2560", "2700", 140)
    assert of(result, "weight.landing") == ("pass", "2440", "2600", 160)
    assert of(result, "place.HOOK") == ("pass", "400", "500", 100)
    assert result.check("weight.take-off").source == "VP2-FM rev B p. 6-4"
    assert result.verdict == "within"


@pytest.mark.parametrize(("external", "outcome"), [(2960, "pass"), (2959, "fail")])
def test_the_higher_maximum_is_a_limit_itself(external: int, outcome: str) -> None:
    result = flown(slung(event(60, leave=[RELEASE])), hook_basis(external=external))
    assert result.check("weight.take-off").outcome == outcome


@pytest.mark.parametrize(("ordinary", "outcome"), [(2560, "pass"), (2559, "fail")])
def test_all_but_the_load_on_the_hook_must_be_within_the_ordinary_maximum(
    ordinary: int, outcome: str
) -> None:
    result = flown(slung(event(60, leave=[RELEASE])), hook_basis(take_off=ordinary))
    assert result.check("weight.take-off").outcome == "pass"
    assert of(result, "weight.take-off-internal")[0] == outcome


def test_a_load_that_cannot_be_released_has_the_ordinary_limits() -> None:
    result = flown(slung(event(60, leave=[RELEASE]), item=DRUM), hook_basis())
    assert of(result, "weight.take-off") == ("fail", "2960", "2600", -360)


def test_without_a_release_the_ordinary_landing_limit_stands() -> None:
    # 2440 + 400 = 2840 at the landing
    result = flown(slung(), hook_basis())
    assert result.check("weight.take-off").outcome == "pass"
    assert of(result, "weight.landing") == ("fail", "2840", "2600", -240)


def test_a_higher_maximum_that_was_not_entered_is_unresolved_where_it_is_needed() -> None:
    result = flown(slung(event(60, leave=[RELEASE])), hook_basis(external=None))
    check = result.check("weight.take-off")
    assert (check.outcome, check.limit) == ("unresolved", None)
    assert check.margin_text.endswith("the maximum with an external load was not entered")
    # Within the ordinary maximum none is needed.
    assert of(flown(slung(), hook_basis(external=None, take_off=2960)), "weight.take-off")[0] == "pass"


def test_a_hook_whose_limit_was_not_entered_is_unresolved() -> None:
    assert flown(slung(event(60, leave=[RELEASE])), hook_basis(hook=None)).check("place.HOOK").outcome == (
        "unresolved"
    )


def test_with_somebody_outside_no_higher_maximum_holds() -> None:
    # the jumper is lowered on the hook beside the drum: 3120 lb and 600 lb on the hook
    down = [event(40, move=[{"seat": "S1", "to": "HOOK"}]), event(80, leave=[RELEASE])]
    basis = hook_basis(external=3400, take_off=2800, landing=2800, ramp=2800)
    result = flown(slung(*down, jumpers=1), basis)

    assert of(result, "weight.take-off") == ("pass", "3160", "3400", 240)
    check = result.check("weight.in-flight")
    assert (check.outcome, check.actual, check.limit) == ("fail", "3120", "2800")
    assert "somebody hangs outside, so no higher weight holds" in check.margin_text
    assert result.check("place.HOOK").actual == "600"


def test_a_load_picked_up_in_flight_counts_from_there_until_it_is_released() -> None:
    # take-off 2560; at 30 lb the drum: 2930 of 3000, 2530 of 2600 without it; set down at 90 lb
    run = [event(30, come_aboard=[SLUNG]), event(90, leave=[RELEASE])]
    result = flown(round_load(sequence=run), hook_basis())

    assert of(result, "weight.take-off") == ("pass", "2560", "2600", 40)
    # 40 lb of room at the take-off itself is the least there is; with the drum 70 are left
    assert of(result, "weight.in-flight") == ("pass", "2560", "2600", 40)
    assert of(result, "weight.in-flight-internal") == ("pass", "2530", "2600", 70)
    assert at(result, "landing")[0] == 2440
    tight = flown(round_load(sequence=run), hook_basis(external=2929))
    assert of(tight, "weight.in-flight") == ("fail", "2930", "2929", -1)


def test_after_the_release_the_ordinary_limits_hold_again() -> None:
    # the drum goes at 30 lb, and 200 lb are taken up at once: 2530 + 220 = 2750 of 2600
    run = [event(30, leave=[RELEASE]), event(30, come_aboard=[FOUND])]
    result = flown(slung(*run), hook_basis())
    check = result.check("weight.in-flight")
    assert (check.outcome, check.actual, check.limit) == ("fail", "2750", "2600")
    assert check.title == "weight in flight, just after event 2"


def test_both_sides_of_the_release_are_on_the_path() -> None:
    # 2900 lb at 280000 before, 2500 lb at 248000 after: 96.55 and 99.2 in
    document = slung(event(60, leave=[RELEASE]))
    assert flown(document, hook_basis(box("96.5", "99.2"))).check("path.longitudinal").outcome == "pass"
    after = flown(document, hook_basis(box("96.5", "99.1"))).check("path.longitudinal")
    assert "aft" in after.margin_text
    before = flown(document, hook_basis(box("96.56", 105))).check("path.longitudinal")
    assert before.room == F(280_000, 2900) - F("96.56")


def test_the_allowable_take_off_weight_is_the_lesser_of_both_maxima() -> None:
    result = flown(slung(event(60, leave=[RELEASE])), hook_basis(external=2980))
    allowable = result.as_document()["allowable_take_off"]
    assert isinstance(allowable, dict)
    assert (allowable["weight"], allowable["governed_by"]) == ("2980", "maximum with an external load")
    other = flown(slung(event(60, leave=[RELEASE])), hook_basis()).as_document()["allowable_take_off"]
    assert isinstance(other, dict)
    # 2600 for all but the drum, and 400 lb of drum: 3000, as much as the maximum with it
    assert other["weight"] == "3000"


@pytest.mark.parametrize(
    ("item", "code"),
    [
        (SLUNG | {"place": "HOLD"}, "jettisonable-inside"),
        (SLUNG | {"kind": "equipment", "removed": True}, "jettisonable-removed"),
        (SLUNG | {"jettisonable": "yes"}, "flag-form"),
    ],
)
def test_what_cannot_be_released_is_refused_as_such(item: Any, code: str) -> None:
    with pytest.raises(Invalid) as caught:
        read_load(slung(item=item), hook_basis())
    assert [(fault.pointer, fault.code) for fault in caught.value.faults] == [("/items/0/jettisonable", code)]


HIGHER = {"effect": "limit", "limit": "with_external_load", "weight": lb("2950")}


def test_a_restriction_lowers_the_higher_maximum_and_never_makes_one() -> None:
    lowered = apply(hook_basis(), (restriction(HIGHER),))
    result = flown(slung(event(60, leave=[RELEASE])), lowered.basis)
    assert of(result, "weight.take-off") == ("fail", "2960", "2950", -10)
    assert result.check("weight.take-off").source.startswith("restriction DD-14")

    none = apply(hook_basis(external=None), (restriction(HIGHER),))
    assert none.basis.configurations[0].limits.with_external_load is None
    assert none.unmet == (
        "restriction DD-14 names with_external_load, which the loading basis does not have",
    )
