"""Sums over sets of seats and places: rows, zones, running sums from nose or tail, and maxima that depend on
what is fitted. Common practice of flight manuals, no rule behind the figures; the sums are reckoned by hand.
"""

from collections.abc import Iterable
from dataclasses import replace
from fractions import Fraction
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from fleet.basis import Basis, Zone
from fleet.stations import Condition, Conditional, Cumulative, CumulativeStep
from loads.balance.checks_running import running_checks
from loads.balance.declared import read_load
from loads.balance.prepared import prepared
from records.refusal import Invalid
from tests.pure.loads.making import SOURCE, F, limit, load, place, result_of, seat, twin

NET = Condition("NET", "net fitted", SOURCE)
DOOR = Condition("DOOR-OFF", "cabin door off", SOURCE)


def lb(weight: str | int) -> dict[str, Any]:
    return {"value": weight, "unit": "lb"}


def people(**weights: str | int) -> list[dict[str, Any]]:
    return [
        {"name": f"P. {name}", "seat": name.replace("_", "-"), "weight": lb(weight), "how": "weighed"}
        for name, weight in weights.items()
    ]


def item(where: str, weight: str | int, **more: Any) -> dict[str, Any]:
    return {"kind": "cargo", "what": "crates", "place": where, "weight": lb(weight), "how": "weighed", **more}


def loaded(items: Iterable[dict[str, Any]] = (), **weights: str | int) -> dict[str, Any]:
    """The crew of one (181 lb), these passengers and these items."""
    passengers = people(**weights)
    return load(persons_on_board=1 + len(passengers), passengers=passengers, items=list(items))


def step(name: str, most: Any, *members: str) -> CumulativeStep:
    return CumulativeStep(name, members, None if most == "absent" else limit(most))


def running(start: Any, *steps: CumulativeStep) -> Basis:
    return replace(twin(), cumulative=(Cumulative("FLOOR", "cabin floor", start, steps),))


def from_nose(row1: Any, hold: Any = 250, cockpit: Any = 500) -> Basis:
    return running(
        "nose",
        step("nose hold", hold, "NOSE-HOLD"),
        step("cockpit", cockpit, "COCKPIT-L", "COCKPIT-R"),
        step("row 1", row1, "ROW1-L", "ROW1-R"),
    )


# Nose hold 200, cockpit 181, row 1 176 + 160: the running sum is 200, 381, 717 lb.
HANDED = loaded([item("NOSE-HOLD", 200)], ROW1_L=176, ROW1_R=160)


def test_a_running_sum_is_checked_at_every_station_and_the_worst_one_is_named() -> None:
    check = result_of(HANDED, from_nose(row1=700)).check("cumulative.FLOOR")

    assert (check.outcome, check.actual, check.limit, check.margin) == ("fail", "717", "700", "-17")
    assert check.title == "cabin floor, nose to row 1"
    assert check.what_next == (
        "Take off at least 17 lb of what is from the nose to row 1, or move it further aft."
    )
    assert check.source == str(SOURCE)
    stations = check.as_document()["at"]["stations"]  # type: ignore[index] # what a document holds
    assert [(one["station"], one["sum"], one["limit"]) for one in stations] == [
        ("nose hold", "200", "250"),
        ("cockpit", "381", "500"),
        ("row 1", "717", "700"),
    ]


def test_on_the_limit_of_a_running_sum_is_within_and_a_hair_less_is_not() -> None:
    on = result_of(HANDED, from_nose(row1=717)).check("cumulative.FLOOR")
    beyond = result_of(HANDED, from_nose(row1="716.99")).check("cumulative.FLOOR")

    assert (on.outcome, on.margin_text) == ("pass", "on the limit")
    assert beyond.outcome == "fail"
    assert beyond.actual == "717"
    assert beyond.limit == "716.9"  # a limit is never printed above its value


def test_the_worst_station_is_the_one_with_the_least_room_not_the_last() -> None:
    check = result_of(HANDED, from_nose(row1=800, cockpit=385)).check("cumulative.FLOOR")

    assert (check.title, check.margin) == ("cabin floor, nose to cockpit", "4")


def test_a_running_sum_from_the_tail_adds_up_forward() -> None:
    steps = (step("aft hold", 130, "AFT-HOLD"), step("row 2", 400, "ROW2-L", "ROW2-R"))
    tail = running("tail", *steps, step("row 1", 450, "ROW1-L", "ROW1-R"))

    # Aft hold 120, row 2 170, row 1 165: 120, 290, 455 lb.
    check = result_of(loaded([item("AFT-HOLD", 120)], ROW2_L=170, ROW1_R=165), tail).check("cumulative.FLOOR")

    assert (check.outcome, check.actual, check.margin) == ("fail", "455", "-5")
    assert check.what_next.endswith("from the tail to row 1, or move it further forward.")


def test_a_station_without_a_limit_is_unresolved_unless_a_page_shows_there_is_none() -> None:
    absent = result_of(HANDED, from_nose(row1="absent"))
    none = result_of(HANDED, from_nose(row1=None))

    assert absent.check("cumulative.FLOOR").outcome == "unresolved"
    assert "row 1" in absent.check("cumulative.FLOOR").margin_text
    assert absent.verdict == "unresolved"
    assert none.check("cumulative.FLOOR").outcome == "pass"
    assert none.check("cumulative.FLOOR").title == "cabin floor, nose to nose hold"  # 50 lb, the least


def test_a_weight_that_is_not_known_leaves_every_later_station_unresolved() -> None:
    passengers = [{"name": "P. One", "seat": "ROW1-L", "how": "standard", "category": "adult"}]
    document = load(persons_on_board=2, passengers=passengers, items=[item("NOSE-HOLD", 200)])

    check = result_of(document, from_nose(row1=700)).check("cumulative.FLOOR")

    assert check.outcome == "unresolved"
    assert check.what_next == "Enter the weight of all that is from the nose to row 1."


def test_a_limit_broken_before_the_unknown_is_still_broken() -> None:
    passengers = [{"name": "P. One", "seat": "ROW1-L", "how": "standard", "category": "adult"}]
    document = load(persons_on_board=2, passengers=passengers, items=[item("NOSE-HOLD", 200)])

    check = result_of(document, from_nose(row1=700, hold=199)).check("cumulative.FLOOR")

    assert (check.outcome, check.title) == ("fail", "cabin floor, nose to nose hold")


def test_a_load_that_puts_nothing_on_any_station_has_nothing_to_check() -> None:
    tail = running("tail", step("aft hold", 1, "AFT-HOLD"))

    assert not [c for c in result_of(loaded(), tail).checks if c.code.startswith("cumulative.")]


@given(
    st.lists(st.integers(0, 60), min_size=5, max_size=5),
    st.lists(st.integers(1, 200), min_size=5, max_size=5),
)
def test_running_sums_agree_with_adding_up_by_hand(weights: list[int], most: list[int]) -> None:
    names = ("NOSE-HOLD", "COCKPIT-L", "ROW1-L", "ROW2-L", "AFT-HOLD")
    basis = running("nose", *(step(name, top, name) for name, top in zip(names, most, strict=True)))
    held: dict[str, Fraction | None] = {
        name: Fraction(weight) for name, weight in zip(names, weights, strict=True) if weight
    }

    rooms = [top - sum(weights[: place + 1]) for place, top in enumerate(most)]  # the other way to do it
    first = next((place for place, weight in enumerate(weights) if weight), None)
    checks = running_checks(held, prepared(basis))

    if first is None:
        assert checks == []
    else:
        assert checks[0].room == min(rooms[first:])
        assert (checks[0].outcome == "fail") == (min(rooms[first:]) < 0)


def with_conditions(**conditional: tuple[Conditional, ...]) -> Basis:
    basis = twin()
    hold = replace(place("AFT-HOLD", 190, 150), conditional=conditional.get("hold", ()))
    row = replace(seat("ROW2-L", 155, -12, "passenger", 200), conditional=conditional.get("seat", ()))
    zone = Zone("REAR", "rear floor", ("AFT-HOLD", "ROW2-L"), limit(300), conditional.get("zone", ()))
    return replace(
        basis,
        places=tuple(hold if one.id == hold.id else one for one in basis.places),
        seats=tuple(row if one.id == row.id else one for one in basis.seats),
        zones=(zone,),
        conditions=(NET, DOOR),
    )


def when(most: Any, *conditions: str) -> Conditional:
    return Conditional(frozenset(conditions), limit(most))


HEAVY = loaded([item("AFT-HOLD", 240)])


def test_a_net_that_is_fitted_and_declared_raises_the_limit_and_the_check_says_so() -> None:
    basis = with_conditions(hold=(when(280, "NET"),))

    fitted = result_of({**HEAVY, "conditions": ["NET"]}, basis)
    check = fitted.check("place.AFT-HOLD")

    assert (check.outcome, check.limit, check.margin) == ("pass", "280", "40")
    assert check.title == "aft hold, net fitted"
    assert "declared as fitted: net fitted" in fitted.as_document()["advisories"]


def test_a_condition_that_is_not_declared_does_not_hold() -> None:
    check = result_of(HEAVY, with_conditions(hold=(when(280, "NET"),))).check("place.AFT-HOLD")

    assert (check.outcome, check.limit, check.margin) == ("fail", "150", "-90")
    assert check.title == "aft hold"
    assert check.what_next == "Move or take off at least 90 lb from aft hold."


def test_of_conditions_that_hold_at_once_the_tightest_counts_unless_one_is_for_all_of_them() -> None:
    apart = with_conditions(hold=(when(280, "NET"), when(200, "DOOR-OFF")))
    together = with_conditions(hold=(when(280, "NET"), when(200, "DOOR-OFF"), when(250, "NET", "DOOR-OFF")))
    both = {**HEAVY, "conditions": ["NET", "DOOR-OFF"]}

    assert result_of(both, apart).check("place.AFT-HOLD").limit == "200"
    assert result_of(both, apart).check("place.AFT-HOLD").title == "aft hold, cabin door off"
    assert result_of(both, together).check("place.AFT-HOLD").limit == "250"
    assert result_of(both, together).check("place.AFT-HOLD").title == "aft hold, net fitted, cabin door off"


def test_seats_and_zones_can_depend_on_what_is_fitted_too() -> None:
    basis = with_conditions(seat=(when(120, "DOOR-OFF"),), zone=(when(260, "DOOR-OFF"),))
    document = {**loaded([item("AFT-HOLD", 140)], ROW2_L=130), "conditions": ["DOOR-OFF"]}
    result = result_of(document, basis)

    assert result.check("seat.ROW2-L").margin == "-10"  # 130 of 120
    assert result.check("zone.REAR").margin == "-10"  # 140 + 130 of 260


def test_a_condition_may_take_a_limit_away_where_the_page_says_there_is_none() -> None:
    basis = with_conditions(hold=(when(None, "NET"),))

    check = result_of({**HEAVY, "conditions": ["NET"]}, basis).check("place.AFT-HOLD")

    assert (check.outcome, check.margin_text) == ("pass", "no limit")


@pytest.mark.parametrize(
    ("conditions", "pointer", "code"),
    [
        (["SKIS"], "/conditions/0", "unknown-condition"),
        (["NET", "NET"], "/conditions/1", "duplicate"),
        ([7], "/conditions/0", "text-form"),
        ("NET", "/conditions", "list-form"),
        ([""], "/conditions/0", "empty"),
    ],
)
def test_a_condition_the_basis_does_not_know_is_refused_with_its_field(
    conditions: Any, pointer: str, code: str
) -> None:
    with pytest.raises(Invalid) as refused:
        read_load({**HEAVY, "conditions": conditions}, with_conditions(hold=(when(280, "NET"),)))

    assert (pointer, code) in {(fault.pointer, fault.code) for fault in refused.value.faults}


def test_a_row_is_a_zone_and_counts_the_infant_and_the_restraint_in_it() -> None:
    row = Zone("ROW-1", "row 1", ("ROW1-L", "ROW1-R"), limit(360))
    passengers = people(ROW1_L=170, ROW1_R=160)
    passengers[1] |= {
        "lap_infant": {"name": "I. Kamau", "weight": lb(22), "how": "weighed"},
        "restraint": lb(9),
    }
    document = load(persons_on_board=4, passengers=passengers, items=[])

    check = result_of(document, replace(twin(), zones=(row,))).check("zone.ROW-1")

    assert check.room == F(-1)  # 170 + 160 + 22 + 9 = 361 of 360
